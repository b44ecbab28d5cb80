import { requireWithin, type Validity } from "../numeric/check.ts";
import { interpolateLinear } from "../numeric/interpolate.ts";

export const rainZoneValidity = { percent: [0.001, 1] } as const satisfies Validity;

const percents = [0.001, 0.003, 0.01, 0.03, 0.1, 0.3, 1];

/** PN.837-1 Table 1 [mm/h], from 0.001 % to 1 %. Zone A at 1 % is printed as "less than 0.1". */
const zones = {
  A: [22, 14, 8, 5, 2, 0.8, 0.1],
  B: [32, 21, 12, 6, 3, 2, 0.5],
  C: [42, 26, 15, 9, 5, 2.8, 0.7],
  D: [42, 29, 19, 13, 8, 4.5, 2.1],
  E: [70, 41, 22, 12, 6, 2.4, 0.6],
  F: [78, 54, 28, 15, 8, 4.5, 1.7],
  G: [65, 45, 30, 20, 12, 7, 3],
  H: [83, 55, 32, 18, 10, 4, 2],
  J: [55, 45, 35, 28, 20, 13, 8],
  K: [100, 70, 42, 23, 12, 4.2, 1.5],
  L: [150, 105, 60, 33, 15, 7, 2],
  M: [120, 95, 63, 40, 22, 11, 4],
  N: [180, 140, 95, 65, 35, 15, 5],
  P: [250, 200, 145, 105, 65, 34, 12],
  Q: [170, 142, 115, 96, 72, 49, 24],
} as const;

export type RainZone = keyof typeof zones;

export const rainZoneNames = Object.keys(zones) as readonly RainZone[];

/**
 * Rain rate of a rain climatic zone: a fallback for a place with neither map nor climate figures.
 *
 * Between the percentages of the table log R runs straight against log p (common practice, no source).
 *
 * Source: ITU-R PN.837-1 (08/1994) Table 1, withdrawn in favour of the maps of P.837-2 and later; at 0.01 % a
 *         zone is often tens of percent off the map of P.837-7
 * Valid:  0.001 to 1 %, no extrapolation
 *
 * @param zone     letter of the zone
 * @param percent  share of the average year [%], 0.001 to 1
 * @returns rate exceeded for that share [mm/h], and the words that must go with it
 * @throws RangeError on an unknown zone or a percentage outside the table
 */
export function zoneRainRate({ zone, percent }: { readonly zone: RainZone; readonly percent: number }): {
  rainRateMmPerH: number;
  source: string;
} {
  if (!Object.hasOwn(zones, zone))
    throw new RangeError(`zone must be one of ${rainZoneNames.join(" ")}, got ${zone}`);
  requireWithin("percent", percent, 0.001, 1);
  const logRate = interpolateLinear(percents.map(Math.log), zones[zone].map(Math.log), Math.log(percent));
  return { rainRateMmPerH: Math.exp(logRate), source: "ITU-R PN.837-1 (1994), withdrawn" };
}
