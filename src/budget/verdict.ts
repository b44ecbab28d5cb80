import { normalCdf } from "../numeric/normal.ts";
import type { Decision } from "../scenario/types.ts";
import type { Entry } from "./entry.ts";
import type { Verdict } from "./types.ts";

/** Root-sum-square of the entries' sigmas [dB]: independent normal errors. */
export function combinedSigma(entries: readonly Entry[]): number {
  let variance = 0;
  for (const { sigma } of entries) variance += sigma * sigma;
  return Math.sqrt(variance);
}

/** Probability that a margin of this nominal value and deviation lies above 0. */
export function probabilityAboveZero(marginDb: number, sigmaDb: number): number {
  if (sigmaDb === 0) return marginDb > 0 ? 1 : 0;
  return normalCdf(marginDb / sigmaDb);
}

/**
 * The answer in one word.
 *
 * `fails`: the nominal margin is below 0. `closes`: it leaves the reserve, and holds with the wanted confidence.
 * `thin`: anything between.
 */
export function verdictOf(marginDb: number, holdProbability: number, decision: Decision): Verdict {
  if (marginDb < 0) return "fails";
  return marginDb >= decision.reserveDb && holdProbability >= decision.confidence ? "closes" : "thin";
}
