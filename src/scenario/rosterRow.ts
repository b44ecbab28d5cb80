import { dsvFormat } from "d3-dsv";
import type { Point } from "../path/geodesic.ts";
import { type LocatorCell, locatorToPoint } from "../path/locator.ts";
import { readCoordinate } from "./coordinates.ts";
import { faultOfText } from "./fields.ts";
import { type FieldOptions, outOfRange } from "./judgedQuantity.ts";
import { describeRefusal, type QuantityKind, readQuantity } from "./quantity.ts";
import type { RosterCells, RosterColumn } from "./rosterColumns.ts";
import { stationFields } from "./stationFields.ts";
import type { Uncertain } from "./types.ts";
import { didYouMean, listed, shown, visible } from "./wording.ts";

/** Longest row that can be meant [characters]. */
export const LONGEST_ROW = 2000;

/** A dish that a row states: one of the scenario's, or one of a size or a gain. */
export type StatedDish =
  | { readonly name: string }
  | { readonly diameterM: number }
  | { readonly gainDbi: Uncertain };

/** A station as its row has it, in canonical units; what the row leaves out is undefined. */
export interface Station extends Point {
  readonly line: number;
  readonly name: string;
  readonly locator: string | undefined;
  /** Largest distance of the true position from the one used [km]. */
  readonly positionErrorKm: number;
  readonly groundM: number | undefined;
  readonly heightM: number | undefined;
  readonly powerDbm: Uncertain | undefined;
  readonly dish: StatedDish | undefined;
  readonly noiseFigureDb: Uncertain | undefined;
  readonly mode: string | undefined;
}

/** What is wrong with a row; columns are characters of the line, from 1. */
export interface RowFault {
  readonly line: number;
  readonly column: number;
  readonly message: string;
}

export type ReadStation =
  | { readonly station: Station; readonly faults?: undefined }
  | { readonly station?: undefined; readonly faults: readonly RowFault[] };

export interface RowForm {
  readonly columns: RosterCells;
  readonly separator: string;
  /** Names that a row may use. */
  readonly dishes: readonly string[];
  readonly modes: readonly string[];
}

/** The cells of a line. A quote left open ends with its line, so that it costs one row and not all that follow. */
export function cellsOf(line: string, separator: string): string[] {
  const cells = line.includes('"') ? (dsvFormat(separator).parseRows(line)[0] ?? []) : line.split(separator);
  return cells.map((cell) => cell.trim());
}

/** Whether a line holds no station: empty, a remark, or cells without anything in them, as spreadsheets leave below. */
export function isIdleRow(line: string, separator: string): boolean {
  return line.startsWith("#") || line.replaceAll(separator, "").trim() === "";
}

/** Character of the line at which a cell begins, from 1. */
export function columnAt(line: string, separator: string, cell: number): number {
  let quoted = false;
  let passed = 0;
  let at = 0;
  for (; at < line.length && passed < cell; at++) {
    if (line[at] === '"') quoted = !quoted;
    else if (line[at] === separator && !quoted) passed++;
  }
  return at + 1 + /^\s*/.exec(line.slice(at))![0].length;
}

/** A reader of the rows of one roster: a station, or all that is wrong with its row. Never throws. */
export function rowReader({
  columns,
  separator,
  dishes,
  modes,
}: RowForm): (line: string, number: number) => ReadStation {
  const count = 1 + Math.max(...Object.values(columns).map(({ cell }) => cell));
  return (text, line) => {
    const found: RowFault[] = [];
    const faultAt = (cell: number, message: string) =>
      void found.push({ line, column: columnAt(text, separator, cell), message: visible(message) });
    if (text.length > LONGEST_ROW) {
      return { faults: [{ line, column: 1, message: `a row longer than ${LONGEST_ROW} characters` }] };
    }
    if (text.includes("\ufffd")) faultAt(0, "is no text in UTF-8; save the file as UTF-8");
    if ((text.split('"').length - 1) % 2 === 1)
      faultAt(0, "a quote that is opened and not closed in its row");
    const cells = cellsOf(text, separator);
    const more = cells.findIndex((cell, i) => i >= count && cell !== "");
    if (more >= 0) {
      const hint = "a text with a separator in it needs quotes, and a decimal comma must be a point";
      faultAt(more, `${cells.length} cells under ${count} headings; ${hint}`);
    }
    if (found.length > 0) return { faults: found };

    const textIn = (column: RosterColumn) => cells[columns[column]?.cell ?? -1] ?? "";
    const fault = (column: RosterColumn, message: string): undefined =>
      faultAt(columns[column]?.cell ?? 0, `${column}: ${message}`);
    const quantity = (column: RosterColumn, kind: QuantityKind, field: FieldOptions) => {
      const typed = numberWithUnit(textIn(column), columns[column]?.unit ?? "", separator);
      if (typed === "") return undefined;
      const reading = readQuantity(typed, kind, { spread: kind === "powerDbm" || kind === "levelDb" });
      if (!reading.ok) {
        const inHeader = `, or name the unit in the header, such as "${column} ${headerUnit(kind)}"`;
        return fault(column, describeRefusal(reading) + (reading.code === "bare_number" ? inHeader : ""));
      }
      const message = outOfRange(reading, kind, field);
      return message === undefined ? { value: reading.value, sigma: reading.sigma } : fault(column, message);
    };

    const name = textIn("name");
    const nameFault = faultOfText(name);
    if (nameFault !== undefined) fault("name", `${nameFault}, expected the name of a station`);
    const place = readPlace(textIn, fault, separator);
    const station = {
      line,
      name,
      groundM: quantity("ground", "lengthM", stationFields.ground)?.value,
      heightM: quantity("height", "lengthM", stationFields.height)?.value,
      powerDbm: quantity("power", "powerDbm", stationFields.power),
      noiseFigureDb: quantity("noise figure", "levelDb", stationFields.noiseFigure),
      dish: readDish(),
      mode: readMode(textIn("mode"), modes, fault),
    };
    return place === undefined || found.length > 0
      ? { faults: found }
      : { station: { ...station, ...place } };

    function readDish(): StatedDish | undefined {
      const typed = textIn("dish");
      if (typed === "") return undefined;
      const named = dishes.find((dish) => dish.toLowerCase() === typed.toLowerCase());
      if (named !== undefined) return { name: named };
      if (!/\d/.test(typed)) {
        const choice = [...dishes.slice(0, 20), "a diameter such as 60 cm", "a gain such as 34 dBi"];
        return fault("dish", `read ${shown(typed)}, expected ${listed(choice)}${didYouMean(typed, dishes)}`);
      }
      const gain = readQuantity(typed, "gainDbi", { spread: true });
      if (gain.ok && gain.value >= 0 && gain.value <= 75)
        return { gainDbi: { value: gain.value, sigma: gain.sigma } };
      const size = quantity("dish", "lengthM", stationFields.diameter);
      return size && { diameterM: size.value };
    }
  };
}

/** A unit that people put in a header. */
function headerUnit(kind: QuantityKind): string {
  return kind === "powerDbm" ? "W" : kind === "levelDb" ? "dB" : "m";
}

/** A plain number under a heading with a unit gets that unit; beside semicolons and tabs a decimal comma is a point. */
function numberWithUnit(text: string, unit: string, separator: string): string {
  const typed = withPoint(text, separator);
  return unit !== "" && /^[+-]?[\d.]+$/.test(typed) ? `${typed} ${unit}` : typed;
}

function withPoint(text: string, separator: string): string {
  return separator === "," ? text : text.replace(/^([+-]?\d+),(\d+)(?![\d,])/, "$1.$2");
}

type Place = Pick<Station, "latitude" | "longitude" | "locator" | "positionErrorKm">;

function readPlace(
  textIn: (column: RosterColumn) => string,
  fault: (column: RosterColumn, message: string) => undefined,
  separator: string,
): Place | undefined {
  const typed = textIn("locator");
  const [north, east] = (["latitude", "longitude"] as const).map((axis) => {
    const text = withPoint(textIn(axis), separator);
    if (text === "") return undefined;
    const reading = readCoordinate(text, axis);
    return reading.ok ? reading.degrees : (fault(axis, describeRefusal(reading)) ?? Number.NaN);
  });
  const cell = typed === "" ? undefined : readLocator(typed, fault);
  if (north === undefined && east === undefined) {
    if (typed === "") return fault("locator", "missing, expected a locator, or latitude and longitude");
    return (
      cell && {
        latitude: cell.latitude,
        longitude: cell.longitude,
        locator: typed,
        positionErrorKm: cell.halfDiagonalKm,
      }
    );
  }
  if (north === undefined) return fault("latitude", "missing beside the longitude");
  if (east === undefined) return fault("longitude", "missing beside the latitude");
  if (Number.isNaN(north) || Number.isNaN(east) || (typed !== "" && cell === undefined)) return undefined;
  const point = { latitude: north, longitude: east };
  if (cell !== undefined && !lies(point, cell)) {
    return fault("locator", `${shown(typed)} is not the square of the latitude and longitude beside it`);
  }
  return { ...point, locator: typed === "" ? undefined : typed, positionErrorKm: 0 };
}

function readLocator(
  typed: string,
  fault: (column: RosterColumn, message: string) => undefined,
): LocatorCell | undefined {
  if (typed.length < 4)
    return fault("locator", `read ${shown(typed)}, expected 4 to 10 characters, such as IO84wb`);
  try {
    return locatorToPoint(typed);
  } catch (error) {
    return fault("locator", (error as RangeError).message);
  }
}

/** Within the cell, or on its border as far as rounded degrees may be off. */
function lies({ latitude, longitude }: Point, cell: LocatorCell): boolean {
  const { southWest } = cell;
  const slack = 1e-4;
  const north = cell.latitude - southWest.latitude + slack;
  const east = cell.longitude - southWest.longitude + slack;
  const turned = Math.abs(((longitude - cell.longitude + 540) % 360) - 180);
  return Math.abs(latitude - cell.latitude) <= north && turned <= east;
}

function readMode(
  typed: string,
  modes: readonly string[],
  fault: (column: RosterColumn, message: string) => undefined,
): string | undefined {
  if (typed === "") return undefined;
  const named = modes.find((mode) => mode.toLowerCase() === typed.toLowerCase());
  return (
    named ?? fault("mode", `no mode ${shown(typed)}, expected ${listed(modes)}${didYouMean(typed, modes)}`)
  );
}
