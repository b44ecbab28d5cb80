import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import { powerToDb } from "../numeric/decibels.ts";
import { bisect } from "../numeric/roots.ts";
import {
  type MappedMultipathPath,
  type MultipathPath,
  mappedMultipathOccurrence,
  multipathOccurrence,
} from "./multipathOccurrence.ts";

export interface MultipathFade {
  /** Time of the average worst month for which the fade is exceeded [%], fades of every depth. */
  readonly worstMonthPercent: number;
  /** The same by the law of deep fades alone: too much for shallow ones [%]. */
  readonly deepFadePercent: number;
  readonly occurrencePercent: number;
  /** Edition and form that the occurrence factor comes from. */
  readonly method: "P.530-17 quick" | "P.530-17 detailed" | "P.530-18";
}

/**
 * Time of the average worst month for which multipath fades a line-of-sight path by more than a given depth.
 *
 * Source: ITU-R P.530-17, sections 2.3.1 and 2.3.2, equations 4 to 18: detailed with the roughness of the
 *   terrain, quick without
 * Valid:  `multipathValidity`; no fading below 5 km
 *
 * @param path    as `multipathOccurrence`
 * @param fadeDb  depth of the fade [dB], at least 0
 * @throws RangeError on a non-finite argument or one out of range, and as `fadePercent`
 */
export function multipathFade({
  fadeDb,
  ...path
}: MultipathPath & { readonly fadeDb: number }): MultipathFade {
  const method = path.terrainRoughnessM === undefined ? "P.530-17 quick" : "P.530-17 detailed";
  return fadeOf(multipathOccurrence(path), fadeDb, method);
}

/**
 * The same from values of the maps of the later edition.
 *
 * Source: ITU-R P.530-18, sections 2.3.1 and 2.3.2
 *
 * @param path    as `mappedMultipathOccurrence`
 * @param fadeDb  depth of the fade [dB], at least 0
 * @throws RangeError on a non-finite argument or one out of range, and as `fadePercent`
 */
export function mappedMultipathFade({
  fadeDb,
  ...path
}: MappedMultipathPath & { readonly fadeDb: number }): MultipathFade {
  return fadeOf(mappedMultipathOccurrence(path), fadeDb, "P.530-18");
}

function fadeOf(occurrencePercent: number, fadeDb: number, method: MultipathFade["method"]): MultipathFade {
  return {
    worstMonthPercent: fadePercent(occurrencePercent, fadeDb),
    deepFadePercent: deepFadePercent(occurrencePercent, fadeDb),
    occurrencePercent,
    method,
  };
}

/**
 * Time for which a fade is exceeded, from the occurrence factor.
 *
 * Deep fades lose a decade of time every 10 dB; below a transition depth a curve leads over to 63.2 % at 0 dB,
 * where the median of the combined rays lies.
 *
 * Source: ITU-R P.530-17, section 2.3.2, equations 10 to 18 (the same in -18)
 * Valid:  occurrence factor below 2000 %, from where the curve need not fall monotonically
 *
 * @param occurrencePercent  [%], at least 0
 * @param fadeDb             [dB], at least 0
 * @returns share of time [%]
 * @throws RangeError on an argument out of range, and where a factor beyond about 130 000 % leaves no curve
 */
export function fadePercent(occurrencePercent: number, fadeDb: number): number {
  requireNotNegative("occurrencePercent", occurrencePercent);
  requireNotNegative("fadeDb", fadeDb);
  if (occurrencePercent === 0) return 0;
  const transitionDb = transitionDepthDb(occurrencePercent);
  if (fadeDb >= transitionDb) return deepFadePercent(occurrencePercent, fadeDb);
  const transitionPercent = deepFadePercent(occurrencePercent, transitionDb);
  if (transitionPercent >= 100) {
    throw new RangeError(`occurrencePercent of ${occurrencePercent} lies beyond the method`);
  }
  const shape = (depthDb: number) => 4.3 * (10 ** (-depthDb / 20) + depthDb / 800);
  const scale = (depthDb: number) => (1 + 0.3 * 10 ** (-depthDb / 20)) * 10 ** (-0.016 * depthDb);
  const slopeThere = (-20 * Math.log10(-Math.log1p(-transitionPercent / 100))) / transitionDb;
  const offset = (slopeThere - 2) / scale(transitionDb) - shape(transitionDb);
  const slope = 2 + scale(fadeDb) * (offset + shape(fadeDb));
  return -100 * Math.expm1(-(10 ** ((-slope * fadeDb) / 20)));
}

/**
 * Fade that is exceeded for a share of the average worst month; inverse of `fadePercent`.
 *
 * @param occurrencePercent  [%], above 0
 * @param percent            share of time [%], above 0; from 63.2 % up the answer is 0 dB
 * @returns depth [dB], at least 0
 * @throws RangeError as `fadePercent`
 */
export function fadeExceededFor(occurrencePercent: number, percent: number): number {
  requirePositive("occurrencePercent", occurrencePercent);
  requirePositive("percent", percent);
  const transitionDb = transitionDepthDb(occurrencePercent);
  const deepDb = powerToDb(occurrencePercent / percent);
  if (deepDb >= transitionDb) return Math.max(deepDb, 0);
  return bisect((depthDb) => fadePercent(occurrencePercent, depthDb) - percent, 0, transitionDb) ?? 0;
}

function deepFadePercent(occurrencePercent: number, fadeDb: number): number {
  return occurrencePercent * 10 ** (-fadeDb / 10);
}

/** Depth at which the law of deep fades takes over; equation 10. */
function transitionDepthDb(occurrencePercent: number): number {
  return 25 + 1.2 * Math.log10(occurrencePercent);
}
