import * as z from "zod";
import { group, oneOf } from "./fields.ts";
import { quantity, uncertain } from "./quantityField.ts";
import type { Weather } from "./types.ts";
import { instead } from "./wording.ts";

/** Wind that drives rain against an upright cover where the scenario names none [m/s]: common practice, no source. */
const RAINY_WIND_M_PER_S = 4;

/** Density of snow where the scenario names none: settled snow, common practice, no source [g/cm3]. */
const USUAL_SNOW_G_PER_CM3 = 0.3;

const rate = (about: string) => quantity("rainRateMmPerH", { about, range: [0, 400] });
const stretch = (about: string) => quantity("distanceKm", { about, range: [0.01, 1000] });

const snow = group(
  {
    depth: quantity("thicknessMm", { about: "depth of the snow", range: [0.1, 2000] }),
    density: quantity("densityGcm3", {
      about: "density of the snow when dry",
      range: [0.02, 0.916],
    }).optional(),
    wetness: quantity("percent", { about: "liquid water in it by volume", range: [0, 30] }).optional(),
  },
  "snow on the covers: depth, density, wetness",
).transform(
  ({ depth: depthMm, density: dryDensityGcm3 = USUAL_SNOW_G_PER_CM3, wetness: wetnessPercent = 0 }) => ({
    depthMm,
    dryDensityGcm3,
    wetnessPercent,
  }),
);

/** One weather to judge the path in; `{}` is dry, of the reference atmosphere. */
export const weatherSchema = group(
  {
    rain: uncertain("rainRateMmPerH", { about: "rain rate on the path", range: [0, 400] }).optional(),
    extent: stretch("length of path in the rain").optional(),
    fog: quantity("densityGm3", { about: "liquid water of the fog", range: [0, 5] }).optional(),
    fog_extent: stretch("length of path in the fog").optional(),
    temperature: quantity("temperatureC", { about: "air temperature", range: [-60, 60] }).optional(),
    pressure: quantity("pressureHPa", {
      about: "barometric pressure at the path, not reduced to sea level",
      range: [400, 1090],
    }).optional(),
    humidity: quantity("percent", { about: "relative humidity", range: [0, 100] }).optional(),
    dew_point: quantity("temperatureC", { about: "dew point", range: [-60, 40] }).optional(),
    vapour_density: quantity("densityGm3", { about: "water vapour density", range: [0, 60] }).optional(),
    wind: quantity("speedMPerS", { about: "wind towards the covers", range: [0, 60] }).optional(),
    wets: z
      .array(oneOf(["transmitter", "receiver"], "an end of the path"), {
        error: ({ input }) =>
          instead(input, "a list of the ends whose covers get wet: [transmitter, receiver] or []"),
      })
      .meta({ description: "ends whose covers the rain wets; both where not given" })
      .optional(),
    covers_wet_as_at: rate("rain rate that wetted the covers").optional(),
    dried_for: quantity("durationMin", {
      about: "time since that rain stopped",
      range: [0, 1440],
    }).optional(),
    dew: uncertain("thicknessMm", {
      about: "film of dew on the covers, 0.1 mm on a clear night",
      range: [0, 1],
    }).optional(),
    ice: quantity("thicknessMm", { about: "clear ice on the covers", range: [0, 200] }).optional(),
    snow: snow.optional(),
  },
  "a weather: rain, fog, temperature, what it wets; {} is dry",
  (has) => {
    const ways = (["humidity", "dew_point", "vapour_density"] as const).filter(has);
    if (ways.length > 1) return "more than one of humidity, dew_point and vapour_density; write one";
    const falling = has("rain") && !has("covers_wet_as_at");
    return has("dried_for") && falling
      ? "dried_for while it rains; write covers_wet_as_at in place of rain"
      : undefined;
  },
).transform((weather): Weather => {
  return {
    rainMmPerH: weather.rain ?? { value: 0 },
    extentKm: weather.extent,
    fogGPerM3: weather.fog ?? 0,
    fogExtentKm: weather.fog_extent,
    temperatureC: weather.temperature,
    pressureHPa: weather.pressure,
    humidityPercent: weather.humidity,
    dewPointC: weather.dew_point,
    vapourDensityGPerM3: weather.vapour_density,
    windMPerS: weather.wind ?? RAINY_WIND_M_PER_S,
    wets: weather.wets ?? ["transmitter", "receiver"],
    coversWetAsAtMmPerH: weather.covers_wet_as_at,
    driedForMin: weather.dried_for ?? 0,
    dewMm: weather.dew ?? { value: 0 },
    iceMm: weather.ice ?? 0,
    snow: weather.snow,
  };
});
