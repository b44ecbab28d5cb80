import { requireNotNegative, requirePositive, requireWithin, type Validity } from "../numeric/check.ts";
import { RADIANS_PER_DEGREE } from "../numeric/constants.ts";
import { type WaterInput, waterPermittivity } from "./waterPermittivity.ts";

export const cloudValidity = { frequencyGHz: [0, 200] } as const satisfies Validity;

/**
 * Specific attenuation by fog or cloud for each g/m3 of liquid water; multiply by the liquid water content.
 *
 *     Kl = 0.819 f / (eps'' (1 + eta^2)),  eta = (2 + eps') / eps''
 *
 * Source: ITU-R P.840-9 (08/2023) Annex 1. Its typical contents: fog seen through to 300 m 0.05 g/m3,
 *         to 50 m 0.5 g/m3.
 * Valid:  up to 200 GHz, droplets below 0.1 mm (small against the wavelength)
 *
 * @param frequencyGHz  [GHz], above 0
 * @param temperatureK  temperature of the droplets [K], 200 to 400
 * @returns the coefficient [(dB/km)/(g/m3)]
 * @throws RangeError on a non-finite or impossible argument
 */
export function cloudLiquidCoefficient({ frequencyGHz, temperatureK }: WaterInput): {
  dbPerKmPerGm3: number;
} {
  const { real, imaginary } = waterPermittivity({ frequencyGHz, temperatureK });
  const eta = (2 + real) / imaginary;
  return { dbPerKmPerGm3: (0.819 * frequencyGHz) / (imaginary * (1 + eta * eta)) };
}

/** Temperature at which P.840-9 takes the cloud of a slant path [K]. */
const SLANT_CLOUD_K = 273.75;

/**
 * Attenuation by cloud on a path that leaves the atmosphere: A = KL L / sin(elevation).
 *
 * KL is Kl at 273.75 K times a fitted factor of frequency.
 *
 * Source: ITU-R P.840-9 (08/2023) Annex 1
 * Valid:  up to 200 GHz; a level cloud sheet, so not near the horizon
 *
 * @param frequencyGHz     [GHz], above 0
 * @param elevationDeg     [deg], above 0, at most 90
 * @param liquidWaterKgM2  liquid water in a column over the station [kg/m2], at least 0
 * @returns KL [dB/(kg/m2)] and the attenuation [dB]
 * @throws RangeError on a non-finite or impossible argument
 */
export function cloudSlantAttenuation(input: {
  readonly frequencyGHz: number;
  readonly elevationDeg: number;
  readonly liquidWaterKgM2: number;
}): { dbPerKgM2: number; attenuationDb: number } {
  const { frequencyGHz: f, elevationDeg, liquidWaterKgM2 } = input;
  requirePositive("elevationDeg", elevationDeg);
  requireWithin("elevationDeg", elevationDeg, 0, 90);
  requireNotNegative("liquidWaterKgM2", liquidWaterKgM2);
  const { dbPerKmPerGm3 } = cloudLiquidCoefficient({ frequencyGHz: f, temperatureK: SLANT_CLOUD_K });
  const fit =
    0.1522 * Math.exp(-((f + 23.9589) ** 2) / 3.2991e3) +
    11.51 * Math.exp(-((f - 219.2096) ** 2) / 2.7595e6) -
    10.4912;
  const dbPerKgM2 = dbPerKmPerGm3 * fit;
  return {
    dbPerKgM2,
    attenuationDb: (dbPerKgM2 * liquidWaterKgM2) / Math.sin(elevationDeg * RADIANS_PER_DEGREE),
  };
}
