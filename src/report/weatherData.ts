import { csvFormatRows } from "d3-dsv";
import type { BreakEven } from "../study/breakEven.ts";
import { rainOns } from "../study/rainOn.ts";
import type { Rung } from "../study/rung.ts";
import type { WeatherLadder } from "../study/weatherLadder.ts";

/** The ladder as JSON; a rate that no rain up to the heaviest reaches is left out. */
export function weatherJson(ladder: WeatherLadder): string {
  return `${JSON.stringify(ladder, null, 2)}\n`;
}

/**
 * The ladder as one flat table, a row a rung: every cover by what the rain falls on, then the covers of the table of
 * extents by the extent of rain on both. Break-even rates and words repeat in each row.
 */
export function weatherCsv({ modes, rates, weather, path }: WeatherLadder): string {
  const authorities = rates.find(({ words }) => words.length > 0)!.words.map(({ authority }) => authority);
  const head = [
    ...["table", "mode", "weather", "transmitter_cover", "receiver_cover", "rain_on", "extent", "extent_km"],
    ...["rain_rate_mm_per_h", "margin_db", "margin_sigma_db", "hold_probability", "verdict", "mechanism"],
    ...["closes_to_mm_per_h", "reserve_to_mm_per_h", "reserve_low_mm_per_h", "reserve_high_mm_per_h"],
    ...["zero_from_mm_per_h", "zero_low_mm_per_h", "zero_high_mm_per_h"],
    ...authorities.map((authority) => `words_${authority.toLowerCase().replace(/\W+/g, "_")}`),
  ];
  const rowsOf = (lead: readonly (string | number)[], rungs: readonly Rung[], breakEven: BreakEven) =>
    rungs.map((rung, i) => [
      ...lead,
      ...[rung.rateMmPerH, rung.marginDb, rung.marginSigmaDb, rung.holdProbability],
      ...[rung.verdict, rung.mechanism],
      ...ratesOf(breakEven),
      ...authorities.map((_, j) => rates[i]!.words[j]?.word ?? ""),
    ]);
  const rows = modes.flatMap(({ mode, covers, extents }) => [
    ...covers.flatMap(({ transmitter, receiver, rungs, breakEven }) =>
      rainOns.flatMap((on) =>
        rowsOf(
          ["ladder", mode, weather, transmitter.cover, receiver.cover, on, "as in the weather", ""],
          rungs[on],
          breakEven[on],
        ),
      ),
    ),
    ...extents.columns.flatMap(({ kind, extentKm, rungs, breakEven }) =>
      rowsOf(
        [
          ...["extents", mode, weather, extents.transmitter.cover, extents.receiver.cover, "both", kind],
          kind === "whole" ? path.distanceKm : (extentKm ?? ""),
        ],
        rungs,
        breakEven,
      ),
    ),
  ]);
  return `${csvFormatRows([head, ...rows.map((row) => row.map(String))])}\n`;
}

function ratesOf({ closesMmPerH, reserveMmPerH, reserveSpread, zeroMmPerH, zeroSpread }: BreakEven) {
  return [
    ...[closesMmPerH, reserveMmPerH, reserveSpread.lowMmPerH, reserveSpread.highMmPerH],
    ...[zeroMmPerH, zeroSpread.lowMmPerH, zeroSpread.highMmPerH],
  ].map((rate) => rate ?? "");
}
