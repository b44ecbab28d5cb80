import { requireFinite, requireNotNegative, requirePositive } from "../numeric/check.ts";
import {
  abs,
  add,
  arg,
  type Complex,
  complex,
  divide,
  multiply,
  polar,
  scale,
  subtract,
} from "../numeric/complex.ts";
import { RADIANS_PER_DEGREE, wavelengthM } from "../numeric/constants.ts";
import { type Layer, layeredSheet } from "./layeredSheet.ts";
import { returnLossOfGamma } from "./reflectionFigures.ts";

export interface SheetPair {
  /** Least gap, above 0, at which the two reflect least [mm]; it repeats every `periodMm`. */
  readonly gapMm: number;
  readonly returnLossDb: number;
  /** Least gap at which the two reflect most [mm]. */
  readonly worstGapMm: number;
  readonly worstReturnLossDb: number;
  /** Half a wavelength in air [mm]. */
  readonly periodMm: number;
}

/**
 * The gap at which two equal sheets, one behind the other and the same way round, cancel their reflections.
 *
 * With E = exp(-2 j k0 s) of the gap s, the pair reflects
 *
 *     G2 = (S11 + (S21^2 - S11 S22) G E) / (1 - S22 G E),   G = S11
 *
 * a bilinear map: as s grows, G2 runs round a circle. Its points nearest to 0 and farthest from it lie on the line
 * through 0 and the centre, and map back to the gaps.
 *
 * Source: own derivation from the cascade of two sheets (Born & Wolf, Principles of Optics, section 1.6, from memory)
 * Valid:  normal incidence, flat parallel sheets, air between them
 *
 * @param frequencyGHz  [GHz], above 0
 * @param layers        of one sheet, feed side first
 * @returns undefined where a sheet reflects nothing that could be cancelled
 * @throws RangeError on an argument outside the ranges of `layeredSheet`
 */
export function sheetPair({ frequencyGHz, layers }: OneSheet): SheetPair | undefined {
  const sheet = sheetOf({ frequencyGHz, layers });
  const front = sheet.reflection;
  const back = sheetOf({ frequencyGHz, layers: layers.toReversed() }).reflection;
  if (abs(front) < 1e-9) return undefined;
  const { transmission } = sheet;
  // G2 = (a + b E)/(1 - c E)
  const a = front;
  const b = multiply(front, subtract(multiply(transmission, transmission), multiply(front, back)));
  const c = multiply(back, front);
  const shrink = 1 / (1 - abs(c) ** 2);
  const centre = scale(add(a, multiply(b, { re: c.re, im: -c.im })), shrink);
  const radius = abs(add(multiply(a, c), b)) * shrink;
  const at = (towards: number) => {
    const reflected = scale(centre, 1 + (towards * radius) / abs(centre));
    const turn = divide(subtract(reflected, a), add(b, multiply(c, reflected)));
    return { gapMm: gapOfTurn(frequencyGHz, turn), returnLossDb: returnLossOfGamma(abs(reflected)) };
  };
  const worst = at(1);
  return {
    ...at(-1),
    worstGapMm: worst.gapMm,
    worstReturnLossDb: worst.returnLossDb,
    periodMm: periodMm(frequencyGHz),
  };
}

/**
 * Return loss of two equal sheets a gap apart, [dB]; Infinity where nothing is reflected.
 *
 * @param gapMm  [mm], at least 0
 * @throws RangeError on an argument outside the ranges of `layeredSheet`
 */
export function pairReturnLoss({
  frequencyGHz,
  layers,
  gapMm,
}: OneSheet & { readonly gapMm: number }): number {
  requireNotNegative("gapMm", gapMm);
  const gap = { permittivity: 1, lossTangent: 0, thicknessMm: gapMm };
  return sheetOf({ frequencyGHz, layers: [...layers, gap, ...layers] }).returnLossDb;
}

/**
 * The gap between a feed's mouth and a sheet at which the sheet best matches the feed.
 *
 * |Gin| = |g - x|/|1 - g x|, x = eta G exp(j phi) exp(-2 j k0 s), is least where x is real and positive:
 * 2 k0 s = phi + arg G + 2 pi m. The insertion loss is least at the same gap.
 *
 * Source: own derivation from the two-port cascade of `coveredFeed`
 * Valid:  a collected share eta that hardly changes over a small part of a wavelength
 *
 * @param frequencyGHz  [GHz], above 0
 * @param phaseDeg      arg S22 of the feed at its mouth [deg]
 * @param reflection    of the sheet's front face
 * @returns gapMm, the least above 0 [mm]; periodMm, after which it repeats [mm]
 * @throws RangeError on a frequency or phase outside these ranges
 */
export function matchingGap({
  frequencyGHz,
  phaseDeg,
  reflection,
}: {
  readonly frequencyGHz: number;
  readonly phaseDeg: number;
  readonly reflection: Complex;
}): { gapMm: number; periodMm: number } {
  requirePositive("frequencyGHz", frequencyGHz);
  requireFinite("phaseDeg", phaseDeg);
  const seen = multiply(reflection, polar(1, phaseDeg * RADIANS_PER_DEGREE));
  const turn = divide(complex(abs(seen)), seen);
  return { gapMm: gapOfTurn(frequencyGHz, turn), periodMm: periodMm(frequencyGHz) };
}

interface OneSheet {
  readonly frequencyGHz: number;
  readonly layers: readonly Layer[];
}

function sheetOf({ frequencyGHz, layers }: OneSheet) {
  return layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
}

function periodMm(frequencyGHz: number): number {
  return (1e3 * wavelengthM(frequencyGHz)) / 2;
}

/** Gap s above 0 and up to half a wavelength [mm] whose way forth and back turns a wave by exp(-2 j k0 s). */
function gapOfTurn(frequencyGHz: number, turn: Complex): number {
  const period = periodMm(frequencyGHz);
  const gap = (-arg(turn) / (2 * Math.PI)) * period;
  return gap > 0 ? gap : gap + period;
}
