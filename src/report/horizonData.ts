import { csvFormatRows } from "d3-dsv";
import type { HorizonRound } from "../study/horizonRound.ts";

/** The horizon with all that led to it, as JSON. */
export function horizonJson(horizon: HorizonRound): string {
  return `${JSON.stringify(horizon, null, 2)}\n`;
}

/** The horizon as one flat table: a row for each azimuth; cells are empty where no height is known. */
export function horizonCsv({ rows }: HorizonRound): string {
  const head = ["azimuth_deg", "elevation_deg", "distance_km", "ground_m", "at_reach", "unknown_km"];
  const lines = rows.map((row) => [
    String(row.azimuthDeg),
    row.elevationDeg?.toFixed(4) ?? "",
    row.distanceKm?.toFixed(3) ?? "",
    row.groundM?.toFixed(1) ?? "",
    row.atReach ? "yes" : "no",
    row.unknownKm.toFixed(3),
  ]);
  return `${csvFormatRows([head, ...lines])}\n`;
}
