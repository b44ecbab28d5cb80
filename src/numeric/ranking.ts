import { quantileSorted, rank } from "d3-array";

/**
 * Quantiles of a sample, interpolated between its members.
 *
 * Source: Hyndman & Fan 1996, type 7, by a library
 *
 * @param sample         at least one number; it is sorted in place
 * @param probabilities  0 to 1
 */
export function quantilesOf(sample: Float64Array, probabilities: readonly number[]): number[] {
  sample.sort();
  return probabilities.map((p) => quantileSorted(listOf(sample), p)!);
}

/**
 * Spearman's rank correlation, -1 to 1; 0 where one of the two does not vary. Equal numbers share the least of their
 * ranks.
 *
 * Source: C. Spearman, Amer. J. Psychol. 15, 72-101, 1904
 *
 * @param a, b  of one length, at least two
 */
export function rankCorrelation(a: Float64Array, b: Float64Array): number {
  return correlation(rank(listOf(a)), rank(listOf(b)));
}

/** Pearson's product-moment correlation; 0 where one of the two does not vary. */
export function correlation(a: Float64Array, b: Float64Array): number {
  const [meanA, meanB] = [mean(a), mean(b)];
  let [both, squaresA, squaresB] = [0, 0, 0];
  for (let i = 0; i < a.length; i++) {
    const [x, y] = [a[i]! - meanA, b[i]! - meanB];
    both += x * y;
    squaresA += x * x;
    squaresB += y * y;
  }
  return squaresA > 0 && squaresB > 0 ? both / Math.sqrt(squaresA * squaresB) : 0;
}

export function mean(sample: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < sample.length; i++) sum += sample[i]!;
  return sum / sample.length;
}

/** Mean square deviation from the mean. */
export function variance(sample: Float64Array): number {
  const centre = mean(sample);
  let sum = 0;
  for (let i = 0; i < sample.length; i++) sum += (sample[i]! - centre) ** 2;
  return sum / sample.length;
}

/** Third standardised moment: 0 of a symmetric sample, negative where the long tail lies below; 0 of a constant. */
export function skewness(sample: Float64Array): number {
  const centre = mean(sample);
  const spread = Math.sqrt(variance(sample));
  if (!(spread > 0)) return 0;
  let sum = 0;
  for (let i = 0; i < sample.length; i++) sum += ((sample[i]! - centre) / spread) ** 3;
  return sum / sample.length;
}

/** Part of a sample that lies above a level, 0 to 1. */
export function shareAbove(sample: Float64Array, level: number): number {
  let above = 0;
  for (let i = 0; i < sample.length; i++) if (sample[i]! > level) above++;
  return above / sample.length;
}

/** The library reads any list by index and length; its types know plain ones alone. */
function listOf(sample: Float64Array): number[] {
  return sample as unknown as number[];
}
