import { evaluate } from "../budget/evaluate.ts";
import { onlyWith } from "../budget/onlyWith.ts";
import { withWeather } from "../budget/prepare.ts";
import type { Link, Warning } from "../budget/types.ts";
import type { Weather } from "../scenario/types.ts";
import type { BothEnds } from "./coverPairs.ts";
import { type Rung, rungOf } from "./rung.ts";

/** What rain falls on: the path alone, as when the covers lie sheltered; the covers alone, as after a shower; both. */
export type RainOn = "path" | "covers" | "both";
export const rainOns: readonly RainOn[] = ["path", "covers", "both"];

/** What is kept of a budget: thousands of whole ones would fill the memory. */
export interface RainRung extends Rung {
  readonly warnings: readonly Warning[];
}

export function plainRung({ warnings, ...rung }: RainRung): Rung {
  return rung;
}

/** One choice of covers in rain of a rate [mm/h]. */
export type InRain = (rateMmPerH: number, mode: string) => RainRung;

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
 * One choice of feeds and covers over the rain rate; each rate is worked out once, for all modes.
 *
 * @param name  of the weather that is varied: warnings name it
 * @param base  that weather, or another that is to stand in its place
 */
export function inRain(
  link: Link,
  ends: BothEnds,
  modes: readonly string[],
  name: string,
  base: Weather,
  on: RainOn,
): InRain {
  const own = onlyWith(link, [ends]);
  const known = new Map<number, readonly RainRung[]>();
  return (rateMmPerH, mode) => {
    let rungs = known.get(rateMmPerH);
    if (rungs === undefined) {
      const rained = withWeather(own, name, rainedOn(base, rateMmPerH, on));
      rungs = modes.map((one) => {
        const budget = evaluate(rained, { ...ends, weather: name, mode: one });
        const warnings = budget.warnings.filter((warning) => !isLadders(warning, name));
        return { ...rungOf(rateMmPerH, budget), warnings };
      });
      known.set(rateMmPerH, rungs);
    }
    return rungs[modes.indexOf(mode)]!;
  };
}

/** What a rung sets in the weather, or leaves without rain: idle by the ladder's doing and not by the scenario's. */
const SET_BY_LADDER: readonly string[] = ["extent", "covers_wet_as_at", "dried_for"];

function isLadders({ code, where }: Warning, name: string): boolean {
  return code === "idle_input" && SET_BY_LADDER.some((key) => where === `weather.${name}.${key}`);
}
