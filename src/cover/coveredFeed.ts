import { requireFinite, requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { abs, type Complex, multiply, ONE, polar, subtract } from "../numeric/complex.ts";
import { RADIANS_PER_DEGREE, wavelengthM } from "../numeric/constants.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import { type Bounded, bounded, exactly } from "./bounded.ts";
import type { SheetScattering } from "./layeredSheet.ts";
import { gammaOfReturnLoss, mismatchLossDb, returnLossOfGamma } from "./reflectionFigures.ts";

export interface CoveredFeedInput {
  readonly feedReturnLossDb: number;
  readonly sheet: SheetScattering;
  readonly phaseDeg?: number | undefined;
  readonly gapMm?: number | undefined;
  readonly frequencyGHz?: number | undefined;
  readonly collectedShare?: number | undefined;
}

export interface CoveredFeed {
  /** Return loss at the throat, cover on [dB]. */
  readonly returnLossDb: Bounded;
  /** Change against the bare feed, as a with/without test reads it [dB]; negative where the cover tunes the feed. */
  readonly insertionLossDb: Bounded;
  /** Matched generator at the throat to wave in air [dB]: mismatch + dissipation + sideways. */
  readonly transducerLossDb: Bounded;
  /** Share of the transducer loss that returns to the generator [dB]. */
  readonly mismatchLossDb: Bounded;
  /** Share of the transducer loss that heats the cover [dB]; it does not depend on the phase. */
  readonly dissipationDb: Bounded;
  /** Share of the transducer loss that leaves between sheet and mouth, 0 when all is collected [dB]. */
  readonly sidewaysLossDb: Bounded;
  /** Standard deviation of the insertion loss over a uniformly random phase [dB], 0 with the phase known. */
  readonly phaseSpreadDb: number;
  /** x of the loss 20 log10|1 - x e^(j psi)| that an unknown phase psi adds to the nominal, 0 with the phase known. */
  readonly beat: number;
  /** With the phase known: the same x, and the cosine of its psi; the nominal holds what they add. */
  readonly tuned?: { readonly beat: number; readonly cosine: number } | undefined;
}

/**
 * Feed and sheet as a cascade of reflections.
 *
 * The feed is a lossless reciprocal two-port of reflection g; its aperture-side phase phi = arg S22 is not
 * visible in a return loss. With a = |G| of the sheet, E = exp(-2 j k0 s) of the gap and the collected share eta:
 *
 *     D = 1 - eta g e^(j phi) G E,   |Gin| = |g - eta G E e^(j phi)|/|D|,   G_T = (1 - g^2)|T|^2/|D|^2
 *
 * Phase known: nominal, low and high are equal. Phase unknown: low and high are the bounds over phi, nominal
 * its uniform average, in closed form because the mean of ln|1 - x e^(j phi)| is 0 for x < 1 (Jensen):
 * insertion loss -20 log10|T|; mismatch loss that of g plus that of a; return loss from the mean reflected
 * power g^2 + (1 - g^2)^2 a^2/(1 - g^2 a^2) (power series of Gin in the reflected wave, Parseval).
 *
 * Since |D|^2 (1 - |Gin|^2) = (1 - g^2)(1 - eta^2 a^2), what is not mismatch is -10 log10(|T|^2/(1 - a^2)) of heat
 * and the rest sideways, both without phi.
 *
 * Source: Collin, Foundations for Microwave Engineering, and Pozar, Microwave Engineering (two-port cascade and
 *         power gains, from memory); averages: own derivation.
 * Valid:  one sheet, many reflections; own loss of the feed is to be taken out of its return loss first.
 *
 * @param feedReturnLossDb  bare return loss [dB], above 0 to Infinity (perfect match)
 * @param sheet             reflection and transmission as `layeredSheet` returns them, |reflection| below 1
 * @param phaseDeg          arg S22 of the feed at its aperture plane [deg]; absent: unknown
 * @param gapMm             aperture plane to front face [mm], default 0; of no use without phaseDeg
 * @param frequencyGHz      needed with a gap above 0 and a known phase [GHz]
 * @param collectedShare    eta, share of the returned amplitude that the feed collects again, 0 to 1, default 1
 * @throws RangeError on an argument outside these ranges
 */
export function coveredFeed({
  feedReturnLossDb,
  sheet,
  phaseDeg,
  gapMm = 0,
  frequencyGHz,
  collectedShare = 1,
}: CoveredFeedInput): CoveredFeed {
  const g = gammaOfReturnLoss("feedReturnLossDb", feedReturnLossDb);
  const a = abs(sheet.reflection);
  if (g === 1) throw new RangeError("feedReturnLossDb must be above 0: a feed that reflects all has no gain");
  if (!(a < 1)) throw new RangeError(`sheet.reflection must have a magnitude below 1, got ${a}`);
  requireNotNegative("gapMm", gapMm);
  requireWithin("collectedShare", collectedShare, 0, 1);

  const b = collectedShare * a;
  const sheetLossDb = 0 - amplitudeToDb(abs(sheet.transmission)); // 0 - x: no loss is +0
  const feedMismatchDb = mismatchLossDb(g);
  const dissipationDb = exactly(sheetLossDb - mismatchLossDb(a));
  const sidewaysLossDb = exactly(mismatchLossDb(a) - mismatchLossDb(b));

  if (phaseDeg !== undefined) {
    requireFinite("phaseDeg", phaseDeg);
    const returned = returnedWave(sheet.reflection, phaseDeg, gapMm, frequencyGHz, collectedShare);
    const denominator = abs(subtract(ONE, multiply({ re: g, im: 0 }, returned)));
    const gamma = abs(subtract({ re: g, im: 0 }, returned)) / denominator;
    const insertionLossDb = amplitudeToDb(denominator) + sheetLossDb;
    return {
      returnLossDb: exactly(returnLossOfGamma(gamma)),
      insertionLossDb: exactly(insertionLossDb),
      transducerLossDb: exactly(feedMismatchDb + insertionLossDb),
      mismatchLossDb: exactly(mismatchLossDb(gamma)),
      dissipationDb,
      sidewaysLossDb,
      phaseSpreadDb: 0,
      beat: 0,
      tuned: { beat: g * abs(returned), cosine: b > 0 ? returned.re / abs(returned) : 1 },
    };
  }

  const gb = g * b;
  const best = Math.abs(g - b) / (1 - gb);
  const worst = (g + b) / (1 + gb);
  const meanPower = g * g + ((1 - g * g) ** 2 * b * b) / (1 - gb * gb);
  const drop = amplitudeToDb(1 - gb);
  const rise = amplitudeToDb(1 + gb);
  const transducerLossDb = feedMismatchDb + sheetLossDb;
  return {
    returnLossDb: bounded(
      returnLossOfGamma(worst),
      returnLossOfGamma(Math.sqrt(meanPower)),
      returnLossOfGamma(best),
    ),
    insertionLossDb: bounded(sheetLossDb + drop, sheetLossDb, sheetLossDb + rise),
    transducerLossDb: bounded(transducerLossDb + drop, transducerLossDb, transducerLossDb + rise),
    mismatchLossDb: bounded(mismatchLossDb(best), feedMismatchDb + mismatchLossDb(b), mismatchLossDb(worst)),
    dissipationDb,
    sidewaysLossDb,
    phaseSpreadDb: phaseSpread(gb),
    beat: gb,
  };
}

/** eta G E e^(j phi): the wave that the sheet sends back, seen at the aperture plane in the feed's phase. */
function returnedWave(
  reflection: Complex,
  phaseDeg: number,
  gapMm: number,
  frequencyGHz: number | undefined,
  collectedShare: number,
): Complex {
  let phaseRad = phaseDeg * RADIANS_PER_DEGREE;
  if (gapMm > 0) {
    if (frequencyGHz === undefined) throw new RangeError("frequencyGHz must be given with a gap and a phase");
    requirePositive("frequencyGHz", frequencyGHz);
    phaseRad -= (4 * Math.PI * gapMm * 1e-3) / wavelengthM(frequencyGHz);
  }
  return multiply(reflection, polar(collectedShare, phaseRad));
}

/** Standard deviation of 20 log10|1 - x e^(j psi)| over psi [dB]: (20/ln 10) sqrt(Li2(x^2)/2), by Parseval. */
function phaseSpread(x: number): number {
  return (20 / Math.LN10) * Math.sqrt(dilogarithm(x * x) / 2);
}

/** Li2(y) = sum of y^k/k^2 for 0 <= y < 1; near 1 by Euler's reflection formula, so that 60 terms suffice. */
function dilogarithm(y: number): number {
  if (y > 0.5) return Math.PI ** 2 / 6 - Math.log(y) * Math.log(1 - y) - dilogarithm(1 - y);
  let sum = 0;
  let power = 1;
  for (let k = 1; k <= 60; k++) {
    power *= y;
    sum += power / (k * k);
  }
  return sum;
}
