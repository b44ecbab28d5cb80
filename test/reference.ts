/**
 * Reader of the larger reference tables that some checkouts carry beside the project.
 *
 * Where the folder is present its tables are run whole; where it is absent the figures typed into the
 * tests stand alone and the output says so.
 */
import { existsSync, readFileSync } from "node:fs";
import { csvParse } from "d3-dsv";
import { describe, it } from "vitest";

const folder =
  process.env["OILSKIN_REFERENCE"] ?? new URL("../../shared/reference", import.meta.url).pathname;

export type Row = Readonly<Record<string, string>>;

/** Rows of a reference table, or undefined where the folder is absent. */
export function referenceRows(name: string): Row[] | undefined {
  const path = `${folder}/${name}`;
  if (!existsSync(path)) return undefined;
  const text = readFileSync(path, "utf8");
  return csvParse(text.replace(/^#.*\n/gm, ""));
}

/**
 * Declares one test that runs every row of a table through `check`, and that fails on an empty table.
 * Without the folder the test is reported as skipped, under a name that says why.
 */
export function describeReference(name: string, check: (row: Row) => void): void {
  const rows = referenceRows(name);
  describe(`reference table ${name}`, () => {
    if (rows === undefined) {
      it.skip("folder absent: only the typed figures were run", () => {});
      return;
    }
    it(`agrees in all ${rows.length} rows`, () => {
      if (rows.length === 0) throw new Error(`${name} holds no rows`);
      for (const row of rows) check(row);
    });
  });
}

/** Numeric cell of a row; throws on an empty or non-numeric one, so that no row passes unread. */
export function num(row: Row, column: string): number {
  const text = row[column];
  const value = Number(text);
  if (text === undefined || text.trim() === "" || Number.isNaN(value)) {
    throw new Error(`column ${column} holds ${JSON.stringify(text)}`);
  }
  return value;
}
