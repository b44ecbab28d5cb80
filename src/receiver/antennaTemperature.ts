import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import { dbToPower } from "../numeric/decibels.ts";
import { interpolateLinear } from "../numeric/interpolate.ts";

/**
 * Noise temperature of a level beam over open ground in clear air, half low sky and half ground, with the
 * spread between sites [K].
 *
 * Source: common practice, no source; near 10 GHz the balance of sky and ground gives 160 to 205 K
 */
export const levelBeam = { temperatureK: 200, sigmaK: 40 } as const;

/**
 * Antenna temperature of a level beam of 3 deg over a flat horizon in clear air [K], by frequency [GHz]: the
 * reference atmosphere of P.835 seen through P.676, over ground of 288 K and emissivity 0.95. Evaluated from this
 * library's own `levelBeamTemperature`, which takes too long for a default.
 */
const beamGHz = [3.4, 5.76, 8, 10.368, 12, 14, 16, 18, 20, 21, 22.2, 24.048, 26, 28, 30, 34, 40, 47.088, 50];
const beamK = [
  173.5, 176.9, 181.5, 188.3, 194.4, 204.5, 218.9, 240.4, 267.5, 277.6, 282.6, 279.3, 270.6, 264.4, 262.6,
  266.3, 276.8, 285.4, 286.6,
];

/**
 * Default for a level beam: the usual 200 K, or what wet air adds to a flat horizon where that is more (near and
 * above 20 GHz). The spread narrows as the air closes the view, for ground and sky are then equally warm.
 *
 * Source: common practice, no source, below some 13 GHz; P.676-13, P.835-6 and P.618-14 section 3 above
 *
 * @param frequencyGHz  [GHz], above 0; the table's ends are held beyond it
 */
export function levelBeamDefault(frequencyGHz: number): { temperatureK: number; sigmaK: number } {
  requirePositive("frequencyGHz", frequencyGHz);
  const temperatureK = Math.max(levelBeam.temperatureK, interpolateLinear(beamGHz, beamK, frequencyGHz));
  const open = (filledBeamK - temperatureK) / (filledBeamK - levelBeam.temperatureK);
  return { temperatureK, sigmaK: Math.max(LEAST_SIGMA_K, levelBeam.sigmaK * open) };
}

/** Air and ground differ from the reference by at least this much [K]: common practice, no source. */
const LEAST_SIGMA_K = 10;

/** A beam filled by hills, trees, buildings or heavy rain; the cautious choice [K] (common practice, no source). */
export const filledBeamK = 290;

/** Temperature at which rain and wet air absorb, where that of the ground is unknown [K] (P.618-14 section 3). */
export const MEDIUM_K = 275;

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
