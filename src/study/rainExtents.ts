import type { EndChoice, Link, Warning } from "../budget/types.ts";
import type { Weather } from "../scenario/types.ts";
import { type BreakEven, breakEvenOf } from "./breakEven.ts";
import type { BothEnds } from "./coverPairs.ts";
import { inRain, plainRung } from "./rainOn.ts";
import type { Rung } from "./rung.ts";

/** Rain of one extent on path and covers. */
export interface ExtentColumn {
  /** A stated length, the whole path, or the effective length that P.530 has for the rate. */
  readonly kind: "stated" | "whole" | "effective";
  /** [km]; undefined where it follows the rate. */
  readonly extentKm: number | undefined;
  /** Whether the weather that is varied has this extent. */
  readonly isOwn: boolean;
  readonly rungs: readonly Rung[];
  readonly breakEven: BreakEven;
}

/** Margin by rate and extent of the rain, for one choice of covers. */
export interface ExtentTable {
  readonly transmitter: EndChoice;
  readonly receiver: EndChoice;
  /** Short extents first, then the whole path, then P.530. */
  readonly columns: readonly ExtentColumn[];
  /** Extents that were asked for and are no shorter than the path [km]. */
  readonly beyondKm: readonly number[];
}

/**
 * Margin over the rain rate by the extent of the rain along the path, rain on path and covers.
 *
 * @param extentsKm  rising; those that reach past the path are the whole path
 * @param heard      takes the warnings of each budget
 */
export function extentTable(
  link: Link,
  ends: BothEnds,
  name: string,
  mode: string,
  ratesMmPerH: readonly number[],
  extentsKm: readonly number[],
  heard: (warnings: readonly Warning[]) => void,
): ExtentTable {
  const { distanceKm } = link.path;
  const { reserveDb } = link.scenario.decision;
  const base = link.scenario.weather[name]!;
  const ownKm = base.extentKm === undefined ? undefined : Math.min(base.extentKm, distanceKm);
  const column = (kind: ExtentColumn["kind"], extentKm: number | undefined): ExtentColumn => {
    const weather: Weather = { ...base, extentKm };
    const rungIn = inRain(link, ends, [mode], name, weather, "both");
    const rungAt = (rateMmPerH: number) => rungIn(rateMmPerH, mode);
    for (const rate of ratesMmPerH) heard(rungAt(rate).warnings);
    return {
      kind,
      extentKm,
      isOwn: extentKm === ownKm,
      rungs: ratesMmPerH.map((rate) => plainRung(rungAt(rate))),
      breakEven: breakEvenOf(rungAt, reserveDb),
    };
  };
  return {
    ...ends,
    columns: [
      ...extentsKm.filter((km) => km < distanceKm).map((km) => column("stated", km)),
      column("whole", distanceKm),
      column("effective", undefined),
    ],
    beyondKm: extentsKm.filter((km) => km >= distanceKm),
  };
}
