import { requireFinite, requireNotNegative, requirePositive } from "../numeric/check.ts";
import { EARTH_RADIUS_KM } from "../numeric/constants.ts";

/**
 * Effective Earth radius [km] for a k-factor; 4/3 in the standard atmosphere.
 *
 * Source: Rec. ITU-R P.452-18, equation 6a
 */
export function effectiveRadiusKm(kFactor: number): number {
  requirePositive("kFactor", kFactor);
  return EARTH_RADIUS_KM * kFactor;
}

/**
 * Distance of the radio horizon over a smooth Earth, sqrt(2 ae h).
 *
 * Source: geometry; ITU-R Handbook practice. 4.12 sqrt(h) km for k = 4/3
 *
 * @param heightM            of the antenna above the surface, at least 0
 * @param effectiveRadiusKm  above 0
 */
export function horizonDistance({ heightM, effectiveRadiusKm: radius }: { heightM: number } & Earth): {
  distanceKm: number;
} {
  requireNotNegative("heightM", heightM);
  requirePositive("effectiveRadiusKm", radius);
  return { distanceKm: Math.sqrt((2 * radius * heightM) / 1000) };
}

/** Longest line of sight over a smooth Earth: the sum of both horizons. */
export function lineOfSightLimit({
  height1M,
  height2M,
  ...earth
}: { height1M: number; height2M: number } & Earth): { distanceKm: number } {
  return {
    distanceKm:
      horizonDistance({ heightM: height1M, ...earth }).distanceKm +
      horizonDistance({ heightM: height2M, ...earth }).distanceKm,
  };
}

/**
 * Height of the Earth's bulge over the chord between two points at sea level, d1 d2 / (2 ae).
 *
 * Source: geometry of a shallow circle
 */
export function earthBulge({
  d1Km,
  d2Km,
  effectiveRadiusKm: radius,
}: { d1Km: number; d2Km: number } & Earth): { bulgeM: number } {
  requireNotNegative("d1Km", d1Km);
  requireNotNegative("d2Km", d2Km);
  requirePositive("effectiveRadiusKm", radius);
  return { bulgeM: (500 * d1Km * d2Km) / radius };
}

/**
 * Height of the straight ray above an obstacle, the Earth's bulge taken off; negative where it is cut.
 *
 * Source: geometry
 *
 * @param height1M   antenna at the start, above sea level [m]
 * @param height2M   antenna at the end, above sea level [m]
 * @param obstacleM  top of the obstacle, above sea level [m]
 */
export function rayClearance({
  d1Km,
  d2Km,
  height1M,
  height2M,
  obstacleM,
  ...earth
}: { d1Km: number; d2Km: number; height1M: number; height2M: number; obstacleM: number } & Earth): {
  clearanceM: number;
} {
  requireFinite("height1M", height1M);
  requireFinite("height2M", height2M);
  requireFinite("obstacleM", obstacleM);
  requirePositive("d1Km + d2Km", d1Km + d2Km);
  const rayM = (height1M * d2Km + height2M * d1Km) / (d1Km + d2Km);
  return { clearanceM: rayM - obstacleM - earthBulge({ d1Km, d2Km, ...earth }).bulgeM };
}

/**
 * Angle above the local horizontal under which an antenna sees a point.
 *
 *     theta = atan((h2 - h1) / d - d / (2 ae))
 *
 * Source: Rec. ITU-R P.452-18, equations 152 and 153
 *
 * @param fromHeightM  antenna above sea level [m]
 * @param toHeightM    point looked at, above sea level [m]
 * @param distanceKm   above 0
 */
export function takeOffAngle({
  fromHeightM,
  toHeightM,
  distanceKm,
  effectiveRadiusKm: radius,
}: { fromHeightM: number; toHeightM: number; distanceKm: number } & Earth): { angleMrad: number } {
  requireFinite("fromHeightM", fromHeightM);
  requireFinite("toHeightM", toHeightM);
  requirePositive("distanceKm", distanceKm);
  requirePositive("effectiveRadiusKm", radius);
  const slope = (toHeightM - fromHeightM) / (1000 * distanceKm) - distanceKm / (2 * radius);
  return { angleMrad: 1000 * Math.atan(slope) };
}

interface Earth {
  readonly effectiveRadiusKm: number;
}
