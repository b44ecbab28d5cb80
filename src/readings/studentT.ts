import { incompleteBeta } from "../numeric/incompleteBeta.ts";
import { normalCdf, normalQuantile } from "../numeric/normal.ts";
import { bisect } from "../numeric/roots.ts";

/** Beyond, the beta function loses digits and the normal form of Abramowitz & Stegun 26.7.8 is as good. */
const MANY = 1e6;

/**
 * Student's t distribution function: the probability that a variate with v degrees of freedom is at most t.
 *
 * P = 1 - I_x(v/2, 1/2)/2 = 1/2 + I_(1-x)(1/2, v/2)/2 for t >= 0, x = v/(v + t^2).
 *
 * Source: Abramowitz & Stegun 26.7.1 and 26.5.27
 * Valid:  v above 0, not necessarily whole; Infinity is the normal distribution
 *
 * @throws RangeError on a t that is not a number or on v of 0 or less
 */
export function studentCdf(t: number, degreesOfFreedom: number): number {
  requireDegrees(degreesOfFreedom);
  if (Number.isNaN(t)) throw new RangeError("t must be a number");
  const v = degreesOfFreedom;
  const square = t * t;
  if (v > MANY)
    return v === Infinity ? normalCdf(t) : normalCdf((t * (1 - 0.25 / v)) / Math.sqrt(1 + square / (2 * v)));
  // Whichever side is small is computed, so that neither the tails nor the middle lose digits.
  const tail =
    square > v
      ? 0.5 * incompleteBeta(v / (v + square), v / 2, 0.5)
      : 0.5 - 0.5 * incompleteBeta(square / (v + square), 0.5, v / 2);
  return t < 0 ? tail : 1 - tail;
}

/**
 * Quantile of Student's t distribution: the t below which a variate with v degrees of freedom lies with
 * probability p.
 *
 * @throws RangeError if p is not inside (0, 1) or v is 0 or less
 */
export function studentQuantile(p: number, degreesOfFreedom: number): number {
  requireDegrees(degreesOfFreedom);
  if (!(p > 0 && p < 1)) throw new RangeError(`p must lie between 0 and 1, got ${p}`);
  if (degreesOfFreedom === Infinity) return normalQuantile(p);
  if (p === 0.5) return 0;
  const tail = Math.min(p, 1 - p);
  let high = 1;
  while (studentCdf(-high, degreesOfFreedom) > tail) high *= 2;
  const t = bisect((value) => studentCdf(-value, degreesOfFreedom) - tail, 0, high)!;
  return p < 0.5 ? -t : t;
}

/**
 * Coverage factor k: the interval of plus and minus k standard uncertainties that holds the share `confidence`.
 *
 * Effective degrees of freedom are cut to the whole number below, as the guide advises for reading its table.
 *
 * Source: JCGM 100:2008, G.3 and table G.2
 *
 * @param confidence        level of confidence, inside (0, 1)
 * @param degreesOfFreedom  effective degrees of freedom, at least 1, or Infinity
 * @throws RangeError on an argument outside these ranges
 */
export function coverageFactorFor(confidence: number, degreesOfFreedom: number): number {
  if (!(confidence > 0 && confidence < 1)) {
    throw new RangeError(`confidence must lie between 0 and 1, got ${confidence}`);
  }
  const whole = Math.floor(degreesOfFreedom + 1e-9); // 1e-9: what rounding takes from a whole number
  if (!(whole >= 1)) {
    throw new RangeError(`degreesOfFreedom must be at least 1, got ${degreesOfFreedom}`);
  }
  return studentQuantile((1 + confidence) / 2, whole);
}

function requireDegrees(degreesOfFreedom: number): void {
  if (!(degreesOfFreedom > 0)) {
    throw new RangeError(`degreesOfFreedom must be above 0, got ${degreesOfFreedom}`);
  }
}
