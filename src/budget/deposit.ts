import { type Bounded, exactly } from "../cover/bounded.ts";
import { filmAfterRain } from "../cover/drying.ts";
import { icePermittivity } from "../cover/icePermittivity.ts";
import { type Layer, layerOf } from "../cover/layeredSheet.ts";
import { snowPermittivity, wetSnowValidity } from "../cover/snowPermittivity.ts";
import { type WaterFilmInput, waterFilm, waterLayer } from "../cover/waterFilm.ts";
import { outside } from "../numeric/check.ts";
import { overreachWarning } from "./overreach.ts";
import type { Warning, Wetness } from "./types.ts";

/** Where the water runs: shape, size and tilt of a cover. */
export type Surface = Pick<WaterFilmInput, "shape" | "sizeM" | "tiltDeg">;

/** Layers upon a cover, outermost last, at the low, nominal and high thickness of the water among them. */
export interface Deposit {
  readonly noun: "water" | "ice" | "snow";
  readonly filmMm: Bounded;
  readonly layersAt: (filmMm: number) => Layer[];
  readonly source: string;
  readonly warnings: readonly Warning[];
}

/** Fall speed of rain drops [m/s]: common practice, no source. */
const DROP_FALL_M_PER_S = 6.5;

export function isDry({ rainRateMmPerH, dewMm, iceMm, snow }: Wetness): boolean {
  return rainRateMmPerH === 0 && dewMm.high === 0 && iceMm === 0 && snow === undefined;
}

/** Ice next to the cover, snow upon it, water outermost: the thicker of rain's film, dried since, and dew. */
export function depositOn(frequencyGHz: number, surface: Surface, wetness: Wetness, where: string): Deposit {
  const { rainRateMmPerH, windMPerS, temperatureC, driedForMin, dewMm, iceMm, snow } = wetness;
  const windRatio = windMPerS / DROP_FALL_M_PER_S;
  const rain = waterFilm({ ...surface, windRatio, rainRateMmPerH, temperatureC });
  const left =
    driedForMin > 0
      ? filmAfterRain({ thicknessMm: rain.meanMm, minutesSinceRain: driedForMin }).thicknessMm
      : exactly(rain.meanMm);
  const larger = (figure: keyof Bounded) => Math.max(left[figure], dewMm[figure]);
  const frozen: Layer[] = [];
  const warnings: Warning[] = [];
  if (rain.standing) {
    const message = "the cover lies too level to drain: water stands on it";
    warnings.push({ code: "standing_water", message, where });
  }
  if (iceMm > 0)
    frozen.push(layerOf(icePermittivity({ frequencyGHz, temperatureC: Math.min(0, temperatureC) }), iceMm));
  if (snow !== undefined) {
    const { depthMm, dryDensityGcm3, wetnessPercent } = snow;
    if (wetnessPercent > 0) {
      const overreach = outside(wetSnowValidity, { frequencyGHz, dryDensityGcm3, wetnessPercent });
      warnings.push(...overreach.map(overreachWarning("wet snow on a cover", "weather")));
    }
    const state = { frequencyGHz, temperatureC: Math.min(0, temperatureC), dryDensityGcm3, wetnessPercent };
    const { real, imaginary } = snowPermittivity(state);
    // Beyond the densities of its measurements the fit falls below that of air.
    frozen.push(layerOf({ real: Math.max(1, real), imaginary }, depthMm));
  }
  const waterC = Math.max(0, temperatureC);
  return {
    noun: snow !== undefined ? "snow" : iceMm > 0 ? "ice" : "water",
    filmMm: { low: larger("low"), nominal: larger("nominal"), high: larger("high") },
    layersAt: (thicknessMm) => [
      ...frozen,
      ...(thicknessMm > 0 ? [waterLayer({ thicknessMm, frequencyGHz, temperatureC: waterC })] : []),
    ],
    source:
      snow !== undefined
        ? snow.wetnessPercent > 0
          ? "wet snow layer, Hallikainen, Ulaby, Abdelrazik 1986"
          : "dry snow layer, Ulaby & Long 2014"
        : iceMm > 0
          ? "ice layer, Matzler & Wegmuller 1987, Hufford 1991"
          : "water film, Nusselt flow; P.840-9",
    warnings,
  };
}
