import { requireFinite, requireNotNegative, requirePositive, type Validity } from "../numeric/check.ts";
import { EARTH_RADIUS_KM } from "../numeric/constants.ts";

export interface Refractivity {
  readonly nUnits: number;
  readonly dryUnits: number;
  readonly wetUnits: number;
}

export const refractivityValidity = { frequencyGHz: [0, 100] } as const satisfies Validity;

/**
 * Radio refractivity of the air, N = (n - 1) 1e6, with its dry and wet terms.
 *
 *     N = 77.6 p/T + 72 e/T + 3.75e5 e/T^2
 *
 * Source: ITU-R P.453-14 (08/2019) Annex 1, equations (1) to (6)
 * Valid:  all radio frequencies; error below 0.5 % up to 100 GHz
 *
 * @param dryPressureHPa     pressure of the dry air alone [hPa], at least 0
 * @param vapourPressureHPa  partial pressure of the water vapour [hPa], at least 0
 * @param temperatureK       [K], above 0
 * @returns refractivity and its two terms [N-units]
 * @throws RangeError on a non-finite or impossible argument
 */
export function refractivity({
  dryPressureHPa: p,
  vapourPressureHPa: e,
  temperatureK: t,
}: {
  readonly dryPressureHPa: number;
  readonly vapourPressureHPa: number;
  readonly temperatureK: number;
}): Refractivity {
  requireNotNegative("dryPressureHPa", p);
  requireNotNegative("vapourPressureHPa", e);
  requirePositive("temperatureK", t);
  const dryUnits = (77.6 * p) / t;
  const wetUnits = (72 * e) / t + (3.75e5 * e) / (t * t);
  return { nUnits: dryUnits + wetUnits, dryUnits, wetUnits };
}

/** Curvature of that Earth in N-units/km, 1e6/6371 rounded as P.452 and P.530 do. */
const EARTH_CURVATURE_N_PER_KM = 157;

/**
 * Effective Earth radius over which rays in a linear atmosphere run straight.
 *
 *     k = 157 / (157 + dN/dh)
 *
 * At -157 N/km the ray follows the Earth: k and radius are Infinity. Below, it bends down to the ground; k and
 * radius come out negative, `ducting` is true, and neither may be used as a radius.
 *
 * Source: ITU-R P.452 and P.530, with 1e6/6371 rounded to 157
 *
 * @param gradientNPerKm  change of refractivity with height [N-units/km], about -39 in ordinary weather;
 *                        P.452 states the lapse with the opposite sign
 * @returns k, effective radius [km], and whether the gradient is at or below -157
 * @throws RangeError on a non-finite argument
 */
export function effectiveEarthRadius({ gradientNPerKm }: { readonly gradientNPerKm: number }): {
  k: number;
  radiusKm: number;
  ducting: boolean;
} {
  requireFinite("gradientNPerKm", gradientNPerKm);
  const difference = EARTH_CURVATURE_N_PER_KM + gradientNPerKm;
  const k = EARTH_CURVATURE_N_PER_KM / difference;
  return { k, radiusKm: k * EARTH_RADIUS_KM, ducting: difference <= 0 };
}
