import { gammaOfReturnLoss, returnLossOfGamma } from "../cover/reflectionFigures.ts";
import { energyContradiction, type Suspect } from "../readings/energyContradiction.ts";
import type { InferredFeed } from "../readings/inferFeed.ts";
import { inferFeedPhase } from "../readings/inferFeedPhase.ts";
import { type InferredSheet, inferSheet } from "../readings/inferSheet.ts";
import type { FurtherReading } from "../readings/tellApart.ts";
import type { InferReadings, UnknownSheetReading } from "../scenario/infer.ts";

/** A feed that explains the readings. */
export interface PossibleFeed {
  readonly gamma: number;
  readonly returnLossDb: number;
  /** Expanded (k = 2); Infinity where the readings leave it free, undefined where it was read and not fitted. */
  readonly gammaExpanded?: number;
  readonly phaseDeg: number;
  readonly phaseLowDeg: number;
  readonly phaseHighDeg: number;
}

export interface FeedReport {
  readonly outcome: "decided" | "ambiguous" | "undetermined" | "contradictory";
  readonly feeds: readonly PossibleFeed[];
  /** How far each sheet lies from the best fit [standard uncertainties], where more was read than is asked. */
  readonly residuals: InferredFeed["residuals"];
  readonly chiSquared?: number;
  readonly degreesOfFreedom: number;
  readonly outlier?: InferredFeed["outlier"];
  /** cos S of one sheet, beyond +-1 where the readings do not belong to it. */
  readonly cosSum?: number;
  readonly cosSumExpanded?: number;
  readonly advice: readonly FurtherReading[];
}

/** A sheet of unknown material by one possible feed. */
export interface SheetByFeed {
  /** Undefined where nobody knows it. */
  readonly feedPhaseDeg: number | undefined;
  readonly result: InferredSheet;
}

export interface SheetReport {
  readonly name: string;
  readonly thicknessMm: number;
  readonly byFeed: readonly SheetByFeed[];
}

/** A sheet whose insertion loss lies below what its return losses demand. */
export interface SheetContradiction {
  readonly sheet: string;
  readonly insertionLossDb: number;
  readonly floorDb: number;
  readonly suspects: readonly Suspect[];
}

export interface InferReport {
  readonly file: string;
  readonly title?: string | undefined;
  readonly frequencyGHz: number;
  readonly returnLossStandardDb: number;
  readonly lossStandardDb: number;
  readonly feed?: FeedReport;
  /** Where the phase that the unknown sheets are held against comes from. */
  readonly phaseFrom: "file" | "sheets" | "nowhere";
  readonly sheets: readonly SheetReport[];
  readonly contradictions: readonly SheetContradiction[];
}

/** Coverage factor of all intervals here. */
const COVERAGE = 2;

/** The feed from its known sheets, and sheets of unknown material from the feed. */
export async function inferReport(readings: InferReadings): Promise<InferReport> {
  const { file, title, frequencyGHz, returnLossStandardDb, lossStandardDb, feedPhaseDeg } = readings;
  const feed = readings.sheets.length > 0 ? await feedOf(readings) : undefined;
  const phases =
    feedPhaseDeg !== undefined
      ? [{ phaseDeg: feedPhaseDeg.value, standardDeg: feedPhaseDeg.sigma ?? 0 }]
      : (feed?.feeds ?? [])
          .filter(({ phaseLowDeg, phaseHighDeg }) => phaseHighDeg - phaseLowDeg < 180)
          .map(({ phaseDeg, phaseLowDeg, phaseHighDeg }) => ({
            phaseDeg,
            standardDeg: (phaseHighDeg - phaseLowDeg) / 2 / COVERAGE,
          }));
  return {
    file,
    title,
    frequencyGHz,
    returnLossStandardDb,
    lossStandardDb,
    ...(feed && { feed }),
    phaseFrom: feedPhaseDeg !== undefined ? "file" : phases.length > 0 ? "sheets" : "nowhere",
    sheets: readings.unknown.map((sheet) => ({
      name: sheet.name,
      thicknessMm: sheet.thicknessMm,
      byFeed: (phases.length > 0 ? phases : [undefined]).map((phase) => ({
        feedPhaseDeg: phase?.phaseDeg,
        result: sheetBy(readings, sheet, phase),
      })),
    })),
    contradictions: contradictionsOf(readings),
  };
}

async function feedOf(readings: InferReadings): Promise<FeedReport> {
  const { frequencyGHz, sheets, feedReturnLossDb, returnLossStandardDb, lossStandardDb } = readings;
  const [only] = sheets;
  if (sheets.length === 1 && feedReturnLossDb !== undefined && only?.coveredReturnLossDb !== undefined) {
    const { layer, permittivityStandard, thicknessStandardMm, gapMm, coveredReturnLossDb } = only;
    const { solutions, ...rest } = inferFeedPhase({
      ...layer,
      frequencyGHz,
      gapMm,
      feedReturnLossDb,
      coveredReturnLossDb,
      returnLossStandardDb,
      permittivityStandard,
      thicknessStandardMm,
      coverage: COVERAGE,
    });
    const gamma = gammaOfReturnLoss("feedReturnLossDb", feedReturnLossDb);
    return {
      outcome: rest.outcome,
      feeds: solutions.map(({ phaseDeg, lowDeg, highDeg }) => ({
        gamma,
        returnLossDb: feedReturnLossDb,
        phaseDeg,
        phaseLowDeg: lowDeg,
        phaseHighDeg: highDeg,
      })),
      residuals: [],
      degreesOfFreedom: 0,
      cosSum: rest.cosSum,
      cosSumExpanded: rest.cosSumExpanded,
      advice: rest.advice,
    };
  }
  // What fits by least squares is loaded when several sheets ask for it.
  const { inferFeed } = await import("../readings/inferFeed.ts");
  const fitted = inferFeed({
    frequencyGHz,
    sheets: sheets.map(({ name, layer, gapMm, coveredReturnLossDb, insertionLossDb }) => ({
      name,
      layer,
      gapMm,
      ...(coveredReturnLossDb !== undefined && { coveredReturnLossDb }),
      ...(insertionLossDb !== undefined && { insertionLossDb }),
    })),
    feedReturnLossDb,
    returnLossStandardDb,
    lossStandardDb,
    coverage: COVERAGE,
  });
  return {
    outcome: fitted.outcome,
    feeds: fitted.solutions.map(({ gamma, gammaExpanded, phaseDeg, phaseExpandedDeg }) => ({
      gamma,
      returnLossDb: returnLossOfGamma(gamma),
      gammaExpanded,
      phaseDeg,
      phaseLowDeg: phaseDeg - phaseExpandedDeg,
      phaseHighDeg: phaseDeg + phaseExpandedDeg,
    })),
    residuals: fitted.residuals,
    chiSquared: fitted.solutions[0]!.chiSquared,
    degreesOfFreedom: fitted.degreesOfFreedom,
    ...(fitted.outlier && { outlier: fitted.outlier }),
    advice: fitted.advice,
  };
}

function sheetBy(
  { frequencyGHz, feedReturnLossDb, returnLossStandardDb, lossStandardDb }: InferReadings,
  sheet: UnknownSheetReading,
  phase: { readonly phaseDeg: number; readonly standardDeg: number } | undefined,
): InferredSheet {
  const { thicknessMm, thicknessStandardMm, gapMm, coveredReturnLossDb, insertionLossDb, lossTangent } =
    sheet;
  return inferSheet({
    frequencyGHz,
    feedReturnLossDb: feedReturnLossDb!,
    coveredReturnLossDb,
    insertionLossDb,
    thicknessMm,
    thicknessStandardMm,
    gapMm,
    ...(lossTangent !== undefined && { lossTangent }),
    permittivityRange: [1, sheet.permittivityUpTo],
    returnLossStandardDb,
    lossStandardDb,
    ...(phase && { phaseDeg: phase.phaseDeg, phaseStandardDeg: phase.standardDeg }),
    coverage: COVERAGE,
  });
}

/** The energy floor held against every sheet whose readings allow it. */
function contradictionsOf(readings: InferReadings): SheetContradiction[] {
  const {
    feedReturnLossDb: bareReturnLossDb,
    sheets,
    unknown,
    lossStandardDb,
    returnLossStandardDb,
  } = readings;
  return [...sheets, ...unknown].flatMap(({ name, insertionLossDb, coveredReturnLossDb }) => {
    if (
      bareReturnLossDb === undefined ||
      insertionLossDb === undefined ||
      coveredReturnLossDb === undefined
    ) {
      return [];
    }
    const { floorDb, shortfallDb, suspects } = energyContradiction({
      lossDb: insertionLossDb,
      lossStandardDb,
      bareReturnLossDb,
      coveredReturnLossDb,
      returnLossStandardDb,
    });
    if (shortfallDb <= COVERAGE * lossStandardDb) return [];
    return [{ sheet: name, insertionLossDb, floorDb, suspects }];
  });
}
