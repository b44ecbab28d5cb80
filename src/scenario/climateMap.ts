import { pointAlong } from "../path/geodesic.ts";
import { MapFault, rainRateOfMap } from "./rainMap.ts";
import type { Climate, Scenario } from "./types.ts";
import { fromFolder } from "./yamlFile.ts";

/**
 * The climate of a scenario, with the rain rate half-way along the path read from its map, where it names one.
 *
 * @param folder  where relative paths start
 * @returns the climate, and what is wrong with the map
 */
export function withRainMap(
  { climate, path: { from, to } }: Scenario,
  folder: string,
): { readonly climate: Climate | undefined; readonly mapMessages: readonly string[] } {
  if (climate?.rain.kind !== "map") return { climate, mapMessages: [] };
  const { latitude, longitude } = pointAlong({ from, to, share: 0.5 });
  try {
    const rainRate001MmPerH = rainRateOfMap(fromFolder(folder, climate.rain.folder), latitude, longitude);
    return { climate: { ...climate, rain: { ...climate.rain, rainRate001MmPerH } }, mapMessages: [] };
  } catch (error) {
    if (error instanceof MapFault) return { climate, mapMessages: [error.message] };
    throw error;
  }
}
