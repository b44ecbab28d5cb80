import { requirePositive, requireWithin, type Validity } from "../numeric/check.ts";
import { ZERO_CELSIUS_K } from "../numeric/constants.ts";

export interface IceInput {
  readonly frequencyGHz: number;
  readonly temperatureC: number;
  /** The fields of snow, without meaning here: one object may be asked of both. */
  readonly dryDensityGcm3?: number | undefined;
  readonly wetnessPercent?: number | undefined;
}

export const iceValidity = {
  frequencyGHz: [0.01, 1000],
  temperatureC: [-40, 0],
} as const satisfies Validity;

/**
 * Relative permittivity eps' - j eps'' of pure fresh-water ice.
 *
 * eps' = 3.1884 + 0.00091 t;  eps'' = A/f + B f.
 *
 * Source: eps' Matzler & Wegmuller 1987, J. Phys. D 20, 1623; eps'' Hufford 1991, Int. J. Infrared Millim.
 *         Waves 12, 677; the same in ITU-R P.527 (all from memory)
 * Valid:  -40 to 0 degC; impurities raise the loss
 *
 * @param frequencyGHz  [GHz], above 0
 * @param temperatureC  [degC], -100 to 0
 * @returns eps' as `real` and eps'' as `imaginary`, both positive
 * @throws RangeError on an argument outside these ranges
 */
export function icePermittivity({ frequencyGHz: f, temperatureC: t }: IceInput): {
  real: number;
  imaginary: number;
} {
  requirePositive("frequencyGHz", f);
  requireWithin("temperatureC", t, -100, 0);
  const h = 300 / (t + ZERO_CELSIUS_K) - 1;
  const a = (0.00504 + 0.0062 * h) * Math.exp(-22.1 * h);
  const b = (1e-4 * (0.502 - 0.131 * h)) / (1 + h) + 0.542e-6 * ((1 + h) / (h + 0.0073)) ** 2;
  return { real: 3.1884 + 0.00091 * t, imaginary: a / f + b * f };
}
