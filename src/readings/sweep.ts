import { energyFloor } from "../cover/energyFloor.ts";
import { returnLossOfGamma } from "../cover/reflectionFigures.ts";
import { requireNotNegative } from "../numeric/check.ts";
import { abs, type Complex } from "../numeric/complex.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import { interpolateLinear } from "../numeric/interpolate.ts";
import { leastSquares } from "./leastSquares.ts";
import type { SweepPoint } from "./touchstone.ts";
import { BENCH_REPEATABILITY_DB } from "./verdict.ts";

export interface SweptCover {
  readonly frequencyHz: number;
  readonly bareReturnLossDb: number;
  readonly coveredReturnLossDb: number;
  /** Bare less covered: positive where the cover spoils the match. */
  readonly returnLossChangeDb: number;
  /** Least insertion loss that the return losses allow. */
  readonly floorDb: number;
  /** From the transmissions, where both sweeps hold them. */
  readonly insertionLossDb?: number;
  /** The insertion loss lies below the floor by more than its uncertainty. */
  readonly belowFloor: boolean;
}

export interface ReducedSweep {
  readonly points: readonly SweptCover[];
  readonly worstReturnLoss: SweptCover;
  /** Peak to peak about its straight line over the band; with fewer than three points or no transmission absent. */
  readonly insertionLossRippleDb?: number;
  readonly meanInsertionLossDb?: number;
  readonly worstInsertionLoss?: SweptCover;
  readonly contradictions: readonly SweptCover[];
}

/**
 * A bare and a covered sweep held against each other over the band that both cover.
 *
 * The frequencies are those of the bare sweep; between its points the covered one is interpolated in magnitude.
 * Return loss is -20 log10|S11|, insertion loss 20 log10(|S21 bare|/|S21 covered|). The ripple that the cover adds is
 * what a straight line leaves of the insertion loss over the band, peak to peak.
 *
 * Source: floor of `energyFloor`; ripple as common practice, no source
 *
 * @param bare, covered     points of `readTouchstone`, frequency rising, port 1 at the feed
 * @param lossExpandedDb    expanded uncertainty of the insertion loss [dB], at least 0; never less than 0.05 is used
 * @throws RangeError on sweeps without a common frequency, a total reflection, or a negative uncertainty
 */
export function reduceSweep({
  bare,
  covered,
  lossExpandedDb = BENCH_REPEATABILITY_DB,
}: {
  readonly bare: readonly SweepPoint[];
  readonly covered: readonly SweepPoint[];
  readonly lossExpandedDb?: number;
}): ReducedSweep {
  requireNotNegative("lossExpandedDb", lossExpandedDb);
  const limitDb = Math.max(lossExpandedDb, BENCH_REPEATABILITY_DB);
  const points = bare
    .filter(({ frequencyHz }) => holds(covered, frequencyHz))
    .map((point) => compare(point, sweepAt(covered, point.frequencyHz), limitDb));
  const [first] = points;
  if (first === undefined) throw new RangeError("the sweeps have no frequency in common");
  const worstReturnLoss = points.reduce((a, b) => (b.coveredReturnLossDb < a.coveredReturnLossDb ? b : a));
  const contradictions = points.filter((point) => point.belowFloor);
  const losses = points.flatMap(({ insertionLossDb }) => insertionLossDb ?? []);
  if (losses.length === 0) return { points, worstReturnLoss, contradictions };
  return {
    points,
    worstReturnLoss,
    contradictions,
    meanInsertionLossDb: losses.reduce((sum, loss) => sum + loss, 0) / losses.length,
    worstInsertionLoss: points.reduce((a, b) => (b.insertionLossDb! > a.insertionLossDb! ? b : a)),
    ...(losses.length > 2 && {
      insertionLossRippleDb: rippleAboutLine(
        points.map((point) => point.frequencyHz),
        losses,
      ),
    }),
  };
}

/** Magnitudes of a sweep at one frequency. */
export interface SweepMagnitudes {
  readonly s11: number;
  readonly s21?: number;
}

/**
 * Magnitudes at a frequency, linear between the points on either side.
 *
 * @throws RangeError on a frequency that the sweep does not cover
 */
export function sweepAt(points: readonly SweepPoint[], frequencyHz: number): SweepMagnitudes {
  if (!holds(points, frequencyHz)) throw new RangeError(`the sweep does not cover ${frequencyHz} Hz`);
  const frequencies = points.map((point) => point.frequencyHz);
  const at = (values: readonly Complex[]) => interpolateLinear(frequencies, values.map(abs), frequencyHz);
  const transmissions = points.flatMap(({ s21 }) => s21 ?? []);
  return {
    s11: at(points.map(({ s11 }) => s11)),
    ...(transmissions.length === points.length && { s21: at(transmissions) }),
  };
}

function holds(points: readonly SweepPoint[], frequencyHz: number): boolean {
  const [first, last] = [points[0], points.at(-1)];
  return first !== undefined && frequencyHz >= first.frequencyHz && frequencyHz <= last!.frequencyHz;
}

function compare(
  { frequencyHz, s11, s21 }: SweepPoint,
  covered: SweepMagnitudes,
  limitDb: number,
): SweptCover {
  const bareReturnLossDb = returnLossOfGamma(abs(s11));
  const coveredReturnLossDb = returnLossOfGamma(covered.s11);
  const { floorDb } = energyFloor({ bareReturnLossDb, coveredReturnLossDb });
  const insertionLossDb =
    s21 === undefined || covered.s21 === undefined ? undefined : amplitudeToDb(abs(s21) / covered.s21);
  return {
    frequencyHz,
    bareReturnLossDb,
    coveredReturnLossDb,
    returnLossChangeDb: bareReturnLossDb - coveredReturnLossDb,
    floorDb,
    ...(insertionLossDb !== undefined && { insertionLossDb }),
    belowFloor: insertionLossDb !== undefined && insertionLossDb < floorDb - limitDb,
  };
}

function rippleAboutLine(frequenciesHz: readonly number[], lossesDb: readonly number[]): number {
  const low = frequenciesHz[0]!;
  const span = frequenciesHz.at(-1)! - low;
  const { residuals } = leastSquares({
    measured: lossesDb,
    standard: lossesDb.map(() => 1),
    predict: ([start, rise]) => frequenciesHz.map((f) => start! + (rise! * (f - low)) / span),
    start: [lossesDb[0]!, 0],
    step: [1, 1],
  });
  return Math.max(...residuals) - Math.min(...residuals);
}
