import type { ScenarioPath } from "./types.ts";

/**
 * The path with the ground between its ends read from its terrain, where it names one.
 *
 * @param folder  where relative paths start
 * @returns the path, and what is wrong with the terrain
 */
export async function withTerrain(
  path: ScenarioPath,
  folder: string,
): Promise<{ readonly path: ScenarioPath; readonly messages: readonly string[] }> {
  if (path.terrain === undefined) return { path, messages: [] };
  // Few scenarios name a terrain: what reads it is loaded for those alone.
  const { openTerrain } = await import("./terrain/openTerrain.ts");
  const terrain = await openTerrain(path.terrain, folder);
  const found = terrain.ok ? await terrain.profileBetween(path.from, path.to) : terrain;
  if (found.ok) return { path: { ...path, profile: found.profile, gaps: found.gaps }, messages: [] };
  const messages = found.faults.map(
    ({ file, line, message }) => `${line === undefined ? file : `${file}:${line}`}: ${message}`,
  );
  return { path, messages };
}
