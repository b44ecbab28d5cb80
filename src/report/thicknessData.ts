import { csvFormatRows } from "d3-dsv";
import type { ThicknessStudy } from "../study/thickness.ts";

/** The whole study as JSON; a figure without bound (no reflection at all) is null, an end not met is absent. */
export function thicknessJson(study: ThicknessStudy): string {
  return `${JSON.stringify(study, null, 2)}\n`;
}

/** Cost and match against thickness, a row a thickness, for plotting. */
export function thicknessCsv({ points }: ThicknessStudy): string {
  const head = [
    "thickness_mm",
    "sheet_loss_db",
    "sheet_return_loss_db",
    "cost_db",
    "cost_low_db",
    "cost_high_db",
    "cost_best_db",
    "cost_worst_db",
    "return_loss_db",
    "return_loss_low_db",
    "return_loss_high_db",
    "return_loss_worst_db",
  ];
  const rows = points.map((point) =>
    [
      point.thicknessMm,
      point.sheetLossDb,
      point.sheetReturnLossDb,
      point.costDb.nominal,
      point.costDb.low,
      point.costDb.high,
      point.bestCostDb,
      point.worstCostDb,
      point.returnLossDb.nominal,
      point.returnLossDb.low,
      point.returnLossDb.high,
      point.worstReturnLossDb,
    ].map(String),
  );
  return `${csvFormatRows([head, ...rows])}\n`;
}
