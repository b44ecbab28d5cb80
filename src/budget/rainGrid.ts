import type { Scatter } from "../numeric/scatter.ts";
import { scatterQuantile } from "../numeric/scatterQuantile.ts";
import { withWeather } from "./prepare.ts";
import type { Link } from "./types.ts";

/** Nodes to either side of the weather's own rate. */
export const RAIN_NODES = 8;
/** Rates drawn more seldom than this at either end are taken at the grid's end. */
const RAREST = 1e-4;
/** Widest step: a grid from a hundredth to a hundredfold. */
const WIDEST_LOG = Math.log(100);

/** A weather at rates about its own, evenly spaced in the logarithm, so that draws need not ask the models again. */
export interface RainGrid {
  readonly rateMmPerH: number;
  readonly scatter: Scatter;
  readonly stepLog: number;
  /** The link in 2 RAIN_NODES + 1 such weathers of one name, the scenario's own in the middle. */
  readonly links: readonly Link[];
}

/**
 * The weather over the spread of its rate, path and covers alike; undefined where nothing is wet by rain or the rate
 * is exact.
 */
export function rainGrid(link: Link, name: string): RainGrid | undefined {
  const weather = link.scenario.weather[name]!;
  const { value, sigma, scatter: stated } = weather.rainMmPerH;
  const covers = weather.coversWetAsAtMmPerH ?? 0;
  const rateMmPerH = value > 0 ? value : covers;
  if (rateMmPerH === 0) return undefined;
  const factor = link.doubts.rainRateFactor;
  const scatter: Scatter =
    value > 0 && stated !== undefined
      ? stated
      : value > 0 && sigma !== undefined
        ? { kind: "normal", sigma }
        : { kind: "lognormal", factor };
  const quantile = scatterQuantile(rateMmPerH, scatter);
  const reach = [RAREST, 1 - RAREST].map((p) => {
    const ratio = quantile(p) / rateMmPerH;
    return ratio > 0 ? Math.min(WIDEST_LOG, Math.abs(Math.log(ratio))) : WIDEST_LOG;
  });
  const stepLog = Math.max(...reach) / RAIN_NODES;
  if (!(stepLog > 1e-9)) return undefined;
  const links = Array.from({ length: 2 * RAIN_NODES + 1 }, (_, i) => {
    const times = Math.exp((i - RAIN_NODES) * stepLog);
    if (i === RAIN_NODES) return link;
    return withWeather(link, name, {
      ...weather,
      rainMmPerH: { value: value * times },
      coversWetAsAtMmPerH: weather.coversWetAsAtMmPerH && weather.coversWetAsAtMmPerH * times,
    });
  });
  return { rateMmPerH, scatter, stepLog, links };
}
