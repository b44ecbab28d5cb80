import { requireNotNegative, requirePositive, type Validity } from "../numeric/check.ts";

/** Where both depth formulas are quoted for; limits of frequency from memory. */
export const foliageValidity = {
  frequencyGHz: [0.23, 95],
  depthM: [0, 400],
} as const satisfies Validity;

export interface FoliageLoss {
  /** Mean of the two formulas [dB]. */
  readonly lossDb: number;
  /** The lower and the higher of them [dB]. */
  readonly lowDb: number;
  readonly highDb: number;
  /** 1-sigma uncertainty [dB]: 40 %, at least 3 dB (common practice, no source). */
  readonly sigmaDb: number;
}

/**
 * Loss through trees in leaf by two rules of thumb that differ by some decibels.
 *
 * One is 0.2 f^0.3 d^0.6 (f in MHz). The other is 1.33 f^0.284 d^0.588 from 14 m on and 0.45 f^0.284 d below
 * (f in GHz). Wet leaves and wind cost more; no figure for them has a source.
 *
 * Source: CCIR Report 236-2, as quoted in OET Bulletin 70; M. A. Weissberger, ESD-TR-81-101 (1982), from memory
 * Valid:  0.23 to 95 GHz, up to 400 m of trees
 *
 * @param frequencyGHz  [GHz], above 0
 * @param depthM        length of the ray within the trees [m], at least 0
 * @throws RangeError on a non-finite argument or one out of range
 */
export function foliageLoss({
  frequencyGHz,
  depthM,
}: {
  readonly frequencyGHz: number;
  readonly depthM: number;
}): FoliageLoss {
  requirePositive("frequencyGHz", frequencyGHz);
  requireNotNegative("depthM", depthM);
  const power = 0.2 * (1000 * frequencyGHz) ** 0.3 * depthM ** 0.6;
  const twoPart = frequencyGHz ** 0.284 * (depthM < 14 ? 0.45 * depthM : 1.33 * depthM ** 0.588);
  const lossDb = (power + twoPart) / 2;
  return {
    lossDb,
    lowDb: Math.min(power, twoPart),
    highDb: Math.max(power, twoPart),
    sigmaDb: depthM === 0 ? 0 : Math.max(3, 0.4 * lossDb),
  };
}

/**
 * Loss through trees that saturates: rays around and over them bound what a deep wood can take.
 *
 * A = Am (1 - exp(-d gamma / Am))
 *
 * Source: ITU-R P.833-10, section 2.1, equation 1 (form from memory)
 *
 * @param depthM           length of the path within the trees [m], at least 0
 * @param specificDbPerM   loss of the first metres [dB/m], at least 0; about 2 at 10 GHz and 5 at 24 GHz as read
 *   from the graph of P.833-5
 * @param maximumDb        loss of a wood without end [dB], above 0
 * @throws RangeError on a non-finite argument or one out of range
 */
export function saturatingFoliageLoss({
  depthM,
  specificDbPerM,
  maximumDb,
}: {
  readonly depthM: number;
  readonly specificDbPerM: number;
  readonly maximumDb: number;
}): { readonly lossDb: number } {
  requireNotNegative("depthM", depthM);
  requireNotNegative("specificDbPerM", specificDbPerM);
  requirePositive("maximumDb", maximumDb);
  return { lossDb: -maximumDb * Math.expm1((-depthM * specificDbPerM) / maximumDb) };
}
