import { requirePositive, type Validity } from "../numeric/check.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";

export const conicalHornValidity = { phaseDeviationWavelengths: [0, 0.5] } as const satisfies Validity;

export interface ConicalHorn {
  readonly directivityDbi: number;
  /** Phase deviation at the rim, d^2 / (8 l) [wavelengths]; 3/8 is the optimum for a length. */
  readonly phaseDeviationWavelengths: number;
  /** Under the gain of an evenly lit aperture without phase error [dB]. */
  readonly lossDb: number;
}

/**
 * Directivity of a smooth conical horn.
 *
 *     D = 20 log(pi d) - L,  L = 0.8 - 1.71 s + 26.25 s^2 - 17.79 s^3 dB,  s = d^2 / (8 l)
 *
 * Source: A. P. King, Proc. IRE 38, 249-251, 1950, as given in C. A. Balanis, Antenna Theory, section 13.5
 * Valid:  s up to 0.5, where the cubic stops being a fit; at s = 0 it leaves the 0.8 dB of the TE11 mode
 *
 * @param diameter  of the aperture [wavelengths], above 0
 * @param length    slant length from apex to rim [wavelengths], above 0
 */
export function conicalHorn({ diameter, length }: { diameter: number; length: number }): ConicalHorn {
  requirePositive("diameter", diameter);
  requirePositive("length", length);
  const s = diameter ** 2 / (8 * length);
  const lossDb = 0.8 - 1.71 * s + 26.25 * s ** 2 - 17.79 * s ** 3;
  return {
    directivityDbi: amplitudeToDb(Math.PI * diameter) - lossDb,
    phaseDeviationWavelengths: s,
    lossDb,
  };
}
