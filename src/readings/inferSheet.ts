import { gammaOfReturnLoss, mismatchLossDb } from "../cover/reflectionFigures.ts";
import { requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { abs } from "../numeric/complex.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { allSolutions } from "./allSolutions.ts";
import { foretell, LOSS_STANDARD_DB, RETURN_LOSS_STANDARD_DB, sheetOf } from "./sheetOnFeed.ts";
import { type FurtherReading, tellApart } from "./tellApart.ts";

export interface InferSheetInput {
  readonly frequencyGHz: number;
  readonly feedReturnLossDb: number;
  readonly coveredReturnLossDb: number;
  readonly insertionLossDb?: number | undefined;
  readonly thicknessMm: number;
  readonly phaseDeg?: number | undefined;
  readonly gapMm?: number;
  readonly lossTangent?: number;
  readonly permittivityRange?: readonly [low: number, high: number];
  readonly returnLossStandardDb?: number;
  readonly lossStandardDb?: number;
  readonly phaseStandardDeg?: number;
  readonly thicknessStandardMm?: number;
  readonly coverage?: number;
}

export interface SheetSolution {
  readonly permittivity: number;
  readonly permittivityLow: number;
  readonly permittivityHigh: number;
  readonly lossTangent: number;
  readonly lossTangentLow: number;
  readonly lossTangentHigh: number;
  /** The loss tangent is only known to be below lossTangentHigh. */
  readonly onlyBelow: boolean;
  /** Meets the readings themselves, not just their uncertainty. */
  readonly exact: boolean;
  /** Whole half waves inside the sheet. */
  readonly halfWaves: number;
}

export interface InferredSheet {
  /**
   * "decided": one; "ambiguous": several; "contradictory": none, no sheet of this thickness and range explains the
   * readings; "undetermined": the feed's phase is not known, only intervals follow.
   */
  readonly outcome: "decided" | "ambiguous" | "contradictory" | "undetermined";
  readonly ambiguous: boolean;
  readonly solutions: readonly SheetSolution[];
  /** Ranges of permittivity that the readings allow where the phase is not known. */
  readonly permittivityIntervals: readonly (readonly [low: number, high: number])[];
  /** Insertion loss not explained by the change of match [dB]: heat, negative where the readings contradict energy. */
  readonly heatDb?: number;
  /** Readings that would tell the solutions apart, best first. */
  readonly advice: readonly FurtherReading[];
}

/** Steps of the search over the index of refraction. */
const STEPS = 600;

/**
 * Permittivity and loss tangent of a flat sheet from what it does to a known feed.
 *
 * The heat, insertion loss less the change of mismatch loss, is -10 log10(|T|^2/(1 - |G|^2)) whatever the phase, and
 * gives the loss tangent for each permittivity. The permittivities that also meet the covered return loss are the
 * solutions; all in the range are listed, for the match is not monotone in them and half waves repeat it. A
 * permittivity's interval is where the foretold reflection stays within its expanded uncertainty. Without the feed's
 * phase only |g - g1|/(1 - g g1) <= |G| <= (g + g1)/(1 + g g1) follows.
 *
 * Source: cascade of `coveredFeed`; bounds as in `measuredCover`; uncertainty by JCGM 100:2008, 5.1.3 note 2
 * Valid:  one homogeneous sheet straight on, that collects all it sends back (on or near the mouth)
 *
 * @param frequencyGHz          [GHz], above 0
 * @param feedReturnLossDb      bare [dB], above 0, finite
 * @param coveredReturnLossDb   covered [dB], above 0, finite
 * @param insertionLossDb       [dB]; absent: the loss tangent is taken as given
 * @param thicknessMm           of the sheet [mm], above 0
 * @param phaseDeg              arg S22 of the feed at its aperture plane [deg]; absent: unknown
 * @param gapMm                 aperture plane to sheet [mm], default 0
 * @param lossTangent           used without an insertion loss, default 0
 * @param permittivityRange     searched, default 1 to 12
 * @param returnLossStandardDb  standard uncertainty of each return loss [dB], default 0.58
 * @param lossStandardDb        of the insertion loss [dB], default 0.029
 * @param phaseStandardDeg, thicknessStandardMm  default 0
 * @param coverage              factor k of the intervals, default 2
 * @throws RangeError on an argument outside these ranges
 */
export function inferSheet(input: InferSheetInput): InferredSheet {
  const {
    permittivityRange = [1, 12],
    returnLossStandardDb = RETURN_LOSS_STANDARD_DB,
    lossStandardDb = LOSS_STANDARD_DB,
    phaseStandardDeg = 0,
    thicknessStandardMm = 0,
    coverage = 2,
  } = input;
  const [low, high] = permittivityRange;
  requireWithin("permittivityRange[0]", low, 1, 100);
  requireWithin("permittivityRange[1]", high, low, 100);
  requirePositive("frequencyGHz", input.frequencyGHz);
  requirePositive("thicknessMm", input.thicknessMm);
  requirePositive("feedReturnLossDb", input.feedReturnLossDb);
  requirePositive("coveredReturnLossDb", input.coveredReturnLossDb);
  requirePositive("coverage", coverage);
  requireNotNegative("returnLossStandardDb", returnLossStandardDb);
  requireNotNegative("lossStandardDb", lossStandardDb);
  requireNotNegative("phaseStandardDeg", phaseStandardDeg);
  requireNotNegative("thicknessStandardMm", thicknessStandardMm);

  const grid = Array.from(
    { length: STEPS + 1 },
    (_, i) => (Math.sqrt(low) + (i / STEPS) * (Math.sqrt(high) - Math.sqrt(low))) ** 2,
  );
  const readings: Readings = {
    frequencyGHz: input.frequencyGHz,
    gapMm: input.gapMm ?? 0,
    givenLossTangent: input.lossTangent ?? 0,
    feedReturnLossDb: input.feedReturnLossDb,
    coveredReturnLossDb: input.coveredReturnLossDb,
    insertionLossDb: input.insertionLossDb,
    phaseDeg: input.phaseDeg ?? 0,
    thicknessMm: input.thicknessMm,
  };
  const moves: readonly (readonly [Movable, number])[] = [
    ["feedReturnLossDb", returnLossStandardDb],
    ["coveredReturnLossDb", returnLossStandardDb],
    ["insertionLossDb", lossStandardDb],
    ["phaseDeg", phaseStandardDeg],
    ["thicknessMm", thicknessStandardMm],
  ];
  const heat = readings.insertionLossDb === undefined ? undefined : heatOf(readings);
  const shared = { ...(heat !== undefined && { heatDb: heat }), permittivityIntervals: [] };

  if (input.phaseDeg === undefined) {
    const permittivityIntervals = withoutPhase(readings, grid, coverage * returnLossStandardDb);
    const outcome = permittivityIntervals.length === 0 ? "contradictory" : "undetermined";
    return { ...shared, outcome, ambiguous: false, solutions: [], permittivityIntervals, advice: [] };
  }
  const heatExpanded = coverage * spread(moves, readings, heatOf);
  if (heat !== undefined && heat < -heatExpanded) {
    return { ...shared, outcome: "contradictory", ambiguous: false, solutions: [], advice: [] };
  }
  const miss = (permittivity: number) => missOf(permittivity, readings);
  const limitAt = (permittivity: number) =>
    coverage * spread(moves, readings, (r) => missOf(permittivity, r));
  const solutions = allSolutions(miss, limitAt, grid).map(
    ({ x: permittivity, exact, from, to }): SheetSolution => {
      const tangent = (heatDb: number | undefined) => lossTangentOf(permittivity, readings, heatDb);
      const lossTangent = tangent(heat);
      const lossTangentLow = heat === undefined ? lossTangent : tangent(heat - heatExpanded);
      const lossTangentHigh = heat === undefined ? lossTangent : tangent(heat + heatExpanded);
      const halfWaveMm = (1e3 * wavelengthM(input.frequencyGHz)) / (2 * Math.sqrt(permittivity));
      return {
        permittivity,
        permittivityLow: from,
        permittivityHigh: to,
        lossTangent,
        lossTangentLow,
        lossTangentHigh,
        onlyBelow: heat !== undefined && lossTangentLow === 0,
        exact,
        halfWaves: Math.floor(input.thicknessMm / halfWaveMm),
      };
    },
  );
  const ambiguous = solutions.length > 1;
  const outcome = ambiguous ? "ambiguous" : solutions.length === 1 ? "decided" : "contradictory";
  const cases = solutions.map(({ permittivity, lossTangent }) => ({
    ...readings,
    layer: { permittivity, lossTangent, thicknessMm: input.thicknessMm },
  }));
  const advice = ambiguous ? tellApart(cases, returnLossStandardDb) : [];
  return { ...shared, outcome, ambiguous, solutions, advice };
}

interface Readings {
  readonly frequencyGHz: number;
  readonly gapMm: number;
  readonly givenLossTangent: number;
  readonly feedReturnLossDb: number;
  readonly coveredReturnLossDb: number;
  readonly insertionLossDb: number | undefined;
  readonly phaseDeg: number;
  readonly thicknessMm: number;
}

type Movable = "feedReturnLossDb" | "coveredReturnLossDb" | "insertionLossDb" | "phaseDeg" | "thicknessMm";

/** Standard uncertainty of a figure of the readings: each is moved by its own, both ways. */
function spread(
  moves: readonly (readonly [Movable, number])[],
  readings: Readings,
  figure: (readings: Readings) => number,
): number {
  const contributions = moves.map(([name, standard]) => {
    const value = readings[name];
    if (value === undefined || standard === 0) return 0;
    const least = name === "insertionLossDb" || name === "phaseDeg" ? -Infinity : 1e-6;
    const moved = (sign: number) => figure({ ...readings, [name]: Math.max(least, value + sign * standard) });
    return (moved(1) - moved(-1)) / 2;
  });
  return Math.hypot(...contributions);
}

function heatOf({ feedReturnLossDb, coveredReturnLossDb, insertionLossDb = 0 }: Readings): number {
  const mismatch = (returnLossDb: number) => mismatchLossDb(gammaOfReturnLoss("returnLossDb", returnLossDb));
  return insertionLossDb - mismatch(coveredReturnLossDb) + mismatch(feedReturnLossDb);
}

/** Loss tangent whose heat is as given; 0 where there is none to explain. */
function lossTangentOf(permittivity: number, readings: Readings, heatDb: number | undefined): number {
  if (heatDb === undefined) return readings.givenLossTangent;
  if (heatDb <= 0) return 0;
  const excess = (lossTangent: number) => {
    const { thicknessMm, frequencyGHz } = readings;
    const sheet = sheetOf({ permittivity, lossTangent, thicknessMm }, frequencyGHz);
    return sheet.transmissionLossDb - mismatchLossDb(abs(sheet.reflection)) - heatDb;
  };
  // Heat is nearly proportional to the loss tangent, so secant steps from 0 arrive at once.
  let [before, atBefore] = [0, -heatDb];
  let [now, atNow] = [1e-3, excess(1e-3)];
  for (let step = 0; step < 30 && Math.abs(atNow) > 1e-12 && atNow !== atBefore; step++) {
    const next = Math.max(0, now - (atNow * (now - before)) / (atNow - atBefore));
    [before, atBefore] = [now, atNow];
    [now, atNow] = [next, excess(next)];
  }
  return now;
}

/** Foretold less measured reflection at the throat. */
function missOf(permittivity: number, readings: Readings): number {
  const heat = readings.insertionLossDb === undefined ? undefined : heatOf(readings);
  const lossTangent = lossTangentOf(permittivity, readings, heat);
  const layer = { permittivity, lossTangent, thicknessMm: readings.thicknessMm };
  return (
    foretell({ ...readings, layer }).gamma -
    gammaOfReturnLoss("coveredReturnLossDb", readings.coveredReturnLossDb)
  );
}

/** Ranges of permittivity whose reflection lies between the bounds, each return loss at its worst. */
function withoutPhase(readings: Readings, grid: readonly number[], expandedDb: number): [number, number][] {
  const around = (returnLossDb: number) =>
    [-expandedDb, 0, expandedDb].map((by) =>
      gammaOfReturnLoss("returnLossDb", Math.max(0, returnLossDb + by)),
    );
  const pairs = around(readings.feedReturnLossDb).flatMap((g) =>
    around(readings.coveredReturnLossDb).map((g1) => [g, g1] as const),
  );
  const least = Math.min(...pairs.map(([g, g1]) => Math.abs(g - g1) / (1 - g * g1)));
  const most = Math.max(...pairs.map(([g, g1]) => (g + g1) / (1 + g * g1)));
  const heat = readings.insertionLossDb === undefined ? undefined : heatOf(readings);
  const intervals: [number, number][] = [];
  let open = false;
  for (const permittivity of grid) {
    const lossTangent = lossTangentOf(permittivity, readings, heat);
    const layer = { permittivity, lossTangent, thicknessMm: readings.thicknessMm };
    const a = abs(sheetOf(layer, readings.frequencyGHz).reflection);
    const allowed = a >= least && a <= most;
    if (allowed && open) intervals.at(-1)![1] = permittivity;
    else if (allowed) intervals.push([permittivity, permittivity]);
    open = allowed;
  }
  return intervals;
}
