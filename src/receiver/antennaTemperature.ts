import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import { dbToPower } from "../numeric/decibels.ts";

/**
 * Noise temperature of a level beam over open ground in clear air, half low sky and half ground, with the
 * spread between sites [K].
 *
 * Source: common practice, no source; near 10 GHz the balance of sky and ground gives 160 to 205 K
 */
export const levelBeam = { temperatureK: 200, sigmaK: 40 } as const;

/** A beam filled by hills, trees, buildings or heavy rain; the cautious choice [K] (common practice, no source). */
export const filledBeamK = 290;

/** Temperature at which rain and wet air absorb, where that of the ground is unknown [K] (P.618-14 section 3). */
const MEDIUM_K = 275;

/**
 * Noise temperature of an antenna that looks through rain or cloud.
 *
 *     T = T0 10^(-A/10) + Tm (1 - 10^(-A/10))
 *
 * What the antenna saw is dimmed and what dims it glows, so a cold beam warms and one warmer than the rain
 * cools. Rain over part of the path dims the ground behind it as well.
 *
 * Source: balance of absorption and emission, in the form of Rec. ITU-R P.618-14 section 3
 *
 * @param clearK         antenna temperature without the rain [K], at least 0
 * @param attenuationDb  absorbed between the antenna and what it looks at [dB], at least 0
 * @param mediumK        temperature of what absorbs [K], above 0, default 275
 */
export function antennaTemperatureInRain({
  clearK,
  attenuationDb,
  mediumK = MEDIUM_K,
}: {
  clearK: number;
  attenuationDb: number;
  mediumK?: number;
}): { temperatureK: number } {
  requireNotNegative("clearK", clearK);
  requireNotNegative("attenuationDb", attenuationDb);
  requirePositive("mediumK", mediumK);
  const passed = dbToPower(-attenuationDb);
  return { temperatureK: clearK * passed + mediumK * (1 - passed) };
}
