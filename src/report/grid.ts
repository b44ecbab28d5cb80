export interface GridColumn {
  readonly align: "left" | "right";
  /** Longer cells are broken at words. */
  readonly width: number;
}

/**
 * A table without frames whose long cells are broken at words: columns set apart by two blanks, a rule below
 * the headings.
 *
 * The package behind it is loaded with the first table: the plain report, which must start fast, has none.
 */
export async function grid(
  rows: readonly (readonly string[])[],
  columns: readonly GridColumn[],
): Promise<string> {
  const { getBorderCharacters, table } = await import("table");
  const text = table(
    rows.map((row) => [...row]),
    {
      border: { ...getBorderCharacters("void"), joinBody: "-" },
      columns: columns.map(({ align, width }, i) => ({
        alignment: align,
        paddingLeft: i === 0 ? 0 : 2,
        paddingRight: 0,
        width,
        wrapWord: true,
      })),
      drawHorizontalLine: (index) => index === 1,
    },
  );
  return text
    .split("\n")
    .map((line) => line.trimEnd())
    .join("\n")
    .trimEnd();
}
