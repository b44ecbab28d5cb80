import { filmAfterRain } from "../cover/drying.ts";
import type { Wetting } from "../cover/materials.ts";
import { type SurfaceCare, surfaceState } from "../cover/surfaceState.ts";
import { type WetAntennaInput, wetAntennaLoss, wetAntennaModels } from "../cover/wetAntennaLoss.ts";
import type { WetModel } from "../cover/wetModels.ts";
import type { Cover } from "../scenario/types.ts";
import type { Warning, Wetness } from "./types.ts";

/** A cover's water by a published figure. */
export interface PublishedWater {
  readonly lossDb: number;
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

/** The user's model, or the one for the surface; drops named for a surface that lets water spread are the film. */
export function waterModelOf({ surface, state, wetModel }: Cover): WetModel {
  const { form } = surfaceState({ wetting: surface, care: state });
  if (wetModel === "beads" && form === "film") return "film";
  return wetModel ?? (behaviour(surface, state) === "wetting" ? "film" : "merceret2000");
}

/** Whether the water on a cover is reckoned from what the rain takes on the path, so that it differs from path to path. */
export function startsFromPathRain({ wetModel }: Cover): boolean {
  return wetModel === "kharadly2001" || wetModel === "schleiss2013";
}

/**
 * Water on a cover by a published model. One that the user names stands as it is; one that the surface chose never
 * exceeds the film, and on a mixed surface is the mean of both. What a shower left dries as a film does; dew, which
 * no model knows, is a film that a repellent surface sheds.
 *
 * @param filmMm    the water as a film [mm]
 * @param filmDb    what a film of a thickness [mm] would cost, over all phases [dB]
 */
export function publishedWater(
  model: Exclude<WetModel, "film" | "beads">,
  { surface, state, wetModel }: Cover,
  frequencyGHz: number,
  wetness: Wetness,
  filmMm: number,
  filmDb: (thicknessMm: number) => number,
): PublishedWater {
  const { rainRateMmPerH, driedForMin, pathRainDb: attenuationDb } = wetness;
  const kept = behaviour(surface, state);
  const chosen = wetModel !== undefined;
  const rain = { frequencyGHz, rainRateMmPerH };
  const input: Record<typeof model, WetAntennaInput> = {
    leijnse2008: { model: "leijnse2008", ...rain },
    pastorek2022: { model: "pastorek2022", ...rain },
    kharadly2001: { model: "kharadly2001", attenuationDb, ...rain },
    merceret2000: {
      model: "merceret2000",
      surface: chosen && kept !== "beading" ? "standard" : "hydrophobic",
      ...rain,
    },
    // Steady rain: long enough for the antennas to be as wet as they get.
    schleiss2013: { model: "schleiss2013", attenuationDb, wetMinutes: STEADY_RAIN_MIN, ...rain },
    constant: { model: "constant", ...rain },
  };
  const { lossDb, ends, extrapolated } = wetAntennaLoss(input[model]);
  const { source, range } = wetAntennaModels.find(({ name }) => name === model)!;
  const inRainDb = ends === "both" ? lossDb / 2 : lossDb;
  const shareLeft = filmAfterRain({ thicknessMm: 1, minutesSinceRain: driedForMin }).thicknessMm.nominal;
  const publishedDb = Math.max(inRainDb * shareLeft, filmDb(wetness.dewMm.nominal) / REPELLENT_GAIN);
  const warnings: Warning[] = [];
  const warn = (code: string, message: string) => warnings.push({ code, message, where: "covers" });
  if (extrapolated) {
    const [low, high] = range.frequencyGHz;
    const fitted = low === high ? `${low}` : `${low} to ${high}`;
    warn(
      "wet_model_range",
      `water on a cover by the model ${model}, fitted at ${fitted} GHz, carried on to ${frequencyGHz} GHz: ` +
        "trust it to a factor of two",
    );
  }
  if ("attenuationDb" in input[model] && rainRateMmPerH > 0 && attenuationDb === 0) {
    warn(
      "wet_model_no_path_rain",
      `the model ${model} starts from the loss of rain on the path: without any it charges nothing for wet covers`,
    );
  }
  if (chosen) return { lossDb: publishedDb, source, warnings };
  const wholeDb = filmDb(filmMm);
  const shedDb = Math.min(publishedDb, wholeDb);
  return kept === "mixed"
    ? { lossDb: (shedDb + wholeDb) / 2, source: `mean of water film and ${source}`, warnings }
    : { lossDb: shedDb, source, warnings };
}
