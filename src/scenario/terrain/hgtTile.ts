import { endianness } from "node:os";
import { HIGHEST_M, LOWEST_M, TerrainError } from "./faults.ts";
import type { Grid } from "./grid.ts";

/** What an SRTM tile holds where the radar saw nothing. */
export const VOID_M = -32768;

/** Samples along one side: 3 and 1 arc-second. */
const SIDES = [1201, 3601];

/** One degree of latitude on the ground; it differs by 1 % from equator to pole, too little for a step [m]. */
export const METRES_PER_DEGREE = 111_195;

/** Samples along one side of a tile by the size of its file; undefined for a size that no tile has. */
export function sideOf(bytes: number): number | undefined {
  return SIDES.find((side) => bytes === 2 * side * side);
}

/** North-south step between samples [m]. */
export function stepOf(side: number): number {
  return METRES_PER_DEGREE / (side - 1);
}

/**
 * Name of the tile that holds a place: its south-west corner, such as N46E007.
 *
 * Source: SRTM data documentation of NASA/USGS (from memory)
 */
export function tileName(latitude: number, longitude: number): string {
  const [south, west] = [Math.floor(latitude), Math.floor(longitude)];
  const degrees = (value: number, digits: number) => String(Math.abs(value)).padStart(digits, "0");
  return `${south < 0 ? "S" : "N"}${degrees(south, 2)}${west < 0 ? "W" : "E"}${degrees(west, 3)}`;
}

/**
 * One SRTM tile from its bytes: big-endian 16-bit heights above the geoid EGM96, the northern row first.
 *
 * @param file   what messages call it
 * @param south  latitude of its southern edge [deg]
 * @param west   longitude of its western edge [deg]
 * @throws TerrainError for a size that no tile has, or a height that no place has
 */
export function readTile(bytes: Uint8Array, file: string, south: number, west: number): Grid {
  const side = sideOf(bytes.length);
  if (side === undefined) {
    const sizes = SIDES.map((one) => `${2 * one * one} (${one} x ${one})`).join(" or ");
    throw new TerrainError(file, "bad_tile_size", `tile of ${bytes.length} bytes, expected ${sizes}`);
  }
  const heightsM = bigEndian(bytes);
  const absurd = heightsM.findIndex(
    (heightM) => heightM !== VOID_M && (heightM < LOWEST_M || heightM > HIGHEST_M),
  );
  if (absurd >= 0) {
    const place = `row ${Math.floor(absurd / side)}, column ${absurd % side}`;
    const expected = `${LOWEST_M} to ${HIGHEST_M} m or ${VOID_M} for unknown`;
    throw new TerrainError(
      file,
      "bad_height",
      `height ${heightsM[absurd]} m at ${place}, expected ${expected}`,
    );
  }
  return {
    heightsM,
    rows: side,
    columns: side,
    north: south + 1,
    west,
    rowsPerDegree: side - 1,
    columnsPerDegree: side - 1,
    voidM: VOID_M,
  };
}

/** Signed 16-bit numbers with the high byte first. */
export function bigEndian(bytes: Uint8Array): Int16Array {
  const copy = Buffer.from(bytes); // a buffer of its own starts at an even offset, and may be turned round
  if (endianness() === "LE") copy.swap16();
  return new Int16Array(copy.buffer, copy.byteOffset, copy.length / 2);
}
