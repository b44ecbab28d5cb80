import { closeSync, createReadStream, openSync, readSync, statSync } from "node:fs";
import { pipeline } from "node:stream/promises";
import { parse } from "csv-parse";
import type { FaultList } from "./readingsFaults.ts";
import { type ReadingsTable, tableReader } from "./readingsTable.ts";

/** Told of bytes read, of all; a 200 MB file takes a while. */
export type Progress = (bytes: number, ofBytes: number) => void;

/** Longest row that can be meant [characters]. */
const LONGEST_ROW = 10_000;
const HEAD_BYTES = 65_536;

/**
 * Reads a table of readings from a CSV file, streamed: memory does not grow with the file.
 *
 * Comma, semicolon or tab, as the header has it; quoted cells; comments from # at the start of a line; any line end;
 * a byte-order mark.
 *
 * @returns the table, or undefined where `faults` has got the faults
 */
export async function readCsv(
  path: string,
  file: string,
  faults: FaultList,
  progress?: Progress,
): Promise<ReadingsTable | undefined> {
  const reader = tableReader(file, faults);
  let line = 0;
  const parser = parse({
    bom: true,
    comment: "#",
    comment_no_infix: true,
    delimiter: separatorOf(path),
    max_record_size: LONGEST_ROW,
    record_delimiter: ["\r\n", "\n", "\r"],
    relax_column_count: true,
    skip_empty_lines: true,
    trim: true,
    on_record: (cells: string[], { lines }) => {
      line = lines;
      const within = cells.reduce((sum, cell) => sum + (cell.match(/\r\n?|\n/g)?.length ?? 0), 0);
      reader.row(cells, lines - within);
      return null; // nothing is handed on: the row has been judged
    },
  });
  try {
    await pipeline(textOf(path, progress), parser.resume());
  } catch (error) {
    faults.add(...faultOf(error as NodeJS.ErrnoException & { lines?: number }, line));
    return undefined;
  }
  return reader.end();
}

async function* textOf(path: string, progress?: Progress): AsyncGenerator<string> {
  const decoder = new TextDecoder("utf-8", { fatal: true, ignoreBOM: true });
  const { size } = statSync(path);
  let done = 0;
  for await (const chunk of createReadStream(path, { highWaterMark: 1 << 18 })) {
    const bytes = chunk as Buffer;
    if (bytes.includes(0)) throw Object.assign(new Error(), { code: "BINARY" });
    yield decoder.decode(bytes, { stream: true });
    done += bytes.length;
    progress?.(done, size);
  }
  yield decoder.decode();
}

/** The separator of the first line that is no comment: the one that occurs most outside quotes. */
function separatorOf(path: string): string {
  const head = Buffer.alloc(HEAD_BYTES);
  const descriptor = openSync(path, "r");
  const length = readSync(descriptor, head, 0, HEAD_BYTES, 0);
  closeSync(descriptor);
  const lines = head
    .toString("utf8", 0, length)
    .replace(/^\ufeff/, "")
    .split(/\r\n?|\n/);
  const header = (lines.find((line) => line.trim() !== "" && !line.startsWith("#")) ?? "").replace(
    /"[^"]*"/g,
    "",
  );
  const separators = [",", ";", "\t"];
  return separators.reduce((a, b) => (header.split(b).length > header.split(a).length ? b : a));
}

function faultOf(
  { code, message, lines }: NodeJS.ErrnoException & { lines?: number },
  lastGood: number,
): [code: string, line: number, message: string] {
  const line = lastGood + 1;
  switch (code) {
    case "CSV_QUOTE_NOT_CLOSED":
      return ["bad_quotes", line, "a quote that is opened here or below and never closed"];
    case "INVALID_OPENING_QUOTE":
    case "CSV_INVALID_CLOSING_QUOTE":
      return [
        "bad_quotes",
        lines ?? line,
        'a quote inside a cell; put the cell in quotes and write "" for a quote',
      ];
    case "CSV_MAX_RECORD_SIZE":
      return ["long_row", line, `a row longer than ${LONGEST_ROW} characters; is a quote left open?`];
    case "BINARY":
      return ["not_text", line, "is a binary file, expected CSV in UTF-8"];
    case "ERR_ENCODING_INVALID_ENCODED_DATA":
      return ["not_text", line, "is no text in UTF-8, expected CSV in UTF-8"];
    default:
      return ["unreadable", line, `cannot be read (${code ?? message})`];
  }
}
