import { requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { RADIANS_PER_DEGREE } from "../numeric/constants.ts";
import { dbToPower } from "../numeric/decibels.ts";

/**
 * Share of an average year from that of the average worst month, for deep multipath fades.
 *
 * Source: ITU-R P.530-17, section 2.3.4, equation 26; P.2001-4, Attachment B.3
 *
 * @param worstMonthPercent     [%], at least 0
 * @param latitudeDeg           [deg], either sign
 * @param distanceKm            [km], above 0
 * @param pathInclinationMrad   difference in height of the antennas over the distance [mrad], at least 0
 * @returns share of the year [%] and the conversion [dB], at most 10.8: one month in twelve
 * @throws RangeError on a non-finite argument or one out of range
 */
export function multipathYear({
  worstMonthPercent,
  latitudeDeg,
  distanceKm,
  pathInclinationMrad,
}: {
  readonly worstMonthPercent: number;
  readonly latitudeDeg: number;
  readonly distanceKm: number;
  readonly pathInclinationMrad: number;
}): { readonly yearPercent: number; readonly conversionDb: number } {
  requireNotNegative("worstMonthPercent", worstMonthPercent);
  requireWithin("latitudeDeg", latitudeDeg, -90, 90);
  requirePositive("distanceKm", distanceKm);
  requireNotNegative("pathInclinationMrad", pathInclinationMrad);
  const season = Math.abs(Math.cos(2 * latitudeDeg * RADIANS_PER_DEGREE)) ** 0.7;
  const climate = 1.1 + (Math.abs(latitudeDeg) <= 45 ? season : -season);
  const conversionDb = Math.min(
    10.8,
    10.5 -
      5.6 * Math.log10(climate) -
      2.7 * Math.log10(distanceKm) +
      1.7 * Math.log10(1 + pathInclinationMrad),
  );
  return { yearPercent: worstMonthPercent / dbToPower(conversionDb), conversionDb };
}

/**
 * Share of an average year from that of the average worst month, for rain.
 *
 * Source: ITU-R P.841, global values for planning (from memory)
 *
 * @param worstMonthPercent  [%], at least 0
 * @returns share of the year [%]
 */
export function rainYear({ worstMonthPercent }: { readonly worstMonthPercent: number }): {
  readonly yearPercent: number;
} {
  requireNotNegative("worstMonthPercent", worstMonthPercent);
  return { yearPercent: 0.3 * worstMonthPercent ** 1.15 };
}

/**
 * Share of the average worst month from that of an average year, for rain: inverse of `rainYear`.
 *
 * @param yearPercent  [%], at least 0
 * @returns share of the worst month [%], at most 100
 */
export function rainWorstMonth({ yearPercent }: { readonly yearPercent: number }): {
  readonly worstMonthPercent: number;
} {
  requireNotNegative("yearPercent", yearPercent);
  return { worstMonthPercent: Math.min(100, (yearPercent / 0.3) ** (1 / 1.15)) };
}

/** Ground under a path: `hilly-land` is hilly with no water near. */
export type FadingTerrain = "flat" | "hilly" | "hilly-land";

const shorterPeriodLaw: Readonly<Record<FadingTerrain, readonly [number, number, number]>> = {
  flat: [89.34, -0.854, 0.676],
  hilly: [119, -0.78, 0.295],
  "hilly-land": [199.85, -0.834, 0.175],
};

/**
 * How much larger the share of fading time is in the worst few hours than in the whole worst month.
 *
 * Source: ITU-R P.530-17, section 2.3.5 (the same in -18)
 * Valid:  1 to 720 hours
 *
 * @param terrain      kind of ground
 * @param periodHours  length of the period [h], 1 to 720
 * @returns factor on the share of the worst month
 * @throws RangeError on a period out of range or an unknown terrain
 */
export function shorterPeriodFactor({
  terrain,
  periodHours,
}: {
  readonly terrain: FadingTerrain;
  readonly periodHours: number;
}): { readonly factor: number } {
  requireWithin("periodHours", periodHours, 1, 720);
  const law = shorterPeriodLaw[terrain];
  if (law === undefined) throw new RangeError(`unknown terrain ${terrain}`);
  const [scale, exponent, floor] = law;
  return { factor: scale * periodHours ** exponent + floor };
}
