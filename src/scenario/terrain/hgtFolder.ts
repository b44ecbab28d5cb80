import { readdirSync, readFileSync, statSync } from "node:fs";
import { basename, join } from "node:path";
import { TerrainError, unreadable } from "./faults.ts";
import { degreesEast } from "./grid.ts";
import { gridSource } from "./gridSource.ts";
import { readTile, sideOf, stepOf, tileName } from "./hgtTile.ts";
import type { ElevationSource } from "./types.ts";

/** Tiles kept in memory: at 1 arc-second each takes 26 MB, 156 MB together; at 3 arc-seconds a ninth of that. */
const MOST_TILES = 6;

/** N46E007.hgt, n46e007.hgt.zip, N46E007.SRTMGL1.hgt.zip */
const tileFile = /^([NS]\d{2}[EW]\d{3})(?:\.[A-Z0-9]+)?\.hgt(\.zip)?$/i;

/**
 * Elevation from a folder of SRTM tiles, plain or zipped, or from a single tile.
 *
 * The folder is listed once; a tile is read when a height in it is first asked for. Memory is bounded: six tiles,
 * 156 MB at 1 arc-second, the one longest unused given up first, and while a zipped tile is read its own 26 MB twice.
 *
 * @param path  of the folder or tile
 * @param name  as the user named it
 * @throws TerrainError on a folder that cannot be read or holds no tile, and on a tile that is not named as one
 */
export function hgtSource(path: string, name: string): ElevationSource {
  const files = /\.hgt(\.zip)?$/i.test(path) ? oneTile(path, name) : tilesIn(path, name);
  return gridSource({
    name,
    stepM: finestStep([...files.values()]),
    mostGrids: MOST_TILES,
    keyAt: (latitude, longitude) =>
      (Math.floor(latitude) + 90) * 360 + Math.floor(degreesEast(-180, longitude)),
    nameOf: (key) => tileName(...cornerOf(key)),
    read: async (key) => {
      const corner = cornerOf(key);
      const file = files.get(tileName(...corner));
      return file === undefined ? undefined : readTile(await bytesOf(file), basename(file), ...corner);
    },
  });
}

/** Latitude and longitude of the south-west corner of a tile [deg]. */
function cornerOf(key: number): [south: number, west: number] {
  return [Math.floor(key / 360) - 90, (key % 360) - 180];
}

function tileOf(path: string): string | undefined {
  return tileFile.exec(basename(path))?.[1]?.toUpperCase();
}

function oneTile(path: string, name: string): Map<string, string> {
  const tile = tileOf(path);
  if (tile !== undefined) return new Map([[tile, path]]);
  const message = "is not named by its south-west corner, expected a name such as N53W004.hgt";
  throw new TerrainError(name, "bad_tile_name", message);
}

/** Files of tiles by the tile's name; a plain one goes before a zipped one. */
function tilesIn(folder: string, name: string): Map<string, string> {
  const files = new Map<string, string>();
  try {
    const zippedFirst = (file: string) => (/\.zip$/i.test(file) ? 0 : 1);
    for (const file of readdirSync(folder).sort((a, b) => zippedFirst(a) - zippedFirst(b))) {
      const tile = tileOf(file);
      if (tile !== undefined) files.set(tile, join(folder, file));
    }
  } catch (error) {
    throw unreadable(name, error);
  }
  if (files.size > 0) return files;
  const expected = "expected files such as N53W004.hgt or N53W004.hgt.zip";
  throw new TerrainError(name, "no_tiles", `holds no elevation tiles, ${expected}`);
}

/** The finest step of the plain tiles, by the sizes of their files; that of 1 arc-second where all are zipped. */
function finestStep(files: readonly string[]): number {
  const sides = files.flatMap((file) => sideOf(statSync(file).size) ?? []);
  return stepOf(sides.length === files.length ? Math.max(...sides) : 3601);
}

async function bytesOf(file: string): Promise<Uint8Array> {
  try {
    const bytes = readFileSync(file);
    return /\.zip$/i.test(file) ? await unzipped(bytes, basename(file)) : bytes;
  } catch (error) {
    throw error instanceof TerrainError ? error : unreadable(basename(file), error);
  }
}

/** The tile in an archive; one that claims another size than a tile has is not unpacked at all. */
async function unzipped(bytes: Uint8Array, file: string): Promise<Uint8Array> {
  const { unzipSync } = await import("fflate");
  let other: string | undefined;
  const fits = ({ name, originalSize }: { name: string; originalSize: number }) => {
    if (!/\.hgt$/i.test(name)) return false;
    if (sideOf(originalSize) === undefined)
      other = `${name} of ${originalSize} bytes, which is no size of a tile`;
    return sideOf(originalSize) !== undefined;
  };
  let found: Uint8Array | undefined;
  try {
    found = Object.values(unzipSync(bytes, { filter: fits }))[0];
  } catch (error) {
    throw new TerrainError(file, "bad_zip", `cannot be unpacked (${(error as Error).message})`);
  }
  if (found !== undefined) return found;
  throw new TerrainError(file, "bad_zip", `holds ${other ?? "no .hgt file"}`);
}
