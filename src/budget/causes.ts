import { normalCdf } from "../numeric/normal.ts";
import { normalDeviate, normalDeviates } from "../numeric/normalDeviate.ts";
import type { Scatter } from "../numeric/scatter.ts";
import { scatterColumn } from "../numeric/scatterQuantile.ts";
import type { EndName } from "../scenario/types.ts";

/** What a cause is about: what its user could look into, measure or mend. */
export type Matter =
  | "power"
  | "line"
  | "gain"
  | "aim"
  | "match"
  | "cover"
  | "water"
  | "rate"
  | "extent"
  | "air"
  | "place"
  | "ground"
  | "trees"
  | "tilt"
  | "noise"
  | "sky"
  | "operator"
  | "blunder";

/** Something that nobody knows exactly, drawn once for all cases. */
export interface Cause {
  /** Name of its stream of random numbers, such as `tx.power`. */
  readonly id: string;
  readonly matter: Matter;
  readonly end?: EndName | undefined;
  readonly label: string;
  readonly scatter: Scatter;
  /** Of the figures in `scatter`; "share" is a part of the nominal value. */
  readonly unit: "dB" | "dBm" | "K" | "deg" | "share" | "rate" | "mm";
  /** True where the scenario states it, false where common practice stands in. */
  readonly stated: boolean;
  /** Probability at which the cause has the value that a budget takes; `STILL` where its distribution has no such place. */
  readonly still: number;
}

/** In the place of a probability: the value that a budget takes, which a mixture or a one-sided loss never has. */
export const STILL = -1;

/** Draws by block: what the causes are, where their random numbers lie, and what is made of them, step by step. */
export interface Sketch {
  readonly block: number;
  readonly causes: Cause[];
  readonly uniforms: Float64Array[];
  readonly steps: (() => void)[];
}

export function newSketch(block: number): Sketch {
  return { block, causes: [], uniforms: [], steps: [] };
}

/**
 * The cause's random numbers, block by block, strictly inside (0, 1) or `STILL`; a cause met again is the same one. Another
 * label makes it another way to scatter by the numbers of one stream.
 */
export function uniformsOf(sketch: Sketch, cause: Cause): Float64Array {
  const known = sketch.causes.findIndex(({ id, label }) => id === cause.id && label === cause.label);
  if (known >= 0) return sketch.uniforms[known]!;
  const uniforms = new Float64Array(sketch.block).fill(cause.still);
  sketch.causes.push(cause);
  sketch.uniforms.push(uniforms);
  return uniforms;
}

/** A column that a step fills anew for every block. */
export function column(sketch: Sketch, fill: (out: Float64Array) => void): Float64Array {
  const out = new Float64Array(sketch.block);
  sketch.steps.push(() => fill(out));
  return out;
}

/** Standard normal deviates of a cause. */
export function normalsOf(sketch: Sketch, cause: Cause): Float64Array {
  const uniforms = uniformsOf(sketch, cause);
  return column(sketch, (out) => normalDeviates(uniforms, out));
}

/** Values of an input that scatters about a nominal one, which it has where it is `STILL`. */
export function valuesOf(
  sketch: Sketch,
  nominal: number,
  scatter: Scatter,
  uniforms: Float64Array,
): Float64Array {
  const fill = scatterColumn(nominal, scatter);
  return column(sketch, (out) => {
    fill(uniforms, out);
    for (let i = 0; i < out.length; i++) if (uniforms[i] === STILL) out[i] = nominal;
  });
}

/** Normal deviates that hang together with those of the other end: r of one, sqrt(1 - r^2) of its own. */
export function tied(
  sketch: Sketch,
  other: Float64Array,
  own: Float64Array,
  correlation: number,
): Float64Array {
  const rest = Math.sqrt(1 - correlation * correlation);
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) out[i] = correlation * other[i]! + rest * own[i]!;
  });
}

/** The same for probabilities of whatever distribution: by way of normal deviates (a Gaussian copula). */
export function tiedUniforms(
  sketch: Sketch,
  other: Float64Array,
  own: Float64Array,
  correlation: number,
): Float64Array {
  if (correlation === 0) return own;
  if (correlation === 1) return other;
  const rest = Math.sqrt(1 - correlation * correlation);
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) {
      if (own[i] === STILL && other[i] === STILL) {
        out[i] = STILL;
        continue;
      }
      const deviate = correlation * deviateOf(other[i]!) + rest * deviateOf(own[i]!);
      out[i] = Math.min(LARGEST, Math.max(1 - LARGEST, normalCdf(deviate)));
    }
  });
}

function deviateOf(probability: number): number {
  return probability === STILL ? 0 : normalDeviate(probability);
}

const LARGEST = 1 - 2 ** -40;

/** ln of the factor of a log-normal whose standard deviation is a share of its median, to first order of a share. */
export function logSpread(share: number): number {
  return Math.sqrt(Math.log(1 + share * share));
}

/** How the names of an end's entries and causes begin. */
export const PREFIX = { transmitter: "tx", receiver: "rx" } as const;
