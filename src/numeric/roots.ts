/**
 * Root of a continuous function by bisection: slow and sure.
 *
 * @param f          function whose sign differs at `low` and `high` (a zero at an end counts)
 * @param tolerance  width of the interval to stop at; 0 goes on to the last bits of a double
 * @returns          the abscissa, or undefined if the sign does not change between the ends
 */
export function bisect(
  f: (x: number) => number,
  low: number,
  high: number,
  tolerance = 0,
): number | undefined {
  const atLow = f(low);
  if (atLow === 0) return low;
  const atHigh = f(high);
  if (atHigh === 0) return high;
  if (!(atLow * atHigh < 0)) return undefined;
  let a = low;
  let b = high;
  for (;;) {
    const middle = (a + b) / 2;
    if (middle === a || middle === b || b - a <= tolerance) return middle;
    const value = f(middle);
    if (value === 0) return middle;
    if (value < 0 === atLow < 0) a = middle;
    else b = middle;
  }
}
