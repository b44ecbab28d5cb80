import { writeFileSync } from "node:fs";
import { join } from "node:path";

/** Writes a tile whose height at a row and column is that of a function, and gives its path. */
export function writeTile(
  folder: string,
  name: string,
  side: number,
  heightM: (row: number, column: number) => number,
): string {
  const file = join(folder, name);
  writeFileSync(file, tileBytes(side, heightM));
  return file;
}

export function tileBytes(side: number, heightM: (row: number, column: number) => number): Buffer {
  const bytes = Buffer.alloc(2 * side * side);
  for (let row = 0; row < side; row++) {
    for (let column = 0; column < side; column++) {
      bytes.writeInt16BE(heightM(row, column), 2 * (row * side + column));
    }
  }
  return bytes;
}

/** The synthetic tile of the check tables, by the formula in their first line. */
export function tableHeight(row: number, column: number): number {
  const inHole = row >= 300 && row <= 301 && column >= 900 && column <= 901;
  if ((row === 600 && column === 600) || inHole) return -32768;
  return Math.round(800 + 300 * Math.sin(row / 37) + 200 * Math.cos(column / 53));
}
