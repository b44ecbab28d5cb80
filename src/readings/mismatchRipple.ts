import { type ReflectionInput, reflectionFigures } from "../cover/reflectionFigures.ts";
import { requireNotNegative } from "../numeric/check.ts";
import { dbToPower } from "../numeric/decibels.ts";
import { uShaped } from "./gum.ts";

const DB_PER_NEPER = 20 / Math.LN10;

/**
 * Change of level by the reflections of source and load, whose phase is not known.
 *
 * Limits 20 log10(1 +- |Gs||G|), u = 8.686 |Gs||G|/sqrt 2. A pad of P dB before the source is passed twice.
 *
 * Source: standard mismatch uncertainty, as in Agilent AN 1287-3; U-shaped spread (JCGM 100:2008, F.2.4 names the
 *         arcsine distribution)
 *
 * @param first, second  the two reflections, by return loss, VSWR or magnitude
 * @param padDb          attenuator between them [dB], at least 0, default 0
 * @returns maxDb and minDb, limits [dB]; standardDb, standard uncertainty [dB]
 * @throws RangeError on an impossible reflection or a negative pad
 */
export function mismatchRipple({
  first,
  second,
  padDb = 0,
}: {
  readonly first: ReflectionInput;
  readonly second: ReflectionInput;
  readonly padDb?: number;
}): { maxDb: number; minDb: number; standardDb: number } {
  requireNotNegative("padDb", padDb);
  const product = (reflectionFigures(first).gamma * reflectionFigures(second).gamma) / dbToPower(padDb);
  return {
    maxDb: DB_PER_NEPER * Math.log1p(product),
    minDb: DB_PER_NEPER * Math.log1p(-product),
    standardDb: uShaped(DB_PER_NEPER * product),
  };
}

/**
 * Most that this ripple can differ between the bare and the covered feed [dB]: 8.686 |Gs| (|G bare| + |G covered|).
 *
 * Source: as `mismatchRipple`, both ripples at opposite ends, first order
 *
 * @throws RangeError on an impossible reflection or a negative pad
 */
export function rippleChangeLimitDb({
  source,
  bare,
  covered,
  padDb = 0,
}: {
  readonly source: ReflectionInput;
  readonly bare: ReflectionInput;
  readonly covered: ReflectionInput;
  readonly padDb?: number;
}): number {
  requireNotNegative("padDb", padDb);
  const both = reflectionFigures(bare).gamma + reflectionFigures(covered).gamma;
  return (DB_PER_NEPER * reflectionFigures(source).gamma * both) / dbToPower(padDb);
}
