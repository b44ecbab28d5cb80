import type { Scatter } from "../numeric/scatter.ts";
import { scatterQuantile } from "../numeric/scatterQuantile.ts";
import { withWeather } from "./prepare.ts";
import type { Link } from "./types.ts";

/** Nodes to either side of the weather's own rate. */
const RAIN_NODES = 8;
/** Rates drawn more seldom than this at either end are taken at the grid's end. */
const RAREST = 1e-4;
/** Widest step: a grid from a hundredth to a hundredfold. */
const WIDEST_LOG = Math.log(100);

/**
 * A weather at rates about its own, or at films of dew, evenly spaced in the logarithm, so that draws need not ask the
 * models again.
 */
export interface RainGrid {
  /** What the grid runs over: the rate of the rain [mm/h], or without any the film of dew [mm]. */
  readonly of: "rain" | "dew";
  readonly nominal: number;
  readonly scatter: Scatter;
  readonly stepLog: number;
  /** The link in such weathers of one name: in none of that rain where draws may bring it to nothing, then by rate. */
  readonly links: readonly Link[];
  /** Place among them of the least rate above 0, and of the scenario's own. */
  readonly least: number;
  readonly middle: number;
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
  if (rateMmPerH === 0) return dewGrid(link, name);
  const factor = link.doubts.rainRateFactor;
  const scatter: Scatter =
    value > 0 && stated !== undefined
      ? stated
      : value > 0 && sigma !== undefined
        ? { kind: "normal", sigma }
        : { kind: "lognormal", factor };
  return gridOver(link, { of: "rain", nominal: rateMmPerH, scatter }, (times) =>
    withWeather(link, name, {
      ...weather,
      rainMmPerH: { value: value * times },
      coversWetAsAtMmPerH: weather.coversWetAsAtMmPerH && weather.coversWetAsAtMmPerH * times,
    }),
  );
}

/** Beside rain's film, which is the thicker, dew does not count. */
function dewGrid(link: Link, name: string): RainGrid | undefined {
  const weather = link.scenario.weather[name]!;
  const { value: nominal, sigma, scatter = sigma && ({ kind: "normal", sigma } as const) } = weather.dewMm;
  if (nominal === 0 || !scatter) return undefined;
  return gridOver(link, { of: "dew", nominal, scatter }, (times) =>
    withWeather(link, name, { ...weather, dewMm: { value: nominal * times } }),
  );
}

function gridOver(
  link: Link,
  over: Pick<RainGrid, "of" | "nominal" | "scatter">,
  at: (times: number) => Link,
): RainGrid | undefined {
  const reach = extremes(over.nominal, over.scatter).map((amount) => {
    const ratio = amount / over.nominal;
    return ratio > 0 ? Math.min(WIDEST_LOG, Math.abs(Math.log(ratio))) : WIDEST_LOG;
  });
  const stepLog = Math.max(...reach) / RAIN_NODES;
  if (!(stepLog > 1e-9)) return undefined;
  const byRate = Array.from({ length: 2 * RAIN_NODES + 1 }, (_, i) =>
    i === RAIN_NODES ? link : at(Math.exp((i - RAIN_NODES) * stepLog)),
  );
  // A film thins with the third root of the rate: a hundredth of the rain still leaves a fifth of it.
  const dry = Math.max(...reach) === WIDEST_LOG ? [at(0)] : [];
  const least = dry.length;
  return { ...over, stepLog, links: [...dry, ...byRate], least, middle: least + RAIN_NODES };
}

/** Least and largest amount worth a node; the parts of a mixture follow in any order, so that each is looked at. */
function extremes(value: number, scatter: Scatter): number[] {
  if (scatter.kind !== "mixture") return [RAREST, 1 - RAREST].map(scatterQuantile(value, scatter));
  return scatter.parts.flatMap((part) =>
    part.share === 0 ? [] : part.scatter === undefined ? [part.value] : extremes(part.value, part.scatter),
  );
}
