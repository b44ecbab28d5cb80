import * as z from "zod";
import { type RainZone, rainZoneNames } from "../atmosphere/rainZones.ts";
import { meanRainHeightM } from "../path/wetSnow.ts";
import { described, group, oneOf, text } from "./fields.ts";
import { quantity } from "./quantityField.ts";
import type { Climate, RainOfTheYear } from "./types.ts";
import { instead, shown } from "./wording.ts";

const zones = rainZoneNames as readonly [RainZone, ...RainZone[]];
const ways = ["rain_rate", "rain_zone", "monthly", "map"] as const;

/** Twelve figures, January first. */
function twelve<T extends z.ZodType>(figure: T, about: string) {
  const field = z
    .array(figure, { error: ({ input }) => instead(input, about) })
    .superRefine((list, context) => {
      const message = `a list of ${list.length}, expected ${about}`;
      if (list.length !== 12) context.addIssue({ code: "custom", message, input: list });
    });
  return described(field, { description: about });
}

const monthly = group(
  {
    rainfall: twelve(
      quantity("thicknessMm", { about: "rain and melted snow of a month", range: [0, 3000] }),
      "twelve monthly totals, January first, each such as 62 mm",
    ),
    temperature: twelve(
      quantity("temperatureC", { about: "mean temperature of a month", range: [-60, 60] }),
      "twelve monthly mean temperatures, January first, each such as 4 degC",
    ),
  },
  "twelve monthly figures of a weather station: rainfall and temperature",
);

const GRADIENT = "a refractivity gradient from -2000 to 500 N/km, such as -200 N/km";

/** N-units are pure numbers, so that no other unit can be meant. */
const gradient = described(
  z
    .union([z.string(), z.number()], { error: ({ input }) => instead(input, GRADIENT) })
    .transform((input, context) => {
      const written = String(input)
        .trim()
        .replace(/^[\u2212\u2013]/, "-");
      const [, figure] = /^([+-]?\d+(?:\.\d+)?)\s*(?:N(?:-units)?\/km)?$/.exec(written) ?? [];
      const value = Number(figure);
      if (value >= -2000 && value <= 500) return value;
      context.addIssue({ code: "custom", message: `read ${shown(input)}, expected ${GRADIENT}`, input });
      return z.NEVER;
    }),
  { description: `gradient of the lowest 65 m that 1 % of the year stays below: ${GRADIENT}` },
);

/** Rain and air of an average year, for a path that runs all year. */
export const climateSchema = group(
  {
    rain_rate: quantity("rainRateMmPerH", {
      about: "rain rate exceeded for 0.01 % of an average year, over one minute",
      range: [0, 400],
    }).optional(),
    rain_zone: oneOf(zones, "a rain climatic zone of PN.837-1 (1994)").optional(),
    monthly: monthly.optional(),
    map: text("the folder that holds R001.TXT of P.837, LAT_R001.TXT and LON_R001.TXT").optional(),
    dN1: gradient.optional(),
    terrain_roughness: quantity("lengthM", {
      about: "standard deviation of terrain height over 110 km by 110 km",
      range: [0, 3000],
    }).optional(),
    isotherm: quantity("lengthM", {
      about: "mean height of the 0 degC isotherm above sea level",
      range: [-400, 7000],
    }).optional(),
    rain_height: quantity("lengthM", {
      about: "mean rain height above sea level",
      range: [0, 7500],
    }).optional(),
  },
  "the climate: one of rain_rate, rain_zone, monthly and map; dN1, terrain_roughness, rain_height",
  (has) => {
    const given = ways.filter(has);
    if (given.length === 0) return `missing ${ways.slice(0, -1).join(", ")} or ${ways.at(-1)}`;
    if (given.length > 1) return `more than one of ${ways.join(", ")}; write one`;
    return has("isotherm") && has("rain_height") ? "both isotherm and rain_height; write one" : undefined;
  },
).transform(({ dN1, terrain_roughness, isotherm, rain_height, ...typed }): Climate => {
  const { rain_rate, rain_zone, monthly, map } = typed;
  const rain: RainOfTheYear =
    rain_rate !== undefined
      ? { kind: "rate", rainRate001MmPerH: rain_rate }
      : rain_zone !== undefined
        ? { kind: "zone", zone: rain_zone }
        : monthly !== undefined
          ? { kind: "monthly", monthlyRainfallMm: monthly.rainfall, monthlyTemperatureC: monthly.temperature }
          : { kind: "map", folder: map!, rainRate001MmPerH: undefined };
  return {
    rain,
    dN1,
    terrainRoughnessM: terrain_roughness,
    meanRainHeightM: isotherm === undefined ? rain_height : meanRainHeightM(isotherm / 1000),
  };
});
