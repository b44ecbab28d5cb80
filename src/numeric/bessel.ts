/**
 * Lambda function of order q, the Bessel function J_q freed of its leading power: Lam_q(0) = 1.
 *
 *     Lam_q(u) = q! 2^q J_q(u) / u^q = sum_k (-u^2/4)^k q! / (k! (q+k)!)
 *
 * Its slope is -u / (2(q+1)) Lam_{q+1}(u).
 *
 * Source: Abramowitz & Stegun 9.1.10
 * Valid:  q at least 0, not necessarily whole; |u| up to about 15, where cancellation has cost six digits
 */
export function lambdaFunction(q: number, u: number): number {
  const step = -(u * u) / 4;
  let term = 1;
  let sum = 1;
  for (let k = 1; Math.abs(term) > 1e-17 || k * (q + k) < -step; k++) {
    term *= step / (k * (q + k));
    sum += term;
  }
  return sum;
}
