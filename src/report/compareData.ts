import { csvFormatRows } from "d3-dsv";
import type { Comparison } from "../study/compare.ts";

/** The comparison as JSON; a figure without bound (a perfect match) is null. */
export function compareJson(comparison: Comparison): string {
  return `${JSON.stringify(comparison, null, 2)}\n`;
}

/**
 * The comparison as one flat table: a row for each entry that differs, signed as it adds to the margin, then the
 * margins of each weather as a row of stage `result`.
 */
export function compareCsv({ scenario: { a, b }, weathers }: Comparison): string {
  const head = ["weather_a", "weather_b", "mode_a", "mode_b", "id", "stage", "label_a", "label_b", "cause"];
  const figures = ["a_db", "b_db", "difference_db", "difference_sigma_db", "verdict_a", "verdict_b"];
  const rows = weathers.flatMap(({ weather, entries, budget, differenceDb, differenceSigmaDb }) => {
    const chosen = [weather.a, weather.b, a.mode, b.mode];
    return [
      ...entries.map(({ id, stage, label, cause, db, differenceDb: change, ...rest }) => [
        ...[...chosen, id, stage, label.a ?? "", label.b ?? "", cause],
        ...[db.a ?? "", db.b ?? "", change, rest.differenceSigmaDb, "", ""],
      ]),
      [
        ...[...chosen, "result.margin", "result", "margin", "margin", ""],
        ...[budget.a.marginDb, budget.b.marginDb, differenceDb, differenceSigmaDb],
        ...[budget.a.verdict, budget.b.verdict],
      ],
    ];
  });
  return `${csvFormatRows([[...head, ...figures], ...rows.map((row) => row.map(String))])}\n`;
}
