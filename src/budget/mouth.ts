import { type Bounded, bounded, exactly } from "../cover/bounded.ts";
import type { CoveredFeed } from "../cover/coveredFeed.ts";
import { energyCheck } from "../cover/energyFloor.ts";
import type { Layer } from "../cover/layeredSheet.ts";
import { equivalentLayer, measuredCover } from "../cover/measuredCover.ts";
import { gammaOfReturnLoss, mismatchLossDb } from "../cover/reflectionFigures.ts";
import type { Cover, CoverLayer, Feed } from "../scenario/types.ts";
import type { EndHeading } from "./antennaEntries.ts";
import { type Entry, lossEntry } from "./entry.ts";
import type { Mouth, Warning } from "./types.ts";
import { cascade, sheetOf, type WaterCost, type Wetness, waterOnCover } from "./waterOnCover.ts";

/** A return loss read with a coupler is good to 2 dB or so: common practice, no source. */
const RETURN_LOSS_DOUBT_DB = 2;
/** Loss tangents and thicknesses scatter: share of the dissipation, common practice, no source. */
const DISSIPATION_SIGMA_SHARE = 0.4;
/** A with/without test in free air repeats to about this [dB]: common practice, no source. */
export const BENCH_REPEATABILITY_DB = 0.05;
/** Where a change of return loss stops that asks for more than the feed has: it was read on a better feed. */
const LEAST_RETURN_LOSS_DB = 0.1;
/** A film's loss is good to a factor of two each way: common practice, no source. */
const WATER_SIGMA_SHARE = 0.5;

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
 * A feed's mouth under a cover, dry or wet: entries of the bare feed's mismatch, of the cover's mismatch and
 * dissipation, and of what water adds to either. Nothing is charged twice: the five add up to the whole loss
 * between a matched line and the air.
 */
export function mouthOf(
  heading: EndHeading,
  frequencyGHz: number,
  feed: Feed,
  cover: Cover,
  coverName: string,
  wetness: Wetness | undefined,
): Mouth {
  const where = `covers.${coverName}`;
  const feedMismatchDb = mismatchLossDb(gammaOfReturnLoss("returnLossDb", feed.returnLossDb));
  const entries: Entry[] = [
    lossEntry(
      heading("feed_mismatch", "feed mismatch, bare", "return loss of the scenario"),
      feedMismatchDb,
      mismatchDoubt(feed.returnLossDb),
    ),
  ];
  const bareState = {
    bareReturnLossDb: feed.returnLossDb,
    dryCostDb: exactly(0),
    waterCostDb: exactly(0),
    returnLossDb: exactly(feed.returnLossDb),
    filmMm: 0,
  };
  if (cover.layers.length === 0 && cover.measured === undefined) {
    return { ...bareState, entries, mismatchLossDb: feedMismatchDb, dissipationDb: 0, warnings: [] };
  }

  // The layer that stands in for readings has the right |G| but no phase to set against the feed's.
  const exposed = cover.layers.length > 0 ? feed : { ...feed, phaseDeg: undefined };
  const dry = cover.measured
    ? measuredDry(frequencyGHz, exposed, cover, feedMismatchDb, where)
    : layeredDry(frequencyGHz, exposed, cover, feedMismatchDb);
  entries.push(
    lossEntry(heading("cover_mismatch", "cover, mismatch", dry.source), dry.mismatchDb, dry.mismatchSigmaDb),
    lossEntry(heading("cover_loss", "cover, heat", dry.source), dry.dissipationDb, dry.dissipationSigmaDb),
  );
  const dryState = {
    ...bareState,
    dryCostDb: plus(dry.mismatchDb, dry.dissipationDb),
    returnLossDb: dry.covered.returnLossDb,
  };
  if (wetness === undefined || wetness.rainRateMmPerH === 0) {
    return {
      ...dryState,
      entries,
      mismatchLossDb: feedMismatchDb + dry.mismatchDb.nominal,
      dissipationDb: dry.dissipationDb.nominal,
      warnings: dry.warnings,
    };
  }

  const water = waterOnCover(frequencyGHz, exposed, cover, dry.layers, dry.covered, wetness, where);
  entries.push(...waterEntries(heading, water, dry.covered.phaseSpreadDb));
  return {
    ...dryState,
    waterCostDb: plus(water.mismatchDb, water.dissipationDb),
    returnLossDb: water.returnLossDb,
    filmMm: water.filmMm,
    entries,
    mismatchLossDb: feedMismatchDb + dry.mismatchDb.nominal + water.mismatchDb.nominal,
    dissipationDb: dry.dissipationDb.nominal + water.dissipationDb.nominal,
    warnings: [...dry.warnings, ...water.warnings],
  };
}

/** Half of what the doubt of a return loss leaves the mismatch loss to range over [dB]. */
function mismatchDoubt(returnLossDb: number): number {
  const at = (db: number) => mismatchLossDb(gammaOfReturnLoss("returnLossDb", db));
  return (
    (at(Math.max(0.1, returnLossDb - RETURN_LOSS_DOUBT_DB)) - at(returnLossDb + RETURN_LOSS_DOUBT_DB)) / 2
  );
}

/** A cover by its layers; the spread of its materials widens the bounds that the phase leaves. */
function layeredDry(frequencyGHz: number, feed: Feed, cover: Cover, feedMismatchDb: number): DryCover {
  const stack = (figure: keyof Bounded): Layer[] => cover.layers.map((layer) => layerAt(layer, figure));
  const [covered, least, most] = (["nominal", "low", "high"] as const).map((figure) =>
    cascade(frequencyGHz, feed, cover, sheetOf(frequencyGHz, stack(figure))),
  ) as [CoveredFeed, CoveredFeed, CoveredFeed];
  const range = (part: "mismatchLossDb" | "dissipationDb", nominal: number) =>
    bounded(
      Math.min(covered[part].low, least[part].low, most[part].low),
      nominal,
      Math.max(covered[part].high, least[part].high, most[part].high),
    );
  const mismatch = range("mismatchLossDb", covered.mismatchLossDb.nominal);
  const dissipationDb = range("dissipationDb", covered.dissipationDb.nominal);
  return {
    mismatchDb: shifted(mismatch, -feedMismatchDb),
    mismatchSigmaDb: covered.phaseSpreadDb,
    dissipationDb,
    dissipationSigmaDb: DISSIPATION_SIGMA_SHARE * Math.max(0, dissipationDb.nominal), // no loss may round below 0
    layers: stack("nominal"),
    covered,
    source: "plane wave through the layers, Born & Wolf 1.6",
    warnings: [],
  };
}

function layerAt({ permittivity, lossTangent, thicknessMm }: CoverLayer, figure: keyof Bounded): Layer {
  return { permittivity: permittivity[figure], lossTangent: lossTangent[figure], thicknessMm };
}

/** A cover by its readings: the reading is charged as it stands, split into mismatch and heat. */
function measuredDry(
  frequencyGHz: number,
  feed: Feed,
  cover: Cover,
  feedMismatchDb: number,
  where: string,
): DryCover {
  const { insertionLossDb } = cover.measured!;
  const insertionDb = insertionLossDb.value;
  const coveredReturnLossDb = coveredReturnLoss(feed, cover);
  const split = measuredCover({
    feedReturnLossDb: feed.returnLossDb,
    insertionLossDb: insertionDb,
    returnLossChangeDb: coveredReturnLossDb && feed.returnLossDb - coveredReturnLossDb,
  });
  const sigma = insertionLossDb.sigma ?? BENCH_REPEATABILITY_DB;
  const modelled =
    cover.layers.length > 0 ? layeredDry(frequencyGHz, feed, cover, feedMismatchDb) : undefined;
  const layers = modelled?.layers ?? [
    equivalentLayer({ reflection: split.reflection.nominal, frequencyGHz }),
  ];
  const covered = modelled?.covered ?? cascade(frequencyGHz, feed, cover, sheetOf(frequencyGHz, layers));
  return {
    // What lies below the energy floor cannot be heat: the reading keeps its value, as mismatch alone.
    mismatchDb: exactly(insertionDb - split.dissipationDb),
    mismatchSigmaDb: sigma,
    dissipationDb: exactly(split.dissipationDb),
    dissipationSigmaDb: 0,
    layers,
    covered: { ...covered, returnLossDb: exactly(split.coveredReturnLossDb) },
    source: "measured, scenario",
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
  const { leastDb, contradiction } = energyCheck({
    bareReturnLossDb: feed.returnLossDb,
    coveredReturnLossDb: coveredReturnLoss(feed, cover),
    insertionLossDb: insertionLossDb.value,
    repeatabilityDb,
  });
  if (contradiction === undefined) return [];
  const message =
    contradiction === "below_energy_floor"
      ? `an insertion loss of ${insertionLossDb.value} dB cannot go with this change of return loss: energy ` +
        `balance asks for at least ${leastDb.toFixed(2)} dB; one of the two readings is wrong`
      : `a gain of ${-insertionLossDb.value} dB is more than any cover can give this feed (${(-leastDb).toFixed(2)} dB)`;
  return [{ code: contradiction, message, where: `${where}.measured` }];
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
  const { mismatchDb, dissipationDb, source } = water;
  const whole = Math.abs(mismatchDb.nominal) + Math.abs(dissipationDb.nominal);
  // One factor of two over both parts: shared out so that the parts' squares add up to the whole's.
  const share = (part: number) => (whole > 0 ? WATER_SIGMA_SHARE * Math.sqrt(whole * Math.abs(part)) : 0);
  const morePhase = Math.max(0, water.phaseSpreadDb ** 2 - dryPhaseSpreadDb ** 2);
  return [
    lossEntry(
      heading("water_mismatch", "water on it, mismatch", source),
      mismatchDb,
      Math.sqrt(share(mismatchDb.nominal) ** 2 + morePhase),
    ),
    lossEntry(
      heading("water_loss", "water on it, heat", source),
      dissipationDb,
      share(dissipationDb.nominal),
    ),
  ];
}

function shifted({ low, nominal, high }: Bounded, by: number): Bounded {
  return { low: low + by, nominal: nominal + by, high: high + by };
}

function plus(a: Bounded, b: Bounded): Bounded {
  return { low: a.low + b.low, nominal: a.nominal + b.nominal, high: a.high + b.high };
}
