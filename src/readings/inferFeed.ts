import type { Layer } from "../cover/layeredSheet.ts";
import { gammaOfReturnLoss, returnLossOfGamma } from "../cover/reflectionFigures.ts";
import { requireFinite, requireNotNegative, requirePositive } from "../numeric/check.ts";
import { RADIANS_PER_DEGREE } from "../numeric/constants.ts";
import { normalQuantile } from "../numeric/normal.ts";
import { wrapped } from "./inferFeedPhase.ts";
import { type LeastSquaresFit, leastSquares } from "./leastSquares.ts";
import { foretell, LOSS_STANDARD_DB, RETURN_LOSS_STANDARD_DB, sheetOf } from "./sheetOnFeed.ts";
import { type FurtherReading, tellApart } from "./tellApart.ts";

/** A known sheet on the feed, with what was read; at least one of the two readings. */
export interface KnownSheet {
  readonly name: string;
  readonly layer: Layer;
  readonly gapMm?: number;
  readonly coveredReturnLossDb?: number;
  readonly insertionLossDb?: number;
}

export interface InferFeedInput {
  readonly frequencyGHz: number;
  readonly sheets: readonly KnownSheet[];
  readonly feedReturnLossDb?: number | undefined;
  readonly returnLossStandardDb?: number;
  readonly lossStandardDb?: number;
  readonly coverage?: number;
}

export interface FeedSolution {
  /** Magnitude g of the feed's reflection, and its expanded uncertainty. */
  readonly gamma: number;
  readonly gammaExpanded: number;
  readonly returnLossDb: number;
  /** arg S22 at the aperture plane [deg], and its expanded uncertainty; Infinity where the readings leave it free. */
  readonly phaseDeg: number;
  readonly phaseExpandedDeg: number;
  readonly chiSquared: number;
}

export interface SheetResidual {
  readonly name: string;
  /** Measured less fitted, in standard uncertainties. */
  readonly returnLoss?: number;
  readonly insertionLoss?: number;
}

export interface InferredFeed {
  /** "undetermined": one solution, whose phase the readings leave open by 90 degrees or more. */
  readonly outcome: "decided" | "ambiguous" | "undetermined";
  readonly ambiguous: boolean;
  /** Best first; all that fit as well as the best within the confidence wanted. */
  readonly solutions: readonly FeedSolution[];
  readonly degreesOfFreedom: number;
  /** Of the best solution. */
  readonly residuals: readonly SheetResidual[];
  /** The sheet without which the others agree far better; it is kept in the fit. */
  readonly outlier?: { readonly name: string; readonly chiSquaredWithout: number };
  /** Readings of the first sheet that would tell the solutions apart, best first. */
  readonly advice: readonly FurtherReading[];
}

/**
 * Reflection of a feed, magnitude and phase, from several known sheets before it.
 *
 * Weighted least squares over (g, phi) of all covered reflections and insertion losses, and of the bare reflection
 * where it was read, from starts all around the circle. Reflections are compared as magnitudes, because a return loss
 * in dB has no slope to follow near a perfect match. Where the residuals exceed their uncertainties, intervals grow
 * by sqrt(chi^2/degrees of freedom). Solutions within k^2 of the best chi^2, so enlarged, are listed.
 *
 * The outlier is the sheet that lowers chi^2 most when left out, if that is more than chance explains at 5 % over all
 * sheets (1 or 2 readings a sheet: chi^2 quantiles z^2 and -2 ln p). None is named where leaving out either of two
 * does about as well.
 *
 * Source: cascade of `coveredFeed`; least squares by `leastSquares`; enlarged intervals: Birge 1932, Phys. Rev. 40,
 *         207 (from memory)
 * Valid:  sheets that collect all they send back; their own uncertainty is to be held in that of the readings
 *
 * @param frequencyGHz          [GHz], above 0
 * @param sheets                at least one; two of clearly different thickness or gap decide the sign of the phase
 * @param feedReturnLossDb      bare [dB], above 0, finite
 * @param returnLossStandardDb  standard uncertainty of each return loss [dB], above 0, default 0.58
 * @param lossStandardDb        of each insertion loss [dB], above 0, default 0.029
 * @param coverage              factor k, default 2
 * @throws RangeError on fewer than two readings in all, or an argument outside these ranges
 */
export function inferFeed({
  frequencyGHz,
  sheets,
  feedReturnLossDb,
  returnLossStandardDb = RETURN_LOSS_STANDARD_DB,
  lossStandardDb = LOSS_STANDARD_DB,
  coverage = 2,
}: InferFeedInput): InferredFeed {
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("returnLossStandardDb", returnLossStandardDb);
  requirePositive("lossStandardDb", lossStandardDb);
  requirePositive("coverage", coverage);
  if (feedReturnLossDb !== undefined) requirePositive("feedReturnLossDb", feedReturnLossDb);
  for (const { gapMm = 0, coveredReturnLossDb, insertionLossDb } of sheets) {
    requireNotNegative("gapMm", gapMm);
    if (coveredReturnLossDb !== undefined) requirePositive("coveredReturnLossDb", coveredReturnLossDb);
    if (insertionLossDb !== undefined) requireFinite("insertionLossDb", insertionLossDb);
  }
  const problem = { frequencyGHz, feedReturnLossDb, returnLossStandardDb, lossStandardDb };
  const data = dataOf(problem, sheets);
  if (data.length < 2) throw new RangeError("sheets must hold at least two readings, the bare one included");
  const fits = fitAll(data);
  const best = fits[0]!;
  const { degreesOfFreedom } = best;
  const enlarged = degreesOfFreedom > 0 ? Math.max(1, best.chiSquared / degreesOfFreedom) : 1;
  const solutions = fits
    .filter(({ chiSquared }) => chiSquared - best.chiSquared <= coverage ** 2 * enlarged)
    .map((fit) => solutionOf(fit, coverage * Math.sqrt(enlarged)));
  const ambiguous = solutions.length > 1;
  const open = !(solutions[0]!.phaseExpandedDeg < 90);
  const [first] = sheets;
  const cases = solutions.map(({ gamma, phaseDeg }) => ({
    frequencyGHz,
    feedReturnLossDb: returnLossOfGamma(gamma),
    phaseDeg,
    layer: first!.layer,
    gapMm: first!.gapMm ?? 0,
  }));
  const outlier = outlyingSheet(problem, sheets, best);
  return {
    outcome: ambiguous ? "ambiguous" : open ? "undetermined" : "decided",
    ambiguous,
    solutions,
    degreesOfFreedom,
    residuals: sheets.map(({ name }, i) => residualOf(name, i, data, best)),
    ...(outlier && { outlier }),
    advice: ambiguous ? tellApart(cases, returnLossStandardDb) : [],
  };
}

interface Problem {
  readonly frequencyGHz: number;
  readonly feedReturnLossDb: number | undefined;
  readonly returnLossStandardDb: number;
  readonly lossStandardDb: number;
}

/** One reading: what was read, how well, and what a feed (g, phi [rad]) would give. */
interface Datum {
  readonly sheet: number | undefined;
  readonly kind: "returnLoss" | "insertionLoss";
  readonly measured: number;
  readonly standard: number;
  readonly predict: (gamma: number, phaseRad: number) => number;
}

function dataOf(
  { frequencyGHz, feedReturnLossDb, returnLossStandardDb, lossStandardDb }: Problem,
  sheets: readonly KnownSheet[],
): Datum[] {
  const reflection = (returnLossDb: number) => {
    const measured = gammaOfReturnLoss("returnLossDb", returnLossDb);
    return {
      kind: "returnLoss" as const,
      measured,
      standard: (measured * returnLossStandardDb * Math.LN10) / 20,
    };
  };
  const data: Datum[] = [];
  if (feedReturnLossDb !== undefined) {
    data.push({ sheet: undefined, ...reflection(feedReturnLossDb), predict: (gamma) => gamma });
  }
  sheets.forEach(({ layer, gapMm = 0, coveredReturnLossDb, insertionLossDb }, sheet) => {
    const scattering = sheetOf(layer, frequencyGHz);
    const on = (gamma: number, phaseRad: number) =>
      foretell(
        {
          frequencyGHz,
          feedReturnLossDb: returnLossOfGamma(gamma),
          phaseDeg: phaseRad / RADIANS_PER_DEGREE,
          layer,
          gapMm,
        },
        scattering,
      );
    if (coveredReturnLossDb !== undefined) {
      data.push({ sheet, ...reflection(coveredReturnLossDb), predict: (g, phi) => on(g, phi).gamma });
    }
    if (insertionLossDb !== undefined) {
      data.push({
        sheet,
        kind: "insertionLoss",
        measured: insertionLossDb,
        standard: lossStandardDb,
        predict: (g, phi) => on(g, phi).insertionLossDb,
      });
    }
  });
  return data;
}

const PHASES = 36;
const LEAST_GAMMA = 0.003;
const MOST_GAMMA = 0.95;
const GAMMAS = Array.from({ length: 20 }, (_, i) => LEAST_GAMMA * (MOST_GAMMA / LEAST_GAMMA) ** (i / 19));

/** Every local minimum of chi^2, least first, each once. */
function fitAll(data: readonly Datum[]): LeastSquaresFit[] {
  const bare = data.find(({ sheet }) => sheet === undefined)?.measured;
  const gammas = bare === undefined ? GAMMAS : [bare];
  const ring = Array.from({ length: PHASES }, (_, i) => {
    const phase = (2 * Math.PI * i) / PHASES;
    const tries = gammas.map((gamma) => ({
      start: [gamma, phase],
      chiSquared: chiSquaredAt(data, gamma, phase),
    }));
    return tries.reduce((a, b) => (b.chiSquared < a.chiSquared ? b : a));
  });
  const valleys = ring.filter(({ chiSquared }, i) => {
    const [before, after] = [ring.at(i - 1)!, ring[(i + 1) % PHASES]!];
    return chiSquared <= before.chiSquared && chiSquared <= after.chiSquared;
  });
  const fits = valleys
    .map(({ start }) =>
      leastSquares({
        measured: data.map(({ measured }) => measured),
        standard: data.map(({ standard }) => standard),
        predict: ([gamma, phase]) =>
          data.map((datum) => datum.predict(Math.min(MOST_GAMMA, Math.abs(gamma!)), phase!)),
        start,
        step: [1e-5, 1e-5],
        low: [LEAST_GAMMA, -100],
        high: [MOST_GAMMA, 100],
      }),
    )
    .sort((a, b) => a.chiSquared - b.chiSquared);
  return fits.filter((fit, i) => !fits.slice(0, i).some((other) => samePlace(fit, other)));
}

function chiSquaredAt(data: readonly Datum[], gamma: number, phaseRad: number): number {
  return data.reduce(
    (sum, { measured, standard, predict }) => sum + ((measured - predict(gamma, phaseRad)) / standard) ** 2,
    0,
  );
}

function samePlace(a: LeastSquaresFit, b: LeastSquaresFit): boolean {
  const turn = wrapped((a.parameters[1]! - b.parameters[1]!) / RADIANS_PER_DEGREE);
  return Math.abs(turn) < 1 && Math.abs(a.parameters[0]! - b.parameters[0]!) < 0.01;
}

function solutionOf({ parameters, covariance, chiSquared }: LeastSquaresFit, factor: number): FeedSolution {
  const [gamma, phaseRad] = parameters as [number, number];
  const expanded = (i: number) => factor * Math.sqrt(covariance?.[i]?.[i] ?? Infinity);
  return {
    gamma,
    gammaExpanded: expanded(0),
    returnLossDb: returnLossOfGamma(gamma),
    phaseDeg: wrapped(phaseRad / RADIANS_PER_DEGREE),
    phaseExpandedDeg: expanded(1) / RADIANS_PER_DEGREE,
    chiSquared,
  };
}

function residualOf(
  name: string,
  sheet: number,
  data: readonly Datum[],
  fit: LeastSquaresFit,
): SheetResidual {
  const own = data.flatMap((datum, i) =>
    datum.sheet === sheet ? [[datum.kind, fit.residuals[i]! / datum.standard] as const] : [],
  );
  return { name, ...Object.fromEntries(own) };
}

function outlyingSheet(
  problem: Problem,
  sheets: readonly KnownSheet[],
  best: LeastSquaresFit,
): InferredFeed["outlier"] {
  const chance = 0.05 / sheets.length;
  const suspects = sheets.flatMap((sheet) => {
    const data = dataOf(
      problem,
      sheets.filter((other) => other !== sheet),
    );
    const without = data.length > 2 ? fitAll(data)[0]! : undefined;
    if (without === undefined) return []; // nothing would be left to judge by
    const readings = best.residuals.length - data.length;
    const limit = readings === 1 ? normalQuantile(1 - chance / 2) ** 2 : -2 * Math.log(chance);
    const drop = best.chiSquared - without.chiSquared;
    return drop > limit ? [{ name: sheet.name, chiSquaredWithout: without.chiSquared }] : [];
  });
  const [first, second] = suspects.sort((a, b) => a.chiSquaredWithout - b.chiSquaredWithout);
  // Where leaving out either of two does as well, the readings cannot say which one is wrong.
  if (second !== undefined && second.chiSquaredWithout - first!.chiSquaredWithout < 4) return undefined;
  return first;
}
