import { pipeline } from "node:stream/promises";
import { parse } from "csv-parse";
import { headLines, isIdle, type Progress, separatorOf, textOf } from "./csvText.ts";
import type { FaultList } from "./readingsFaults.ts";
import { type ReadingsTable, tableReader } from "./readingsTable.ts";

/** Longest row that can be meant [characters]. */
const LONGEST_ROW = 10_000;

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
    delimiter: separatorOf(headLines(path).find((one) => !isIdle(one)) ?? ""),
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
    await pipeline(textOf(path, true, progress), parser.resume());
  } catch (error) {
    faults.add(...faultOf(error as NodeJS.ErrnoException & { lines?: number }, line));
    return undefined;
  }
  return reader.end();
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
