import {
  isIdleRow,
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
  stationKey,
} from "../index.ts";

export type RosterFormat = "table" | "csv" | "jsonl";

/** What a thread needs to know before it gets rows: plain data. */
export interface RosterJob {
  readonly plan: RosterPlan;
  readonly form: RowForm;
  readonly format: RosterFormat;
  /** Whether the stations are written as they come, so that nothing of them but their text is needed. */
  readonly streamed: boolean;
}

/** A station seen from one site, as it will be sorted and printed. */
export interface Worked extends Ranked {
  readonly site: number;
  /** Lines of CSV or JSON; "" for a table. */
  readonly text: string;
  readonly table: RosterLine | undefined;
}

/**
 * Some rows of a roster, worked out, in the order of the file: by station, in arrays of numbers and one piece of text,
 * because a million small objects sent from thread to thread would cost more than a tenth of the work.
 */
export interface WorkedLines {
  readonly share: number;
  readonly lines: Uint32Array;
  /** Two halves for each station. */
  readonly keys: Uint32Array;
  /** 1 where there is a path from any site; 1 where the ground was taken for 0 m. */
  readonly reached: Uint8Array;
  readonly groundAssumed: Uint8Array;
  /** Why terrain could not be had. */
  readonly noTerrain: readonly { readonly station: number; readonly reason: string }[];
  /** What the filter keeps: where streamed, the text of all and its end for each station; else the stations. */
  readonly text: Uint8Array;
  readonly ends: Uint32Array;
  readonly kept: readonly (readonly Worked[])[];
  /** Of rows that could not be read. */
  readonly faults: readonly RowFault[];
  /** Why there is no path from one site or another. */
  readonly noPaths: readonly (RowFault & { readonly station: number })[];
}

/** A function that works out some lines after others. */
export async function rosterWork(job: RosterJob): Promise<(rows: RosterLines) => Promise<WorkedLines>> {
  const { plan, form, streamed } = job;
  const read = rowReader(form);
  const study = await rosterStudy(plan);
  return async ({ lines: texts, firstLine, share }) => {
    const [lines, keys, reached, ground, ends]: [number[], number[], number[], number[], number[]] = [
      [],
      [],
      [],
      [],
      [],
    ];
    const noTerrain: WorkedLines["noTerrain"][number][] = [];
    const noPaths: WorkedLines["noPaths"][number][] = [];
    const faults: RowFault[] = [];
    const kept: Worked[][] = [];
    const pieces: Buffer[] = [];
    let end = 0;
    for (const [i, text] of texts.entries()) {
      if (isIdleRow(text, form.separator)) continue;
      const line = firstLine + i;
      const { station, faults: found } = read(text, line);
      if (station === undefined) {
        faults.push(...found);
        continue;
      }
      const seen = await study(station);
      const index = lines.length;
      lines.push(line);
      keys.push(...stationKey(station));
      reached.push(seen.rows.length > 0 ? 1 : 0);
      ground.push(seen.assumed.ground ? 1 : 0);
      if (seen.assumed.noTerrain !== undefined)
        noTerrain.push({ station: index, reason: seen.assumed.noTerrain });
      for (const { message } of seen.noPaths) noPaths.push({ station: index, line, column: 1, message });
      const worked = seen.rows.flatMap((row) => workedOf(row, job));
      if (streamed) {
        const piece = Buffer.from(worked.map((one) => one.text).join(""));
        pieces.push(piece);
        end += piece.length;
      } else kept.push(worked);
      ends.push(end);
    }
    return {
      share,
      lines: Uint32Array.from(lines),
      keys: Uint32Array.from(keys),
      reached: Uint8Array.from(reached),
      groundAssumed: Uint8Array.from(ground),
      noTerrain,
      text: Buffer.concat(pieces),
      ends: Uint32Array.from(ends),
      kept,
      faults,
      noPaths,
    };
  };
}

function workedOf(row: RosterRow, { plan, format }: RosterJob): Worked[] {
  const table = rosterLine(row, plan);
  const { line, name, site, headingDeg, distanceKm, rankDb } = table;
  const best = table.weathers.map((one) => ({ verdict: one.best?.verdict }));
  if (!keeps(plan.filter, { headingDeg, distanceKm, best })) return [];
  const text = format === "csv" ? rosterCsvLines(row) : format === "jsonl" ? rosterJsonLine(row) : "";
  const ranked = { line, name, site, headingDeg, distanceKm, rankDb };
  return [{ ...ranked, text, table: format === "table" ? table : undefined }];
}
