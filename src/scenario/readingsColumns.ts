import type { FaultList } from "./readingsFaults.ts";
import { type TimeUnit, timeUnits } from "./readingsTime.ts";
import { didYouMean, listed, shown } from "./wording.ts";

/** The figures that a bench may read; `reflected` is the level at a coupler's port. */
export const figures = ["level", "return loss", "reflected"] as const;
export type FigureColumn = (typeof figures)[number];
export type LevelUnit = "dB" | "dBm";

const columnNames = ["time", "order", "state", ...figures, "averages", "note"] as const;
type ColumnName = (typeof columnNames)[number];

/** Which cell of a row holds what. */
export interface Columns {
  readonly time: number | undefined;
  readonly timeUnit: TimeUnit | undefined;
  readonly state: number;
  readonly figures: readonly {
    readonly name: FigureColumn;
    readonly cell: number;
    readonly unit: LevelUnit | undefined;
  }[];
  readonly averages: number | undefined;
  readonly note: number | undefined;
  readonly count: number;
}

const EXPECTED =
  "columns time (or order), state, level dB (or level dBm, return loss dB, reflected dB), averages, note";

/** The columns that a header names, with their units; undefined where the rows cannot be read by it. */
export function readHeader(cells: readonly string[], line: number, faults: FaultList): Columns | undefined {
  const before = faults.count();
  const fault = (message: string) => faults.add("bad_header", line, message);
  const found = new Map<ColumnName, { cell: number; unit: string | undefined }>();
  for (const [cell, text] of cells.entries()) {
    if (text === "" && cell === cells.length - 1) continue; // a separator at the end of each line
    const { name, unit } = nameAndUnit(text);
    const column = columnNames.find((one) => one === name);
    if (column === undefined) {
      fault(`unknown column ${shown(text)}, expected ${EXPECTED}${didYouMean(name, columnNames)}`);
      continue;
    }
    if (found.has(column)) fault(`the column ${column} twice`);
    const units = unitsOf(column);
    if (unit !== undefined && !units.includes(unit)) {
      fault(`the unit ${shown(unit)} of the column ${column}, expected ${listed(units) || "none"}`);
    }
    found.set(column, { cell, unit });
  }
  if (found.has("time") && found.has("order")) fault("both time and order, expected one of them");
  if (!found.has("state")) fault(`no column state, expected ${EXPECTED}`);
  const present = figures.flatMap((name) => {
    const column = found.get(name);
    return column ? [{ name, cell: column.cell, unit: column.unit as LevelUnit | undefined }] : [];
  });
  if (present.length === 0) fault(`no column level, return loss or reflected, expected ${EXPECTED}`);
  if (found.has("return loss") && found.has("reflected"))
    fault("both return loss and reflected, expected one");
  if (faults.count() > before) return undefined;
  return {
    time: (found.get("time") ?? found.get("order"))?.cell,
    timeUnit: found.get("time")?.unit as TimeUnit | undefined,
    state: found.get("state")!.cell,
    figures: present,
    averages: found.get("averages")?.cell,
    note: found.get("note")?.cell,
    count: cells.length,
  };
}

/** `Level [dBm]`, `level_dbm`, `level dBm`: the name in small letters, the unit as it is usually written. */
function nameAndUnit(text: string): { name: string; unit: string | undefined } {
  const plain = text
    .toLowerCase()
    .replace(/[\s_]+/g, " ")
    .trim();
  const match = /^(.+?)(?: ?[[(/] ?| )(dbm?|s|min|h|[^\s[\](]+(?=[\])]))[\])]?$/.exec(plain);
  const [, name = plain, unit] = match ?? [];
  return { name, unit: unit?.replace("db", "dB") };
}

function unitsOf(column: ColumnName): readonly string[] {
  if (column === "time") return timeUnits;
  if (column === "return loss") return ["dB"];
  return column === "level" || column === "reflected" ? ["dB", "dBm"] : [];
}
