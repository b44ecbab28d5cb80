import { requirePositive } from "../numeric/check.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";

/**
 * Free-space basic transmission loss between isotropic antennas, 20 log(4 pi d / lambda).
 *
 * Source: Rec. ITU-R P.525-4; with the exact speed of light, so 0.0022 dB below its printed 92.45
 * Valid:  in the far field of both antennas
 *
 * @param frequencyGHz  above 0
 * @param distanceKm    above 0
 */
export function freeSpaceLoss({ frequencyGHz, distanceKm }: { frequencyGHz: number; distanceKm: number }): {
  lossDb: number;
} {
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("distanceKm", distanceKm);
  return { lossDb: amplitudeToDb((4 * Math.PI * distanceKm * 1000) / wavelengthM(frequencyGHz)) };
}
