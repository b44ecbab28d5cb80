import { csvFormatRows } from "d3-dsv";
import type { PathStudy } from "../study/pathStudy.ts";

/** Everything of a path as JSON. */
export function pathJson(study: PathStudy): string {
  return `${JSON.stringify(study, null, 2)}\n`;
}

/** The profile with its ray as one flat table, a row a point. */
export function pathCsv({ points }: PathStudy): string {
  const head = [
    ...["distance_km", "ground_m", "cover_m", "earth_bulge_m", "ray_m", "fresnel_radius_m"],
    ...["clearance_m", "clearance_low_k_m"],
  ];
  const rows = points.map((point) => [
    ...[point.distanceKm, point.groundM, point.coverM, point.bulgeM, point.rayM, point.fresnelM],
    ...[point.clearanceM, point.clearanceLowM],
  ]);
  return `${csvFormatRows([head, ...rows.map((row) => row.map(String))])}\n`;
}
