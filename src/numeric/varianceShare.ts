import { mean, variance } from "./ranking.ts";

/**
 * Share of a result's variance that would go on the mean if one of its inputs were known: the first-order index.
 *
 *     S = mean[ f(B) (f(A with the input of B) - f(A)) ] / variance
 *
 * Source: Saltelli, Annoni, Azzini, Campolongo, Ratto & Tarantola, Computer Physics Communications 181, 259-270,
 *         2010, table 2 (b); centred on the mean, which leaves the estimate unbiased and less noisy
 *
 * @param a      results of a sample of inputs A
 * @param b      results of an independent sample B
 * @param mixed  results of A with the one input taken from B
 * @returns the share, about 0 to 1; an estimate, which may lie a little outside; 0 where nothing varies
 */
export function varianceShare(a: Float64Array, b: Float64Array, mixed: Float64Array): number {
  const spread = (variance(a) + variance(b)) / 2;
  if (!(spread > 0)) return 0;
  const centre = (mean(a) + mean(b)) / 2;
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (b[i]! - centre) * (mixed[i]! - a[i]!);
  return sum / a.length / spread;
}
