/**
 * Standard normal distribution function: the probability that a normal variate is at most `z`.
 *
 * Source: Abramowitz & Stegun 26.2.11 (series) below |z| = 3.5, 26.2.14 (continued fraction) above;
 * relative error near 1e-14 in either tail.
 */
export function normalCdf(z: number): number {
  if (Number.isNaN(z)) throw new RangeError("z must be a number");
  const x = Math.abs(z);
  const density = Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI);
  if (x < 3.5) {
    let term = x;
    let sum = x;
    for (let n = 3; term > sum * 1e-17; n += 2) {
      term *= (x * x) / n;
      sum += term;
    }
    return z < 0 ? 0.5 - density * sum : 0.5 + density * sum;
  }
  let tail = 0;
  for (let n = 120; n >= 1; n--) tail = n / (x + tail);
  const upper = density / (x + tail);
  return z < 0 ? upper : 1 - upper;
}

/**
 * Quantile of the standard normal distribution, 0 < p < 1.
 *
 * Newton steps with Halley's correction on `normalCdf` from a start by Abramowitz & Stegun 26.2.23.
 *
 * @throws RangeError if p is not inside (0, 1)
 */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`p must lie between 0 and 1, got ${p}`);
  if (p === 0.5) return 0;
  const q = Math.min(p, 1 - p);
  const t = Math.sqrt(-2 * Math.log(q));
  let z = -(
    t -
    (2.515517 + t * (0.802853 + t * 0.010328)) / (1 + t * (1.432788 + t * (0.189269 + t * 0.001308)))
  );
  for (let step = 0; step < 3; step++) {
    const error = (normalCdf(z) - q) * Math.sqrt(2 * Math.PI) * Math.exp(0.5 * z * z);
    z -= error / (1 + 0.5 * z * error);
  }
  return p < 0.5 ? z : -z;
}
