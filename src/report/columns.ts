import { lengthOf } from "./words.ts";

/** A cell: a text, and how it is to be shown where that is longer than it looks (colour). */
export interface Cell {
  readonly text: string;
  readonly shown?: string;
  /** Number of columns that the cell covers, 1 where not given; the covered ones follow as empty cells. */
  readonly across?: number;
}

export const cell = (text: string, shown = text): Cell => ({ text, shown });

/** A line across the table. */
export const RULE = "rule";

/**
 * Lines of one-line cells under each other: the first column to the left, the others to the right, two blanks
 * between. For cells that must break at words there is `grid`, which is slow to load.
 */
export function columns(rows: readonly (readonly Cell[] | typeof RULE)[]): string {
  const widths: number[] = [];
  const widthOf = (from: number, across: number) =>
    widths.slice(from, from + across).reduce((sum, width) => sum + width + 2, -2);
  const cells = rows.filter((row) => row !== RULE).flatMap((row) => [...row.entries()]);
  for (const [i, { text, across = 1 }] of cells) {
    if (across === 1) widths[i] = Math.max(widths[i] ?? 0, lengthOf(text));
  }
  // What is wider than the columns that it covers widens the last of them.
  for (const [i, { text, across = 1 }] of cells) {
    widths[i + across - 1]! += Math.max(0, lengthOf(text) - widthOf(i, across));
  }
  const whole = widthOf(0, widths.length);
  return rows
    .map((row) => {
      if (row === RULE) return "-".repeat(whole);
      const parts: string[] = [];
      for (let i = 0; i < row.length; ) {
        const { text, shown = text, across = 1 } = row[i]!;
        const blanks = " ".repeat(Math.max(0, widthOf(i, across) - lengthOf(text)));
        parts.push(i === 0 ? shown + blanks : blanks + shown);
        i += across;
      }
      return parts.join("  ").trimEnd();
    })
    .join("\n");
}
