import { type Bounded, bounded, exactly, plus } from "../cover/bounded.ts";
import type { CoveredFeed } from "../cover/coveredFeed.ts";
import { energyCheck } from "../cover/energyFloor.ts";
import type { Layer } from "../cover/layeredSheet.ts";
import { equivalentLayer, measuredCover } from "../cover/measuredCover.ts";
import { type NearMouth, nearMouth } from "../cover/nearMouth.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { energyContradiction } from "../readings/energyContradiction.ts";
import { BENCH_REPEATABILITY_DB } from "../readings/verdict.ts";
import type { Cover, CoverLayer, Feed, Uncertain } from "../scenario/types.ts";
import type { Doubts } from "./doubts.ts";
import { cascade, type Mouthpiece, mouthWidthMm, sheetBefore } from "./mouthpiece.ts";
import type { CoverScatter, StackShift, Warning } from "./types.ts";

/** Where a change of return loss stops that asks for more than the feed has: it was read on a better feed. */
const LEAST_RETURN_LOSS_DB = 0.1;

export const NO_SCATTER: CoverScatter = {
  stack: undefined,
  stackIsSigma: false,
  heatShare: 0,
  planeWaveDb: 0,
  readingDb: 0,
};

/** A dry cover: its share of the loss, and the stack that water comes to lie upon. */
export interface DryCover {
  readonly mismatchDb: Bounded;
  readonly mismatchSigmaDb: number;
  readonly dissipationDb: Bounded;
  readonly dissipationSigmaDb: number;
  /** What a draw needs: how each part may differ. */
  readonly scatter: CoverScatter;
  /** As `MouthParts` has it. */
  readonly beat: number;
  readonly layers: readonly Layer[];
  readonly covered: CoveredFeed;
  readonly source: string;
  readonly warnings: readonly Warning[];
}

/** A cover by its readings where it has some, else by its layers. */
export function dryCover(mouth: Mouthpiece, doubts: Doubts, feedMismatchDb: number, where: string): DryCover {
  return mouth.cover.measured
    ? measuredDry(mouth, doubts, feedMismatchDb, where)
    : layeredDry(mouth, doubts, feedMismatchDb, where);
}

/** A cover by its layers; the spread of its materials widens the bounds that the phase leaves. */
function layeredDry(mouth: Mouthpiece, doubts: Doubts, feedMismatchDb: number, where: string): DryCover {
  const { frequencyGHz, feed, cover } = mouth;
  const stack = (figure: keyof Bounded): Layer[] => cover.layers.map((layer) => layerAt(layer, figure));
  const [covered, least, most] = (["nominal", "low", "high"] as const).map((figure) =>
    cascade(mouth, sheetBefore(mouth, stack(figure))),
  ) as [CoveredFeed, CoveredFeed, CoveredFeed];
  const range = (part: "mismatchLossDb" | "dissipationDb" | "sidewaysLossDb") =>
    bounded(
      Math.min(covered[part].low, least[part].low, most[part].low),
      covered[part].nominal,
      Math.max(covered[part].high, least[part].high, most[part].high),
    );
  const dissipationDb = plus(range("dissipationDb"), range("sidewaysLossDb"));
  const heatShare = heatShareOf(cover.layers, doubts.coverLossShare, (layers) => {
    const { dissipationDb, sidewaysLossDb, transducerLossDb } = cascade(mouth, sheetBefore(mouth, layers));
    return { heatDb: dissipationDb.nominal + sidewaysLossDb.nominal, wholeDb: transducerLossDb.nominal };
  });
  const sheetLossDb = Math.max(0, covered.transducerLossDb.nominal - feedMismatchDb);
  const near = nearMouth({ frequencyGHz, apertureMm: mouthWidthMm(feed), gapMm: cover.gapMm, sheetLossDb });
  // A cover of no thickness is no cover, and has no doubt of its own.
  const planeWaveSigmaDb = cover.layers.some(({ thicknessMm }) => thicknessMm > 0) ? near.sigmaLossDb : 0;
  return {
    mismatchDb: shifted(range("mismatchLossDb"), -feedMismatchDb),
    mismatchSigmaDb: covered.phaseSpreadDb,
    dissipationDb,
    dissipationSigmaDb: Math.hypot(
      heatShare * Math.max(0, dissipationDb.nominal), // no loss may round below 0
      planeWaveSigmaDb,
    ),
    scatter: {
      stack: hasStackSpread(cover) ? (end) => stackShift(mouth, covered, end) : undefined,
      stackIsSigma: cover.layers.some(({ statedSpread }) => statedSpread),
      heatShare,
      planeWaveDb: planeWaveSigmaDb,
      readingDb: 0,
    },
    beat: covered.beat,
    layers: stack("nominal"),
    covered,
    source: "plane wave through the layers, Born & Wolf 1.6",
    warnings: layerWarnings(mouth, near, where),
  };
}

/**
 * One standard deviation of the heat as a share of it: the usual one, or by the loss tangents whose spread the user
 * stated, and the usual one of what is left without them. A lossier sheet reflects less, so that the whole is looked
 * at where one is made so.
 */
export function heatShareOf(
  layers: readonly CoverLayer[],
  usualShare: number,
  lossOf: (layers: readonly Layer[]) => { readonly heatDb: number; readonly wholeDb: number },
): number {
  if (!layers.some(({ statedLossTangent }) => statedLossTangent)) return usualShare;
  const at = (figure: keyof Bounded | undefined) =>
    lossOf(
      layers.map((layer) => {
        const { statedLossTangent, lossTangent } = layer;
        const there = figure === undefined ? 0 : lossTangent[figure];
        return { ...layerAt(layer, "nominal"), ...(statedLossTangent && { lossTangent: there }) };
      }),
    );
  const { heatDb } = at("nominal");
  if (!(heatDb > 0)) return usualShare;
  const statedDb = (at("high").wholeDb - at("low").wholeDb) / 2;
  return Math.hypot(statedDb, usualShare * Math.max(0, at(undefined).heatDb)) / heatDb;
}

export function hasStackSpread({ layers }: Cover): boolean {
  return layers.some(
    ({ permittivity: { low, high }, thicknessSigmaMm = 0 }) => low !== high || thicknessSigmaMm > 0,
  );
}

/** Layers with permittivity and thickness at an end of their spread; what loss tangents scatter by is drawn with the heat. */
export function withLossKept(layers: readonly CoverLayer[], figure: keyof Bounded): Layer[] {
  return layers.map((layer) => ({ ...layerAt(layer, figure), lossTangent: layer.lossTangent.nominal }));
}

function stackShift(mouth: Mouthpiece, nominal: CoveredFeed, end: "low" | "high"): StackShift {
  const there = cascade(mouth, sheetBefore(mouth, withLossKept(mouth.cover.layers, end)));
  const change = (part: "mismatchLossDb" | "dissipationDb" | "sidewaysLossDb") =>
    there[part].nominal - nominal[part].nominal;
  return {
    mismatchDb: change("mismatchLossDb"),
    heatDb: change("dissipationDb") + change("sidewaysLossDb"),
  };
}

/** Where a stack leaves the range in which a plane wave through layers can be trusted. */
function layerWarnings({ frequencyGHz, cover }: Mouthpiece, near: NearMouth, where: string): Warning[] {
  const warnings = thicknessWarnings(frequencyGHz, cover, where);
  if (cover.gapMm > 10_000 * wavelengthM(frequencyGHz)) {
    const message = `a gap of ${cover.gapMm} mm is more than ten wavelengths: the feed's beam has spread by then`;
    warnings.push({ code: "gap_beyond_model", message, where });
  }
  if (near.weak) {
    const doubt = "take a cover's loss to 0.1 dB or a third of it, its return loss to 2 dB";
    warnings.push({ code: "plane_wave_weak", message: `${near.reason}; ${doubt}`, where: "covers" });
  }
  return warnings;
}

/** Layers that do nothing, or that are thicker than any cover. */
export function thicknessWarnings(frequencyGHz: number, { layers }: Cover, where: string): Warning[] {
  const mostMm = 10_000 * wavelengthM(frequencyGHz);
  return layers.flatMap(({ material, thicknessMm }) => {
    if (thicknessMm === 0) {
      const message = `the layer of ${material} has no thickness and does nothing`;
      return { code: "zero_thickness", message, where };
    }
    if (thicknessMm <= mostMm) return [];
    const message = `the layer of ${material} is more than ten wavelengths thick (${Math.round(mostMm)} mm)`;
    return { code: "thick_layer", message, where };
  });
}

const ends = { low: -1, nominal: 0, high: 1 } as const;

/** A layer with its figures at the low end of their spread, at the high one or between. */
export function layerAt(
  { permittivity, lossTangent, thicknessMm, thicknessSigmaMm = 0 }: CoverLayer,
  figure: keyof Bounded,
): Layer {
  return {
    permittivity: permittivity[figure],
    lossTangent: lossTangent[figure],
    thicknessMm: Math.max(0, thicknessMm + ends[figure] * thicknessSigmaMm),
  };
}

/** A cover by its readings: the reading is charged as it stands, split into mismatch and heat. */
function measuredDry(mouth: Mouthpiece, doubts: Doubts, feedMismatchDb: number, where: string): DryCover {
  const { frequencyGHz, feed, cover } = mouth;
  const { insertionLossDb } = cover.measured!;
  const insertionDb = insertionLossDb.value;
  const coveredReturnLossDb = coveredReturnLoss(feed, cover);
  const split = measuredCover({
    feedReturnLossDb: feed.returnLossDb,
    insertionLossDb: insertionDb,
    returnLossChangeDb: coveredReturnLossDb && feed.returnLossDb - coveredReturnLossDb,
  });
  const sigma = insertionLossDb.sigma ?? BENCH_REPEATABILITY_DB;
  const modelled = cover.layers.length > 0 ? layeredDry(mouth, doubts, feedMismatchDb, where) : undefined;
  const layers = modelled?.layers ?? [
    equivalentLayer({ reflection: split.reflection.nominal, frequencyGHz }),
  ];
  const covered = modelled?.covered ?? cascade(mouth, sheetBefore(mouth, layers));
  return {
    // What lies below the energy floor cannot be heat: the reading keeps its value, as mismatch alone.
    mismatchDb: exactly(insertionDb - split.dissipationDb),
    mismatchSigmaDb: sigma,
    dissipationDb: exactly(split.dissipationDb),
    dissipationSigmaDb: 0,
    scatter: { ...NO_SCATTER, readingDb: sigma, reading: insertionLossDb },
    beat: 0, // it was read at the phase that there is
    layers,
    covered: { ...covered, returnLossDb: exactly(split.coveredReturnLossDb) },
    source: `measured, ${cover.measured!.source ?? "scenario"}`,
    warnings: [...contradictions(feed, cover, where), ...outsideModel(insertionDb, sigma, modelled, where)],
  };
}

/** Return loss under the cover by the change that was read, if one was. */
function coveredReturnLoss({ returnLossDb }: Feed, { measured }: Cover): number | undefined {
  const change = measured?.returnLossChangeDb;
  return change && Math.max(LEAST_RETURN_LOSS_DB, returnLossDb - change.value);
}

/** Readings that energy balance forbids. */
function contradictions(feed: Feed, cover: Cover, where: string): Warning[] {
  const { insertionLossDb } = cover.measured!;
  const repeatabilityDb = 2 * (insertionLossDb.sigma ?? BENCH_REPEATABILITY_DB);
  const bareReturnLossDb = feed.returnLossDb;
  const coveredReturnLossDb = coveredReturnLoss(feed, cover);
  const { leastDb, contradiction } = energyCheck({
    bareReturnLossDb,
    coveredReturnLossDb,
    insertionLossDb: insertionLossDb.value,
    repeatabilityDb,
  });
  if (contradiction === undefined) return [];
  const message =
    contradiction === "below_energy_floor"
      ? `an insertion loss of ${insertionLossDb.value} dB cannot go with this change of return loss: energy ` +
        `balance asks for at least ${leastDb.toFixed(2)} dB; the likelier culprit is the ` +
        likelierCulprit(insertionLossDb, bareReturnLossDb, coveredReturnLossDb!)
      : `a gain of ${-insertionLossDb.value} dB is more than any cover can give this feed (${(-leastDb).toFixed(2)} dB)`;
  return [{ code: contradiction, message, where: `${where}.measured` }];
}

/** Of a loss and the return losses that contradict it, the reading that its own uncertainty would soonest mend. */
function likelierCulprit(loss: Uncertain, bareReturnLossDb: number, coveredReturnLossDb: number): string {
  const { suspects } = energyContradiction({
    lossDb: loss.value,
    lossStandardDb: loss.sigma || BENCH_REPEATABILITY_DB, // 0 is no uncertainty of a reading
    bareReturnLossDb,
    coveredReturnLossDb,
  });
  return suspects[0]!.reading.replaceAll("_", " ");
}

/** A reading that the layers beside it cannot explain. */
function outsideModel(
  insertionDb: number,
  sigma: number,
  modelled: DryCover | undefined,
  where: string,
): Warning[] {
  if (modelled === undefined) return [];
  const { low, high } = plus(modelled.mismatchDb, modelled.dissipationDb);
  if (insertionDb >= low - 2 * sigma && insertionDb <= high + 2 * sigma) return [];
  const message =
    `the measured ${insertionDb} dB lies outside what the layers allow, ` +
    `${low.toFixed(2)} to ${high.toFixed(2)} dB; the reading is used`;
  return [{ code: "measured_outside_model", message, where: `${where}.measured` }];
}

function shifted({ low, nominal, high }: Bounded, by: number): Bounded {
  return { low: low + by, nominal: nominal + by, high: high + by };
}
