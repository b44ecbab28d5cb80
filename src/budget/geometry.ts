import { geodesicPath, headingUncertaintyDeg } from "../path/geodesic.ts";
import { effectiveRadiusKm, lineOfSightLimit, takeOffAngle } from "../path/horizon.ts";
import type { Scenario, ScenarioPath, Site } from "../scenario/types.ts";
import { pathSettings } from "./pathSettings.ts";
import type { PathGeometry, Warning } from "./types.ts";

/** A profile's ground may differ from a site's by this [m]: elevation data are no better (common practice, no source). */
const GROUND_DIFFERS_M = 30;

const DEG_PER_MRAD = 180 / Math.PI / 1000;

/** Length, headings and horizons of the path between the two sites. */
export function geometryOf({ path }: Scenario): PathGeometry {
  const { from, to } = path;
  const { distanceKm, headingDeg, backHeadingDeg } = geodesicPath(from, to);
  const radius = effectiveRadiusKm(pathSettings(path).k);
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
export function geometryWarnings(path: PathGeometry, scenarioPath: ScenarioPath): Warning[] {
  const warnings: Warning[] = [];
  const { distanceKm, radioHorizonKm } = path;
  if (distanceKm > radioHorizonKm && scenarioPath.profile === undefined) {
    warnings.push({
      code: "beyond_horizon",
      message:
        `the path of ${distanceKm.toFixed(1)} km reaches past the smooth-Earth horizon of ` +
        `${radioHorizonKm.toFixed(1)} km; a smooth Earth at sea level is taken, no terrain being given`,
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
  return [...warnings, ...terrainWarnings(scenarioPath)];
}

/** Where the terrain has no heights, and where it contradicts the sites. */
function terrainWarnings({ from, to, profile, gaps = [] }: ScenarioPath): Warning[] {
  if (profile === undefined) return [];
  const last = profile.heightsM[profile.heightsM.length - 1]!;
  const ends = [
    { end: "from", siteM: from.groundM, groundM: profile.heightsM[0]! },
    { end: "to", siteM: to.groundM, groundM: last },
  ];
  return [
    ...gaps.map(({ reason, source, fromKm, toKm }) => ({
      code: "terrain_gap",
      message:
        `no height from ${fromKm.toFixed(1)} to ${toKm.toFixed(1)} km (${reason}, ${source}); ` +
        "the ground is taken to run straight over it",
      where: "path.terrain",
    })),
    ...ends
      .filter(({ siteM, groundM }) => Math.abs(siteM - groundM) > GROUND_DIFFERS_M)
      .map(({ end, siteM, groundM }) => ({
        code: "ground_differs",
        message:
          `the terrain has ${Math.round(groundM)} m where the site says ${Math.round(siteM)} m; ` +
          "the antenna stands as high above sea level as the site says",
        where: `path.${end}.ground`,
      })),
  ];
}
