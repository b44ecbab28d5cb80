import type { Places } from "./positions.ts";
import { type FileFault, faultList } from "./readingsFaults.ts";
import type { TypedRow } from "./readingsSchema.ts";
import { type ReadingsTable, tableReader } from "./readingsTable.ts";

/** The list of readings of a YAML file as a table; each row has the line of its item. */
export function tableOfRows(
  rows: readonly TypedRow[],
  file: string,
  places: Places,
): { table: ReadingsTable | undefined; faults: readonly FileFault[] } {
  const faults = faultList(file);
  const reader = tableReader(file, faults);
  const keys = [...new Set(rows.flatMap((row) => Object.keys(row) as (keyof TypedRow)[]))];
  reader.row(keys, places.ofKey(["readings"]).line);
  for (const [i, row] of rows.entries()) {
    reader.row(
      keys.map((key) => row[key]?.trim() ?? ""),
      places.ofValue(["readings", i]).line,
    );
  }
  const table = reader.end();
  return { table, faults: faults.list() };
}
