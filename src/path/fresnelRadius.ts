import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import { wavelengthM } from "../numeric/constants.ts";

/**
 * Radius of the first Fresnel zone at a point of the path, sqrt(lambda d1 d2 / (d1 + d2)).
 *
 * Source: Rec. ITU-R P.530-17 section 2.2.1, equation 3, without the rounding of its factor to 17.3
 *
 * @param frequencyGHz  above 0
 * @param d1Km          from one end to the point [km], at least 0
 * @param d2Km          from the point to the other end [km], at least 0
 * @throws RangeError where both distances are 0
 */
export function fresnelRadius({
  frequencyGHz,
  d1Km,
  d2Km,
}: {
  frequencyGHz: number;
  d1Km: number;
  d2Km: number;
}): { radiusM: number } {
  requirePositive("frequencyGHz", frequencyGHz);
  requireNotNegative("d1Km", d1Km);
  requireNotNegative("d2Km", d2Km);
  requirePositive("d1Km + d2Km", d1Km + d2Km);
  return { radiusM: Math.sqrt((wavelengthM(frequencyGHz) * d1Km * d2Km * 1000) / (d1Km + d2Km)) };
}
