import { geodesicPath, headingUncertaintyDeg } from "../path/geodesic.ts";
import { effectiveRadiusKm, lineOfSightLimit, takeOffAngle } from "../path/horizon.ts";
import type { Scenario, Site } from "../scenario/types.ts";
import type { PathGeometry, Warning } from "./types.ts";

/** Usual bending of the ray near the ground. */
const MEDIAN_K = 4 / 3;

const DEG_PER_MRAD = 180 / Math.PI / 1000;

/** Length, headings and horizons of the path between the two sites. */
export function geometryOf({ path: { from, to } }: Scenario): PathGeometry {
  const { distanceKm, headingDeg, backHeadingDeg } = geodesicPath(from, to);
  const radius = effectiveRadiusKm(MEDIAN_K);
  const radiusKm = from.positionErrorKm + to.positionErrorKm;
  const antenna = ({ groundM, heightM }: Site) => groundM + heightM;
  const elevation = (own: Site, other: Site) =>
    DEG_PER_MRAD *
    takeOffAngle({
      fromHeightM: antenna(own),
      toHeightM: antenna(other),
      distanceKm,
      effectiveRadiusKm: radius,
    }).angleMrad;
  return {
    distanceKm,
    headingDeg,
    backHeadingDeg,
    headingErrorDeg: radiusKm > 0 ? headingUncertaintyDeg({ halfDiagonalKm: radiusKm, distanceKm }) : 0,
    elevationDeg: elevation(from, to),
    backElevationDeg: elevation(to, from),
    radioHorizonKm: lineOfSightLimit({
      height1M: Math.max(0, antenna(from)),
      height2M: Math.max(0, antenna(to)),
      effectiveRadiusKm: radius,
    }).distanceKm,
    from,
    to,
  };
}

/** Doubts about the path itself. */
export function geometryWarnings(path: PathGeometry, terrainGiven: boolean): Warning[] {
  const warnings: Warning[] = [];
  const { distanceKm, radioHorizonKm } = path;
  if (distanceKm > radioHorizonKm) {
    warnings.push({
      code: "beyond_horizon",
      message:
        `the path of ${distanceKm.toFixed(1)} km reaches past the smooth-Earth horizon of ` +
        `${radioHorizonKm.toFixed(1)} km; the report takes line of sight, which it has not`,
      where: "path",
    });
  }
  if (distanceKm > 1500) {
    warnings.push({
      code: "very_long_path",
      message: `${distanceKm.toFixed(0)} km: check the sign of the longitudes (E and W letters are read)`,
      where: "path",
    });
  }
  if (terrainGiven) {
    warnings.push({
      code: "terrain_not_used",
      message: "the terrain file is not read by this version; nothing stands in the way in this report",
      where: "path.terrain",
    });
  }
  return warnings;
}
