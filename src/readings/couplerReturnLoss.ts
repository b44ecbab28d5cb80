import { gammaOfReturnLoss } from "../cover/reflectionFigures.ts";
import { requireFinite, requireNotNegative } from "../numeric/check.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import { directivityBounds } from "./directivityBounds.ts";

export interface CouplerInput {
  readonly reflectedDb: number;
  readonly openDb?: number | undefined;
  readonly shortDb?: number | undefined;
  readonly directivityDb: number;
  readonly sourceMatchDb?: number | undefined;
  readonly padMismatchDb?: number | undefined;
}

export interface CouplerReturnLoss {
  readonly returnLossDb: number;
  readonly lowDb: number;
  /** Infinity where the coupler's leak can feign or hide all of the reflection. */
  readonly highDb: number;
  /** Half-width of the reference level by leak and test port [dB]. */
  readonly referenceDb: number;
}

/**
 * Return loss from the levels at a coupler's port, as bounds.
 *
 * The reference is total reflection: an open, a short, or both averaged in dB. With e = d + m of leak and test port
 * a single one may be off by 20 log10[1/(1 - e)]; open and short err with opposite signs, and their mean only by
 * the second order, taken as 8.686 e^2. The reading itself errs by `directivityBounds`, and an attenuator switched
 * in to compare like levels by its mismatch.
 *
 * Source: common practice (open/short average), no source; limits as `directivityBounds`
 * Valid:  bounds, all errors at their worst together; levels above noise
 *
 * @param reflectedDb      level with the load [dB]
 * @param openDb, shortDb  level with open and short [dB], at least one of them
 * @param directivityDb    of the coupler [dB], above 0
 * @param sourceMatchDb    return loss of its test port [dB], above 0; absent: perfect
 * @param padMismatchDb    half-width by the mismatch of an attenuator [dB], at least 0, default 0
 * @throws RangeError without a reference, on a load above the reference, or on an argument outside these ranges
 */
export function couplerReturnLoss({
  reflectedDb,
  openDb,
  shortDb,
  directivityDb,
  sourceMatchDb = Infinity,
  padMismatchDb = 0,
}: CouplerInput): CouplerReturnLoss {
  requireFinite("reflectedDb", reflectedDb);
  requireNotNegative("padMismatchDb", padMismatchDb);
  const references = [openDb, shortDb].filter((level) => level !== undefined);
  if (references.length === 0) throw new RangeError("openDb or shortDb must be given");
  references.forEach((level) => {
    requireFinite("openDb and shortDb", level);
  });
  const error =
    gammaOfReturnLoss("directivityDb", directivityDb) + gammaOfReturnLoss("sourceMatchDb", sourceMatchDb);
  if (!(error < 1)) throw new RangeError("directivityDb and sourceMatchDb leave nothing of the reference");
  const referenceDb =
    references.length === 1 ? -amplitudeToDb(1 - error) : amplitudeToDb(Math.exp(error ** 2));
  const returnLossDb = references.reduce((sum, level) => sum + level, 0) / references.length - reflectedDb;
  const { lowDb, highDb } = directivityBounds({ returnLossDb, directivityDb, sourceMatchDb });
  const halfWidthDb = referenceDb + padMismatchDb;
  return { returnLossDb, lowDb: Math.max(0, lowDb - halfWidthDb), highDb: highDb + halfWidthDb, referenceDb };
}
