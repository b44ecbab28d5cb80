import { type Bounded, bounded, exactly, plus } from "../cover/bounded.ts";
import type { CoveredFeed } from "../cover/coveredFeed.ts";
import { energyCheck } from "../cover/energyFloor.ts";
import type { Layer } from "../cover/layeredSheet.ts";
import { equivalentLayer, measuredCover } from "../cover/measuredCover.ts";
import { type NearMouth, nearMouth } from "../cover/nearMouth.ts";
import { gammaOfReturnLoss, mismatchLossDb } from "../cover/reflectionFigures.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { energyContradiction } from "../readings/energyContradiction.ts";
import { BENCH_REPEATABILITY_DB } from "../readings/verdict.ts";
import type { Cover, CoverLayer, Feed, Uncertain } from "../scenario/types.ts";
import type { EndHeading } from "./antennaEntries.ts";
import { isDry } from "./deposit.ts";
import { type Entry, lossEntry } from "./entry.ts";
import { cascade, type Mouthpiece, mouthWidthMm, sheetBefore } from "./mouthpiece.ts";
import type { Mouth, Warning, Wetness } from "./types.ts";
import { type WaterCost, waterOnCover } from "./waterOnCover.ts";

/** A return loss read with a coupler is good to 2 dB or so: common practice, no source. */
const RETURN_LOSS_DOUBT_DB = 2;
/** Loss tangents and thicknesses scatter: share of the dissipation, common practice, no source. */
const DISSIPATION_SIGMA_SHARE = 0.4;
/** Where a change of return loss stops that asks for more than the feed has: it was read on a better feed. */
const LEAST_RETURN_LOSS_DB = 0.1;
/** A film's loss is good to a factor of two each way: common practice, no source. */
const WATER_SIGMA_SHARE = 0.5;

const BARE_IN_RAIN: Warning = {
  code: "bare_in_rain",
  message:
    "an open mouth takes in rain, for which nothing is charged: bare looks better than it is in the wet",
  where: "covers.bare",
};

/** A dry cover: its share of the loss, and the stack that water comes to lie upon. */
interface DryCover {
  readonly mismatchDb: Bounded;
  readonly mismatchSigmaDb: number;
  readonly dissipationDb: Bounded;
  readonly dissipationSigmaDb: number;
  readonly layers: readonly Layer[];
  readonly covered: CoveredFeed;
  readonly source: string;
  readonly warnings: readonly Warning[];
}

/**
 * A feed's mouth under a cover: entries of the bare feed's mismatch, of the cover's mismatch and heat, and of
 * what water, ice or snow adds to either. Nothing is charged twice: the five add up to the whole loss between a
 * matched line and the air. What leaves sideways between mouth and cover counts with the heat: like that it is
 * lost to the signal and replaced by the warmth around.
 *
 * @returns the mouth by what the weather has put on it; the dry cover is worked out once
 */
export function mouthUnder(
  heading: EndHeading,
  mouth: Mouthpiece,
  coverName: string,
): (wetness: Wetness | undefined) => Mouth {
  const { feed, cover } = mouth;
  const where = `covers.${coverName}`;
  const feedMismatchDb = mismatchLossDb(gammaOfReturnLoss("returnLossDb", feed.returnLossDb));
  const feedEntry = lossEntry(
    heading("feed_mismatch", "feed alone, mismatch", "return loss of the scenario"),
    feedMismatchDb,
    mismatchDoubt(feed.returnLossDb),
  );
  const bare: Mouth = {
    bareReturnLossDb: feed.returnLossDb,
    dryCostDb: exactly(0),
    waterCostDb: exactly(0),
    returnLossDb: exactly(feed.returnLossDb),
    filmMm: 0,
    entries: [feedEntry],
    mismatchLossDb: feedMismatchDb,
    dissipationDb: 0,
    warnings: [],
  };
  if (isNothing(cover)) {
    return (wetness) =>
      wetness === undefined || isDry(wetness) ? bare : { ...bare, warnings: [BARE_IN_RAIN] };
  }

  // The layer that stands in for readings has the right |G| but no phase to set against the feed's.
  const exposed = cover.layers.length > 0 ? mouth : { ...mouth, feed: { ...feed, phaseDeg: undefined } };
  const dry = cover.measured
    ? measuredDry(exposed, feedMismatchDb, where)
    : layeredDry(exposed, feedMismatchDb, where);
  const dryMouth: Mouth = {
    ...bare,
    dryCostDb: plus(dry.mismatchDb, dry.dissipationDb),
    returnLossDb: dry.covered.returnLossDb,
    entries: [
      feedEntry,
      lossEntry(
        heading("cover_mismatch", "cover, mismatch", dry.source),
        dry.mismatchDb,
        dry.mismatchSigmaDb,
      ),
      lossEntry(
        heading("cover_loss", "cover, heat and stray", dry.source),
        dry.dissipationDb,
        dry.dissipationSigmaDb,
      ),
    ],
    mismatchLossDb: feedMismatchDb + dry.mismatchDb.nominal,
    dissipationDb: dry.dissipationDb.nominal,
    warnings: dry.warnings,
  };
  return (wetness) => {
    if (wetness === undefined || isDry(wetness)) return dryMouth;
    const water = waterOnCover(exposed, dry.layers, dry.covered, wetness, where);
    return {
      ...dryMouth,
      waterCostDb: plus(water.mismatchDb, water.dissipationDb),
      returnLossDb: water.returnLossDb,
      filmMm: water.filmMm,
      entries: [...dryMouth.entries, ...waterEntries(heading, water, dry.covered.phaseSpreadDb)],
      mismatchLossDb: dryMouth.mismatchLossDb + water.mismatchDb.nominal,
      dissipationDb: dryMouth.dissipationDb + water.dissipationDb.nominal,
      warnings: [...dry.warnings, ...water.warnings],
    };
  };
}

/** An open mouth under another name. */
export function isNothing({ layers, measured }: Cover): boolean {
  return layers.length === 0 && measured === undefined;
}

/** Half of what the doubt of a return loss leaves the mismatch loss to range over [dB]. */
function mismatchDoubt(returnLossDb: number): number {
  const at = (db: number) => mismatchLossDb(gammaOfReturnLoss("returnLossDb", db));
  return (
    (at(Math.max(0.1, returnLossDb - RETURN_LOSS_DOUBT_DB)) - at(returnLossDb + RETURN_LOSS_DOUBT_DB)) / 2
  );
}

/** A cover by its layers; the spread of its materials widens the bounds that the phase leaves. */
function layeredDry(mouth: Mouthpiece, feedMismatchDb: number, where: string): DryCover {
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
  const sheetLossDb = Math.max(0, covered.transducerLossDb.nominal - feedMismatchDb);
  const near = nearMouth({ frequencyGHz, apertureMm: mouthWidthMm(feed), gapMm: cover.gapMm, sheetLossDb });
  // A cover of no thickness is no cover, and has no doubt of its own.
  const planeWaveSigmaDb = cover.layers.some(({ thicknessMm }) => thicknessMm > 0) ? near.sigmaLossDb : 0;
  return {
    mismatchDb: shifted(range("mismatchLossDb"), -feedMismatchDb),
    mismatchSigmaDb: covered.phaseSpreadDb,
    dissipationDb,
    dissipationSigmaDb: Math.hypot(
      DISSIPATION_SIGMA_SHARE * Math.max(0, dissipationDb.nominal), // no loss may round below 0
      planeWaveSigmaDb,
    ),
    layers: stack("nominal"),
    covered,
    source: "plane wave through the layers, Born & Wolf 1.6",
    warnings: layerWarnings(mouth, near, where),
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

export function layerAt(
  { permittivity, lossTangent, thicknessMm }: CoverLayer,
  figure: keyof Bounded,
): Layer {
  return { permittivity: permittivity[figure], lossTangent: lossTangent[figure], thicknessMm };
}

/** A cover by its readings: the reading is charged as it stands, split into mismatch and heat. */
function measuredDry(mouth: Mouthpiece, feedMismatchDb: number, where: string): DryCover {
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
  const modelled = cover.layers.length > 0 ? layeredDry(mouth, feedMismatchDb, where) : undefined;
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

function waterEntries(heading: EndHeading, water: WaterCost, dryPhaseSpreadDb: number): Entry[] {
  const { noun, mismatchDb, dissipationDb, source } = water;
  const whole = Math.abs(mismatchDb.nominal) + Math.abs(dissipationDb.nominal);
  // One factor of two over both parts: shared out so that the parts' squares add up to the whole's.
  const share = (part: number) => (whole > 0 ? WATER_SIGMA_SHARE * Math.sqrt(whole * Math.abs(part)) : 0);
  const morePhase = Math.max(0, water.phaseSpreadDb ** 2 - dryPhaseSpreadDb ** 2);
  return [
    lossEntry(
      heading("water_mismatch", `${noun} on it, mismatch`, source),
      mismatchDb,
      Math.sqrt(share(mismatchDb.nominal) ** 2 + morePhase),
    ),
    lossEntry(
      heading("water_loss", `${noun} on it, heat`, source),
      dissipationDb,
      share(dissipationDb.nominal),
    ),
  ];
}

function shifted({ low, nominal, high }: Bounded, by: number): Bounded {
  return { low: low + by, nominal: nominal + by, high: high + by };
}
