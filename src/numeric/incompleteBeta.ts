/**
 * Natural logarithm of the gamma function of x > 0.
 *
 * Stirling's series (Abramowitz & Stegun 6.1.41), after x has been raised above 10 by the recurrence 6.1.15, so
 * that six terms reach rounding.
 */
export function logGamma(x: number): number {
  let product = 1;
  let z = x;
  for (; z < 10; z++) product *= z;
  const w = 1 / (z * z);
  const series =
    (1 / 12 + w * (-1 / 360 + w * (1 / 1260 + w * (-1 / 1680 + w * (1 / 1188 + w * (-691 / 360360)))))) / z;
  return (z - 0.5) * Math.log(z) - z + 0.5 * Math.log(2 * Math.PI) + series - Math.log(product);
}

/**
 * Regularised incomplete beta function I_x(a, b), 0 <= x <= 1, a and b above 0.
 *
 * Source: continued fraction of Abramowitz & Stegun 26.5.8, evaluated by Lentz's method, on the side of the mean
 *         where it converges fast; the other side by I_x(a, b) = 1 - I_(1-x)(b, a) (26.5.2)
 */
export function incompleteBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  if (x > (a + 1) / (a + b + 2)) return 1 - incompleteBeta(1 - x, b, a);
  const front = Math.exp(
    a * Math.log(x) + b * Math.log1p(-x) + logGamma(a + b) - logGamma(a) - logGamma(b) - Math.log(a),
  );
  let c = 1;
  let d = 1 / awayFromZero(1 - ((a + b) * x) / (a + 1));
  let fraction = d;
  for (let m = 1; m <= 10_000; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / awayFromZero(1 + even * d);
    c = awayFromZero(1 + even / c);
    fraction *= c * d;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / awayFromZero(1 + odd * d);
    c = awayFromZero(1 + odd / c);
    fraction *= c * d;
    if (Math.abs(c * d - 1) < 1e-15) break;
  }
  return front * fraction;
}

/** Lentz's method divides by its partial results, so none may be exactly 0. */
function awayFromZero(value: number): number {
  return Math.abs(value) < 1e-300 ? 1e-300 : value;
}
