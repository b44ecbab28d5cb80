import { csvFormatRows } from "d3-dsv";
import type { Outage, YearOutage } from "../study/yearOutage.ts";

/** The year as JSON; spans have the same low and high where the model knows the figure. */
export function yearJson(year: YearOutage): string {
  return `${JSON.stringify(year, null, 2)}\n`;
}

const spans = [
  ["rain_percent", "rainPercent"],
  ["multipath_percent", "multipathPercent"],
  ["availability_percent", "availabilityPercent"],
  ["rain_hours", "rainHours"],
  ["multipath_hours", "multipathHours"],
  ["year_hours", "yearHours"],
  ["rain_month_minutes", "rainMonthMinutes"],
  ["multipath_month_minutes", "multipathMonthMinutes"],
  ["month_minutes", "monthMinutes"],
] as const satisfies readonly (readonly [string, keyof Outage])[];

/** The year as one flat table: three rows a choice of covers, dry and wet below 0 and wet below the reserve. */
export function yearCsv({ covers, mode, reserveDb }: YearOutage): string {
  const head = [
    ...["transmitter_cover", "receiver_cover", "mode", "clear_margin_db", "covers", "below_margin_db"],
    ...spans.flatMap(([name]) => [`${name}_low`, `${name}_high`]),
    ...["at_rain_mm_per_h", "at_path_fade_db"],
  ];
  const rows = covers.flatMap(({ transmitter, receiver, clearMarginDb, dry, wet, belowReserve }) =>
    (
      [
        ["dry", 0, dry],
        ["wet", 0, wet],
        ["wet", reserveDb, belowReserve],
      ] as const
    ).map(([water, belowDb, outage]) => [
      ...[transmitter.cover, receiver.cover, mode, clearMarginDb, water, belowDb],
      ...spans.flatMap(([, key]) => [outage[key].low, outage[key].high]),
      ...[outage.atRain?.rateMmPerH ?? "", outage.atRain?.pathFadeDb ?? ""],
    ]),
  );
  return `${csvFormatRows([head, ...rows.map((row) => row.map(String))])}\n`;
}
