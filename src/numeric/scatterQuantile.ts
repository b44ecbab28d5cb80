import { normalDeviates } from "./normalDeviate.ts";
import type { Scatter, ScatterPart } from "./scatter.ts";

/** Writes the values at some probabilities into a column of the same length, another one than theirs. */
export type ScatterColumn = (probabilities: Float64Array, out: Float64Array) => void;

/**
 * What an input is at probabilities inside (0, 1), by the way in which it scatters: a column at once and without
 * garbage, for draws.
 *
 * Source: inverse distribution functions, as in any text on statistics; the parts of a mixture follow each other, so
 *         that its quantile does not rise throughout, which a draw need not mind
 *
 * @param value    value about which a normal, or median about which a log-normal scatters
 * @param scatter  as `momentsOf` takes it
 */
export function scatterColumn(value: number, scatter: Scatter): ScatterColumn {
  switch (scatter.kind) {
    case "normal": {
      const { sigma } = scatter;
      return (probabilities, out) => {
        normalDeviates(probabilities, out);
        for (let i = 0; i < out.length; i++) out[i] = value + sigma * out[i]!;
      };
    }
    case "lognormal": {
      const spread = Math.log(scatter.factor);
      return (probabilities, out) => {
        normalDeviates(probabilities, out);
        for (let i = 0; i < out.length; i++) out[i] = value * Math.exp(spread * out[i]!);
      };
    }
    case "flat": {
      const { low, high } = scatter;
      return (probabilities, out) => {
        for (let i = 0; i < out.length; i++) out[i] = low + (high - low) * probabilities[i]!;
      };
    }
    case "exponential": {
      const { mean } = scatter;
      return (probabilities, out) => {
        for (let i = 0; i < out.length; i++) out[i] = -mean * Math.log(1 - probabilities[i]!);
      };
    }
    case "mixture":
      return mixtureColumn(scatter.parts);
  }
}

/** Each part gets the draws that fall into its share, spread over (0, 1) again. */
function mixtureColumn(parts: readonly ScatterPart[]): ScatterColumn {
  let below = 0;
  const ready = parts.map(({ share, value, scatter }, k) => {
    const from = below;
    below += share;
    // The last part takes what rounding of the shares leaves.
    const to = k === parts.length - 1 ? Number.POSITIVE_INFINITY : below;
    return { from, to, share, value, fill: scatter && scatterColumn(value, scatter) };
  });
  let own = new Float64Array(0);
  let drawn = new Float64Array(0);
  return (probabilities, out) => {
    if (own.length !== out.length) {
      own = new Float64Array(out.length);
      drawn = new Float64Array(out.length);
    }
    for (const { from, to, share, value, fill } of ready) {
      for (let i = 0; i < out.length; i++) {
        const p = probabilities[i]!;
        own[i] = p >= from && p < to ? Math.min(LARGEST, Math.max(1 - LARGEST, (p - from) / share)) : 0.5;
      }
      if (fill === undefined) drawn.fill(value);
      else fill(own, drawn);
      for (let i = 0; i < out.length; i++) {
        const p = probabilities[i]!;
        if (p >= from && p < to) out[i] = drawn[i]!;
      }
    }
  };
}

const LARGEST = 1 - 2 ** -40;

/** The same for one probability at a time. */
export function scatterQuantile(value: number, scatter: Scatter): (probability: number) => number {
  const fill = scatterColumn(value, scatter);
  const [at, out] = [new Float64Array(1), new Float64Array(1)];
  return (probability) => {
    at[0] = probability;
    fill(at, out);
    return out[0]!;
  };
}
