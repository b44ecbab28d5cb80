import { requireFinite, requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { RADIANS_PER_DEGREE } from "../numeric/constants.ts";
import { powerToDb } from "../numeric/decibels.ts";
import { integrate } from "../numeric/quadrature.ts";

export interface FeedEfficiency {
  /** Share of the feed's power that meets the dish. */
  readonly spillover: number;
  /** Gain of the tapered aperture over that of an evenly lit one. */
  readonly taper: number;
  /** Spillover times taper. */
  readonly efficiency: number;
  /** How far the feed's pattern is down towards the rim [dB], positive. */
  readonly edgeTaperDb: number;
  /** How far the field at the rim is down, longer way to the rim included [dB], positive. */
  readonly edgeTotalDb: number;
  /** Angle between axis and rim, seen from the feed [deg]. */
  readonly subtendedHalfAngleDeg: number;
}

/**
 * Spillover and taper of a prime-focus dish whose feed has the power pattern 2(n+1) cos^n.
 *
 *     theta0 = 2 atan(1 / (4 f/D))
 *     spillover = 1 - cos^(n+1) theta0
 *     spillover taper = cot^2(theta0/2) | int_0^theta0 sqrt(2(n+1) cos^n t) tan(t/2) dt |^2
 *
 * Source: C. A. Balanis, Antenna Theory, 3rd ed., section 15.4.1
 * Valid:  feed that radiates into the forward half space alone; phase, blockage, surface and ohmic loss are
 *         left out, and lower a small dish from 0.8 to 0.50-0.60 (common practice, no source)
 *
 * @param exponent    n of the power pattern, at least 0
 * @param focalRatio  focal length over diameter, above 0.25: at 0.25 the rim stands 90 deg off the axis
 * @throws RangeError on a non-finite or impossible argument
 */
export function feedEfficiency({
  exponent: n,
  focalRatio,
}: {
  exponent: number;
  focalRatio: number;
}): FeedEfficiency {
  requireNotNegative("exponent", n);
  const rim = rimAngleRad(focalRatio);
  const spillover = 1 - Math.cos(rim) ** (n + 1);
  const field = integrate((t) => Math.cos(t) ** (n / 2) * Math.tan(t / 2), 0, rim, 64);
  const efficiency = (2 * (n + 1) * field ** 2) / Math.tan(rim / 2) ** 2;
  const edgeTaperDb = n * rimTaperDb(rim);
  return {
    spillover,
    taper: efficiency / spillover,
    efficiency,
    edgeTaperDb,
    edgeTotalDb: edgeTaperDb - 4 * powerToDb(Math.cos(rim / 2)),
    subtendedHalfAngleDeg: rim / RADIANS_PER_DEGREE,
  };
}

/**
 * Exponent n of a feed from how far its pattern is down towards the rim of a dish.
 *
 * @param edgeTaperDb  of the feed's pattern alone [dB], positive downwards, at least 0
 * @param focalRatio   above 0.25
 */
export function feedExponentFromEdgeTaper({
  edgeTaperDb,
  focalRatio,
}: {
  edgeTaperDb: number;
  focalRatio: number;
}): { exponent: number } {
  requireNotNegative("edgeTaperDb", edgeTaperDb);
  return { exponent: edgeTaperDb / rimTaperDb(rimAngleRad(focalRatio)) };
}

/**
 * Exponent n of a feed from the full width of its pattern 10 dB down.
 *
 * @param tenDbFullWidthDeg  above 0, below 180
 */
export function feedExponentFromBeamwidth({ tenDbFullWidthDeg }: { tenDbFullWidthDeg: number }): {
  exponent: number;
} {
  requirePositive("tenDbFullWidthDeg", tenDbFullWidthDeg);
  requireWithin("tenDbFullWidthDeg", tenDbFullWidthDeg, 0, 179.999);
  return { exponent: 10 / rimTaperDb((tenDbFullWidthDeg / 2) * RADIANS_PER_DEGREE) };
}

/** Angle [rad] between axis and rim, seen from the focus of a paraboloid. */
export function rimAngleRad(focalRatio: number): number {
  requireFinite("focalRatio", focalRatio);
  if (focalRatio <= 0.25) throw new RangeError(`focalRatio must be above 0.25, got ${focalRatio}`);
  return 2 * Math.atan(1 / (4 * focalRatio));
}

/** How far a pattern of exponent 1 is down at an angle off its axis [dB]. */
function rimTaperDb(angleRad: number): number {
  return -powerToDb(Math.cos(angleRad));
}
