import { type Layer, layeredSheet } from "../cover/layeredSheet.ts";
import type { Material } from "../cover/materials.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { reach } from "./reach.ts";
import { MOST_WAVELENGTHS } from "./thicknessLimits.ts";

/** A thickness by the spread of its material: `thin` is the least, where both figures lie high. */
export interface ThicknessSpread {
  readonly thin: number | undefined;
  readonly nominal: number | undefined;
  readonly thick: number | undefined;
}

export interface MaterialThickness {
  /** Half a wave in the material [mm]. */
  readonly halfWaveMm: ThicknessSpread;
  /** Thickness below which a flat sheet loses less than the limit [mm]; undefined beyond ten wavelengths. */
  readonly thinLimitMm: ThicknessSpread;
}

/** Steps of the search in one half wave. */
const STEPS = 32;

/**
 * Two thicknesses for orientation: half a wave, and where a sheet by itself before a matched feed begins to cost.
 *
 * @param frequencyGHz  [GHz], above 0
 * @param limitDb       what the sheet may lose [dB], above 0
 */
export function materialThickness(
  { permittivity, lossTangent }: Material,
  { frequencyGHz, limitDb }: { readonly frequencyGHz: number; readonly limitDb: number },
): MaterialThickness {
  const waveMm = 1e3 * wavelengthM(frequencyGHz);
  const at = (figure: "low" | "nominal" | "high") => {
    const layer = { permittivity: permittivity[figure], lossTangent: lossTangent[figure] };
    const halfWaveMm = waveMm / (2 * Math.sqrt(layer.permittivity));
    const lossDb = (thicknessMm: number) => sheetLossDb(frequencyGHz, { ...layer, thicknessMm });
    const thinLimitMm = reach((mm) => lossDb(mm) - limitDb, {
      from: 0,
      step: halfWaveMm / STEPS,
      end: MOST_WAVELENGTHS * waveMm,
    });
    return { halfWaveMm, thinLimitMm };
  };
  const [low, nominal, high] = [at("low"), at("nominal"), at("high")];
  const spread = (key: keyof MaterialThickness): ThicknessSpread => ({
    thin: high[key],
    nominal: nominal[key],
    thick: low[key],
  });
  return { halfWaveMm: spread("halfWaveMm"), thinLimitMm: spread("thinLimitMm") };
}

function sheetLossDb(frequencyGHz: number, layer: Layer): number {
  return layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers: [layer] })
    .transmissionLossDb;
}
