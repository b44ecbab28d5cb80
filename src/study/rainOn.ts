import { evaluate } from "../budget/evaluate.ts";
import { withWeather } from "../budget/prepare.ts";
import type { Budget, Link } from "../budget/types.ts";
import type { Weather } from "../scenario/types.ts";
import { type BothEnds, onlyWith } from "./onlyWith.ts";

/** What rain falls on: the path alone, as when the covers lie sheltered; the covers alone, as after a shower; both. */
export type RainOn = "path" | "covers" | "both";
export const rainOns: readonly RainOn[] = ["path", "covers", "both"];

/** Budget of one choice in rain of a rate [mm/h]. */
export type InRain = (rateMmPerH: number, mode: string) => Budget;

/** A weather with rain of another rate; extent, wind, temperature, the ends that get wet, dew, ice and snow are kept. */
export function rainedOn(base: Weather, rateMmPerH: number, on: RainOn): Weather {
  return {
    ...base,
    rainMmPerH: { value: on === "covers" ? 0 : rateMmPerH },
    coversWetAsAtMmPerH: on === "path" ? 0 : rateMmPerH,
    driedForMin: 0,
  };
}

/**
 * Budgets of one choice of feeds and covers over the rain rate; each rate is worked out once.
 *
 * @param name  of the weather that is varied: warnings name it
 * @param base  that weather, or another that is to stand in its place
 */
export function inRain(link: Link, ends: BothEnds, name: string, base: Weather, on: RainOn): InRain {
  const own = onlyWith(link, ends);
  const links = new Map<number, Link>();
  const budgets = new Map<string, Budget>();
  const linkAt = (rateMmPerH: number): Link => {
    const known = links.get(rateMmPerH) ?? withWeather(own, name, rainedOn(base, rateMmPerH, on));
    links.set(rateMmPerH, known);
    return known;
  };
  return (rateMmPerH, mode) => {
    const key = `${rateMmPerH} ${mode}`;
    const known = budgets.get(key) ?? evaluate(linkAt(rateMmPerH), { ...ends, weather: name, mode });
    budgets.set(key, known);
    return known;
  };
}
