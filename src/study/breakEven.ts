import { evaluate } from "../budget/evaluate.ts";
import { withWeather } from "../budget/prepare.ts";
import type { Case, Link } from "../budget/types.ts";
import { bisect } from "../numeric/roots.ts";

/** Rain rates at which a margin is used up; undefined where none up to `HEAVIEST_MM_PER_H` does it. */
export interface BreakEven {
  /** Margin 0 at this rate [mm/h]; 0 where the path fails in the dry already. */
  readonly zeroMmPerH: number | undefined;
  /** Reserve reached at this rate [mm/h]; 0 where the dry path has less. */
  readonly reserveMmPerH: number | undefined;
}

/** Rain heavier than any hour's [mm/h]. */
export const HEAVIEST_MM_PER_H = 400;
/** Rates are told to this [mm/h]; the rain is known far worse. */
const RATE_STEP_MM_PER_H = 0.05;

/**
 * Rain rates, on the path and on the covers together, at which the margin of a case reaches the reserve and 0.
 *
 * The case's weather is kept in all but its rate: extent, wind, temperature, which ends get wet.
 */
export function breakEven(link: Link, chosen: Case): BreakEven {
  const { reserveDb } = link.scenario.decision;
  const base = link.scenario.weather[chosen.weather]!;
  const known = new Map<number, number>();
  const marginAt = (rate: number): number => {
    const seen = known.get(rate);
    if (seen !== undefined) return seen;
    const weather = { ...base, rainMmPerH: { value: rate }, coversWetAsAtMmPerH: undefined, driedForMin: 0 };
    const { marginDb } = evaluate(withWeather(link, chosen.weather, weather), chosen);
    known.set(rate, marginDb);
    return marginDb;
  };
  const rateFor = (wantedDb: number): number | undefined => {
    if (marginAt(0) <= wantedDb) return 0;
    return bisect((rate) => marginAt(rate) - wantedDb, 0, HEAVIEST_MM_PER_H, RATE_STEP_MM_PER_H);
  };
  return { zeroMmPerH: rateFor(0), reserveMmPerH: rateFor(reserveDb) };
}

/** The weather with the most rain among those named; the first of them where all are dry. */
export function rainiest({ scenario }: Link, weathers: readonly string[]): string {
  const rate = (name: string) => scenario.weather[name]!.rainMmPerH.value;
  return weathers.reduce((a, b) => (rate(b) > rate(a) ? b : a));
}
