import { evaluate } from "../budget/evaluate.ts";
import { onlyWith } from "../budget/onlyWith.ts";
import { overreachWarning } from "../budget/overreach.ts";
import { withWeather } from "../budget/prepare.ts";
import type { Budget, Case, EndChoice, Link, PathGeometry, Warning } from "../budget/types.ts";
import { outside } from "../numeric/check.ts";
import { bisect } from "../numeric/roots.ts";
import { rainWorstMonth } from "../path/fadingPeriod.ts";
import { rainFadeValidity } from "../path/rainFade.ts";
import type { EndName, Scenario, Weather } from "../scenario/types.ts";
import { isClear } from "./clearWeather.ts";
import { type BothEnds, coverPairs, endsUnder } from "./coverPairs.ts";
import { type MultipathOfYear, multipathOfYear } from "./multipathOfYear.ts";
import { type RainOfYear, rainOfYear } from "./rainOfYear.ts";
import { difference, exact, mapSpan, type Span, sum } from "./span.ts";
import { warningsOnce } from "./warningsOnce.ts";

/** How long a path lies below a margin, in an average year and in its worst month. */
export interface Outage {
  /** Rain on the path, and the water that it puts on the covers where that is counted. */
  readonly rainPercent: Span;
  readonly multipathPercent: Span;
  readonly yearPercent: Span;
  readonly availabilityPercent: Span;
  readonly rainHours: Span;
  readonly multipathHours: Span;
  readonly yearHours: Span;
  readonly rainMonthMinutes: Span;
  readonly multipathMonthMinutes: Span;
  /** Both added as though their worst months were the same one: never less than the truth. */
  readonly monthMinutes: Span;
  /** Rain at which the margin is used up; undefined beyond the range of the model. */
  readonly atRain: { readonly rateMmPerH: number; readonly pathFadeDb: number } | undefined;
}

/** One choice of covers over the year. */
export interface CoverYear {
  readonly transmitter: EndChoice;
  readonly receiver: EndChoice;
  /** In clear air, covers dry [dB]. */
  readonly clearMarginDb: number;
  /** Below a margin of 0 in rain that leaves the covers dry. */
  readonly dry: Outage;
  /** Below a margin of 0 in rain that wets the covers of both ends. */
  readonly wet: Outage;
  /** The same, below the reserve. */
  readonly belowReserve: Outage;
  /** Hours a year that the wet covers cost against bare mouths; undefined where both ends are bare. */
  readonly costHours: Span | undefined;
}

export interface YearOutage {
  readonly title: string;
  readonly frequencyGHz: number;
  readonly path: PathGeometry;
  readonly mode: string;
  readonly reserveDb: number;
  /** Rain rate exceeded for 0.01 % of the year [mm/h], and where it comes from. */
  readonly rainRate001MmPerH: number;
  readonly rainSource: string;
  /** Mean rain height [m]; undefined where wet snow is left out. */
  readonly meanRainHeightM: number | undefined;
  readonly multipath: Omit<MultipathOfYear, "sharesBelow" | "warnings">;
  /** The covers of the scenario first, then each on both ends, bare among them. */
  readonly covers: readonly CoverYear[];
  readonly warnings: readonly Warning[];
}

const HOURS_OF_YEAR = 24 * 365.25;
const MINUTES_OF_MONTH = (60 * HOURS_OF_YEAR) / 12;
const BOTH_ENDS: readonly EndName[] = ["transmitter", "receiver"];
/** Fades are sought to this [dB]: some 1e-7 of the time. */
const FADE_STEP_DB = 1e-6;
/** Name of the weather that is varied. */
const RAINING = "rain of the year";

/**
 * A permanent path over an average year: how long rain and multipath leave it below 0 and below the reserve, for
 * bare mouths, for dry covers and for covers that the rain wets.
 *
 * Rain is solved with its water: at a share of the year the climate has a rate, P.530 the fade of the path, and
 * the budget what that rate's water costs on the covers; the share is sought at which all of it uses the margin up.
 * Water that stays when the rain has stopped, dew, snow and ice on the covers are not counted.
 *
 * @param mode  name of a mode of the link
 * @throws RangeError on a scenario without a climate, or with a map that has not been read
 */
export function yearOutage(link: Link, mode: string): YearOutage {
  const { scenario, path } = link;
  const { climate, decision } = scenario;
  if (climate === undefined) throw new RangeError("the scenario has no climate");
  const rain = rainOfYear(scenario, climate, path);
  const { sharesBelow, warnings: multipathWarnings, ...multipath } = multipathOfYear(scenario, climate, path);
  const clear = clearWeather(scenario);
  const warnings = warningsOnce();

  const yearOf = (ends: BothEnds, bare: CoverYear | undefined): CoverYear => {
    const own = onlyWith(link, [ends]);
    const budgetIn = (weather: Weather) => {
      const chosen: Case = { ...ends, weather: RAINING, mode };
      return evaluate(withWeather(own, RAINING, weather), chosen);
    };
    const inRain = (rateMmPerH: number, rainFadeDb: number, wets: readonly EndName[]) =>
      budgetIn({ ...clear, rainMmPerH: { value: rateMmPerH }, rainFadeDb, wets });
    const { marginDb: clearMarginDb, mechanisms } = budgetIn(clear);
    warnings.add(sightWarnings(mechanisms[0]!));
    const outage = (keepDb: number, wets: readonly EndName[]): Outage => {
      const left = (rateMmPerH: number, fadeDb: number) => inRain(rateMmPerH, fadeDb, wets).marginDb - keepDb;
      return outageOf(rainBelow(rain, clearMarginDb - keepDb, left), sharesBelow(clearMarginDb - keepDb));
    };
    const wet = outage(0, BOTH_ENDS);
    const { rateMmPerH, pathFadeDb } = wet.atRain ?? {
      rateMmPerH: rain.rainRate001MmPerH,
      pathFadeDb: rain.deepDb,
    };
    warnings.add(inRain(rateMmPerH, pathFadeDb, BOTH_ENDS).warnings);
    return {
      ...ends,
      clearMarginDb,
      dry: outage(0, []),
      wet,
      belowReserve: outage(decision.reserveDb, BOTH_ENDS),
      costHours: bare && difference(wet.yearHours, bare.wet.yearHours),
    };
  };

  const bare = yearOf(endsUnder(link, "bare", "bare"), undefined);
  const covers = coverPairs(link).map((ends) =>
    ends.transmitter.cover === "bare" && ends.receiver.cover === "bare" ? bare : yearOf(ends, bare),
  );
  const ranges = outside(rainFadeValidity, {
    frequencyGHz: scenario.frequencyGHz,
    distanceKm: path.distanceKm,
  });
  return {
    title: scenario.title,
    frequencyGHz: scenario.frequencyGHz,
    path,
    mode,
    reserveDb: decision.reserveDb,
    rainRate001MmPerH: rain.rainRate001MmPerH,
    rainSource: rain.source,
    meanRainHeightM: climate.meanRainHeightM,
    multipath,
    covers,
    warnings: [
      ...warnings.all(),
      ...ranges.map(overreachWarning("rain of the year by P.530", "climate")),
      ...multipathWarnings,
    ],
  };
}

/** P.530 is for lines of sight; over an obstacle the hours are a guess, and in rain another way may carry the path. */
function sightWarnings({ name, label }: Budget["mechanisms"][number]): Warning[] {
  if (name === "line_of_sight") return [];
  const message = `P.530 holds for lines of sight, and ${label} carries this path in clear air: take the hours for a guess`;
  return [{ code: "no_line_of_sight", message, where: "path" }];
}

/** The scenario's first weather without rain, fog, water, ice or snow, or its first one freed of them. */
function clearWeather({ weather }: Scenario): Weather {
  const all = Object.values(weather);
  return {
    ...(all.find(isClear) ?? all[0]!),
    rainMmPerH: { value: 0 },
    fogGPerM3: 0,
    coversWetAsAtMmPerH: undefined,
    driedForMin: 0,
    dewMm: { value: 0 },
    iceMm: 0,
    snow: undefined,
  };
}

type RainShare = { readonly percent: Span; readonly atRain: Outage["atRain"] };

/**
 * Share of the year in which rain leaves less than is wanted; beyond the model's 0.001 to 1 % only a bound.
 *
 * @param clearDb  what is left in clear air [dB]
 * @param left     what is left at a rate [mm/h] on the covers and a fade [dB] on the path
 */
function rainBelow(
  rain: RainOfYear,
  clearDb: number,
  left: (rateMmPerH: number, fadeDb: number) => number,
): RainShare {
  const [rarest, commonest] = rainFadeValidity.percent;
  const percentAt = (fadeDb: number) =>
    Math.min(commonest, Math.max(rarest, fadeDb > 0 ? rain.percentOf(fadeDb) : commonest));
  const leftAt = (fadeDb: number) => left(rain.rateAt(percentAt(fadeDb)), fadeDb);
  if (clearDb < 0) return { percent: exact(100), atRain: { rateMmPerH: 0, pathFadeDb: 0 } };
  if (leftAt(rain.deepDb) >= 0) return { percent: { low: 0, high: rarest }, atRain: undefined };
  if (leftAt(rain.shallowDb) < 0) {
    return { percent: { low: percentAt(rain.shallowDb), high: rain.mostPercent }, atRain: undefined };
  }
  const pathFadeDb = bisect(leftAt, rain.shallowDb, rain.deepDb, FADE_STEP_DB)!;
  const percent = percentAt(pathFadeDb);
  return { percent: exact(percent), atRain: { rateMmPerH: rain.rateAt(percent), pathFadeDb } };
}

/** Rain and multipath do not fall together, so that their times add up. */
function outageOf(
  { percent: rainPercent, atRain }: RainShare,
  multipath: ReturnType<MultipathOfYear["sharesBelow"]>,
): Outage {
  const hours = (span: Span) => mapSpan(span, (percent) => (percent / 100) * HOURS_OF_YEAR);
  const minutes = (span: Span) => mapSpan(span, (percent) => (percent / 100) * MINUTES_OF_MONTH);
  const wholeAtMost = (span: Span) => mapSpan(span, (percent) => Math.min(100, percent));
  const yearPercent = wholeAtMost(sum(rainPercent, multipath.yearPercent));
  const rainMonth = mapSpan(
    rainPercent,
    (percent) => rainWorstMonth({ yearPercent: percent }).worstMonthPercent,
  );
  return {
    rainPercent,
    multipathPercent: multipath.yearPercent,
    yearPercent,
    availabilityPercent: { low: 100 - yearPercent.high, high: 100 - yearPercent.low },
    rainHours: hours(rainPercent),
    multipathHours: hours(multipath.yearPercent),
    yearHours: hours(yearPercent),
    rainMonthMinutes: minutes(rainMonth),
    multipathMonthMinutes: minutes(multipath.worstMonthPercent),
    monthMinutes: minutes(wholeAtMost(sum(rainMonth, multipath.worstMonthPercent))),
    atRain,
  };
}
