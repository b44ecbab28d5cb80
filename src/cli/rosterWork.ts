import {
  keeps,
  type Ranked,
  type RosterLine,
  type RosterLines,
  type RosterPlan,
  type RosterRow,
  type RowFault,
  type RowForm,
  rosterCsvLines,
  rosterJsonLine,
  rosterLine,
  rosterStudy,
  rowReader,
  type StationKey,
  stationKey,
} from "../index.ts";

export type RosterFormat = "table" | "csv" | "jsonl";

/** What a thread needs to know before it gets rows: plain data. */
export interface RosterJob {
  readonly plan: RosterPlan;
  readonly form: RowForm;
  readonly format: RosterFormat;
}

/** A station seen from one site, as it will be printed. */
export interface Worked extends Ranked {
  readonly site: number;
  /** Lines of CSV or JSON; "" for a table. */
  readonly text: string;
  readonly table: RosterLine | undefined;
}

/** Some rows of a roster, worked out; in the order of the file. */
export interface WorkedLines {
  readonly share: number;
  readonly stations: readonly {
    readonly line: number;
    readonly key: StationKey;
    /** Whether there is a path from any site. */
    readonly reached: boolean;
    /** Those that the filter keeps. */
    readonly kept: readonly Worked[];
    readonly groundAssumed: boolean;
    readonly noTerrain: string | undefined;
    /** Why there is no path from one site or another. */
    readonly faults: readonly RowFault[];
  }[];
  /** Of rows that could not be read. */
  readonly faults: readonly RowFault[];
}

/** A function that works out some lines after others. */
export async function rosterWork(job: RosterJob): Promise<(rows: RosterLines) => Promise<WorkedLines>> {
  const { plan, form } = job;
  const read = rowReader(form);
  const study = await rosterStudy(plan);
  return async ({ lines, firstLine, share }) => {
    const stations: WorkedLines["stations"][number][] = [];
    const faults: RowFault[] = [];
    for (const [i, text] of lines.entries()) {
      if (text.startsWith("#") || text.trim() === "") continue;
      const line = firstLine + i;
      const { station, faults: found } = read(text, line);
      if (station === undefined) {
        faults.push(...found);
        continue;
      }
      const { rows, noPaths, assumed } = await study(station);
      stations.push({
        line,
        key: stationKey(station),
        reached: rows.length > 0,
        kept: rows.flatMap((row) => worked(row, job)),
        groundAssumed: assumed.ground,
        noTerrain: assumed.noTerrain,
        faults: noPaths.map(({ message }) => ({ line, column: 1, message })),
      });
    }
    return { share, stations, faults };
  };
}

function worked(row: RosterRow, { plan, format }: RosterJob): Worked[] {
  const table = rosterLine(row, plan);
  const { line, name, site, headingDeg, distanceKm, rankDb } = table;
  const best = table.weathers.map((one) => ({ verdict: one.best?.verdict }));
  if (!keeps(plan.filter, { headingDeg, distanceKm, best })) return [];
  const text = format === "csv" ? rosterCsvLines(row) : format === "jsonl" ? rosterJsonLine(row) : "";
  const ranked = { line, name, site, headingDeg, distanceKm, rankDb };
  return [{ ...ranked, text, table: format === "table" ? table : undefined }];
}
