import { BEAD_HEIGHT_MM, beadedSheet } from "../cover/beads.ts";
import { type Bounded, bounded, exactly, plus } from "../cover/bounded.ts";
import type { CoveredFeed } from "../cover/coveredFeed.ts";
import type { Layer, SheetScattering } from "../cover/layeredSheet.ts";
import { surfaceState } from "../cover/surfaceState.ts";
import { waterLayer } from "../cover/waterFilm.ts";
import { abs } from "../numeric/complex.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import { type Deposit, depositOn } from "./deposit.ts";
import { cascade, type Mouthpiece, mouthWidthMm, sheetBefore } from "./mouthpiece.ts";
import { publishedWater, waterModelOf } from "./publishedWater.ts";
import type { Warning, Wetness } from "./types.ts";

/** What water, ice or snow adds to a dry cover. */
export interface WaterCost {
  readonly noun: Deposit["noun"];
  readonly mismatchDb: Bounded;
  readonly dissipationDb: Bounded;
  /** Standard deviation over an unknown phase of the wet feed's loss [dB]. */
  readonly phaseSpreadDb: number;
  /** As of a covered feed, with the water on. */
  readonly beat: number;
  readonly tuned: CoveredFeed["tuned"];
  readonly returnLossDb: Bounded;
  readonly filmMm: number;
  readonly source: string;
  readonly warnings: readonly Warning[];
}

/**
 * Water on a cover: a film on a surface that wets, the published model for water-repellent radomes on one that
 * beads (never above the film), the mean of both between; or the model that the user names. Drops are for
 * surfaces that shed water: named for one that lets it spread, they are the film. Ice and snow lie as layers.
 *
 * The film may cost less than none: with the feed's phase known it can tune the feed, and on a sheet a little
 * short of half a wave it makes up the rest. That is the cascade's answer and stands.
 */
export function waterOnCover(
  mouth: Mouthpiece,
  dryLayers: readonly Layer[],
  dry: CoveredFeed,
  wetness: Wetness,
  where: string,
): WaterCost {
  const { frequencyGHz, feed, cover } = mouth;
  const deposit = depositOn(frequencyGHz, surfaceOf(mouth), wetness, where);
  const { filmMm, noun } = deposit;
  const known = new Map<number, { sheet: SheetScattering; covered: CoveredFeed }>();
  const coveredAt = (thicknessMm: number) => {
    const seen = known.get(thicknessMm);
    if (seen !== undefined) return seen;
    const sheet = sheetBefore(mouth, [...dryLayers, ...deposit.layersAt(thicknessMm)]);
    const found = { sheet, covered: cascade(mouth, sheet) };
    known.set(thicknessMm, found);
    return found;
  };
  const { covered: wet } = coveredAt(filmMm.nominal);
  const ends = filmMm.low === filmMm.high ? [] : [filmMm.low, filmMm.high].map((mm) => coveredAt(mm).covered);
  const full = difference(dry, wet, ends);
  const common = {
    noun,
    phaseSpreadDb: wet.phaseSpreadDb,
    beat: wet.beat,
    tuned: wet.tuned,
    filmMm: filmMm.nominal,
    warnings: deposit.warnings,
  };

  const model = waterModelOf(cover);
  if (noun !== "water" || model === "film") {
    return { ...common, ...full, returnLossDb: wet.returnLossDb, source: deposit.source };
  }

  // A published figure knows no phase, so the film that caps it is taken over all phases.
  const dryPass = abs(sheetBefore(mouth, dryLayers).transmission);
  const filmDb = (thicknessMm: number) =>
    thicknessMm === 0
      ? 0
      : Math.max(0, amplitudeToDb(dryPass / abs(coveredAt(thicknessMm).sheet.transmission)));
  if (model === "beads") {
    return {
      ...common,
      ...beads(mouth, dryLayers, dry, wetness, filmDb(filmMm.nominal)),
      source: "drops by covered share",
    };
  }
  const whole = full.mismatchDb.high + full.dissipationDb.high;
  const published = publishedWater(model, cover, frequencyGHz, wetness, filmMm.nominal, filmDb);
  return {
    ...common,
    // A published figure does not say how much of it is reflection: all of it counts as heat, so as noise too.
    mismatchDb: exactly(0),
    dissipationDb: bounded(0, published.lossDb, whole),
    phaseSpreadDb: dry.phaseSpreadDb,
    beat: dry.beat,
    tuned: dry.tuned,
    returnLossDb: bounded(wet.returnLossDb.low, dry.returnLossDb.nominal, dry.returnLossDb.high),
    filmMm: 0,
    source: published.source,
    warnings: [...published.warnings, ...deposit.warnings],
  };

  function surfaceOf({ cover: { domeRadiusMm, slopeMm } }: Mouthpiece) {
    return domeRadiusMm === undefined
      ? {
          shape: "plate" as const,
          sizeM: (slopeMm ?? mouthWidthMm(feed)) / 1000,
          tiltDeg: 90 - feed.facingDeg,
        }
      : { shape: "dome" as const, sizeM: domeRadiusMm / 1000 };
  }
}

function beads(
  mouth: Mouthpiece,
  dryLayers: readonly Layer[],
  dry: CoveredFeed,
  { temperatureC }: Wetness,
  filmDb: number,
) {
  const { frequencyGHz, cover } = mouth;
  const { coveredShare } = surfaceState({ wetting: cover.surface, care: cover.state });
  const drops = waterLayer({
    thicknessMm: BEAD_HEIGHT_MM,
    frequencyGHz,
    temperatureC: Math.max(0, temperatureC),
  });
  const sheet = beadedSheet({
    dry: sheetBefore(mouth, dryLayers),
    wet: sheetBefore(mouth, [...dryLayers, drops]),
    coveredShare,
  });
  const wet = cascade(mouth, sheet);
  // Drops hold no more water than the rain brings: light rain on a repellent surface never costs more than its film.
  const scarce = sheet.excessDb.nominal > filmDb ? filmDb / sheet.excessDb.nominal : 1;
  const times = ({ low, nominal, high }: Bounded) => ({
    low: low * scarce,
    nominal: nominal * scarce,
    high: high * scarce,
  });
  const { mismatchDb, dissipationDb } = difference(dry, wet, []);
  const { low, nominal, high } = sheet.excessDb;
  return {
    mismatchDb: times(mismatchDb),
    dissipationDb: times(
      bounded(
        Math.max(0, dissipationDb.nominal + low - nominal),
        dissipationDb.nominal,
        dissipationDb.nominal + high - nominal,
      ),
    ),
    phaseSpreadDb: wet.phaseSpreadDb,
    beat: wet.beat,
    tuned: wet.tuned,
    returnLossDb: wet.returnLossDb,
    filmMm: 0,
  };
}

/** Wet less dry, bound by bound, so that the bounds of dry and water add up to those of the wet whole. */
function difference(
  dry: CoveredFeed,
  wet: CoveredFeed,
  /** The wet feed at the least and the most water. */
  ends: readonly CoveredFeed[],
): Pick<WaterCost, "mismatchDb" | "dissipationDb"> {
  const less = (part: "mismatchLossDb" | "dissipationDb" | "sidewaysLossDb") => {
    const all = [wet, ...ends].flatMap((one) => [
      one[part].low - dry[part].low,
      one[part].high - dry[part].high,
    ]);
    return bounded(Math.min(...all), wet[part].nominal - dry[part].nominal, Math.max(...all));
  };
  return {
    mismatchDb: less("mismatchLossDb"),
    dissipationDb: plus(less("dissipationDb"), less("sidewaysLossDb")),
  };
}
