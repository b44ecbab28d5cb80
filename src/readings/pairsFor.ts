import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import { type CoverageChoice, expandedUncertainty, type TypeBInput } from "./reduceSeries.ts";

/** Nobody alternates a cover more often than this. */
const MOST_PAIRS = 100_000;

/**
 * How many pairs of readings, in turn and in equal steps, reach a wanted expanded uncertainty.
 *
 *     u_A^2 = sigma^2 3/(2n) [1 + (n - 1)/(3n)]     sigma: standard deviation of one reading
 *
 * Source: see `reduceSeries`
 *
 * @param readingStandardDb  sigma as `reduceReadings` returns it [dB], at least 0
 * @param wantedDb           expanded uncertainty wanted [dB], above 0
 * @param pairsSoFar         pairs already taken, default 0
 * @param repeatabilityDb, typeB, coverage, confidence  as for `reduceReadings`
 * @returns pairs in all and more, the pairs still to take; both undefined where no number will do. leastDb, the
 *          uncertainty that type B leaves however long one reads [dB]
 * @throws RangeError on an argument outside these ranges
 */
export function pairsFor({
  readingStandardDb,
  wantedDb,
  pairsSoFar = 0,
  ...choice
}: {
  readonly readingStandardDb: number;
  readonly wantedDb: number;
  readonly pairsSoFar?: number;
} & CoverageChoice &
  TypeBInput): { pairs: number | undefined; more: number | undefined; leastDb: number } {
  requireNotNegative("readingStandardDb", readingStandardDb);
  requirePositive("wantedDb", wantedDb);
  requireNotNegative("pairsSoFar", pairsSoFar);
  const expandedDb = (n: number) =>
    expandedUncertainty(readingStandardDb * Math.sqrt((1.5 / n) * (1 + (n - 1) / (3 * n))), n - 1, choice)
      .expandedDb;
  const leastDb = expandedUncertainty(0, Infinity, choice).expandedDb;
  if (expandedDb(MOST_PAIRS) > wantedDb) return { pairs: undefined, more: undefined, leastDb };
  let enough = MOST_PAIRS;
  let tooFew = 1;
  while (enough - tooFew > 1) {
    const middle = (enough + tooFew) >> 1;
    if (expandedDb(middle) <= wantedDb) enough = middle;
    else tooFew = middle;
  }
  return { pairs: enough, more: Math.max(0, enough - pairsSoFar), leastDb };
}
