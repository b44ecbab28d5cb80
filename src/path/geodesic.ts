import geographiclib from "geographiclib-geodesic";
import { requireFinite, requirePositive, requireWithin } from "../numeric/check.ts";
import { EARTH_RADIUS_KM, RADIANS_PER_DEGREE } from "../numeric/constants.ts";

const wgs84 = geographiclib.Geodesic.WGS84;

/** A place on the WGS84 ellipsoid, degrees, north and east positive. */
export interface Point {
  readonly latitude: number;
  readonly longitude: number;
}

export interface GeodesicPath {
  /** Length of the shortest line on the ellipsoid [km]. */
  readonly distanceKm: number;
  /** True heading at `from` towards `to` [deg], 0 up to 360. */
  readonly headingDeg: number;
  /** True heading at `to` back towards `from` [deg], 0 up to 360. */
  readonly backHeadingDeg: number;
}

/**
 * Distance and true headings of the shortest line between two places.
 *
 * The back heading is that of the far station, looking here; it differs from `headingDeg` + 180 because
 * meridians converge.
 *
 * Source: C. F. F. Karney, Algorithms for geodesics, J. Geodesy 87, 43-55, 2013, on WGS84
 * Valid:  everywhere; good to some nanometres. Between antipodes one of several shortest lines is given
 *
 * @param from  latitude -90 to 90 deg, any longitude
 * @throws RangeError on a latitude beyond a pole, and on one place given twice: it has no heading
 */
export function geodesicPath(from: Point, to: Point): GeodesicPath {
  requirePoint("from", from);
  requirePoint("to", to);
  const line = wgs84.Inverse(from.latitude, from.longitude, to.latitude, to.longitude);
  const metres = line.s12!;
  if (metres === 0) throw new RangeError("both ends are the same point, so there is no heading");
  return {
    distanceKm: metres / 1000,
    headingDeg: fullCircle(line.azi1!),
    backHeadingDeg: fullCircle(line.azi2! + 180),
  };
}

/**
 * Distance between two places on a sphere [km], for questions that need no better: some thirty times quicker.
 *
 * Source: haversine (from memory) on the sphere of the Recommendations
 * Valid:  within 0.6 % of `geodesicPath`; 0 for one place
 */
export function sphereDistanceKm(from: Point, to: Point): number {
  const [phi1, phi2] = [from.latitude * RADIANS_PER_DEGREE, to.latitude * RADIANS_PER_DEGREE];
  const across = ((to.longitude - from.longitude) * RADIANS_PER_DEGREE) / 2;
  const up = (phi2 - phi1) / 2;
  const haversine = Math.sin(up) ** 2 + Math.cos(phi1) * Math.cos(phi2) * Math.sin(across) ** 2;
  return 2 * EARTH_RADIUS_KM * Math.asin(Math.min(1, Math.sqrt(haversine)));
}

/**
 * Point of the shortest line between two places, at a share of its length.
 *
 * Source: as `geodesicPath`
 *
 * @param share  0 at `from`, 1 at `to`, 0.5 half-way
 */
export function pointAlong({ from, to, share }: { from: Point; to: Point; share: number }): Point {
  return pointsAlong({ from, to, shares: [share] })[0]!;
}

/**
 * Points of the shortest line between two places, at shares of its length: the line is sought once for all of them.
 *
 * Source: as `geodesicPath`
 *
 * @param shares  each 0 at `from`, 1 at `to`
 */
export function pointsAlong({
  from,
  to,
  shares,
}: {
  from: Point;
  to: Point;
  shares: readonly number[];
}): Point[] {
  requirePoint("from", from);
  requirePoint("to", to);
  const line = wgs84.InverseLine(from.latitude, from.longitude, to.latitude, to.longitude);
  return shares.map((share) => {
    requireWithin("share", share, 0, 1);
    const { lat2, lon2 } = line.Position(share * line.s13);
    return { latitude: lat2!, longitude: lon2! };
  });
}

/**
 * Points of the shortest line that leaves a place at a heading.
 *
 * Source: as `geodesicPath`
 *
 * @param headingDeg   true heading at `from` [deg]
 * @param distancesKm  from `from`, any order [km]
 */
export function pointsTowards({
  from,
  headingDeg,
  distancesKm,
}: {
  from: Point;
  headingDeg: number;
  distancesKm: readonly number[];
}): Point[] {
  requirePoint("from", from);
  requireFinite("headingDeg", headingDeg);
  const line = wgs84.DirectLine(from.latitude, from.longitude, headingDeg, 0);
  return distancesKm.map((distanceKm) => {
    const { lat2, lon2 } = line.Position(1000 * distanceKm);
    return { latitude: lat2!, longitude: lon2! };
  });
}

/**
 * Largest error of a heading [deg] when the far station is only known to lie within a circle.
 *
 *     asin(radius / distance); 180 where the circle holds the near station, as any heading may be right
 *
 * Source: tangent from a point to a circle, flat; good to a few per cent below 1000 km
 *
 * @param halfDiagonalKm  radius of the circle: half a locator's diagonal, or the sum of both ends' [km]
 */
export function headingUncertaintyDeg({
  halfDiagonalKm,
  distanceKm,
}: {
  halfDiagonalKm: number;
  distanceKm: number;
}): number {
  requirePositive("halfDiagonalKm", halfDiagonalKm);
  requirePositive("distanceKm", distanceKm);
  if (halfDiagonalKm >= distanceKm) return 180;
  return Math.asin(halfDiagonalKm / distanceKm) / RADIANS_PER_DEGREE;
}

function requirePoint(name: string, { latitude, longitude }: Point): void {
  requireWithin(`${name}.latitude`, latitude, -90, 90);
  requireFinite(`${name}.longitude`, longitude);
}

/** Angle [deg] brought into 0 up to, not including, 360. */
function fullCircle(degrees: number): number {
  const turned = ((degrees % 360) + 360) % 360;
  return turned === 0 ? 0 : turned;
}
