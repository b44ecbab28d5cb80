import { requireFinite, requireNotNegative } from "../numeric/check.ts";
import { powerToDb } from "../numeric/decibels.ts";
import { integrate } from "../numeric/quadrature.ts";
import { rimAngleRad } from "./feedEfficiency.ts";

/**
 * Loss of a prime-focus dish whose feed stands before or behind the focus, on the axis.
 *
 *     phase error 2 pi delta (1 - cos t),  weight g = cos^(n/2) t tan(t/2)
 *     efficiency = |int g e^(j phase) dt|^2 / (int g dt)^2
 *
 * Source: aperture integral by geometrical optics, weights as C. A. Balanis, Antenna Theory, section 15.4.1
 * Valid:  displacement small against the focal length, up to about one wavelength
 *
 * @param exponent           n of the feed's power pattern cos^n, at least 0
 * @param focalRatio         focal length over diameter, above 0.25
 * @param defocusWavelengths displacement of the phase centre, either sign [wavelengths]
 */
export function defocus({
  exponent: n,
  focalRatio,
  defocusWavelengths,
}: {
  exponent: number;
  focalRatio: number;
  defocusWavelengths: number;
}): { phaseEfficiency: number; lossDb: number } {
  requireNotNegative("exponent", n);
  requireFinite("defocusWavelengths", defocusWavelengths);
  const rim = rimAngleRad(focalRatio);
  const sum = (part: (phase: number) => number) =>
    integrate(
      (t) =>
        Math.cos(t) ** (n / 2) * Math.tan(t / 2) * part(2 * Math.PI * defocusWavelengths * (1 - Math.cos(t))),
      0,
      rim,
      64,
    );
  const phaseEfficiency = (sum(Math.cos) ** 2 + sum(Math.sin) ** 2) / sum(() => 1) ** 2;
  return { phaseEfficiency, lossDb: powerToDb(1 / phaseEfficiency) };
}
