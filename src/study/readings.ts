import { couplerReturnLoss } from "../readings/couplerReturnLoss.ts";
import { directivityBounds, returnLossChangeLimitDb } from "../readings/directivityBounds.ts";
import { energyContradiction, type Suspect } from "../readings/energyContradiction.ts";
import { rectangular, type UncertaintyComponent } from "../readings/gum.ts";
import { pairsFor } from "../readings/pairsFor.ts";
import { expandedUncertainty, reduceSeries } from "../readings/reduceSeries.ts";
import type { RunningCover } from "../readings/runningSeries.ts";
import { BENCH_REPEATABILITY_DB, judgeLoss, type LossVerdict } from "../readings/verdict.ts";
import type { BenchReadings, Coupler } from "../scenario/readings.ts";
import type { FigureColumn } from "../scenario/readingsColumns.ts";
import type { TableSeries } from "../scenario/readingsSeries.ts";
import { type SweptCoverReport, sweptCovers } from "./readingsSweep.ts";

/** What the command line adds to a file of readings, or puts in the place of what the file says. */
export interface BenchChoice {
  readonly confidence?: number | undefined;
  readonly repeatabilityDb?: number | undefined;
  readonly wantedDb?: number | undefined;
  readonly directivityDb?: number | undefined;
  readonly frequencyGHz?: number | undefined;
}

/** A mean with its uncertainty. */
export interface ReducedFigure {
  readonly pairs: number;
  readonly valueDb: number;
  readonly typeADb: number;
  /** Standard uncertainty, type A and B together [dB]. */
  readonly combinedDb: number;
  readonly expandedDb: number;
  readonly coverageFactor: number;
  readonly effectiveDegreesOfFreedom: number;
  /** A smaller figure is not told from zero [dB]. */
  readonly limitDb: number;
  /** What a wanted uncertainty would take, where one is wanted; `more` is undefined where no number will do. */
  readonly wanted?: { readonly db: number; readonly more: number | undefined };
  /** Expanded uncertainty that type B leaves however long one reads [dB]. */
  readonly leastDb: number;
}

export interface LossFigure extends ReducedFigure {
  readonly verdict: LossVerdict;
  readonly retake: boolean;
  /** Least loss that the change of return loss demands, where both return losses are known [dB]. */
  readonly floorDb?: number | undefined;
  readonly bestPossibleGainDb?: number | undefined;
  /** Which reading is the likelier culprit, likeliest first, where the loss lies below the floor. */
  readonly suspects: readonly Suspect[];
}

export interface ChangeFigure extends ReducedFigure {
  readonly verdict: "indistinguishable_from_zero" | "worse_match" | "better_match";
  /** Bare and covered return loss, where the readings are not just differences. */
  readonly returnLosses?: { readonly bare: BoundedReturnLoss; readonly covered: BoundedReturnLoss };
  /** Most by which the coupler's leak can falsify the change [dB], where its directivity is known. */
  readonly leakLimitDb?: number | undefined;
}

export interface BoundedReturnLoss {
  readonly db: number;
  /** Bounds by the coupler, where it is known. */
  readonly lowDb?: number;
  readonly highDb?: number;
}

export interface CoverReadings {
  readonly cover: string;
  readonly loss?: LossFigure;
  readonly change?: ChangeFigure;
}

/** What one column of a table is like as a whole. */
export interface RunOfReadings {
  readonly figure: FigureColumn;
  readonly unit: string;
  readonly count: number;
  /** Last bare reading less the first [dB], and the time between [s], where the table has times. */
  readonly driftDb: number;
  readonly overS?: number;
  readonly readingStandardDb: number;
  readonly degreesOfFreedom: number;
  readonly outlier?: { readonly line: number; readonly state: string | undefined; readonly shiftDb: number };
  readonly unbracketedCount: number;
  /** Where the table is short enough to tell. */
  readonly unbracketedLines: readonly number[];
}

export interface BenchReport {
  readonly file: string;
  readonly title?: string | undefined;
  readonly rows: number;
  readonly confidence: number;
  readonly repeatabilityDb: number;
  readonly averages?: { readonly least: number; readonly most: number };
  readonly covers: readonly CoverReadings[];
  readonly runs: readonly RunOfReadings[];
  readonly sweeps: readonly SweptCoverReport[];
  readonly notes: readonly { readonly line: number; readonly text: string }[];
  readonly doubts: readonly { readonly line: number; readonly message: string }[];
}

const USUAL_CONFIDENCE = 0.95;
/** A covered return loss by a change that asks for more than the feed has was read on a better feed [dB]. */
const LEAST_RETURN_LOSS_DB = 0.1;

/** Reduces and judges readings: one result a cover, then what the runs and sweeps are like. */
export async function benchReport(readings: BenchReadings, choice: BenchChoice = {}): Promise<BenchReport> {
  const { file, title, table, returnLossesDb } = readings;
  const directivityDb = choice.directivityDb ?? readings.coupler?.directivityDb;
  const bench: Bench = {
    confidence: choice.confidence ?? readings.confidence ?? USUAL_CONFIDENCE,
    repeatabilityDb: choice.repeatabilityDb ?? readings.repeatabilityDb ?? BENCH_REPEATABILITY_DB,
    wantedDb: choice.wantedDb ?? readings.wantedDb,
    coupler: directivityDb === undefined ? undefined : { ...readings.coupler, directivityDb },
    returnLossesDb,
  };
  const levels = table?.series.find(({ figure }) => figure === "level");
  const matches = table?.series.find(({ figure }) => figure !== "level");
  const covers = (table?.covers ?? []).flatMap((cover): CoverReadings[] => {
    const change = matches && changeOf(cover, matches, bench);
    const loss = levels && lossOf(cover, levels, bench, change);
    return loss || change ? [{ cover, ...(loss && { loss }), ...(change && { change }) }] : [];
  });
  return {
    file,
    title,
    rows: table?.rows ?? 0,
    confidence: bench.confidence,
    repeatabilityDb: bench.repeatabilityDb,
    ...(table?.averages && { averages: table.averages }),
    covers,
    runs: (table?.series ?? []).map((series) => runOf(series, table!.timeInSeconds)),
    sweeps: await sweptCovers(readings.sweeps, choice.frequencyGHz ?? readings.frequencyGHz),
    notes: table?.notes ?? [],
    doubts: table?.doubts ?? [],
  };
}

interface Bench {
  readonly confidence: number;
  readonly repeatabilityDb: number;
  readonly wantedDb: number | undefined;
  readonly coupler: Coupler | undefined;
  readonly returnLossesDb: Readonly<Record<string, number>>;
}

function runOf(
  { figure, unit, count, readings, running, bare }: TableSeries,
  inSeconds: boolean,
): RunOfReadings {
  const { readingStandardDb, degreesOfFreedom, unbracketedCount } = running;
  // A short run is judged with all its readings at hand, a long one while it passes.
  const held = readings && reduceSeries({ readings });
  const outlier = held
    ? held.outlier && { ...held.outlier, line: readings[held.outlier.reading]!.line }
    : undefined;
  const passed =
    held || running.outlier === undefined ? undefined : { ...running.outlier, line: running.outlier.place };
  const found = outlier ?? passed;
  const state = readings?.find(({ line }) => line === found?.line)?.state;
  return {
    figure,
    unit,
    count,
    driftDb: bare.last.levelDb - bare.first.levelDb,
    ...(inSeconds && { overS: bare.last.time - bare.first.time }),
    readingStandardDb,
    degreesOfFreedom,
    ...(found && { outlier: { line: found.line, state, shiftDb: found.shiftDb } }),
    unbracketedCount,
    unbracketedLines: held ? held.unbracketed.map((place) => readings[place]!.line) : [],
  };
}

/** The figure of one cover with its uncertainty; undefined without pairs of it. */
function figureOf(
  cover: string,
  { running }: TableSeries,
  { confidence, repeatabilityDb, wantedDb }: Bench,
  typeB: readonly UncertaintyComponent[],
): ReducedFigure | undefined {
  const found: RunningCover | undefined = running.covers.find(({ state }) => state === cover);
  if (found === undefined) return undefined;
  const { count, lossDb, typeADb } = found;
  const choice = { confidence, repeatabilityDb, typeB };
  const { readingStandardDb, degreesOfFreedom } = running;
  const uncertainty = expandedUncertainty(typeADb, degreesOfFreedom, choice);
  const more = (wanted: number) =>
    pairsFor({ readingStandardDb, pairsSoFar: count, wantedDb: wanted, ...choice }).more;
  return {
    pairs: count,
    valueDb: lossDb,
    typeADb,
    ...uncertainty,
    limitDb: Math.max(uncertainty.expandedDb, BENCH_REPEATABILITY_DB),
    ...(wantedDb !== undefined && { wanted: { db: wantedDb, more: more(wantedDb) } }),
    leastDb: expandedUncertainty(0, Infinity, choice).expandedDb,
  };
}

function lossOf(
  cover: string,
  series: TableSeries,
  bench: Bench,
  change: ChangeFigure | undefined,
): LossFigure | undefined {
  const figure = figureOf(cover, series, bench, []);
  if (figure === undefined) return undefined;
  const bare = change?.returnLosses?.bare.db ?? bench.returnLossesDb["bare"];
  const covered =
    change?.returnLosses?.covered.db ??
    (change && bare !== undefined ? Math.max(LEAST_RETURN_LOSS_DB, bare - change.valueDb) : undefined) ??
    bench.returnLossesDb[cover];
  const { valueDb: lossDb, expandedDb, combinedDb } = figure;
  const judged = judgeLoss({
    lossDb,
    expandedDb,
    feedReturnLossDb: bare,
    coveredReturnLossDb: bare === undefined ? undefined : covered,
  });
  const { suspects } =
    judged.verdict === "below_energy_floor"
      ? energyContradiction({
          lossDb,
          lossStandardDb: Math.max(combinedDb, 1e-3),
          bareReturnLossDb: bare!,
          coveredReturnLossDb: covered!,
        })
      : { suspects: [] };
  return { ...figure, ...judged, suspects };
}

function changeOf(cover: string, series: TableSeries, bench: Bench): ChangeFigure | undefined {
  const plain = figureOf(cover, series, bench, []);
  if (plain === undefined) return undefined;
  const bareDb = bareReturnLossOf(series, bench);
  const coveredDb = bareDb && Math.max(LEAST_RETURN_LOSS_DB, bareDb - plain.valueDb);
  const { coupler } = bench;
  const leakLimitDb =
    coupler && bareDb && coveredDb
      ? returnLossChangeLimitDb({
          bareReturnLossDb: bareDb,
          coveredReturnLossDb: coveredDb,
          directivityDb: coupler.directivityDb,
        })
      : undefined;
  // The leak keeps its phase while one reads: it is a component of type B, and no repeat lowers it.
  const leak =
    leakLimitDb !== undefined && leakLimitDb < Infinity
      ? [{ name: "leak", standard: rectangular(leakLimitDb) }]
      : [];
  const figure = figureOf(cover, series, bench, leak)!;
  const { valueDb, limitDb } = figure;
  return {
    ...figure,
    verdict:
      Math.abs(valueDb) <= limitDb
        ? "indistinguishable_from_zero"
        : valueDb > 0
          ? "worse_match"
          : "better_match",
    ...(bareDb !== undefined &&
      coveredDb !== undefined && {
        returnLosses: { bare: boundedBy(coupler, bareDb), covered: boundedBy(coupler, coveredDb) },
      }),
    ...(leakLimitDb !== undefined && { leakLimitDb }),
  };
}

/** The bare return loss that the readings give, alone or with the coupler's reference. */
function bareReturnLossOf(
  { figure, bare }: TableSeries,
  { coupler, returnLossesDb }: Bench,
): number | undefined {
  if (figure === "return loss") return bare.meanDb;
  if (coupler?.openDb === undefined && coupler?.shortDb === undefined) return returnLossesDb["bare"];
  return couplerReturnLoss({ ...coupler, reflectedDb: -bare.meanDb }).returnLossDb;
}

function boundedBy(coupler: Coupler | undefined, returnLossDb: number): BoundedReturnLoss {
  if (coupler === undefined) return { db: returnLossDb };
  const { openDb, shortDb } = coupler;
  if (openDb === undefined && shortDb === undefined) {
    return { db: returnLossDb, ...directivityBounds({ ...coupler, returnLossDb }) };
  }
  // Only differences of levels count: the reference stands at 0 dB.
  const reference = {
    openDb: openDb === undefined ? undefined : 0,
    shortDb: shortDb === undefined ? undefined : 0,
  };
  const { lowDb, highDb } = couplerReturnLoss({ ...coupler, ...reference, reflectedDb: -returnLossDb });
  return { db: returnLossDb, lowDb, highDb };
}
