import { requirePositive, requireWithin, type Validity } from "../numeric/check.ts";

export interface WaterInput {
  readonly frequencyGHz: number;
  readonly temperatureK: number;
}

export interface WaterPermittivity {
  readonly real: number;
  readonly imaginary: number;
}

/** The temperatures are those of the measurements and of supercooled droplets (from memory). */
export const waterValidity = {
  frequencyGHz: [0, 1000],
  temperatureK: [253.15, 303.15],
} as const satisfies Validity;

/**
 * Relative permittivity eps' - j eps'' of pure liquid water: two Debye relaxations.
 *
 * Source: ITU-R P.840-9 (08/2023) Annex 1, which has it from Liebe, Hufford and Manabe,
 *         Int. J. Infrared and Millimeter Waves 12 (1991) 659 (citation from memory)
 * Valid:  up to 1000 GHz, -20 to 30 degC; fresh water, not salt spray. Beyond, the formulas are carried on.
 *
 * @param frequencyGHz  [GHz], above 0
 * @param temperatureK  temperature of the water [K], 200 to 400
 * @returns eps' as `real` and eps'' as `imaginary`, both positive
 * @throws RangeError on a non-finite argument, or where water is no liquid at any ordinary pressure
 */
export function waterPermittivity({ frequencyGHz: f, temperatureK }: WaterInput): WaterPermittivity {
  requirePositive("frequencyGHz", f);
  requireWithin("temperatureK", temperatureK, 200, 400);
  const u = 300 / temperatureK - 1;
  const eps0 = 77.66 + 103.3 * u;
  const eps1 = 0.0671 * eps0;
  const eps2 = 3.52;
  const fp = 20.2 - 146 * u + 316 * u * u;
  const fs = 39.8 * fp;
  const principal = (eps0 - eps1) / (1 + (f / fp) ** 2);
  const secondary = (eps1 - eps2) / (1 + (f / fs) ** 2);
  return {
    real: principal + secondary + eps2,
    imaginary: (f / fp) * principal + (f / fs) * secondary,
  };
}
