import { readFileSync, statSync } from "node:fs";
import { dsvFormat } from "d3-dsv";
import type { Profile, Zone } from "../../path/profile.ts";
import { type FaultList, faultList } from "../readingsFaults.ts";
import { convert, findUnit, type Unit } from "../units.ts";
import { didYouMean, listed, shown } from "../wording.ts";
import { HIGHEST_M, LOWEST_M, unreadable } from "./faults.ts";
import { LONGEST_PATH_KM } from "./sampleProfile.ts";
import type { TerrainFault } from "./types.ts";

/** A profile of a million points is far smaller; what is larger is something else [bytes]. */
const LARGEST = 64_000_000;

/** Tallest trees or buildings that can be meant [m]. */
const TALLEST_COVER_M = 500;

const columnNames = ["distance", "height", "cover", "zone"] as const;
type ColumnName = (typeof columnNames)[number];

/** What people call the columns; bare ground is never called by a word that may include trees. */
const aliases: Readonly<Record<string, ColumnName>> = {
  distance: "distance",
  dist: "distance",
  height: "height",
  ground: "height",
  elevation: "height",
  terrain: "height",
  "ground height": "height",
  "terrain height": "height",
  cover: "cover",
  "cover height": "cover",
  "clutter height": "cover",
  clutter: "cover",
  zone: "zone",
};

const zoneNames: readonly string[] = ["inland", "coastal", "sea"] satisfies Zone[];

const EXPECTED = "columns distance (km), height (m) and, where known, cover (m) and zone";

type Columns = Partial<Record<ColumnName, { readonly cell: number; readonly unit: Unit | undefined }>>;

export type ProfileFile =
  | { readonly profile: Profile; readonly faults?: undefined }
  | { readonly profile?: undefined; readonly faults: readonly TerrainFault[] };

/**
 * Reads a profile of terrain from CSV: `distance (km), height (m)`, and `cover (m)` and `zone` where known.
 *
 * Comma, semicolon or tab, as the header has it; beside semicolons and tabs a decimal comma is read too. Units stand
 * in the header: any unit of length. Comments from # at the start of a line. Height is bare ground above sea level,
 * cover is trees and buildings above that ground.
 *
 * @param path  of the file
 * @param file  as the user named it
 * @returns the profile, or every fault with its line; two points get a third half-way, on the straight line
 */
export function readProfile(path: string, file: string): ProfileFile {
  const faults = faultList(file);
  const text = textOf(path, file, faults);
  const profile = text === undefined ? undefined : profileOf(text, faults);
  return profile ? { profile } : { faults: faults.list() };
}

function textOf(path: string, file: string, faults: FaultList): string | undefined {
  try {
    const { size } = statSync(path);
    if (size <= LARGEST) return new TextDecoder("utf-8", { fatal: true }).decode(readFileSync(path));
    faults.add("too_large", 1, `is ${size} bytes long, expected a profile of at most ${LARGEST}`);
  } catch (error) {
    if (error instanceof TypeError)
      faults.add("not_text", 1, "is no text in UTF-8, expected a profile as CSV");
    else faults.add("unreadable", 1, unreadable(file, error).fault.message);
  }
  return undefined;
}

function profileOf(text: string, faults: FaultList): Profile | undefined {
  const lines = text
    .split(/\r\n?|\n/)
    .map((line, i) => ({ line, number: i + 1 }))
    .filter(({ line }) => line.trim() !== "" && !line.startsWith("#"));
  const [header, ...rows] = lines;
  if (header === undefined) {
    faults.add("empty", 1, `the file is empty, expected ${EXPECTED}`);
    return undefined;
  }
  const separators = [",", ";", "\t"];
  const separator = separators.reduce((a, b) =>
    header.line.split(b).length > header.line.split(a).length ? b : a,
  );
  const cellsOf = (line: string) =>
    dsvFormat(separator)
      .parseRows(line)[0]!
      .map((cell) => cell.trim());
  const columns = readHeader(cellsOf(header.line), header.number, faults);
  if (columns === undefined) return undefined;

  const distancesKm: number[] = [];
  const heightsM: number[] = [];
  const coverM: number[] = [];
  const zones: Zone[] = [];
  for (const { line, number } of rows) {
    const row = rowReader(cellsOf(line), columns, separator !== ",", number, faults);
    const distanceKm = row.metres("distance", 0, 1000 * LONGEST_PATH_KM) / 1000;
    const before = distancesKm.at(-1);
    if (before === undefined && distanceKm > 0) {
      faults.add("bad_start", number, `starts at ${distanceKm} km, expected 0, below the transmitter`);
    }
    if (distanceKm <= before!) {
      const message = `distance ${distanceKm} km after ${before} km, expected distances that rise from row to row`;
      faults.add("unsorted", number, message);
    }
    if (!Number.isNaN(distanceKm)) distancesKm.push(distanceKm);
    heightsM.push(row.metres("height", LOWEST_M, HIGHEST_M));
    if (columns.cover) coverM.push(row.metres("cover", 0, TALLEST_COVER_M));
    if (columns.zone) zones.push(row.zone());
  }
  if (rows.length < 2) {
    const message = `profile of ${rows.length === 1 ? "1 point" : "no points"}, expected 2 or more`;
    faults.add("too_short", rows.at(-1)?.number ?? header.number, message);
  }
  if (faults.count() > 0) return undefined;
  const profile = {
    distancesKm,
    heightsM,
    ...(columns.cover && { coverM }),
    ...(columns.zone && { zones }),
  };
  return rows.length === 2 ? withMiddle(profile) : profile;
}

function readHeader(cells: readonly string[], line: number, faults: FaultList): Columns | undefined {
  const before = faults.count();
  const fault = (message: string) => faults.add("bad_header", line, message);
  const columns: Columns = {};
  for (const [cell, text] of cells.entries()) {
    if (text === "" && cell === cells.length - 1) continue; // a separator at the end of each line
    const [, name = "", written] = /^(.*?)(?:[\s_]*[[( _/]\s*([a-z]+)[\])]?)?$/i.exec(text.toLowerCase())!;
    const column = aliases[name.trim()];
    if (column === undefined) {
      fault(`unknown column ${shown(text)}, expected ${EXPECTED}${didYouMean(name, Object.keys(aliases))}`);
      continue;
    }
    const unit = written === undefined ? undefined : findUnit(written);
    if (columns[column]) fault(`the column ${column} twice`);
    else if (column === "zone") {
      if (written !== undefined) fault("a unit of the column zone, expected none");
    } else if (written === undefined) {
      fault(`no unit in the column ${shown(text)}, expected one such as ${name.trim()} (m)`);
    } else if (unit?.dimension !== "length") {
      fault(`the unit ${shown(written)} of the column ${column}, expected km, m, mi or ft`);
    }
    columns[column] = { cell, unit };
  }
  for (const name of ["distance", "height"] as const) {
    if (!columns[name]) fault(`no column ${name}, expected ${EXPECTED}`);
  }
  return faults.count() > before ? undefined : columns;
}

/** Reads the cells of one row; what is wrong becomes a fault and NaN. */
function rowReader(
  cells: readonly string[],
  columns: Columns,
  decimalComma: boolean,
  line: number,
  faults: FaultList,
) {
  const metre = findUnit("m")!;
  return {
    metres: (name: "distance" | "height" | "cover", low: number, high: number): number => {
      const { cell, unit } = columns[name]!;
      const text = cells[cell] ?? "";
      const number = text === "" ? Number.NaN : Number(decimalComma ? text.replace(",", ".") : text);
      const metres = convert(number, unit!, metre);
      if (metres >= low && metres <= high) return metres;
      const read = text === "" ? "nothing" : shown(text);
      const range = `expected ${name === "distance" ? `0 to ${high / 1000} km` : `${low} to ${high} m`}`;
      faults.add("bad_value", line, `${name}: read ${read}, ${range}`);
      return Number.NaN;
    },
    zone: (): Zone => {
      const text = cells[columns.zone!.cell] ?? "";
      if (zoneNames.includes(text.toLowerCase())) return text.toLowerCase() as Zone;
      const message = `zone: read ${shown(text)}, expected ${listed(zoneNames)}${didYouMean(text, zoneNames)}`;
      faults.add("bad_value", line, message);
      return "inland";
    },
  };
}

/** The models need a point between the ends; on the straight line between them it changes no ground. */
function withMiddle({ distancesKm, heightsM, coverM, zones }: Profile): Profile {
  const middle = (list: ArrayLike<number>) => [list[0]!, (list[0]! + list[1]!) / 2, list[1]!];
  return {
    distancesKm: middle(distancesKm),
    heightsM: middle(heightsM),
    ...(coverM && { coverM: middle(coverM) }),
    ...(zones && { zones: [zones[0]!, zones[0]!, zones[1]!] }),
  };
}
