import { rainWords } from "../atmosphere/rainWords.ts";
import type { EndChoice, Link, PathGeometry, Warning } from "../budget/types.ts";
import { type BreakEven, breakEvenOf, HEAVIEST_MM_PER_H, rainiest } from "./breakEven.ts";
import { type BothEnds, coverPairs, endsUnder } from "./coverPairs.ts";
import { type ExtentTable, extentTable } from "./rainExtents.ts";
import { type InRain, inRain, plainRung, type RainOn, rainOns } from "./rainOn.ts";
import type { Rung } from "./rung.ts";
import { warningsOnce } from "./warningsOnce.ts";

/** One choice of covers, feeds as the scenario has them. */
export interface CoverLadder {
  readonly transmitter: EndChoice;
  readonly receiver: EndChoice;
  /** By what the rain falls on; the same rates in each, no rain first. */
  readonly rungs: Readonly<Record<RainOn, readonly Rung[]>>;
  readonly breakEven: Readonly<Record<RainOn, BreakEven>>;
  /** Margin in rain on path and covers at `curveMmPerH` [dB]. */
  readonly curveDb: readonly number[];
}

export interface ModeLadder {
  readonly mode: string;
  /** The covers of the scenario first, then each on both ends, bare among them. */
  readonly covers: readonly CoverLadder[];
  /** Rates of the curves [mm/h], evenly spaced from 0 to past the last break-even. */
  readonly curveMmPerH: readonly number[];
  readonly extents: ExtentTable;
}

/** What authorities call a rain. */
export interface WordedRate {
  readonly rateMmPerH: number;
  readonly words: ReturnType<typeof rainWords>;
}

export interface WeatherLadder {
  readonly title: string;
  readonly frequencyGHz: number;
  readonly path: PathGeometry;
  /** The weather whose rain is varied; all else of it is kept. */
  readonly weather: string;
  readonly reserveDb: number;
  readonly rates: readonly WordedRate[];
  readonly modes: readonly ModeLadder[];
  readonly warnings: readonly Warning[];
}

export interface LadderChoices {
  /** Modes of the link, at least one; the scenario's first where not given. */
  readonly modes?: readonly string[] | undefined;
  /** A weather of the link; the rainiest where not given. */
  readonly weather?: string | undefined;
  /** Rungs above no rain [mm/h]; the usual ones and the weather's own rate where not given. */
  readonly ratesMmPerH?: readonly number[] | undefined;
  /** Lengths of rain along the path [km]; the usual ones and the weather's own where not given. */
  readonly extentsKm?: readonly number[] | undefined;
  /** Cover on both ends in the table of extents; the scenario's own where not given. */
  readonly cover?: string | undefined;
}

/** Where words of the authorities change, a shower, and thunderstorms [mm/h]. */
const USUAL_RATES_MM_PER_H: readonly number[] = [0.5, 1, 2.5, 5, 10, 16, 25, 50, 100, 150];
/** Cells of a shower and of a thunderstorm, a front [km]. */
const USUAL_EXTENTS_KM: readonly number[] = [1, 2, 5, 10, 20];
const CURVE_POINTS = 61;
/** A curve goes on past its break-even by this share, so that it is seen to fall below 0. */
const CURVE_BEYOND = 1.25;

/**
 * The rain ladder: margin over the rain rate for every cover, rain on the path alone, on the covers alone and on
 * both; the rates at which it is used up; and the margin by rate and extent of the rain.
 *
 * @throws RangeError on a name that the link does not have
 */
export function weatherLadder(link: Link, choices: LadderChoices = {}): WeatherLadder {
  const { scenario, path } = link;
  const { modes = scenario.receiver.modes.slice(0, 1), cover } = choices;
  const weather = choices.weather ?? rainiest(link, Object.keys(scenario.weather));
  const base = scenario.weather[weather];
  if (base === undefined) throw new RangeError(`the link has no weather "${weather}"`);
  const ownRates = [...USUAL_RATES_MM_PER_H, base.rainMmPerH.value];
  const ownExtents = [
    ...USUAL_EXTENTS_KM.filter((km) => km < path.distanceKm),
    ...(base.extentKm === undefined ? [] : [base.extentKm]),
  ];
  const ratesMmPerH = rising([0, ...(choices.ratesMmPerH ?? ownRates)]);
  const extentsKm = rising(choices.extentsKm ?? ownExtents);
  const warnings = warningsOnce();

  const choice = coverPairs(link).map((ends) => ({
    ends,
    rungIn: byRainOn((on) => inRain(link, ends, modes, weather, base, on)),
  }));
  const shown = cover === undefined ? choice[0]!.ends : endsUnder(link, cover, cover);
  return {
    title: scenario.title,
    frequencyGHz: scenario.frequencyGHz,
    path,
    weather,
    reserveDb: scenario.decision.reserveDb,
    rates: ratesMmPerH.map((rateMmPerH) => ({
      rateMmPerH,
      words: rainWords({ rainRateMmPerH: rateMmPerH }),
    })),
    modes: modes.map((mode) => {
      const ladders = choice.map(({ ends, rungIn }) => ladderOf(ends, rungIn, mode));
      const curveMmPerH = curveRates(ladders, ratesMmPerH.at(-1)!);
      const covers = ladders.map((ladder, i) => ({
        ...ladder,
        curveDb: curveMmPerH.map((rate) => choice[i]!.rungIn.both(rate, mode).marginDb),
      }));
      const extents = extentTable(link, shown, weather, mode, ratesMmPerH, extentsKm, warnings.add);
      return { mode, covers, curveMmPerH, extents };
    }),
    warnings: warnings.all(),
  };

  function ladderOf(ends: BothEnds, rungIn: Readonly<Record<RainOn, InRain>>, mode: string) {
    const rungs = byRainOn((on) =>
      ratesMmPerH.map((rate) => {
        const rung = rungIn[on](rate, mode);
        warnings.add(rung.warnings);
        return plainRung(rung);
      }),
    );
    const breakEven = byRainOn((on) =>
      breakEvenOf((rate) => rungIn[on](rate, mode), scenario.decision.reserveDb),
    );
    return { ...ends, rungs, breakEven };
  }
}

function byRainOn<T>(f: (on: RainOn) => T): Readonly<Record<RainOn, T>> {
  return Object.fromEntries(rainOns.map((on) => [on, f(on)])) as Record<RainOn, T>;
}

function rising(values: readonly number[]): number[] {
  return [...new Set(values)].sort((a, b) => a - b);
}

/** Evenly from 0 to past the heaviest rain that turns a margin; to the last rung where none does. */
function curveRates(
  ladders: readonly Pick<CoverLadder, "breakEven">[],
  lastRungMmPerH: number,
): readonly number[] {
  const turns = ladders.flatMap(({ breakEven: { both } }) => [
    both.zeroMmPerH ?? 0,
    ...both.zeroBack.flatMap(({ fromMmPerH, toMmPerH }) => [fromMmPerH, toMmPerH ?? 0]),
  ]);
  const last = CURVE_BEYOND * Math.max(...turns);
  const end = last > 0 ? Math.min(HEAVIEST_MM_PER_H, last) : lastRungMmPerH;
  return Array.from({ length: CURVE_POINTS }, (_, i) => (end * i) / (CURVE_POINTS - 1));
}
