import { BEAD_HEIGHT_MM, beadedSheet } from "../cover/beads.ts";
import { type Bounded, bounded, plus } from "../cover/bounded.ts";
import type { CoveredFeed } from "../cover/coveredFeed.ts";
import type { Layer } from "../cover/layeredSheet.ts";
import type { Wetting } from "../cover/materials.ts";
import { type SurfaceCare, surfaceState } from "../cover/surfaceState.ts";
import { waterLayer } from "../cover/waterFilm.ts";
import { type WetAntennaInput, wetAntennaLoss, wetAntennaModels } from "../cover/wetAntennaLoss.ts";
import type { WetModel } from "../cover/wetModels.ts";
import { abs } from "../numeric/complex.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import { type Deposit, depositOn, type Wetness } from "./deposit.ts";
import { cascade, type Mouthpiece, mouthWidthMm, sheetBefore } from "./mouthpiece.ts";
import type { Warning } from "./types.ts";

/** What water, ice or snow adds to a dry cover. */
export interface WaterCost {
  readonly noun: Deposit["noun"];
  readonly mismatchDb: Bounded;
  readonly dissipationDb: Bounded;
  /** Standard deviation over an unknown phase of the wet feed's loss [dB]. */
  readonly phaseSpreadDb: number;
  readonly returnLossDb: Bounded;
  readonly filmMm: number;
  readonly source: string;
  readonly warnings: readonly Warning[];
}

const STEADY_RAIN_MIN = 60;

/** Loss of a film over that of the same rain on a fresh repellent surface: Merceret & Ward 2000. */
const REPELLENT_GAIN = 2.9;

/** How a kept surface behaves: weather takes it one step towards wetting, a repellent coat makes it bead. */
function behaviour(surface: Wetting, care: SurfaceCare): Wetting {
  if (care === "treated") return "beading";
  if (care === "new") return surface;
  return surface === "beading" ? "mixed" : "wetting";
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
  const deposit = depositOn(frequencyGHz, surfaceOf(mouth), wetness);
  const { filmMm, noun } = deposit;
  const coveredAt = (thicknessMm: number) => {
    const sheet = sheetBefore(mouth, [...dryLayers, ...deposit.layersAt(thicknessMm)]);
    return { sheet, covered: cascade(mouth, sheet) };
  };
  const { sheet, covered: wet } = coveredAt(filmMm.nominal);
  const ends = filmMm.low === filmMm.high ? [] : [filmMm.low, filmMm.high].map((mm) => coveredAt(mm).covered);
  const full = difference(dry, wet, ends);
  const standing: Warning[] = deposit.standing
    ? [{ code: "standing_water", message: "the cover lies too level to drain: water stands on it", where }]
    : [];
  const common = { noun, phaseSpreadDb: wet.phaseSpreadDb, filmMm: filmMm.nominal, warnings: standing };

  const surface = behaviour(cover.surface, cover.state);
  const model: WetModel = cover.wetModel ?? (surface === "wetting" ? "film" : "merceret2000");
  const { form, coveredShare } = surfaceState({ wetting: cover.surface, care: cover.state });
  if (noun !== "water" || model === "film" || (model === "beads" && form === "film")) {
    return { ...common, ...full, returnLossDb: wet.returnLossDb, source: deposit.source };
  }

  // A published figure knows no phase, so the film that caps it is taken over all phases.
  const dryPass = abs(sheetBefore(mouth, dryLayers).transmission);
  const filmDb = Math.max(0, amplitudeToDb(dryPass / abs(sheet.transmission)));
  if (model === "beads") {
    return {
      ...common,
      ...beads(mouth, dryLayers, dry, wetness, coveredShare, filmDb),
      source: "drops by covered share",
    };
  }
  const whole = full.mismatchDb.high + full.dissipationDb.high;
  const published = publishedLoss(model, frequencyGHz, wetness, filmDb);
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
            message: `water on a cover by the model ${model}, ${published.range}: trust it to a factor of two`,
            where: "covers",
          },
          ...standing,
        ]
      : standing,
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
  coveredShare: Bounded,
  filmDb: number,
) {
  const { frequencyGHz } = mouth;
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
    returnLossDb: wet.returnLossDb,
    filmMm: 0,
  };
}

function publishedLoss(
  model: Exclude<WetModel, "film" | "beads">,
  frequencyGHz: number,
  { rainRateMmPerH, driedForMin, pathRainDb: attenuationDb }: Wetness,
  filmDb: number,
) {
  const rain = { frequencyGHz, rainRateMmPerH };
  const input: Record<typeof model, WetAntennaInput> = {
    leijnse2008: { model: "leijnse2008", ...rain },
    pastorek2022: { model: "pastorek2022", ...rain },
    kharadly2001: { model: "kharadly2001", attenuationDb, ...rain },
    merceret2000: { model: "merceret2000", surface: "hydrophobic", ...rain },
    // Steady rain: long enough for the antennas to be as wet as they get.
    schleiss2013: { model: "schleiss2013", attenuationDb, wetMinutes: STEADY_RAIN_MIN, ...rain },
    constant: { model: "constant", ...rain },
  };
  const { lossDb, ends, extrapolated } = wetAntennaLoss(input[model]);
  const { source, range } = wetAntennaModels.find(({ name }) => name === model)!;
  const [low, high] = range.frequencyGHz;
  const oneEnd = ends === "both" ? lossDb / 2 : lossDb;
  return {
    // The models know falling rain; dew, or what a shower left, is taken as a film shed by that surface.
    lossDb: rainRateMmPerH > 0 && driedForMin === 0 ? oneEnd : filmDb / REPELLENT_GAIN,
    source,
    extrapolated,
    range: `fitted at ${low === high ? low : `${low} to ${high}`} GHz, carried on to ${frequencyGHz} GHz`,
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
