import { overreachWarning } from "../budget/overreach.ts";
import type { PathGeometry, Warning } from "../budget/types.ts";
import { outside } from "../numeric/check.ts";
import { multipathYear } from "../path/fadingPeriod.ts";
import { pointAlong } from "../path/geodesic.ts";
import { fadePercent } from "../path/multipathFade.ts";
import { multipathOccurrence, multipathValidity } from "../path/multipathOccurrence.ts";
import type { Climate, Scenario } from "../scenario/types.ts";
import { exact, type Span } from "./span.ts";

/** Multipath of a climate on a path over an average year. */
export interface MultipathOfYear {
  readonly dN1: number;
  readonly dN1Source: string;
  readonly method: "P.530-17 quick" | "P.530-17 detailed";
  /** Multiplier of the law of deep fades in the worst month [%]; no share of time. */
  readonly occurrencePercent: number;
  /** Shares of time with less margin than a depth above 0 [dB]: of the year and of the worst month [%]. */
  readonly sharesBelow: (marginDb: number) => {
    readonly yearPercent: Span;
    readonly worstMonthPercent: Span;
  };
  readonly warnings: readonly Warning[];
}

/** Inland, temperate: the usual figure of the published spot values of P.453 [N-units/km]. */
const USUAL_DN1 = -200;

/**
 * Multipath fading by the quick form of P.530-17, or by the detailed one where the terrain's roughness is known.
 *
 * Where the method does not hold, any share of time is possible and the spans say so.
 */
export function multipathOfYear(scenario: Scenario, climate: Climate, path: PathGeometry): MultipathOfYear {
  const { from, to, distanceKm } = path;
  const { dN1 = USUAL_DN1, terrainRoughnessM } = climate;
  const heights = [from, to].map(({ groundM, heightM }) => groundM + heightM);
  const pathInclinationMrad = Math.abs(heights[0]! - heights[1]!) / distanceKm;
  const input = {
    dN1,
    terrainRoughnessM,
    distanceKm,
    lowerAntennaM: Math.min(...heights),
    pathInclinationMrad,
    frequencyGHz: scenario.frequencyGHz,
  };
  const occurrencePercent = multipathOccurrence(input);
  const holds = occurrencePercent <= multipathValidity.occurrencePercent[1];
  const { latitude: latitudeDeg } = pointAlong({ from, to, share: 0.5 });
  const sharesBelow: MultipathOfYear["sharesBelow"] = (marginDb) => {
    // Nothing left in clear air is not multipath's doing.
    if (marginDb < 0 || occurrencePercent === 0)
      return { yearPercent: exact(0), worstMonthPercent: exact(0) };
    if (!holds) return { yearPercent: { low: 0, high: 100 }, worstMonthPercent: { low: 0, high: 100 } };
    const worstMonthPercent = fadePercent(occurrencePercent, marginDb);
    const { yearPercent } = multipathYear({
      worstMonthPercent,
      latitudeDeg,
      distanceKm,
      pathInclinationMrad,
    });
    return { yearPercent: exact(Math.min(100, yearPercent)), worstMonthPercent: exact(worstMonthPercent) };
  };
  // Short paths and low antennas without multipath are no doubt.
  const ranges = occurrencePercent === 0 ? [] : outside(multipathValidity, { ...input, occurrencePercent });
  return {
    dN1,
    dN1Source: climate.dN1 === undefined ? "usual inland, temperate" : "scenario",
    method: terrainRoughnessM === undefined ? "P.530-17 quick" : "P.530-17 detailed",
    occurrencePercent,
    sharesBelow,
    warnings: ranges.map(overreachWarning("multipath by P.530", "climate")),
  };
}
