import { requireNotNegative } from "../numeric/check.ts";
import { studentQuantile } from "./studentT.ts";

export interface OutlyingReading {
  /** Place of the reading in `shifts`. */
  readonly index: number;
  /** How far the reading lies from where the others put it, same unit as the values. */
  readonly shift: number;
  /** Student's t of that shift, and the limit it exceeded. */
  readonly t: number;
  readonly limit: number;
}

/**
 * The one reading, if any, that no longer fits the rest.
 *
 * Each column of `shifts` says how a unit error of one reading would move the values, all means being taken out
 * already. The shift x of a reading is fitted and its t is held against Student's quantile at
 * significance/(2 readings) (Bonferroni). Where each reading moves just its own value this is Grubbs' test; the
 * general form also finds a bad reading that two neighbouring differences share.
 *
 * Source: Grubbs 1969, Technometrics 11, 1-21; as a mean-shift test Cook & Weisberg 1982, Residuals and Influence
 *         in Regression, section 2.2.2 (both from memory)
 * Valid:  one outlier; two of the same size hide each other. Nothing is dropped here.
 *
 * @param values            deviations from their mean
 * @param shifts            one row a reading: change of each value per unit of error, means taken out
 * @param degreesOfFreedom  of the values: their number less the means taken out
 * @param significance      chance to flag a good set, default 0.05
 * @param leastShift        a smaller shift is never an outlier (repeatability of the bench), default 0
 * @returns the reading with the largest t where it exceeds its limit and leastShift, otherwise undefined
 * @throws RangeError on a significance outside (0, 1)
 */
export function outlyingReading({
  values,
  shifts,
  degreesOfFreedom,
  significance = 0.05,
  leastShift = 0,
}: {
  readonly values: readonly number[];
  readonly shifts: readonly (readonly number[])[];
  readonly degreesOfFreedom: number;
  readonly significance?: number;
  readonly leastShift?: number;
}): OutlyingReading | undefined {
  requireNotNegative("leastShift", leastShift);
  if (!(significance > 0 && significance < 1)) {
    throw new RangeError(`significance must lie between 0 and 1, got ${significance}`);
  }
  const remaining = degreesOfFreedom - 1;
  if (remaining < 1) return undefined;
  const total = dot(values, values);
  const limit = studentQuantile(1 - significance / (2 * shifts.length), remaining);
  let worst: OutlyingReading | undefined;
  shifts.forEach((row, index) => {
    const length = dot(row, row);
    if (length < 1e-12) return;
    const shift = dot(row, values) / length;
    const explained = shift * shift * length;
    const rest = Math.max(0, total - explained);
    const t = Math.sqrt((remaining * explained) / rest);
    if (t > limit && Math.abs(shift) > leastShift && t > (worst?.t ?? 0)) worst = { index, shift, t, limit };
  });
  return worst;
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, value, i) => sum + value * b[i]!, 0);
}
