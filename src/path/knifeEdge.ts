import { requireFinite, requirePositive } from "../numeric/check.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import { fresnelIntegrals } from "../numeric/fresnelIntegrals.ts";

/**
 * Wavelength [m] as the diffraction models of this folder take it.
 *
 * The validation data of ITU-R Study Group 3 rest on c = 2.998e8 m/s; the exact constant would move a
 * diffraction loss by about 1e-4 dB, so the rounded one is kept for agreement to the last digit.
 */
export function diffractionWavelengthM(frequencyGHz: number): number {
  return 0.2998 / frequencyGHz;
}

/**
 * Diffraction parameter nu of an edge: its height over the straight ray in units of the Fresnel zone.
 *
 * nu = h sqrt(2 (1/d1 + 1/d2) / lambda), with h positive where the edge stands above the ray.
 *
 * Source: ITU-R P.526-15, section 4.1
 *
 * @param heightM  height of the edge over the ray [m], negative when the ray clears it
 * @param d1Km     distance from one end [km], above 0
 * @param d2Km     distance from the other end [km], above 0
 * @throws RangeError on a non-finite argument or one out of range
 */
export function knifeEdgeParameter({
  heightM,
  d1Km,
  d2Km,
  frequencyGHz,
}: {
  readonly heightM: number;
  readonly d1Km: number;
  readonly d2Km: number;
  readonly frequencyGHz: number;
}): number {
  requireFinite("heightM", heightM);
  requirePositive("d1Km", d1Km);
  requirePositive("d2Km", d2Km);
  requirePositive("frequencyGHz", frequencyGHz);
  return heightM * Math.sqrt((0.002 * (d1Km + d2Km)) / (diffractionWavelengthM(frequencyGHz) * d1Km * d2Km));
}

/**
 * Loss of a single knife edge.
 *
 * The closed form J = 6.9 + 20 log(sqrt((nu - 0.1)^2 + 1) + nu - 0.1) holds within 0.13 dB for
 * -0.7 < nu < 15 and is taken as 0 from nu = -0.78 down; the exact form is the Fresnel integral itself and
 * swings about 0 there.
 *
 * Source: ITU-R P.526-15, section 4.1, equations 30 (exact) and 31 (closed form)
 *
 * @param nu     diffraction parameter, positive where the edge blocks the ray
 * @param exact  true: by Fresnel integrals
 * @returns loss [dB] against the unobstructed ray; the exact form may be slightly negative
 * @throws RangeError on a non-finite nu
 */
export function knifeEdgeLoss(nu: number, { exact = false }: { readonly exact?: boolean } = {}): number {
  requireFinite("nu", nu);
  if (exact) {
    const { c, s } = fresnelIntegrals(nu);
    return -amplitudeToDb(Math.hypot(1 - c - s, c - s) / 2);
  }
  if (nu <= -0.78) return 0;
  return 6.9 + amplitudeToDb(Math.sqrt((nu - 0.1) ** 2 + 1) + nu - 0.1);
}
