import { requireFinite, requireNotNegative } from "../numeric/check.ts";

/** One input of a measurement: how much it moves the result, and how well it is known. */
export interface UncertaintyComponent {
  readonly name?: string;
  /** Change of the result per unit of the input; default 1. */
  readonly sensitivity?: number;
  /** Standard uncertainty of the input, in its own unit. */
  readonly standard: number;
  /** Default Infinity: known without doubt, as for limits from a data sheet. */
  readonly degreesOfFreedom?: number;
}

/** Correlation coefficient of two components, by their place in the list. */
export interface Correlation {
  readonly first: number;
  readonly second: number;
  readonly coefficient: number;
}

export interface CombinedUncertainty {
  /** Combined standard uncertainty of the result. */
  readonly standard: number;
  /** Welch-Satterthwaite; Infinity where no component of weight has finite degrees of freedom. */
  readonly effectiveDegreesOfFreedom: number;
}

/**
 * Combined standard uncertainty by the law of propagation, and its effective degrees of freedom.
 *
 *     u_c^2 = sum (c_i u_i)^2 + 2 sum_(i<j) c_i c_j u_i u_j r_ij,    v_eff = u_c^4/sum((c_i u_i)^4/v_i)
 *
 * Source: JCGM 100:2008, equations (10), (16) and (G.2b)
 * Valid:  a result that is nearly linear in its inputs; v_eff supposes independent inputs, so with correlations it
 *         is an approximation
 *
 * @param components    inputs of the measurement, at least one
 * @param correlations  pairs with a coefficient of -1 to 1; pairs not listed are independent
 * @throws RangeError on a negative or non-finite uncertainty, degrees of freedom of 0 or less, a bad pair, or
 *         correlations that contradict each other
 */
export function combineUncertainty(
  components: readonly UncertaintyComponent[],
  correlations: readonly Correlation[] = [],
): CombinedUncertainty {
  if (components.length === 0) throw new RangeError("components must hold at least one");
  const contributions = components.map(({ sensitivity = 1, standard, degreesOfFreedom = Infinity }, i) => {
    requireFinite(`components[${i}].sensitivity`, sensitivity);
    requireNotNegative(`components[${i}].standard`, standard);
    if (!(degreesOfFreedom > 0)) {
      throw new RangeError(`components[${i}].degreesOfFreedom must be above 0, got ${degreesOfFreedom}`);
    }
    return { signed: sensitivity * standard, degreesOfFreedom };
  });
  let variance = 0;
  let doubt = 0;
  for (const { signed, degreesOfFreedom } of contributions) {
    variance += signed ** 2;
    doubt += signed ** 4 / degreesOfFreedom;
  }
  const independent = variance;
  for (const { first, second, coefficient } of correlations) {
    const one = contributions[first];
    const other = contributions[second];
    if (one === undefined || other === undefined || first === second || !(Math.abs(coefficient) <= 1)) {
      throw new RangeError(`correlation of ${first} and ${second} by ${coefficient} cannot be`);
    }
    variance += 2 * one.signed * other.signed * coefficient;
  }
  if (variance < -1e-12 * independent) throw new RangeError("correlations contradict each other");
  variance = Math.max(0, variance);
  return {
    standard: Math.sqrt(variance),
    effectiveDegreesOfFreedom: doubt === 0 ? Infinity : variance ** 2 / doubt,
  };
}

/** Standard uncertainty of limits between which every value is as likely (JCGM 100:2008, 4.3.7). */
export function rectangular(halfWidth: number): number {
  return halfWidth / Math.sqrt(3);
}

/** Standard uncertainty of limits of a sine of unknown phase, as in mismatch (arcsine distribution, from memory). */
export function uShaped(halfWidth: number): number {
  return halfWidth / Math.SQRT2;
}

/** Standard uncertainty of a figure rounded to steps of `step` (JCGM 100:2008, F.2.2.1). */
export function resolution(step: number): number {
  return rectangular(step / 2);
}
