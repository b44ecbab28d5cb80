import { exactly, plus } from "../cover/bounded.ts";
import { gammaOfReturnLoss, mismatchLossDb } from "../cover/reflectionFigures.ts";
import type { Cover, Feed } from "../scenario/types.ts";
import type { EndHeading } from "./antennaEntries.ts";
import { isDry } from "./deposit.ts";
import type { Doubts } from "./doubts.ts";
import { type DryCover, dryCover, NO_SCATTER } from "./dryCover.ts";
import { type Entry, lossEntry } from "./entry.ts";
import type { Mouthpiece } from "./mouthpiece.ts";
import type { Mouth, Warning, Wetness } from "./types.ts";
import { type WaterCost, waterOnCover } from "./waterOnCover.ts";

const NOTHING_ON_IT = { waterMismatchDb: 0, waterHeatDb: 0 };

const BARE_IN_RAIN: Warning = {
  code: "bare_in_rain",
  message:
    "an open mouth takes in rain, for which nothing is charged: bare looks better than it is in the wet",
  where: "covers.bare",
};

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
  doubts: Doubts,
  coverName: string,
): (wetness: Wetness | undefined) => Mouth {
  const { feed, cover } = mouth;
  const where = `covers.${coverName}`;
  const feedMismatchDb = mismatchLossDb(gammaOfReturnLoss("returnLossDb", feed.returnLossDb));
  const feedEntry = lossEntry(
    heading("feed_mismatch", "feed alone, mismatch", "return loss of the scenario"),
    feedMismatchDb,
    mismatchDoubt(feed, doubts.feedReturnLossDb),
  );
  const bare: Mouth = {
    bareReturnLossDb: feed.returnLossDb,
    dryCostDb: exactly(0),
    waterCostDb: exactly(0),
    returnLossDb: exactly(feed.returnLossDb),
    filmMm: 0,
    entries: [feedEntry],
    parts: {
      ...NOTHING_ON_IT,
      coverMismatchDb: 0,
      coverHeatDb: 0,
      beat: 0,
      tuned: undefined,
      scatter: NO_SCATTER,
    },
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
  const dry = dryCover(exposed, doubts, feedMismatchDb, where);
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
    parts: {
      ...NOTHING_ON_IT,
      coverMismatchDb: dry.mismatchDb.nominal,
      coverHeatDb: dry.dissipationDb.nominal,
      beat: dry.beat,
      tuned: cover.measured === undefined ? dry.covered.tuned : undefined,
      scatter: dry.scatter,
    },
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
      entries: [
        ...dryMouth.entries,
        ...waterEntries(heading, water, dry.covered.phaseSpreadDb, doubts.waterShare),
      ],
      parts: {
        ...dryMouth.parts,
        waterMismatchDb: water.mismatchDb.nominal,
        waterHeatDb: water.dissipationDb.nominal,
        beat: wetBeat(dry, water),
        tuned: cover.measured === undefined ? water.tuned : undefined,
      },
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
function mismatchDoubt({ returnLossDb, returnLossSpread }: Feed, usualDb: number): number {
  const doubtDb = returnLossSpread?.sigma ?? usualDb;
  const at = (db: number) => mismatchLossDb(gammaOfReturnLoss("returnLossDb", db));
  return (at(Math.max(0.1, returnLossDb - doubtDb)) - at(returnLossDb + doubtDb)) / 2;
}

/** A reading holds the dry cover's beat already: what is left is that of the water, their squares adding up. */
function wetBeat({ beat, covered }: DryCover, water: WaterCost): number {
  return beat === covered.beat ? water.beat : Math.sqrt(Math.max(0, water.beat ** 2 - covered.beat ** 2));
}

function waterEntries(
  heading: EndHeading,
  water: WaterCost,
  dryPhaseSpreadDb: number,
  sigmaShare: number,
): Entry[] {
  const { noun, mismatchDb, dissipationDb, source } = water;
  const whole = Math.abs(mismatchDb.nominal) + Math.abs(dissipationDb.nominal);
  // One factor of two over both parts: shared out so that the parts' squares add up to the whole's.
  const share = (part: number) => (whole > 0 ? sigmaShare * Math.sqrt(whole * Math.abs(part)) : 0);
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
