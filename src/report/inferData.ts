import { csvFormatRows } from "d3-dsv";
import type { InferReport } from "../study/inferReadings.ts";

/** The report as JSON; a figure without bound is null. */
export function inferJson(report: InferReport): string {
  return `${JSON.stringify(report, null, 2)}\n`;
}

/** A row for each solution: feeds first, then the sheets of unknown material by each feed. */
export function inferCsv({ frequencyGHz, feed, sheets }: InferReport): string {
  const head = [
    ...["what", "name", "outcome", "frequency_ghz", "gamma", "return_loss_db"],
    ...["phase_deg", "phase_low_deg", "phase_high_deg"],
    ...["permittivity", "permittivity_low", "permittivity_high"],
    ...["loss_tangent", "loss_tangent_low", "loss_tangent_high"],
  ];
  const none = (count: number) => Array.from({ length: count }, () => "");
  const rows = [
    ...(feed?.feeds ?? []).map(({ gamma, returnLossDb, phaseDeg, phaseLowDeg, phaseHighDeg }) => [
      ...["feed", "", feed!.outcome, frequencyGHz, gamma, returnLossDb, phaseDeg, phaseLowDeg, phaseHighDeg],
      ...none(6),
    ]),
    ...sheets.flatMap(({ name, byFeed }) =>
      byFeed.flatMap(({ feedPhaseDeg, result }) => [
        ...result.solutions.map((one) => [
          ...["sheet", name, result.outcome, frequencyGHz, "", "", feedPhaseDeg ?? "", "", ""],
          ...[one.permittivity, one.permittivityLow, one.permittivityHigh],
          ...[one.lossTangent, one.lossTangentLow, one.lossTangentHigh],
        ]),
        ...result.permittivityIntervals.map(([low, high]) => [
          ...["sheet", name, result.outcome, frequencyGHz, "", "", "", "", "", "", low, high],
          ...none(3),
        ]),
      ]),
    ),
  ];
  return `${csvFormatRows([head, ...rows.map((row) => row.map(String))])}\n`;
}
