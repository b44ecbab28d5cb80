import { requireFinite, requireNotNegative, requirePositive, requireWithin } from "./check.ts";

/** How an input scatters, in the canonical unit of its field (dB for powers and gains). */
export type Scatter =
  /** About the value. */
  | { readonly kind: "normal"; readonly sigma: number }
  /** The value is the median; one standard deviation multiplies or divides by `factor` (> 1). */
  | { readonly kind: "lognormal"; readonly factor: number }
  /** As likely anywhere between the ends. */
  | { readonly kind: "flat"; readonly low: number; readonly high: number }
  /** From 0 upwards; the value is the mean. */
  | { readonly kind: "exponential"; readonly mean: number }
  /** One part or another; the shares add up to 1. */
  | { readonly kind: "mixture"; readonly parts: readonly ScatterPart[] };

/** One part of a mixture: a value that may scatter by itself. */
export interface ScatterPart {
  readonly share: number;
  readonly value: number;
  readonly scatter?: Scatter | undefined;
}

export interface Moments {
  readonly mean: number;
  /** Standard deviation. */
  readonly sigma: number;
}

/** Shares that miss the whole by more than rounding are a slip. */
const SHARE_ROUNDING = 1e-9;

/**
 * Mean and standard deviation of a value that scatters, in the unit of the value.
 *
 * The mean of a log-normal lies above its value, which is the median. Flat, exponential and mixture carry their
 * own figures, so that the value is not looked at. A mixture adds to the variances of its parts that of their means.
 *
 * Source: textbook moments (from memory); flat as in JCGM 100:2008 (GUM), 4.3.7
 *
 * @param value  what the field holds; above 0 for a log-normal
 * @param scatter  undefined for a value that does not scatter
 * @throws RangeError on a scatter that cannot be: negative sigma, factor below 1, ends swapped, shares that do not
 *                    add up to 1
 */
export function momentsOf(value: number, scatter: Scatter | undefined): Moments {
  requireFinite("value", value);
  if (scatter === undefined) return { mean: value, sigma: 0 };
  switch (scatter.kind) {
    case "normal":
      requireNotNegative("sigma", scatter.sigma);
      return { mean: value, sigma: scatter.sigma };
    case "lognormal": {
      requirePositive("value of a log-normal", value);
      requireWithin("factor", scatter.factor, 1, Number.MAX_VALUE);
      const logVariance = Math.log(scatter.factor) ** 2;
      const mean = value * Math.exp(logVariance / 2);
      return { mean, sigma: mean * Math.sqrt(Math.expm1(logVariance)) };
    }
    case "flat": {
      const { low, high } = scatter;
      requireFinite("low", low);
      requireWithin("high", high, low, Number.MAX_VALUE);
      return { mean: (low + high) / 2, sigma: (high - low) / Math.sqrt(12) };
    }
    case "exponential":
      requireNotNegative("mean", scatter.mean);
      return { mean: scatter.mean, sigma: scatter.mean };
    case "mixture":
      return momentsOfMixture(scatter.parts);
  }
}

function momentsOfMixture(parts: readonly ScatterPart[]): Moments {
  const read = parts.map(({ share, value, scatter }) => ({ share, ...momentsOf(value, scatter) }));
  for (const { share } of read) requireNotNegative("share", share);
  const whole = sum(read.map(({ share }) => share));
  requireWithin("sum of the shares", whole, 1 - SHARE_ROUNDING, 1 + SHARE_ROUNDING);
  const mean = sum(read.map((part) => part.share * part.mean));
  const variance = sum(read.map((part) => part.share * (part.sigma ** 2 + (part.mean - mean) ** 2)));
  return { mean, sigma: Math.sqrt(variance) };
}

function sum(terms: readonly number[]): number {
  return terms.reduce((total, term) => total + term, 0);
}
