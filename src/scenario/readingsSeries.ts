import { OPEN, type TimedReading } from "../readings/bracket.ts";
import { type RunningSeriesResult, runningSeries } from "../readings/runningSeries.ts";
import { tidy } from "./quantity.ts";
import type { FigureColumn, LevelUnit } from "./readingsColumns.ts";
import type { FaultList } from "./readingsFaults.ts";
import { shown } from "./wording.ts";

/** Readings that are kept one by one; a longer run is reduced while it is read. */
const MOST_HELD = 2000;
/** No meter reads a level beyond [dB]. */
const FARTHEST_DB = 300;

export interface LinedReading extends TimedReading {
  readonly line: number;
}

/** One figure of a table, in order of time. */
export interface TableSeries {
  readonly figure: FigureColumn;
  readonly unit: LevelUnit;
  readonly count: number;
  /** Every reading, where they are few enough to be kept; states as the models have them. */
  readonly readings: readonly LinedReading[] | undefined;
  readonly running: RunningSeriesResult;
  /** First and last bare reading, and the mean of all. */
  readonly bare: { readonly first: LinedReading; readonly last: LinedReading; readonly meanDb: number };
}

export interface Collector {
  readonly read: (text: string, line: number, faults: FaultList) => number | undefined;
  readonly add: (reading: LinedReading) => void;
  /** Undefined without a reading; throws as `runningSeries` does. */
  readonly end: () => TableSeries | undefined;
}

/** All readings of one column. */
export function collector(figure: FigureColumn, headerUnit: LevelUnit | undefined): Collector {
  const running = runningSeries();
  let held: LinedReading[] | undefined = [];
  let count = 0;
  let unit = headerUnit;
  let unitLine = 0;
  let first: LinedReading | undefined;
  let last: LinedReading | undefined;
  let bareCount = 0;
  let bareSumDb = 0;
  return {
    read: (text, line, faults) => {
      const refuse = (code: string, message: string) => {
        faults.add(code, line, `${figure}: read ${shown(text)}, ${message}`);
        return undefined;
      };
      const plain = tidy(text);
      const [, number, written] = /^([+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?) *(dbm?)?$/i.exec(plain) ?? [];
      if (number === undefined) {
        const comma = /^([+-]?\d+),(\d+)\b/.exec(plain);
        const hint = comma ? ` (write ${comma[1]}.${comma[2]} with a point)` : "";
        return refuse("not_a_number", `expected a number in ${unit ?? "dB or dBm"}${hint}`);
      }
      const own = written?.toLowerCase().replace("db", "dB") as LevelUnit | undefined;
      if (own === undefined && unit === undefined) {
        return refuse("no_unit", `a number without a unit; name it in the header: ${figure} dB`);
      }
      if (unit === undefined) [unit, unitLine] = [own, line];
      if (own !== undefined && own !== unit) {
        const where = unitLine === 0 ? "the header says" : `line ${unitLine} has`;
        return refuse("units_mixed", `where ${where} ${unit}; one unit in a column`);
      }
      const value = Number(number);
      if (figure === "return loss" && !(value > 0 && value <= 100)) {
        const hint = value < 0 ? ` (S11 of ${number} dB is a return loss of ${-value} dB)` : "";
        return refuse("out_of_range", `expected a return loss above 0 to 100 dB${hint}`);
      }
      if (Math.abs(value) <= FARTHEST_DB) return value;
      return refuse("out_of_range", `expected -${FARTHEST_DB} to ${FARTHEST_DB} ${unit}`);
    },
    add: (reading) => {
      // A level reflected falls where the return loss rises.
      const taken = figure === "reflected" ? { ...reading, levelDb: -reading.levelDb } : reading;
      running.add(taken, taken.line);
      count++;
      held?.push(taken);
      if (count > MOST_HELD) held = undefined;
      if (taken.state !== OPEN) return;
      first ??= taken;
      last = taken;
      bareCount++;
      bareSumDb += taken.levelDb;
    },
    end: () => {
      if (count === 0) return undefined;
      const result = running.end();
      return {
        figure,
        unit: unit!,
        count,
        readings: held,
        running: result,
        bare: { first: first!, last: last!, meanDb: bareSumDb / bareCount },
      };
    },
  };
}
