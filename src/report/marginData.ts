import { csvFormatRows } from "d3-dsv";
import type { MarginReport } from "../study/marginReport.ts";

/** The margin report as JSON, in the kept form; a figure without bound (a perfect match) is null. */
export function marginJson(report: MarginReport): string {
  return `${JSON.stringify(report, null, 2)}\n`;
}

/** The margin report as one flat table: a row an entry, then the results of each case as rows of stage `result`. */
export function marginCsv(report: MarginReport): string {
  const head = [
    "weather",
    "transmitter_feed",
    "transmitter_cover",
    "receiver_feed",
    "receiver_cover",
    "mode",
  ];
  const columns = ["id", "stage", "label", "db", "low", "high", "sigma", "source"];
  const rows = report.budgets.flatMap((budget) => {
    const { weather, transmitter, receiver, mode } = budget.case;
    const chosen = [weather, transmitter.feed, transmitter.cover, receiver.feed, receiver.cover, mode];
    const entries = [...budget.entries, ...budget.noiseEntries, budget.requirement].map((entry) => [
      ...chosen,
      entry.id,
      entry.stage,
      entry.label,
      ...[entry.db, entry.low, entry.high, entry.sigma].map(String),
      entry.source,
    ]);
    const result = (id: string, label: string, value: number, low = value, high = value, sigma = 0) => [
      ...chosen,
      `result.${id}`,
      "result",
      label,
      ...[value, low, high, sigma].map(String),
      budget.verdict,
    ];
    return [
      ...entries,
      result("received", "received level, dBm", budget.receivedDbm),
      result("noise", "noise, dBm", budget.noiseDbm),
      result("snr", "signal to noise", budget.snrDb),
      result("required", "signal to noise needed", budget.requiredSnrDb),
      result(
        "margin",
        "margin",
        budget.marginDb,
        budget.marginLowDb,
        budget.marginHighDb,
        budget.marginSigmaDb,
      ),
    ];
  });
  return `${csvFormatRows([[...head, ...columns], ...rows])}\n`;
}
