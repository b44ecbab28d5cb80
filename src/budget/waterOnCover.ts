import { BEAD_HEIGHT_MM, beadedSheet } from "../cover/beads.ts";
import { type Bounded, bounded } from "../cover/bounded.ts";
import { type CoveredFeed, coveredFeed } from "../cover/coveredFeed.ts";
import { type Layer, layeredSheet, type SheetScattering } from "../cover/layeredSheet.ts";
import type { Wetting } from "../cover/materials.ts";
import { type SurfaceCare, surfaceState } from "../cover/surfaceState.ts";
import { type WaterFilm, waterFilm, waterLayer } from "../cover/waterFilm.ts";
import { wetAntennaLoss, wetAntennaModels } from "../cover/wetAntennaLoss.ts";
import type { WetModel } from "../cover/wetModels.ts";
import { abs } from "../numeric/complex.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import type { Cover, Feed } from "../scenario/types.ts";
import type { Warning } from "./types.ts";

/** Rain that keeps a cover wet. */
export interface Wetness {
  readonly rainRateMmPerH: number;
  readonly windMPerS: number;
  readonly temperatureC: number;
}

/** What water adds to a dry cover. */
export interface WaterCost {
  readonly mismatchDb: Bounded;
  readonly dissipationDb: Bounded;
  /** Standard deviation over an unknown phase of the wet feed's loss [dB]. */
  readonly phaseSpreadDb: number;
  readonly returnLossDb: Bounded;
  readonly filmMm: number;
  readonly source: string;
  readonly warnings: readonly Warning[];
}

/** Fall speed of rain drops [m/s]: common practice, no source. */
const DROP_FALL_M_PER_S = 6.5;
/** Length down which water runs where neither cover nor feed says: a small horn's mouth [mm]. */
const USUAL_MOUTH_MM = 50;

/** How a kept surface behaves: weather takes it one step towards wetting, a repellent coat makes it bead. */
function behaviour(surface: Wetting, care: SurfaceCare): Wetting {
  if (care === "treated") return "beading";
  if (care === "new") return surface;
  return surface === "beading" ? "mixed" : "wetting";
}

/**
 * Water on a cover: a film on a surface that wets, the published model for water-repellent radomes on one that
 * beads (never above the film), the mean of both between; or the model that the user names. Drops are for
 * surfaces that shed water: named for one that lets it spread, they are the film.
 *
 * The film may cost less than none: with the feed's phase known it can tune the feed, and on a sheet a little
 * short of half a wave it makes up the rest. That is the cascade's answer and stands.
 */
export function waterOnCover(
  frequencyGHz: number,
  feed: Feed,
  cover: Cover,
  dryLayers: readonly Layer[],
  dry: CoveredFeed,
  wetness: Wetness,
  where: string,
): WaterCost {
  const film = filmOn(feed, cover, wetness);
  const wetSheet = withWater(frequencyGHz, dryLayers, film.meanMm, wetness);
  const wet = cascade(frequencyGHz, feed, cover, wetSheet);
  const full = difference(dry, wet);
  const standing: Warning[] = film.standing
    ? [{ code: "standing_water", message: "the cover lies too level to drain: water stands on it", where }]
    : [];
  const common = { phaseSpreadDb: wet.phaseSpreadDb, filmMm: film.meanMm, warnings: standing };

  const surface = behaviour(cover.surface, cover.state);
  const model: WetModel = cover.wetModel ?? (surface === "wetting" ? "film" : "merceret2000");
  const { form, coveredShare } = surfaceState({ wetting: cover.surface, care: cover.state });
  if (model === "film" || (model === "beads" && form === "film")) {
    return {
      ...common,
      ...full,
      returnLossDb: wet.returnLossDb,
      source: "water film, Nusselt flow; P.840-9",
    };
  }
  if (model === "beads") {
    return {
      ...common,
      ...beads(frequencyGHz, feed, cover, dryLayers, dry, wetness, coveredShare),
      source: "drops by covered share",
    };
  }

  const whole = full.mismatchDb.high + full.dissipationDb.high;
  // A published figure knows no phase, so the film that caps it is taken over all phases.
  const dryPass = abs(sheetOf(frequencyGHz, dryLayers).transmission);
  const filmDb = Math.max(0, amplitudeToDb(dryPass / abs(wetSheet.transmission)));
  const published = publishedLoss(model, frequencyGHz, wetness);
  const chosen = cover.wetModel !== undefined;
  const shed = Math.min(published.lossDb, filmDb);
  const nominal = chosen ? published.lossDb : surface === "mixed" ? (shed + filmDb) / 2 : shed;
  return {
    ...common,
    // A published figure does not say how much of it is reflection: all of it counts as heat, so as noise too.
    mismatchDb: { low: 0, nominal: 0, high: 0 },
    dissipationDb: bounded(0, nominal, whole),
    phaseSpreadDb: dry.phaseSpreadDb,
    returnLossDb: bounded(wet.returnLossDb.low, dry.returnLossDb.nominal, dry.returnLossDb.high),
    filmMm: 0,
    source: !chosen && surface === "mixed" ? `mean of water film and ${published.source}` : published.source,
    warnings: published.extrapolated
      ? [
          {
            code: "wet_model_range",
            message: `the ${model} model of water on it was ${published.range}`,
            where,
          },
          ...standing,
        ]
      : standing,
  };
}

function filmOn(feed: Feed, cover: Cover, { rainRateMmPerH, windMPerS, temperatureC }: Wetness): WaterFilm {
  return waterFilm({
    shape: "plate",
    sizeM: (cover.slopeMm ?? feed.apertureMm ?? USUAL_MOUTH_MM) / 1000,
    tiltDeg: 90 - feed.facingDeg,
    windRatio: windMPerS / DROP_FALL_M_PER_S,
    rainRateMmPerH,
    temperatureC,
  });
}

function withWater(
  frequencyGHz: number,
  layers: readonly Layer[],
  thicknessMm: number,
  { temperatureC }: Wetness,
) {
  const water = waterLayer({ thicknessMm, frequencyGHz, temperatureC });
  return sheetOf(frequencyGHz, [...layers, water]);
}

function beads(
  frequencyGHz: number,
  feed: Feed,
  cover: Cover,
  dryLayers: readonly Layer[],
  dry: CoveredFeed,
  wetness: Wetness,
  coveredShare: Bounded,
) {
  const sheet = beadedSheet({
    dry: sheetOf(frequencyGHz, dryLayers),
    wet: withWater(frequencyGHz, dryLayers, BEAD_HEIGHT_MM, wetness),
    coveredShare,
  });
  const wet = cascade(frequencyGHz, feed, cover, sheet);
  const { mismatchDb, dissipationDb } = difference(dry, wet);
  const { low, nominal, high } = sheet.excessDb;
  const spread = { low: low - nominal, high: high - nominal };
  return {
    mismatchDb,
    dissipationDb: bounded(
      Math.max(0, dissipationDb.nominal + spread.low),
      dissipationDb.nominal,
      dissipationDb.nominal + spread.high,
    ),
    phaseSpreadDb: wet.phaseSpreadDb,
    returnLossDb: wet.returnLossDb,
    filmMm: 0,
  };
}

function publishedLoss(model: Exclude<WetModel, "film" | "beads">, frequencyGHz: number, wetness: Wetness) {
  const { rainRateMmPerH } = wetness;
  const rain = { frequencyGHz, rainRateMmPerH };
  const { lossDb, ends, extrapolated } = wetAntennaLoss(
    model === "merceret2000" ? { model, surface: "hydrophobic", ...rain } : { model, ...rain },
  );
  const { source, range } = wetAntennaModels.find(({ name }) => name === model)!;
  const [low, high] = range.frequencyGHz;
  return {
    lossDb: ends === "both" ? lossDb / 2 : lossDb,
    source,
    extrapolated,
    range: `fitted at ${low === high ? low : `${low} to ${high}`} GHz, carried on to ${frequencyGHz} GHz`,
  };
}

export function sheetOf(frequencyGHz: number, layers: readonly Layer[]): SheetScattering {
  return layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
}

export function cascade(frequencyGHz: number, feed: Feed, cover: Cover, sheet: SheetScattering): CoveredFeed {
  return coveredFeed({
    feedReturnLossDb: feed.returnLossDb,
    sheet,
    phaseDeg: feed.phaseDeg,
    gapMm: cover.gapMm,
    frequencyGHz,
  });
}

/** Wet less dry, bound by bound, so that the bounds of dry and water add up to those of the wet whole. */
function difference(dry: CoveredFeed, wet: CoveredFeed): Pick<WaterCost, "mismatchDb" | "dissipationDb"> {
  const less = (a: Bounded, b: Bounded) => {
    const nominal = a.nominal - b.nominal;
    const ends = [a.low - b.low, a.high - b.high];
    return bounded(Math.min(...ends), nominal, Math.max(...ends));
  };
  return {
    mismatchDb: less(wet.mismatchLossDb, dry.mismatchLossDb),
    dissipationDb: less(wet.dissipationDb, dry.dissipationDb),
  };
}
