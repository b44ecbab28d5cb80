import { type Grid, heightIn } from "./grid.ts";
import type { ElevationSource, Heights, UnknownReason } from "./types.ts";

/** Terrain cut into grids, each read when first needed. */
export interface GridStore {
  /** As the user named it. */
  readonly name: string;
  /** North-south step of its grid [m]. */
  readonly stepM: number;
  /** Number of the grid that holds a place; below 0 where none can. */
  readonly keyAt: (latitude: number, longitude: number) => number;
  /** What a report calls the grid of a key. */
  readonly nameOf: (key: number) => string;
  /** Undefined where there is no such grid. */
  readonly read: (key: number) => Promise<Grid | undefined>;
  /** Grids kept in memory; the one longest unused goes first. */
  readonly mostGrids: number;
}

/** Hands out heights from grids; reads no grid twice while it is among the last `mostGrids` used. */
export function gridSource({ name, stepM, keyAt, nameOf, read, mostGrids }: GridStore): ElevationSource {
  const kept = new Map<number, Grid>();
  const gridOf = async (key: number): Promise<Grid | undefined> => {
    const grid = kept.get(key) ?? (await read(key));
    if (grid === undefined) return undefined;
    // A Map keeps the order of insertion, so the first key is the one longest unused.
    kept.delete(key);
    kept.set(key, grid);
    if (kept.size > mostGrids) kept.delete(kept.keys().next().value!);
    return grid;
  };
  return {
    name,
    stepM,
    heightsAt: async (latitudes, longitudes): Promise<Heights> => {
      const heightsM = new Float64Array(latitudes.length).fill(Number.NaN);
      const unknown = new Map<number, { reason: UnknownReason; source: string }>();
      let at: number | undefined;
      let grid: Grid | undefined;
      for (let i = 0; i < latitudes.length; i++) {
        const key = keyAt(latitudes[i]!, longitudes[i]!);
        if (key !== at) {
          grid = key < 0 ? undefined : await gridOf(key);
          at = key;
        }
        if (grid !== undefined) heightsM[i] = heightIn(grid, latitudes[i]!, longitudes[i]!);
        if (!Number.isNaN(heightsM[i]!)) continue;
        if (key < 0) unknown.set(i, { reason: "outside", source: name });
        else unknown.set(i, { reason: grid === undefined ? "no tile" : "void", source: nameOf(key) });
      }
      return { heightsM, unknown };
    },
  };
}
