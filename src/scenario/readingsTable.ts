import { OPEN } from "../readings/bracket.ts";
import { faultOfText } from "./fields.ts";
import { type Columns, type FigureColumn, readHeader } from "./readingsColumns.ts";
import type { FaultList } from "./readingsFaults.ts";
import { type Collector, collector, type TableSeries } from "./readingsSeries.ts";
import { timeReader } from "./readingsTime.ts";
import { didYouMean, shown } from "./wording.ts";

/** Notes kept, and names of covers allowed. */
const MOST_NOTES = 100;
const MOST_STATES = 1000;

export interface ReadingsTable {
  readonly file: string;
  /** Rows of readings. */
  readonly rows: number;
  /** False where the time is an order, or plain numbers without a unit. */
  readonly timeInSeconds: boolean;
  /** Covers, as first named. */
  readonly covers: readonly string[];
  readonly series: readonly TableSeries[];
  /** Fewest and most averages of a reading, where the table counts them. */
  readonly averages?: { readonly least: number; readonly most: number };
  readonly notes: readonly { readonly line: number; readonly text: string }[];
  /** Doubts that do not keep the table from being used. */
  readonly doubts: readonly { readonly line: number; readonly message: string }[];
}

export interface TableReader {
  readonly row: (cells: readonly string[], line: number) => void;
  /** The table, or undefined where it has faults. */
  readonly end: () => ReadingsTable | undefined;
}

/** Judges a table row by row; every fault goes to `faults`, and nothing is reduced any more after the first. */
export function tableReader(file: string, faults: FaultList): TableReader {
  let columns: Columns | undefined;
  let headed = false;
  let clock = timeReader(undefined);
  let rows = 0;
  let lastLine = 1;
  let before: { time: number; line: number } | undefined;
  let averages: { least: number; most: number } | undefined;
  const states = new Map<string, { count: number; line: number }>();
  const collectors = new Map<FigureColumn, Collector>();
  const notes: { line: number; text: string }[] = [];

  const timeOf = ({ time }: Columns, cells: readonly string[], line: number): number | undefined => {
    if (time === undefined) return rows;
    const { value, message } = clock.read(cells[time] ?? "");
    if (value === undefined) {
      faults.add("bad_time", line, `time: ${message}`);
      return undefined;
    }
    if (before && value <= before.time) {
      const same = value === before.time ? "the same time as" : "an earlier time than";
      const hint = same.startsWith("the")
        ? "; give seconds, or a column order"
        : "; past midnight give the date";
      faults.add("unsorted", line, `time: read ${shown(cells[time])}, ${same} line ${before.line}${hint}`);
    }
    before = { time: value, line };
    return value;
  };

  return {
    row: (cells, line) => {
      lastLine = line;
      if (!headed) {
        headed = true;
        columns = readHeader(cells, line, faults);
        clock = timeReader(columns?.timeUnit);
        for (const { name, unit } of columns?.figures ?? []) collectors.set(name, collector(name, unit));
        return;
      }
      if (columns === undefined) return;
      rows++;
      if (cells.slice(columns.count).some((cell) => cell !== "")) {
        const hint = "; a text with a separator in it needs quotes, and a decimal comma must be a point";
        faults.add("too_many_cells", line, `${cells.length} cells under ${columns.count} headings${hint}`);
        return;
      }
      const time = timeOf(columns, cells, line);
      const state = stateOf(cells[columns.state] ?? "", line, faults);
      if (state !== undefined) {
        const seen = states.get(state);
        if (seen) seen.count++;
        else states.set(state, { count: 1, line });
        if (states.size > MOST_STATES) {
          faults.add("too_many_states", line, `more than ${MOST_STATES} different states`);
          columns = undefined;
          return;
        }
      }
      const taken = averagesOf(
        columns.averages === undefined ? "" : (cells[columns.averages] ?? ""),
        line,
        faults,
      );
      if (taken !== undefined) {
        averages = {
          least: Math.min(averages?.least ?? taken, taken),
          most: Math.max(averages?.most ?? taken, taken),
        };
      }
      const note = columns.note === undefined ? "" : (cells[columns.note] ?? "");
      if (note !== "" && notes.length < MOST_NOTES) notes.push({ line, text: note });
      const present = columns.figures.filter(({ cell }) => (cells[cell] ?? "") !== "");
      if (present.length === 0) {
        const names = columns.figures.map(({ name }) => name).join(" or ");
        faults.add("missing_reading", line, `no ${names} in this row; is the file cut off?`);
      }
      for (const { name, cell } of present) {
        const levelDb = collectors.get(name)!.read(cells[cell]!, line, faults);
        if (time === undefined || state === undefined || levelDb === undefined || faults.count() > 0)
          continue;
        try {
          collectors.get(name)!.add({ time, state, levelDb, line });
        } catch (error) {
          faults.add("too_many_covered", line, (error as Error).message);
        }
      }
    },
    end: () => {
      if (!headed) faults.add("empty", 1, "no readings in the file");
      else if (columns && rows === 0) faults.add("empty", lastLine, "a header and no readings below it");
      if (columns === undefined || rows === 0) return undefined;
      if (!states.has(OPEN)) {
        faults.add("no_bare", lastLine, `no reading of state bare; a cover is held against the bare feed`);
      } else if (states.size === 1) {
        faults.add("no_cover", lastLine, "every reading is bare; none names a cover");
      }
      const series = faults.count() > 0 ? [] : endOf([...collectors.values()], lastLine, faults);
      if (faults.count() > 0) return undefined;
      return {
        file,
        rows,
        timeInSeconds: columns.time !== undefined && clock.inSeconds(),
        covers: [...states.keys()].filter((state) => state !== OPEN),
        series,
        ...(averages && { averages }),
        notes,
        doubts: doubtsOf(states, averages),
      };
    },
  };
}

function stateOf(text: string, line: number, faults: FaultList): string | undefined {
  const fault = faultOfText(text);
  if (fault) faults.add("bad_state", line, `state: ${fault}, expected bare or the name of a cover`);
  else if (text === OPEN)
    faults.add("bad_state", line, `state: read "open"; write bare for the feed without cover`);
  else return text.toLowerCase() === "bare" ? OPEN : text;
  return undefined;
}

function averagesOf(text: string, line: number, faults: FaultList): number | undefined {
  if (text === "") return undefined;
  const count = Number(text);
  if (/^\d+$/.test(text) && count > 0) return count;
  faults.add("bad_averages", line, `averages: read ${shown(text)}, expected a whole number of 1 or more`);
  return undefined;
}

function endOf(collectors: readonly Collector[], lastLine: number, faults: FaultList): TableSeries[] {
  return collectors.flatMap(({ end }) => {
    try {
      return end() ?? [];
    } catch {
      const message =
        "too few pairs: two covered readings of one cover or more, each with a bare one before and after";
      faults.add("missing_pairs", lastLine, message);
      return [];
    }
  });
}

function doubtsOf(
  states: ReadonlyMap<string, { readonly count: number; readonly line: number }>,
  averages: { readonly least: number; readonly most: number } | undefined,
) {
  const names = [...states.keys()].filter((name) => name !== OPEN);
  const doubts = [...states].flatMap(([name, { count, line }]) => {
    const hint = didYouMean(name, ["bare", ...names.filter((other) => other !== name)]);
    if (count > 1 || hint === "" || name === OPEN) return [];
    return [{ line, message: `the state ${shown(name)} occurs once${hint}` }];
  });
  if (averages && averages.most > 2 * averages.least) {
    const message = `readings of ${averages.least} to ${averages.most} averages are taken for equally good`;
    doubts.push({ line: 1, message });
  }
  return doubts;
}
