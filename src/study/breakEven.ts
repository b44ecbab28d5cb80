import type { Case, Link, MechanismName } from "../budget/types.ts";
import { bisect } from "../numeric/roots.ts";
import { inRain } from "./rainOn.ts";
import type { Rung } from "./rung.ts";

/** Rates from which and up to which something holds again [mm/h]; `to` is undefined where it holds to the heaviest. */
export interface RainStretch {
  readonly fromMmPerH: number;
  readonly toMmPerH: number | undefined;
  /** The way that carries the path at its beginning. */
  readonly mechanism: MechanismName;
}

/** The rate sought, were the margin one standard deviation less or more [mm/h]; undefined as the rate itself is. */
export interface RateSpread {
  readonly lowMmPerH: number | undefined;
  readonly highMmPerH: number | undefined;
}

/** Rain rates at which a margin is used up; undefined where none up to `HEAVIEST_MM_PER_H` does it. */
export interface BreakEven {
  /** Margin 0 at this rate for the first time [mm/h]; 0 where the path fails in the dry already. */
  readonly zeroMmPerH: number | undefined;
  /** Reserve reached at this rate for the first time [mm/h]; 0 where the dry path has less. */
  readonly reserveMmPerH: number | undefined;
  /** The verdict is no longer `closes` from this rate on [mm/h]; 0 where the dry path does not close. */
  readonly closesMmPerH: number | undefined;
  readonly zeroSpread: RateSpread;
  readonly reserveSpread: RateSpread;
  /** Harder rain in which the margin is back: rain that scatters may carry a path that rain has cut. */
  readonly zeroBack: readonly RainStretch[];
  readonly reserveBack: readonly RainStretch[];
  readonly closesBack: readonly RainStretch[];
}

/** Rain heavier than any hour's [mm/h]. */
export const HEAVIEST_MM_PER_H = 400;
/** Rates are told to this [mm/h]; the rain is known far worse. */
const RATE_STEP_MM_PER_H = 0.01;
/**
 * A margin over rain may turn: where rain scatter takes over it rises. The range is searched from this rate [mm/h]
 * upwards in steps of this ratio, and each change of sign is then closed in.
 */
const FIRST_MM_PER_H = 0.1;
const SCAN_RATIO = 1.13;

const scan: readonly number[] = [
  0,
  ...Array.from(
    { length: Math.ceil(Math.log(HEAVIEST_MM_PER_H / FIRST_MM_PER_H) / Math.log(SCAN_RATIO)) },
    (_, i) => FIRST_MM_PER_H * SCAN_RATIO ** i,
  ),
  HEAVIEST_MM_PER_H,
];

/**
 * Rain rates, on the path and on the covers together, at which the margin of a case reaches the reserve and 0.
 *
 * The case's weather is kept in all but its rate: extent, wind, temperature, which ends get wet.
 */
export function breakEven(link: Link, chosen: Case): BreakEven {
  const base = link.scenario.weather[chosen.weather]!;
  const rungIn = inRain(link, chosen, [chosen.mode], chosen.weather, base, "both");
  return breakEvenOf((rate) => rungIn(rate, chosen.mode), link.scenario.decision.reserveDb);
}

/** The same for the rungs of any ladder. */
export function breakEvenOf(rungAt: (rateMmPerH: number) => Rung, reserveDb: number): BreakEven {
  const open = (keepDb: number, sigmas = 0) =>
    openRain(rungAt, ({ marginDb, marginSigmaDb }) => marginDb + sigmas * marginSigmaDb - keepDb);
  const spread = (keepDb: number): RateSpread => ({
    lowMmPerH: open(keepDb, -1).firstMmPerH,
    highMmPerH: open(keepDb, 1).firstMmPerH,
  });
  const zero = open(0);
  const reserve = open(reserveDb);
  const closes = openRain(rungAt, ({ verdict }) => (verdict === "closes" ? 1 : -1));
  return {
    zeroMmPerH: zero.firstMmPerH,
    reserveMmPerH: reserve.firstMmPerH,
    closesMmPerH: closes.firstMmPerH,
    zeroSpread: spread(0),
    reserveSpread: spread(reserveDb),
    zeroBack: zero.back,
    reserveBack: reserve.back,
    closesBack: closes.back,
  };
}

/** Where a figure first falls to 0, and the stretches of rain in which it is above 0 again. */
function openRain(
  rungAt: (rateMmPerH: number) => Rung,
  figureOf: (rung: Rung) => number,
): { readonly firstMmPerH: number | undefined; readonly back: readonly RainStretch[] } {
  const figureAt = (rateMmPerH: number) => figureOf(rungAt(rateMmPerH));
  const stretches: { fromMmPerH: number; toMmPerH: number | undefined; mechanism: MechanismName }[] = [];
  let isOpen = false;
  for (const [i, rate] of scan.entries()) {
    if (figureAt(rate) > 0 === isOpen) continue;
    const turnMmPerH = i === 0 ? 0 : bisect(figureAt, scan[i - 1]!, rate, RATE_STEP_MM_PER_H)!;
    if (isOpen) stretches.at(-1)!.toMmPerH = turnMmPerH;
    else {
      const { mechanism } = rungAt(rate);
      stretches.push({ fromMmPerH: turnMmPerH, toMmPerH: undefined, mechanism });
    }
    isOpen = !isOpen;
  }
  const inTheDry = figureAt(0) > 0;
  return {
    firstMmPerH: inTheDry ? stretches[0]!.toMmPerH : 0,
    back: inTheDry ? stretches.slice(1) : stretches,
  };
}

/** The weather with the most rain among those named; the first of them where all are dry. */
export function rainiest({ scenario }: Pick<Link, "scenario">, weathers: readonly string[]): string {
  const rate = (name: string) => scenario.weather[name]!.rainMmPerH.value;
  return weathers.reduce((a, b) => (rate(b) > rate(a) ? b : a));
}
