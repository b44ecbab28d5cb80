import { requirePositive, requireWithin, type Validity } from "../numeric/check.ts";
import { icePermittivity } from "./icePermittivity.ts";

export interface SnowInput {
  readonly frequencyGHz: number;
  readonly temperatureC: number;
  readonly dryDensityGcm3: number;
  readonly wetnessPercent: number;
}

/** Of the fit for wet snow; dry snow has the range of ice. */
export const wetSnowValidity = {
  frequencyGHz: [3, 37],
  dryDensityGcm3: [0.09, 0.38],
  wetnessPercent: [1, 12],
} as const satisfies Validity;

const ICE_DENSITY_G_CM3 = 0.9167;

/**
 * Relative permittivity eps' - j eps'' of a layer of snow, dry or melting.
 *
 * Source: dry, Ulaby & Long 2014, Microwave Radar and Radiometric Remote Sensing, section 4-6; wet,
 *         Hallikainen, Ulaby, Abdelrazik 1986, IEEE Trans. AP-34, 1329 (both from memory)
 * Valid:  wet snow 3-37 GHz, 0.09-0.38 g/cm3, 1-12 % of water by volume (densities and wetness from memory); its
 *         coefficients step by some per cent at 15 GHz. The two sources do not meet at 0 % exactly.
 *
 * @param frequencyGHz     [GHz], above 0
 * @param temperatureC     of dry snow [degC], -100 to 0; wet snow is at 0 whatever is given
 * @param dryDensityGcm3   mass of ice by volume [g/cm3], above 0 to 0.9167
 * @param wetnessPercent   liquid water by volume [%], 0 (dry) to 50
 * @returns eps' as `real` and eps'' as `imaginary`, both positive
 * @throws RangeError on an argument outside these ranges
 */
export function snowPermittivity({ frequencyGHz, temperatureC, dryDensityGcm3, wetnessPercent }: SnowInput): {
  real: number;
  imaginary: number;
} {
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("dryDensityGcm3", dryDensityGcm3);
  requireWithin("dryDensityGcm3", dryDensityGcm3, 0, ICE_DENSITY_G_CM3);
  requireWithin("wetnessPercent", wetnessPercent, 0, 50);
  return wetnessPercent > 0
    ? wetSnow(frequencyGHz, dryDensityGcm3, wetnessPercent)
    : drySnow(frequencyGHz, temperatureC, dryDensityGcm3);
}

function drySnow(frequencyGHz: number, temperatureC: number, density: number) {
  const v = density / ICE_DENSITY_G_CM3;
  const ice = icePermittivity({ frequencyGHz, temperatureC });
  return {
    real: v <= 0.45 ? 1 + 1.4667 * v + 1.435 * v ** 3 : (1 + 0.4759 * v) ** 3,
    imaginary: (0.34 * v * ice.imaginary) / (1 - 0.42 * v) ** 2,
  };
}

function wetSnow(f: number, density: number, wetness: number) {
  const low = f < 15;
  const a1 = low ? 1 : 0.78 + 0.03 * f - 5.8e-4 * f * f;
  const a2 = low ? 1 : 0.97 - 0.0039 * f + 3.9e-4 * f * f;
  const b1 = low ? 0 : 0.31 - 0.05 * f + 8.7e-4 * f * f;
  const u = f / 9.07;
  const relaxed = (0.073 * wetness ** 1.31) / (1 + u * u);
  return {
    real: a1 * (1 + 1.83 * density + 0.02 * wetness ** 1.015) + b1 + a1 * relaxed,
    imaginary: a2 * u * relaxed,
  };
}
