import { requirePositive } from "../numeric/check.ts";
import { powerToDb } from "../numeric/decibels.ts";

/**
 * Time for which multipath raises the level of a line-of-sight path by no more than a given amount.
 *
 * Source: ITU-R P.530-17, section 2.3.3, equations 19 to 25 (the same in -18)
 * Valid:  as `multipathOccurrence`
 *
 * @param occurrencePercent  multipath occurrence factor [%], above 0
 * @param enhancementDb      [dB], above 0
 * @returns share of the average worst month for which the enhancement is not exceeded [%]
 * @throws RangeError on an argument out of range, and on a factor so large that the method has no answer
 */
export function enhancementNotExceeded({
  occurrencePercent,
  enhancementDb,
}: {
  readonly occurrencePercent: number;
  readonly enhancementDb: number;
}): { readonly worstMonthPercent: number } {
  requirePositive("occurrencePercent", occurrencePercent);
  requirePositive("enhancementDb", enhancementDb);
  const fade001Db = powerToDb(occurrencePercent / 0.01);
  const exceeded = (db: number) => 10 ** ((-1.7 + 0.2 * fade001Db - db) / 3.5);
  if (enhancementDb > 10) return { worstMonthPercent: 100 - exceeded(enhancementDb) };

  const share = exceeded(10) / 58.21;
  if (share >= 1) {
    throw new RangeError(`occurrencePercent of ${occurrencePercent} lies beyond the method`);
  }
  const slopeAt10 = -2 * Math.log10(-Math.log1p(-share));
  const offset = 2.05 * slopeAt10 - 20.3;
  const decay = 10 ** (-enhancementDb / 20);
  const slope =
    8 +
    (1 + 0.3 * decay) * 10 ** ((-0.7 * enhancementDb) / 20) * (offset + 12 * (decay + enhancementDb / 800));
  return { worstMonthPercent: 100 + 58.21 * Math.expm1(-(10 ** ((-slope * enhancementDb) / 20))) };
}
