import { csvFormatRows } from "d3-dsv";
import type { CoverVerdict } from "../study/coverVerdict.ts";

/** The cover verdict as JSON; a figure without bound (a perfect match) is null. */
export function coversJson(verdict: CoverVerdict): string {
  return `${JSON.stringify(verdict, null, 2)}\n`;
}

/** The cover verdict as one flat table: a row for each cover, weather and placing, best cover first. */
export function coversCsv({ covers, mode }: CoverVerdict): string {
  const head = [
    ...["cover", "weather", "covered_at", "mode", "dry_cost_db", "dry_cost_low_db", "dry_cost_high_db"],
    ...[
      "water_cost_db",
      "water_cost_low_db",
      "water_cost_high_db",
      "noise_added_k",
      "noise_cost_db",
      "cost_db",
    ],
    ...["transmitter_return_loss_db", "receiver_return_loss_db", "margin_db", "margin_sigma_db", "verdict"],
    ...["bare_margin_db", "bare_verdict", "rain_to_reserve_mm_per_h", "rain_to_zero_mm_per_h"],
  ];
  const rows = covers.flatMap(({ cover, rows, breakEven }) =>
    rows.map((row) => [
      ...[cover, row.weather, row.placing, mode],
      ...[row.dryCostDb.nominal, row.dryCostDb.low, row.dryCostDb.high],
      ...[row.waterCostDb.nominal, row.waterCostDb.low, row.waterCostDb.high],
      ...[row.noiseAddedK, row.noiseCostDb, row.costDb],
      ...[row.transmitter.returnLossDb.nominal, row.receiver.returnLossDb.nominal],
      ...[row.marginDb, row.marginSigmaDb, row.verdict, row.bareMarginDb, row.bareVerdict],
      ...[breakEven.reserveMmPerH ?? "", breakEven.zeroMmPerH ?? ""],
    ]),
  );
  return `${csvFormatRows([head, ...rows.map((row) => row.map(String))])}\n`;
}
