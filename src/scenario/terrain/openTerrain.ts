import { statSync } from "node:fs";
import { fromFolder } from "../yamlFile.ts";
import { faultOf, TerrainError, unreadable } from "./faults.ts";
import type { ElevationSource, OpenedTerrain, Terrain } from "./types.ts";

/**
 * Opens terrain, whatever kind it is: a folder of SRTM tiles or one tile (.hgt, .hgt.zip), a GeoTIFF (.tif, .tiff),
 * otherwise a profile as CSV.
 *
 * What reads each kind is loaded only for that kind. Tiles and blocks are read when a height in them is needed.
 *
 * @param path        as the user named it
 * @param baseFolder  where a relative path starts: the folder of the scenario's file
 * @returns the terrain, or its faults; it never rejects for a bad file
 */
export async function openTerrain(path: string, baseFolder: string): Promise<OpenedTerrain> {
  const full = fromFolder(baseFolder, path);
  try {
    if (isFolder(full, path) || /\.hgt(\.zip)?$/i.test(path)) {
      const { hgtSource } = await import("./hgtFolder.ts");
      return fromElevation("tiles", hgtSource(full, path));
    }
    if (/\.tiff?$/i.test(path)) {
      const { geotiffSource } = await import("./geotiffFile.ts");
      return fromElevation("geotiff", await geotiffSource(full, path));
    }
    const { openProfile } = await import("./openProfile.ts");
    return openProfile(full, path);
  } catch (error) {
    return { ok: false, faults: [faultOf(error)] };
  }
}

function isFolder(full: string, name: string): boolean {
  let status: ReturnType<typeof statSync>;
  try {
    status = statSync(full);
  } catch (error) {
    throw unreadable(name, error);
  }
  if (status!.isDirectory() || status!.isFile()) return status!.isDirectory();
  throw new TerrainError(name, "not_a_file", "is neither a file nor a folder");
}

function fromElevation(kind: Terrain["kind"], elevation: ElevationSource): Terrain {
  return {
    ok: true,
    kind,
    name: elevation.name,
    elevation,
    profileBetween: async (from, to, sampling = {}) => {
      const { sampleProfile } = await import("./sampleProfile.ts");
      return sampleProfile({ from, to, source: elevation, ...sampling });
    },
  };
}
