import { statSync } from "node:fs";
import { headLines, isIdle, separatorOf, textOf } from "./csvText.ts";
import type { FileFault } from "./readingsFaults.ts";
import { type RosterCells, type RosterKind, readRosterHeader } from "./rosterColumns.ts";
import { cellsOf, columnAt } from "./rosterRow.ts";
import { visible } from "./wording.ts";

/** Longest stretch without the end of a line before reading stops [characters]. */
const LONGEST_LINE = 1_000_000;

/** What a spreadsheet may write above its header to say how cells are parted. */
const SEPARATOR_LINE = /^"?sep=.?"?\s*$/i;

/** A roster whose header has been read. */
export interface Roster {
  readonly path: string;
  readonly columns: RosterCells;
  readonly separator: string;
  /** Columns that nothing here knows. */
  readonly passedOver: readonly string[];
  readonly headerLine: number;
  readonly bytes: number;
}

export type OpenedRoster =
  | { readonly roster: Roster; readonly faults?: undefined }
  | { readonly roster?: undefined; readonly faults: readonly FileFault[] };

/** Lines of a roster that follow each other, as typed. */
export interface RosterLines {
  readonly firstLine: number;
  readonly lines: readonly string[];
  /** Share of the file up to their end, 0 to 1. */
  readonly share: number;
  /** Why the file could not be read beyond them. */
  readonly fault?: FileFault | undefined;
}

/** Reads the header of a roster of stations, or of own sites. Never throws. */
export function openRoster(path: string, kind: RosterKind): OpenedRoster {
  const fault = (line: number, message: string, column = 1): OpenedRoster => {
    return { faults: [{ code: "bad_roster", message: visible(message), file: path, line, column }] };
  };
  try {
    const status = statSync(path);
    if (status.isDirectory()) return fault(1, `is a folder, expected a CSV file of ${kind}`);
    if (!status.isFile()) return fault(1, `is no plain file, expected a CSV file of ${kind}`);
    const lines = headLines(path);
    if (lines.some((line) => line.includes("\0"))) return fault(1, "is a binary file, expected CSV in UTF-8");
    const index = lines.findIndex((line) => !isIdle(line) && !SEPARATOR_LINE.test(line));
    if (index < 0) return fault(1, `the file is empty, expected a header and ${kind} below it`);
    const header = lines[index]!;
    const separator = separatorOf(header);
    const { columns, passedOver, faults } = readRosterHeader(cellsOf(header, separator), kind);
    if (faults.length === 0) {
      return { roster: { path, columns, separator, passedOver, headerLine: index + 1, bytes: status.size } };
    }
    const placed = faults.map(({ cell, message }) => {
      const column = columnAt(header, separator, cell);
      return { code: "bad_header", message: visible(message), file: path, line: index + 1, column };
    });
    return { faults: placed };
  } catch (error) {
    const { code = "", message } = error as NodeJS.ErrnoException;
    if (code === "ENOENT" || code === "ENOTDIR") return fault(1, "no such file");
    if (code === "EACCES" || code === "EPERM") return fault(1, "no permission to read the file");
    return fault(1, `cannot be read (${code || message})`);
  }
}

/**
 * The lines below the header, some at a time: memory does not grow with the file. Where it cannot be read on, the last
 * lines say so. Never throws.
 */
export async function* rosterLines(
  { path, headerLine, bytes }: Roster,
  atATime: number,
): AsyncGenerator<RosterLines> {
  let line = 0;
  let open = "";
  let passed = 0;
  let waiting: string[] = [];
  const take = (share: number): RosterLines => {
    const lines = waiting;
    waiting = [];
    return { firstLine: line - lines.length + 1, lines, share };
  };
  try {
    for await (const text of textOf(path, false)) {
      // A carriage return at the very end may be half of a line's end.
      const whole = open + text;
      const ready = whole.endsWith("\r") ? whole.slice(0, -1) : whole;
      const lines = ready.split(/\r\n|\n|\r/);
      open = lines.pop()! + whole.slice(ready.length);
      for (const one of lines) {
        passed += one.length + 1; // as good as bytes
        if (++line <= headerLine) continue;
        waiting.push(one);
        if (waiting.length === atATime) yield take(Math.min(1, passed / bytes));
      }
      if (open.length > LONGEST_LINE) throw Object.assign(new Error(), { code: "LONG" });
    }
    if (open.trim() !== "" && ++line > headerLine) waiting.push(open.replace(/\r$/, ""));
  } catch (error) {
    yield { ...take(1), fault: readingFault(path, line + 1, error as NodeJS.ErrnoException) };
    return;
  }
  if (waiting.length > 0) yield take(1);
}

function readingFault(file: string, line: number, { code, message }: NodeJS.ErrnoException): FileFault {
  const why =
    code === "BINARY"
      ? "is a binary file from here on, expected CSV in UTF-8"
      : code === "LONG"
        ? `a line longer than ${LONGEST_LINE} characters; is this CSV?`
        : `cannot be read on (${code ?? message})`;
  return { code: "unreadable", message: why, file, line, column: 1 };
}
