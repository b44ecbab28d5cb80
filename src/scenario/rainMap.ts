import { readdirSync, readFileSync, statSync } from "node:fs";
import { join } from "node:path";
import { bilinear, type GridAxis } from "../atmosphere/gridPoint.ts";
import { shown } from "./wording.ts";

/** Layout of P.837-7 where its files of positions are absent. */
const WHOLE_EARTH = {
  rows: { firstDeg: -90, lastDeg: 90, count: 1441 },
  columns: { firstDeg: -180, lastDeg: 180, count: 2881 },
} as const;

/** Several times the size of the published file [bytes]; what is larger is something else. */
const LARGEST = 400_000_000;
/** Rain heavier than any rate of 0.01 % on Earth [mm/h]: such a file is no map of rain rates. */
const HEAVIEST_MM_PER_H = 400;

/** Why a map cannot be used; the message is for its user. */
export class MapFault extends Error {}

/**
 * Rain rate exceeded for 0.01 % of an average year at a place, from the map of P.837 in ITU's own files.
 *
 * `R001.TXT` holds a row of the grid a line; `LAT_R001.TXT` and `LON_R001.TXT` tell where its points lie. The
 * names are matched without regard to case, with a prefix such as `v7_` or without.
 *
 * @throws MapFault on a missing or damaged file, and on a place that the map does not hold
 */
export function rainRateOfMap(folder: string, latitude: number, longitude: number): number {
  const names = namesIn(folder);
  const find = (name: string) => names.find((one) => one.replace(/^v\d+_/i, "").toUpperCase() === name);
  const [map, latitudes, longitudes] = ["R001.TXT", "LAT_R001.TXT", "LON_R001.TXT"].map(find);
  if (map === undefined) throw new MapFault(`the folder ${shown(folder)} holds no R001.TXT`);
  if ((latitudes === undefined) !== (longitudes === undefined)) {
    const [there, missing] = latitudes === undefined ? ["LON", "LAT"] : ["LAT", "LON"];
    throw new MapFault(`the folder ${shown(folder)} holds ${there}_R001.TXT and no ${missing}_R001.TXT`);
  }
  const table = tableIn(folder, map);
  const { rows, columns } =
    latitudes === undefined || longitudes === undefined
      ? WHOLE_EARTH
      : axesOf(tableIn(folder, latitudes), tableIn(folder, longitudes));
  requireSize(table, rows.count, columns.count);

  const turned = [0, -360, 360].map((turn) => longitude + turn).find((one) => within(columns, one));
  if (turned === undefined || !within(rows, latitude)) {
    const place = `${latitude.toFixed(3)}, ${longitude.toFixed(3)}`;
    throw new MapFault(
      `the middle of the path at ${place} lies beyond the map, which spans latitudes ${rows.firstDeg} to ` +
        `${rows.lastDeg} and longitudes ${columns.firstDeg} to ${columns.lastDeg}`,
    );
  }
  const valueAt = (row: number, column: number) => {
    requireColumns(table, row, columns.count);
    const rate = table.row(row)[column]!;
    if (rate >= 0 && rate <= HEAVIEST_MM_PER_H) return rate;
    throw new MapFault(
      `${table.name}:${row + 1}: read ${rate} in column ${column + 1}, expected a rain rate up to ` +
        `${HEAVIEST_MM_PER_H} mm/h`,
    );
  };
  return bilinear({ rows, columns, latitude, longitude: turned, valueAt });
}

interface Table {
  readonly name: string;
  readonly rowCount: number;
  /** Numbers of a row, from 0. */
  readonly row: (index: number) => readonly number[];
}

function namesIn(folder: string): string[] {
  try {
    return readdirSync(folder);
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === "ENOENT") throw new MapFault(`no folder ${shown(folder)}`);
    if (code === "ENOTDIR") throw new MapFault(`${shown(folder)} is no folder; name the one with R001.TXT`);
    throw new MapFault(`the folder ${shown(folder)} cannot be read (${code})`);
  }
}

/** A file of numbers, of which only the rows that are asked for become numbers: the map is tens of megabytes. */
function tableIn(folder: string, name: string): Table {
  const bytes = bytesOf(join(folder, name), name);
  const starts = [0];
  for (let end = bytes.indexOf("\n"); end >= 0; end = bytes.indexOf("\n", end + 1)) starts.push(end + 1);
  const lineAt = (index: number) => bytes.toString("latin1", starts[index], starts[index + 1]).trim();
  let rowCount = starts.length;
  while (rowCount > 0 && lineAt(rowCount - 1) === "") rowCount--;
  if (rowCount === 0) throw new MapFault(`${name} is empty`);
  const row = (index: number) => {
    const numbers = lineAt(index).split(/\s+/).map(Number);
    if (numbers.every(Number.isFinite)) return numbers;
    throw new MapFault(`${name}:${index + 1}: holds more than numbers between blanks`);
  };
  return { name, rowCount, row };
}

function bytesOf(path: string, name: string): Buffer {
  try {
    const status = statSync(path);
    if (status.isFile() && status.size <= LARGEST) return readFileSync(path);
    throw new MapFault(
      status.isFile() ? `${name} is too large for a map of rain` : `${name} is no plain file`,
    );
  } catch (error) {
    if (error instanceof MapFault) throw error;
    throw new MapFault(`${name} cannot be read (${(error as NodeJS.ErrnoException).code})`);
  }
}

/** Where the points lie, from the corners of the two files of positions. */
function axesOf(latitudes: Table, longitudes: Table): { rows: GridAxis; columns: GridAxis } {
  const count = { rows: latitudes.rowCount, columns: latitudes.row(0).length };
  requireSize(latitudes, count.rows, count.columns);
  requireSize(longitudes, count.rows, count.columns);
  if (count.rows < 2 || count.columns < 2) {
    throw new MapFault(`${latitudes.name} holds fewer than two rows and columns`);
  }
  const rows = {
    firstDeg: latitudes.row(0)[0]!,
    lastDeg: latitudes.row(count.rows - 1)[0]!,
    count: count.rows,
  };
  const first = longitudes.row(0);
  const columns = { firstDeg: first[0]!, lastDeg: first.at(-1)!, count: count.columns };
  for (const [{ firstDeg, lastDeg }, { name }] of [
    [rows, latitudes],
    [columns, longitudes],
  ] as const) {
    if (firstDeg === lastDeg) throw new MapFault(`${name} has the same position at both edges`);
  }
  return { rows, columns };
}

/** Refuses a grid of another size, as a file cut short has. */
function requireSize(table: Table, rows: number, columns: number): void {
  const { name, rowCount } = table;
  if (rowCount !== rows) throw new MapFault(`${name} has ${rowCount} rows, expected ${rows}`);
  for (const index of [0, rowCount - 1]) requireColumns(table, index, columns);
}

function requireColumns({ name, row }: Table, index: number, columns: number): void {
  const { length } = row(index);
  if (length !== columns)
    throw new MapFault(`${name}:${index + 1}: has ${length} columns, expected ${columns}`);
}

function within({ firstDeg, lastDeg }: GridAxis, positionDeg: number): boolean {
  return positionDeg >= Math.min(firstDeg, lastDeg) && positionDeg <= Math.max(firstDeg, lastDeg);
}
