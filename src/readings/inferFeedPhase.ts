import { gammaOfReturnLoss } from "../cover/reflectionFigures.ts";
import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import { abs, arg } from "../numeric/complex.ts";
import { RADIANS_PER_DEGREE, wavelengthM } from "../numeric/constants.ts";
import { RETURN_LOSS_STANDARD_DB, type SheetOnFeed, sheetOf } from "./sheetOnFeed.ts";
import { type FurtherReading, tellApart } from "./tellApart.ts";

export interface InferFeedPhaseInput {
  readonly frequencyGHz: number;
  readonly permittivity: number;
  readonly lossTangent: number;
  readonly thicknessMm: number;
  readonly gapMm?: number;
  readonly feedReturnLossDb: number;
  readonly coveredReturnLossDb: number;
  readonly returnLossStandardDb?: number;
  readonly permittivityStandard?: number;
  readonly thicknessStandardMm?: number;
  readonly coverage?: number;
}

export interface FeedPhase {
  /** arg S22 of the feed at its aperture plane [deg], above -180 to 180. */
  readonly phaseDeg: number;
  /** Its interval; the ends may pass 180 so that low <= phase <= high. */
  readonly lowDeg: number;
  readonly highDeg: number;
}

export interface InferredFeedPhase {
  /** cos(phi + arg G - 2 k0 s). */
  readonly cosSum: number;
  readonly cosSumExpanded: number;
  /** "decided": one; "ambiguous": two of opposite sign; "contradictory": the readings disagree with the sheet. */
  readonly outcome: "decided" | "ambiguous" | "contradictory";
  readonly ambiguous: boolean;
  readonly solutions: readonly FeedPhase[];
  /** Readings that would tell two solutions apart, best first. */
  readonly advice: readonly FurtherReading[];
}

/**
 * Phase of a feed's reflection at its aperture, from a known sheet before it.
 *
 *     cos S = [g^2 + a^2 - g1^2 (1 + g^2 a^2)]/[2 g a (1 - g1^2)],   S = phi + arg G - 2 k0 s
 *
 * with g, g1 the bare and covered reflection and a = |G|. The cosine leaves the sign of S open, and a sheet without
 * loss cannot add to that by its insertion loss, which is the same equation. Beyond +-1 by more than the
 * uncertainty the readings do not belong to this sheet; within it S is 0 or 180 degrees.
 *
 * Source: cascade of `coveredFeed`, solved for the phase (own derivation); uncertainty by JCGM 100:2008, 5.1.3 note 2
 * Valid:  the sheet collects all it sends back (on or near the mouth); a sheet with a near g is best
 *
 * @param frequencyGHz                         [GHz], above 0
 * @param permittivity, lossTangent, thicknessMm  of the sheet, which must reflect
 * @param gapMm                                aperture plane to sheet [mm], default 0
 * @param feedReturnLossDb, coveredReturnLossDb   [dB], above 0, finite for the bare feed
 * @param returnLossStandardDb                 standard uncertainty of each [dB], default 0.58
 * @param permittivityStandard, thicknessStandardMm  of the sheet, default 0
 * @param coverage                             factor k of the intervals, default 2
 * @throws RangeError on an argument outside these ranges
 */
export function inferFeedPhase(input: InferFeedPhaseInput): InferredFeedPhase {
  const {
    frequencyGHz,
    permittivity,
    lossTangent,
    thicknessMm,
    gapMm = 0,
    feedReturnLossDb,
    coveredReturnLossDb,
    returnLossStandardDb = RETURN_LOSS_STANDARD_DB,
    permittivityStandard = 0,
    thicknessStandardMm = 0,
    coverage = 2,
  } = input;
  requireNotNegative("gapMm", gapMm);
  requireNotNegative("returnLossStandardDb", returnLossStandardDb);
  requireNotNegative("permittivityStandard", permittivityStandard);
  requireNotNegative("thicknessStandardMm", thicknessStandardMm);
  requirePositive("coverage", coverage);
  const layer = { permittivity, lossTangent, thicknessMm };
  const { reflection } = sheetOf(layer, frequencyGHz);
  const cosSum = cosineOf(feedReturnLossDb, coveredReturnLossDb, abs(reflection));
  if (!Number.isFinite(cosSum)) throw new RangeError("the sheet or the feed reflects nothing, or all");

  const inputs = [feedReturnLossDb, coveredReturnLossDb, permittivity, thicknessMm] as const;
  const at = (values: readonly number[]) =>
    cosineOf(
      Math.max(1e-6, values[0]!),
      Math.max(1e-6, values[1]!),
      abs(
        sheetOf(
          { ...layer, permittivity: Math.max(1, values[2]!), thicknessMm: Math.max(0, values[3]!) },
          frequencyGHz,
        ).reflection,
      ),
    );
  const steps = [returnLossStandardDb, returnLossStandardDb, permittivityStandard, thicknessStandardMm];
  const contributions = steps.map((step, i) => {
    const moved = (sign: number) => at(inputs.map((value, k) => (k === i ? value + sign * step : value)));
    return step === 0 ? 0 : (moved(1) - moved(-1)) / 2;
  });
  const cosSumExpanded = coverage * Math.hypot(...contributions);

  if (Math.abs(cosSum) - cosSumExpanded > 1 + 1e-9) {
    return { cosSum, cosSumExpanded, outcome: "contradictory", ambiguous: false, solutions: [], advice: [] };
  }
  const angle = acosDeg(cosSum);
  const nearest = acosDeg(cosSum + cosSumExpanded);
  const farthest = acosDeg(cosSum - cosSumExpanded);
  const offsetDeg =
    (2 * 360 * gapMm * 1e-3) / wavelengthM(frequencyGHz) - arg(reflection) / RADIANS_PER_DEGREE;
  const solution = (sumDeg: number, low: number, high: number): FeedPhase => {
    const phaseDeg = wrapped(sumDeg + offsetDeg);
    return { phaseDeg, lowDeg: phaseDeg - (sumDeg - low), highDeg: phaseDeg + (high - sumDeg) };
  };
  const solutions =
    cosSum >= 1
      ? [solution(0, -farthest, farthest)]
      : cosSum <= -1
        ? [solution(180, nearest, 360 - nearest)]
        : [solution(angle, nearest, farthest), solution(-angle, -farthest, -nearest)];
  const ambiguous = solutions.length > 1;
  const cases = solutions.map(
    ({ phaseDeg }): SheetOnFeed => ({ frequencyGHz, feedReturnLossDb, phaseDeg, layer, gapMm }),
  );
  return {
    cosSum,
    cosSumExpanded,
    outcome: ambiguous ? "ambiguous" : "decided",
    ambiguous,
    solutions,
    advice: ambiguous ? tellApart(cases, returnLossStandardDb) : [],
  };
}

function cosineOf(feedReturnLossDb: number, coveredReturnLossDb: number, a: number): number {
  const g = gammaOfReturnLoss("feedReturnLossDb", feedReturnLossDb);
  const g1 = gammaOfReturnLoss("coveredReturnLossDb", coveredReturnLossDb);
  return (g * g + a * a - g1 * g1 * (1 + g * g * a * a)) / (2 * g * a * (1 - g1 * g1));
}

function acosDeg(cosine: number): number {
  return Math.acos(Math.min(1, Math.max(-1, cosine))) / RADIANS_PER_DEGREE;
}

/** Angle [deg] brought above -180 to 180. */
export function wrapped(degrees: number): number {
  return degrees - 360 * Math.ceil((degrees - 180) / 360);
}
