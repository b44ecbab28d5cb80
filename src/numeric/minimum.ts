const GOLDEN = (Math.sqrt(5) - 1) / 2;

/**
 * Abscissa of the least value of a function by golden section: the bracket shrinks by 0.618 a step.
 *
 * Exact to the last bits where the minimum is a kink; to about 1e-8 of the abscissa where it is smooth, because
 * the values around it no longer differ.
 *
 * Source: Kiefer 1953, doi:10.2307/2032161 (from memory)
 *
 * @param f  function with a single minimum between `low` and `high`
 */
export function minimum(f: (x: number) => number, low: number, high: number): number {
  let [a, d] = [low, high];
  let b = d - GOLDEN * (d - a);
  let c = a + GOLDEN * (d - a);
  let [atB, atC] = [f(b), f(c)];
  while (a < b && b < c && c < d) {
    if (atB < atC) {
      [d, c, atC] = [c, b, atB];
      b = d - GOLDEN * (d - a);
      atB = f(b);
    } else {
      [a, b, atB] = [b, c, atC];
      c = a + GOLDEN * (d - a);
      atC = f(c);
    }
  }
  return (b + c) / 2;
}
