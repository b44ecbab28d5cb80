import { findUnit } from "./units.ts";
import { didYouMean, listed, shown } from "./wording.ts";

/** What a roster may say of a station. */
export const rosterColumns = [
  "name",
  "locator",
  "latitude",
  "longitude",
  "ground",
  "height",
  "power",
  "dish",
  "noise figure",
  "mode",
  "note",
] as const;
export type RosterColumn = (typeof rosterColumns)[number];

/** Columns of a list of own sites. */
const siteColumns: readonly RosterColumn[] = [
  "name",
  "locator",
  "latitude",
  "longitude",
  "ground",
  "height",
  "note",
];

/** What people call the columns beside. */
const aliases: Readonly<Record<string, RosterColumn>> = {
  station: "name",
  site: "name",
  call: "name",
  "call sign": "name",
  callsign: "name",
  grid: "locator",
  square: "locator",
  "grid square": "locator",
  lat: "latitude",
  lon: "longitude",
  long: "longitude",
  lng: "longitude",
  "ground height": "ground",
  elevation: "ground",
  altitude: "ground",
  asl: "ground",
  "antenna height": "height",
  agl: "height",
  antenna: "dish",
  nf: "noise figure",
  notes: "note",
  comment: "note",
  comments: "note",
  remark: "note",
  remarks: "note",
};

export type RosterKind = "stations" | "sites";

/** Which cell of a row holds what, and in which unit the header says its plain numbers are. */
export type RosterCells = Partial<Record<RosterColumn, { readonly cell: number; readonly unit: string }>>;

export interface HeaderFault {
  readonly cell: number;
  readonly message: string;
}

const withUnits: readonly RosterColumn[] = ["ground", "height", "power", "dish", "noise figure"];

/**
 * The columns that the header of a roster names, or all that is wrong with it. A club's list has columns of its own
 * beside, which are passed over; one that is nearly a known word is a slip.
 */
export function readRosterHeader(
  cells: readonly string[],
  kind: RosterKind,
): {
  readonly columns: RosterCells;
  /** Columns that nothing here knows, as typed. */
  readonly passedOver: readonly string[];
  readonly faults: readonly HeaderFault[];
} {
  const known = kind === "sites" ? siteColumns : rosterColumns;
  const expected = `columns name, locator (or latitude and longitude), ${listed(known.slice(4))}`;
  const read = cells.map((text) => columnOf(text));
  if (!read.some(({ column }) => column !== undefined)) {
    const first = shown(cells.join(","));
    const message = `no header: the first row reads ${first}, expected ${expected}`;
    return { columns: {}, passedOver: [], faults: [{ cell: 0, message }] };
  }
  const columns: RosterCells = {};
  const faults: HeaderFault[] = [];
  const passedOver: string[] = [];
  for (const [cell, { column, name, unit }] of read.entries()) {
    const fault = (message: string) => faults.push({ cell, message });
    if (name === "" && cell === cells.length - 1) continue; // a separator at the end of each line
    const hint = didYouMean(name, known);
    if (column === undefined && hint === "") passedOver.push(cells[cell]!.trim());
    else if (column === undefined || !known.includes(column)) {
      fault(`unknown column ${shown(cells[cell])}, expected ${expected}${hint}`);
    } else if (columns[column]) fault(`the column ${column} twice`);
    else columns[column] = { cell, unit };
  }
  if (faults.length === 0 && !columns.name)
    faults.push({ cell: 0, message: `no column name, expected ${expected}` });
  const place = columns.locator || (columns.latitude && columns.longitude);
  if (faults.length === 0 && !place) {
    faults.push({ cell: 0, message: `no column locator, nor latitude and longitude, expected ${expected}` });
  }
  return { columns, passedOver, faults };
}

/** `Ground [m]`, `ground_m`, `ground-height (m)`: the column, and the unit where one that is known stands behind it. */
function columnOf(text: string): { column: RosterColumn | undefined; name: string; unit: string } {
  const plain = text.replace(/[\s_-]+/g, " ").trim();
  const [, before = plain, written = ""] = /^(.+?) ?(?:[[(/] ?| )([^\s[\]()]+)[\])]?$/.exec(plain) ?? [];
  const column = nameOf(before);
  if (column !== undefined && withUnits.includes(column) && findUnit(written)) {
    return { column, name: before.toLowerCase(), unit: written };
  }
  return { column: nameOf(plain), name: plain.toLowerCase(), unit: "" };
}

function nameOf(text: string): RosterColumn | undefined {
  const name = text.toLowerCase();
  return (
    rosterColumns.find((one) => one === name) ?? (Object.hasOwn(aliases, name) ? aliases[name] : undefined)
  );
}
