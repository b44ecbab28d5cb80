import { requireNotNegative, requirePositive, requireWithin, type Validity } from "../numeric/check.ts";

/** The condensed water that the vapour is in balance with. */
export type Phase = "water" | "ice";

/** Temperature limits of P.453-14, from memory. */
export const saturationValidity = {
  water: { temperatureC: [-40, 50] },
  ice: { temperatureC: [-80, 0] },
} as const satisfies Record<Phase, Validity>;

/** P.453-14 Annex 1: coefficients of equation (9), and of the enhancement factor, equation (10). */
const saturation = {
  water: { a: 6.1121, b: 18.678, c: 257.14, d: 234.5, ef0: 7.2, efP: 0.032, efPt: 5.9e-6 },
  ice: { a: 6.1115, b: 23.036, c: 279.82, d: 333.7, ef0: 2.2, efP: 0.0383, efPt: 6.4e-6 },
} as const satisfies Record<Phase, object>;

export interface SaturationInput {
  readonly temperatureC: number;
  readonly pressureHPa: number;
  readonly phase?: Phase;
}

/**
 * Pressure of water vapour in balance with water or ice, in air.
 *
 *     es = EF a exp((b - t/d) t / (t + c))
 *
 * Source: ITU-R P.453-14 (08/2019) Annex 1, equations (9) and (10)
 * Valid:  water -40 to 50 degC, ice -80 to 0 degC (limits from memory); beyond, the formula is carried on
 *
 * @param temperatureC  [degC], -100 to 100
 * @param pressureHPa   total air pressure [hPa], at least 0; it moves the result by half a percent at most
 * @param phase         "water" (default, the habit of hygrometers even in frost, from memory) or "ice"
 * @returns saturation pressure [hPa]
 * @throws RangeError on a non-finite or impossible argument
 */
export function saturationPressure(input: SaturationInput): { saturationPressureHPa: number } {
  const { temperatureC: t, pressureHPa, phase = "water" } = input;
  requireWithin("temperatureC", t, -100, 100);
  requireNotNegative("pressureHPa", pressureHPa);
  const { a, b, c, d, ef0, efP, efPt } = saturation[phase];
  const enhancement = 1 + 1e-4 * (ef0 + pressureHPa * (efP + efPt * t * t));
  return { saturationPressureHPa: enhancement * a * Math.exp(((b - t / d) * t) / (t + c)) };
}

/**
 * Vapour pressure from relative humidity: e = H es / 100.
 *
 * Source: ITU-R P.453-14 (08/2019) Annex 1, equation (8)
 * Valid:  as `saturationPressure`
 *
 * @param relativeHumidityPercent  [%], 0 to 100
 * @param temperatureC             air temperature [degC], -100 to 100
 * @param pressureHPa              total air pressure [hPa], at least 0
 * @param phase                    what the humidity refers to, "water" (default) or "ice"
 * @returns vapour pressure [hPa]
 * @throws RangeError on a non-finite or impossible argument
 */
export function vapourPressureFromHumidity(
  input: SaturationInput & { readonly relativeHumidityPercent: number },
): { vapourPressureHPa: number } {
  requireWithin("relativeHumidityPercent", input.relativeHumidityPercent, 0, 100);
  const { saturationPressureHPa } = saturationPressure(input);
  return { vapourPressureHPa: (input.relativeHumidityPercent / 100) * saturationPressureHPa };
}

/**
 * Vapour pressure from the dew point, at which the vapour would just saturate over water.
 *
 * Source: definition of the dew point with ITU-R P.453-14 (08/2019) Annex 1, equation (9)
 * Valid:  as `saturationPressure` over water
 *
 * @param dewPointC    [degC], -100 to 100
 * @param pressureHPa  total air pressure [hPa], at least 0
 * @returns vapour pressure [hPa]
 * @throws RangeError on a non-finite or impossible argument
 */
export function vapourPressureFromDewPoint({
  dewPointC,
  pressureHPa,
}: {
  readonly dewPointC: number;
  readonly pressureHPa: number;
}): { vapourPressureHPa: number } {
  requireWithin("dewPointC", dewPointC, -100, 100);
  const { saturationPressureHPa } = saturationPressure({ temperatureC: dewPointC, pressureHPa });
  return { vapourPressureHPa: saturationPressureHPa };
}

/** Reciprocal gas constant of water vapour [g K / (m3 hPa)], P.676-13 equation (4). */
const DENSITY_FACTOR = 216.7;

/**
 * Vapour pressure from the mass of vapour in the air: e = rho T / 216.7.
 *
 * Source: ITU-R P.676-13 (08/2022) Annex 1, equation (4)
 *
 * @param vapourDensityGm3  [g/m3], at least 0
 * @param temperatureK      [K], above 0
 * @returns vapour pressure [hPa]
 * @throws RangeError on a non-finite or impossible argument
 */
export function vapourPressureFromDensity({
  vapourDensityGm3,
  temperatureK,
}: {
  readonly vapourDensityGm3: number;
  readonly temperatureK: number;
}): { vapourPressureHPa: number } {
  requireNotNegative("vapourDensityGm3", vapourDensityGm3);
  requirePositive("temperatureK", temperatureK);
  return { vapourPressureHPa: (vapourDensityGm3 * temperatureK) / DENSITY_FACTOR };
}

/**
 * Mass of vapour in the air from its pressure: rho = 216.7 e / T.
 *
 * Source: ITU-R P.676-13 (08/2022) Annex 1, equation (4)
 *
 * @param vapourPressureHPa  [hPa], at least 0
 * @param temperatureK       [K], above 0
 * @returns vapour density [g/m3]
 * @throws RangeError on a non-finite or impossible argument
 */
export function vapourDensity({
  vapourPressureHPa,
  temperatureK,
}: {
  readonly vapourPressureHPa: number;
  readonly temperatureK: number;
}): { vapourDensityGm3: number } {
  requireNotNegative("vapourPressureHPa", vapourPressureHPa);
  requirePositive("temperatureK", temperatureK);
  return { vapourDensityGm3: (DENSITY_FACTOR * vapourPressureHPa) / temperatureK };
}
