import { csvFormatRows } from "d3-dsv";
import type { SpreadStudy } from "../study/spread.ts";

/** The spread as JSON: rows by case, what the spread hangs on by weather, and every cause with its distribution. */
export function spreadJson(study: SpreadStudy): string {
  return `${JSON.stringify(study, null, 2)}\n`;
}

/** The spread as one flat table, a row a case. */
export function spreadCsv({ rows, mode, draws, seed }: SpreadStudy): string {
  const head = [
    ...["weather", "transmitter_cover", "receiver_cover", "mode", "draws", "seed"],
    ...[
      "margin_5_percent_db",
      "margin_median_db",
      "margin_95_percent_db",
      "margin_mean_db",
      "margin_sigma_db",
    ],
    ...["closes", "closes_low", "closes_high", "keeps_reserve", "verdict"],
    ...["cost_median_db", "cost_5_percent_db", "cost_95_percent_db", "lost", "won"],
    ...["budget_margin_db", "budget_sigma_db", "budget_holds", "budget_verdict"],
  ];
  const lines = rows.map(
    ({ case: one, marginDb, meanDb, sigmaDb, closes, keepsReserve, verdict, costDb, ...row }) => [
      ...[one.weather, one.transmitter.cover, one.receiver.cover, mode, draws, seed],
      ...[marginDb.lowDb, marginDb.medianDb, marginDb.highDb, meanDb, sigmaDb],
      ...[closes.share, closes.low, closes.high, keepsReserve.share, verdict],
      ...[costDb?.medianDb ?? "", costDb?.lowDb ?? "", costDb?.highDb ?? "", row.lost, row.won],
      ...[row.budget.marginDb, row.budget.marginSigmaDb, row.budget.holdProbability, row.budget.verdict],
    ],
  );
  return `${csvFormatRows([head, ...lines.map((line) => line.map(String))])}\n`;
}
