import { requireNotNegative, requireWithin } from "../numeric/check.ts";
import { normalCdf } from "../numeric/normal.ts";
import { bisect } from "../numeric/roots.ts";

/** Twelve figures of a weather station, January first. */
export interface MonthlyClimate {
  readonly monthlyRainfallMm: readonly number[];
  readonly monthlyTemperatureC: readonly number[];
}

/** Averaged over leap years. */
const DAYS_OF_MONTH = [31, 28.25, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];
const DAYS_OF_YEAR = 365.25;

/** Median and spread of the logarithm of the rate while it rains. */
const MEDIAN_SHIFT = 0.7938;
const SPREAD = 1.26;
/** So many spreads from the median the normal distribution has run out in double precision. */
const TAIL = 38;

/** Rain of a month, weighted by its part of the year. */
interface WetMonth {
  /** Share of the year with rain in this month [%]. */
  readonly rainPercent: number;
  /** Logarithm of the median rate while it rains. */
  readonly logMedian: number;
}

/**
 * Rain rate exceeded for a share of the average year, from the monthly figures of a weather station.
 *
 * Each month rains for a time that follows from its total and its temperature, with rates that are spread
 * log-normally; R(p) is the root of P(R) = p.
 *
 * Source: ITU-R P.837-7 (06/2017) Annex 1. ITU's maps of R0.01 were made by the same method.
 *
 * @param monthlyRainfallMm    12 mean totals [mm], at least 0, January first
 * @param monthlyTemperatureC  12 mean temperatures [degC], -90 to 60
 * @param percent              share of the average year [%], 1e-6 to 100
 * @returns rate [mm/h], 0 where it rains less often than that; the rate at 0.01 % [mm/h]; share of rain [%]
 * @throws RangeError on lists of another length and on impossible figures
 */
export function monthlyRainRate(input: MonthlyClimate & { readonly percent: number }): {
  rainRateMmPerH: number;
  rainRate001MmPerH: number;
  rainPercent: number;
} {
  requireWithin("percent", input.percent, 1e-6, 100);
  const months = wetMonths(input);
  return {
    rainRateMmPerH: rateExceeded(months, input.percent),
    rainRate001MmPerH: rateExceeded(months, 0.01),
    rainPercent: totalRainPercent(months),
  };
}

/**
 * Share of the average year in which a rain rate is exceeded: the inverse of `monthlyRainRate`.
 *
 * Source: ITU-R P.837-7 (06/2017) Annex 1
 *
 * @param monthlyRainfallMm    12 mean totals [mm], at least 0, January first
 * @param monthlyTemperatureC  12 mean temperatures [degC], -90 to 60
 * @param rainRateMmPerH       [mm/h], at least 0
 * @returns share of the year [%]
 * @throws RangeError on lists of another length and on impossible figures
 */
export function monthlyRainPercent(input: MonthlyClimate & { readonly rainRateMmPerH: number }): {
  percent: number;
} {
  requireNotNegative("rainRateMmPerH", input.rainRateMmPerH);
  return { percent: percentExceeded(wetMonths(input), Math.log(input.rainRateMmPerH)) };
}

function wetMonths({ monthlyRainfallMm, monthlyTemperatureC }: MonthlyClimate): WetMonth[] {
  requireWithin("length of monthlyRainfallMm", monthlyRainfallMm.length, 12, 12);
  requireWithin("length of monthlyTemperatureC", monthlyTemperatureC.length, 12, 12);
  return DAYS_OF_MONTH.flatMap((days, month) => {
    const rainfallMm = monthlyRainfallMm[month]!;
    const temperatureC = monthlyTemperatureC[month]!;
    requireNotNegative(`monthlyRainfallMm[${month}]`, rainfallMm);
    requireWithin(`monthlyTemperatureC[${month}]`, temperatureC, -90, 60);
    if (rainfallMm === 0) return [];
    const meanRate = rainfallMm / (24 * days);
    const warmRate = 0.5874 * Math.exp(0.0883 * Math.max(temperatureC, 0));
    // It rains for at most 70 % of a month; more rain then means harder rain.
    const share = Math.min(meanRate / warmRate, 0.7);
    return [
      {
        rainPercent: (100 * share * days) / DAYS_OF_YEAR,
        logMedian: Math.log(meanRate / share) - MEDIAN_SHIFT,
      },
    ];
  });
}

function totalRainPercent(months: readonly WetMonth[]): number {
  return months.reduce((sum, { rainPercent }) => sum + rainPercent, 0);
}

function percentExceeded(months: readonly WetMonth[], logRate: number): number {
  return months.reduce(
    (sum, { rainPercent, logMedian }) => sum + rainPercent * normalCdf((logMedian - logRate) / SPREAD),
    0,
  );
}

function rateExceeded(months: readonly WetMonth[], percent: number): number {
  if (percent >= totalRainPercent(months)) return 0;
  const medians = months.map(({ logMedian }) => logMedian);
  const low = Math.min(...medians) - TAIL * SPREAD;
  const high = Math.max(...medians) + TAIL * SPREAD;
  return Math.exp(bisect((logRate) => percentExceeded(months, logRate) - percent, low, high)!);
}
