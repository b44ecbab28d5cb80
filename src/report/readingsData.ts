import { csvFormatRows } from "d3-dsv";
import type { BenchReport, ReducedFigure } from "../study/readings.ts";

/** The report as JSON; a figure without bound is null. */
export function readingsJson(report: BenchReport): string {
  return `${JSON.stringify(report, null, 2)}\n`;
}

/** A row for each cover and figure of a table, and for each frequency of a sweep. */
export function readingsCsv({ file, confidence, covers, sweeps }: BenchReport): string {
  const head = [
    ...["source", "cover", "figure", "frequency_ghz", "pairs", "value_db", "type_a_db", "combined_db"],
    ...["expanded_db", "confidence", "coverage_factor", "effective_degrees_of_freedom", "verdict"],
    ...["energy_floor_db", "below_energy_floor"],
  ];
  const read = (
    cover: string,
    name: string,
    figure: ReducedFigure & { verdict: string },
    floorDb?: number,
  ) => [
    ...[file, cover, name, "", figure.pairs, figure.valueDb, figure.typeADb, figure.combinedDb],
    ...[
      figure.expandedDb,
      confidence,
      figure.coverageFactor,
      figure.effectiveDegreesOfFreedom,
      figure.verdict,
    ],
    ...[floorDb ?? "", floorDb === undefined ? "" : figure.verdict === "below_energy_floor"],
  ];
  const rows = [
    ...covers.flatMap(({ cover, loss, change }) => [
      ...(loss ? [read(cover, "insertion_loss", loss, loss.floorDb)] : []),
      ...(change ? [read(cover, "return_loss_change", change)] : []),
    ]),
    ...sweeps.flatMap(({ cover, coveredFile, band }) =>
      band.points.flatMap((point) => {
        const swept = (name: string, value: number) => [
          ...[coveredFile, cover, name, point.frequencyHz / 1e9, "", value, "", "", "", "", "", "", ""],
          ...[point.floorDb, point.belowFloor],
        ];
        return [
          swept("bare_return_loss", point.bareReturnLossDb),
          swept("covered_return_loss", point.coveredReturnLossDb),
          ...(point.insertionLossDb === undefined ? [] : [swept("insertion_loss", point.insertionLossDb)]),
        ];
      }),
    ),
  ];
  return `${csvFormatRows([head, ...rows.map((row) => row.map(String))])}\n`;
}
