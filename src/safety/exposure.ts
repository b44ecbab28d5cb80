import { requireFinite, requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { dbToPower } from "../numeric/decibels.ts";
import { type ExposureLimit, exposureLimits } from "./exposureLimits.ts";

/** Wave impedance of free space [ohm]. */
const FREE_SPACE_OHM = 376.730313668;

/**
 * Largest published near-field density of a dish, as a multiple of P / D^2.
 *
 * OET 65 has 16 eta / pi, 2.8 for an efficiency of 0.55, and the two do not agree.
 *
 * Source: P. DeNeef, QEX, January/February 2022, after G. Kizer; fitted to its table of largest powers
 */
const STRICTEST_NEAR_FIELD = 9.45;

export interface ExposureInput {
  /** Average power at the antenna [W], at least 0: see `averagePower`. */
  readonly powerW: number;
  readonly diameterM: number;
  readonly frequencyGHz: number;
  /** Aperture efficiency, 0 to 1. */
  readonly efficiency: number;
  /** Where to give the density, in front of the dish on its axis [m]. */
  readonly distanceM?: number | undefined;
}

export interface LimitDistance extends ExposureLimit {
  /** Distance on the axis beyond which the density is below the limit by OET 65; 0 where it is so everywhere. */
  readonly distanceM: number;
  /**
   * The same, with the far higher near-field density that other authors publish: where that one exceeds the
   * limit the entire way to the far field counts as above it.
   */
  readonly cautiousDistanceM: number;
}

export interface Exposure {
  /** End of the near field, where the density is taken as constant [m]. */
  readonly nearFieldLimitM: number;
  /** Start of the far field [m]. */
  readonly farFieldStartM: number;
  /** Largest density at the face of the dish [W/m2]. */
  readonly surfaceWPerM2: number;
  /** Largest density on the axis in the near field, by OET 65 [W/m2]. */
  readonly nearFieldWPerM2: number;
  /** The same by the strictest published bound [W/m2]; the two disagree by a factor of about 3.4. */
  readonly strictestNearFieldWPerM2: number;
  /** Density on the axis at `distanceM` by OET 65 [W/m2], where that was asked. */
  readonly atDistanceWPerM2?: number;
  /** Electric field strength that belongs to it in a plane wave [V/m]. */
  readonly atDistanceVPerM?: number;
  readonly limits: readonly LimitDistance[];
}

/**
 * Power density on the axis of a dish, and how far in front of it published limits are exceeded.
 *
 *     surface 4 P / A          near field S_nf = 16 eta P / (pi D^2), out to D^2 / (4 lambda)
 *     between S_nf R_nf / R    far field P G / (4 pi R^2), from 0.6 D^2 / lambda
 *
 * The far field starts 2.8 % above the end of the stretch between; a limit that falls into that step takes
 * the larger distance. All of it is an estimate on the axis of the dish in the open: the mouth of the feed
 * (`surfaceDensity`), the feed by itself (`exposureByGain`) and reflections come on top.
 *
 * Source: FCC OET Bulletin 65, Edition 97-01, equations 11 to 18 (equation numbers from memory)
 * Valid:  dishes of several wavelengths, on the axis, in front of the aperture
 *
 * @throws RangeError on a non-finite or impossible argument
 */
export function exposure({
  powerW,
  diameterM,
  frequencyGHz,
  efficiency,
  distanceM,
}: ExposureInput): Exposure {
  requireNotNegative("powerW", powerW);
  requirePositive("diameterM", diameterM);
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("efficiency", efficiency);
  requireWithin("efficiency", efficiency, 0, 1);

  const wavelength = wavelengthM(frequencyGHz);
  const nearFieldLimitM = diameterM ** 2 / (4 * wavelength);
  const farFieldStartM = (0.6 * diameterM ** 2) / wavelength;
  const nearFieldWPerM2 = (nearFieldFactor(efficiency) * powerW) / diameterM ** 2;
  const strictestNearFieldWPerM2 = Math.max(
    nearFieldWPerM2,
    (STRICTEST_NEAR_FIELD * powerW) / diameterM ** 2,
  );
  const eirpW = powerW * efficiency * ((Math.PI * diameterM) / wavelength) ** 2;

  const densityAt = (distance: number) => {
    if (distance >= farFieldStartM) return farFieldDensity(eirpW, distance);
    return nearFieldWPerM2 * Math.min(1, nearFieldLimitM / distance);
  };
  const distanceFor = (limit: number) => {
    if (nearFieldWPerM2 <= limit) return 0;
    const farM = Math.sqrt(eirpW / (4 * Math.PI * limit));
    return farM >= farFieldStartM ? farM : (nearFieldWPerM2 * nearFieldLimitM) / limit;
  };

  return {
    nearFieldLimitM,
    farFieldStartM,
    surfaceWPerM2: surfaceDensity({ powerW, areaM2: (Math.PI * diameterM ** 2) / 4 }).surfaceWPerM2,
    nearFieldWPerM2,
    strictestNearFieldWPerM2,
    ...(distanceM === undefined ? {} : atDistance(distanceM, densityAt)),
    limits: exposureLimits({ frequencyGHz }).map((limit) => {
      const distance = distanceFor(limit.limitWPerM2);
      const reachesFarField = strictestNearFieldWPerM2 > limit.limitWPerM2;
      return {
        ...limit,
        distanceM: distance,
        cautiousDistanceM: reachesFarField ? Math.max(distance, farFieldStartM) : distance,
      };
    }),
  };
}

/**
 * Largest average power at which the near field of a dish stays within a limit.
 *
 * Source: OET 65, equation 13, and the strictest published bound (P. DeNeef, QEX, January/February 2022)
 *
 * @returns both powers [W]; the lower one is the one to heed
 */
export function nearFieldPowerLimit({
  limitWPerM2,
  diameterM,
  efficiency,
}: {
  limitWPerM2: number;
  diameterM: number;
  efficiency: number;
}): { oet65W: number; strictestW: number } {
  requirePositive("limitWPerM2", limitWPerM2);
  requirePositive("diameterM", diameterM);
  requirePositive("efficiency", efficiency);
  requireWithin("efficiency", efficiency, 0, 1);
  const scale = limitWPerM2 * diameterM ** 2;
  const factor = nearFieldFactor(efficiency);
  return { oet65W: scale / factor, strictestW: scale / Math.max(factor, STRICTEST_NEAR_FIELD) };
}

/**
 * Power density in the far field on the axis of an antenna of known gain, a horn or a feed by itself.
 *
 *     S = m P G / (4 pi R^2)
 *
 * Nearer than 2 D^2 / lambda it overstates; at the mouth itself `surfaceDensity` bounds it.
 *
 * Source: FCC OET Bulletin 65, Edition 97-01, equation 18 (number from memory)
 *
 * @param powerW            average power [W], at least 0
 * @param gainDbi           towards the place looked at
 * @param distanceM         above 0
 * @param reflectionFactor  m: 1 (the default) in the open, 2.56 over ground by the EPA, 4 over a perfect
 *                          reflector
 */
export function exposureByGain({
  powerW,
  gainDbi,
  distanceM,
  reflectionFactor = 1,
}: {
  powerW: number;
  gainDbi: number;
  distanceM: number;
  reflectionFactor?: number;
}): { eirpW: number; atDistanceWPerM2: number } {
  requireNotNegative("powerW", powerW);
  requireFinite("gainDbi", gainDbi);
  requirePositive("distanceM", distanceM);
  requirePositive("reflectionFactor", reflectionFactor);
  const eirpW = powerW * dbToPower(gainDbi);
  return { eirpW, atDistanceWPerM2: reflectionFactor * farFieldDensity(eirpW, distanceM) };
}

/**
 * Largest power density at the face of an aperture, 4 P / A: a dish, or the open mouth of a feed.
 *
 * Source: FCC OET Bulletin 65, Edition 97-01, equation 11 (number from memory)
 */
export function surfaceDensity({ powerW, areaM2 }: { powerW: number; areaM2: number }): {
  surfaceWPerM2: number;
} {
  requireNotNegative("powerW", powerW);
  requirePositive("areaM2", areaM2);
  return { surfaceWPerM2: (4 * powerW) / areaM2 };
}

/** Electric field strength [V/m] of a plane wave of a power density [W/m2]. */
export function fieldStrengthVPerM(densityWPerM2: number): number {
  requireNotNegative("densityWPerM2", densityWPerM2);
  return Math.sqrt(densityWPerM2 * FREE_SPACE_OHM);
}

function atDistance(distanceM: number, densityAt: (distance: number) => number) {
  requirePositive("distanceM", distanceM);
  const density = densityAt(distanceM);
  return { atDistanceWPerM2: density, atDistanceVPerM: fieldStrengthVPerM(density) };
}

function farFieldDensity(eirpW: number, distanceM: number): number {
  return eirpW / (4 * Math.PI * distanceM ** 2);
}

/** Near-field density of OET 65 as a multiple of P / D^2. */
function nearFieldFactor(efficiency: number): number {
  return (16 * efficiency) / Math.PI;
}
