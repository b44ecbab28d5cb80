import { requireWithin } from "../numeric/check.ts";
import { dbToAmplitude } from "../numeric/decibels.ts";

/** One reflection, given by exactly one of its figures. */
export type ReflectionInput =
  | { readonly returnLossDb: number }
  | { readonly vswr: number }
  | { readonly gamma: number };

export interface ReflectionFigures {
  readonly returnLossDb: number;
  readonly vswr: number;
  readonly gamma: number;
  readonly mismatchLossDb: number;
  readonly reflectedPercent: number;
}

/** Power lost by a reflection of magnitude `gamma` [dB]: -10 log10(1 - gamma^2); total reflection gives Infinity. */
export function mismatchLossDb(gamma: number): number {
  return (-10 / Math.LN10) * Math.log1p(-gamma * gamma);
}

/**
 * Magnitude of the reflection that belongs to a return loss [dB] of 0 to Infinity.
 *
 * @throws RangeError on a negative or missing return loss, under the given field name
 */
export function gammaOfReturnLoss(name: string, returnLossDb: number): number {
  requireWithin(name, returnLossDb, 0, Infinity);
  return dbToAmplitude(-returnLossDb);
}

/** Return loss [dB] of a reflection of magnitude `gamma`; 0 gives Infinity. */
export function returnLossOfGamma(gamma: number): number {
  return gamma >= 1 ? 0 : -20 * Math.log10(gamma);
}

/**
 * The usual figures of one reflection from any one of them.
 *
 * VSWR = (1 + gamma)/(1 - gamma), return loss = -20 log10 gamma, mismatch loss = -10 log10(1 - gamma^2).
 *
 * Source: any handbook of microwave engineering, e.g. Pozar, Microwave Engineering, section 2.3 (from memory).
 * Valid:  passive reflections; a perfect match has returnLossDb Infinity, a total reflection vswr and
 *         mismatchLossDb Infinity.
 *
 * @param returnLossDb  return loss [dB], 0 to Infinity; or
 * @param vswr          voltage standing wave ratio, 1 to Infinity; or
 * @param gamma         magnitude of the reflection coefficient, 0 to 1
 * @throws RangeError on a figure outside its range, or when not exactly one is given
 */
export function reflectionFigures(input: ReflectionInput): ReflectionFigures {
  const gamma = magnitudeOf(input);
  return {
    returnLossDb: returnLossOfGamma(gamma),
    vswr: (1 + gamma) / (1 - gamma),
    gamma,
    mismatchLossDb: mismatchLossDb(gamma),
    reflectedPercent: 100 * gamma * gamma,
  };
}

function magnitudeOf(input: ReflectionInput): number {
  if (Object.values(input).filter((value) => value !== undefined).length !== 1) {
    throw new RangeError("exactly one of returnLossDb, vswr and gamma must be given");
  }
  if ("returnLossDb" in input) return gammaOfReturnLoss("returnLossDb", input.returnLossDb);
  if ("vswr" in input) {
    requireWithin("vswr", input.vswr, 1, Infinity);
    return input.vswr === Infinity ? 1 : (input.vswr - 1) / (input.vswr + 1);
  }
  requireWithin("gamma", input.gamma, 0, 1);
  return input.gamma;
}
