import { normalQuantile } from "./normal.ts";

/**
 * Interval for a probability of which `hits` of `trials` independent trials bear witness; unlike the plain one it
 * keeps its width where none or all of them hit.
 *
 * Source: E. B. Wilson, J. Amer. Statist. Assoc. 22, 209-212, 1927
 *
 * @param confidence  0 to 1, default 0.95
 * @returns both ends, and half of the distance between them
 */
export function proportionInterval({
  hits,
  trials,
  confidence = 0.95,
}: {
  readonly hits: number;
  readonly trials: number;
  readonly confidence?: number;
}): { low: number; high: number; halfWidth: number } {
  if (!(trials > 0 && hits >= 0 && hits <= trials)) {
    throw new RangeError(`hits must lie between 0 and trials above 0, got ${hits} of ${trials}`);
  }
  const z = normalQuantile(0.5 + confidence / 2);
  const share = hits / trials;
  const scale = 1 + (z * z) / trials;
  const centre = (share + (z * z) / (2 * trials)) / scale;
  const halfWidth = (z / scale) * Math.sqrt((share * (1 - share)) / trials + (z * z) / (4 * trials * trials));
  return { low: Math.max(0, centre - halfWidth), high: Math.min(1, centre + halfWidth), halfWidth };
}
