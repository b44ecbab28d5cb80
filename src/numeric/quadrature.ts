/** Abscissae and weights of the n-point Gauss-Legendre rule on [-1, 1], by Newton steps on P_n. */
function legendreRule(n: number): { nodes: Float64Array; weights: Float64Array } {
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < (n + 1) >> 1; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 0;
    for (let step = 0; step < 100; step++) {
      let previous = 1;
      let value = x;
      for (let k = 2; k <= n; k++) {
        const next = ((2 * k - 1) * x * value - (k - 1) * previous) / k;
        previous = value;
        value = next;
      }
      slope = (n * (x * value - previous)) / (x * x - 1);
      const change = value / slope;
      x -= change;
      if (Math.abs(change) < 1e-15) break;
    }
    // The rule is symmetric: the other half is the mirror image.
    nodes[i] = x;
    nodes[n - 1 - i] = -x;
    weights[i] = 2 / ((1 - x * x) * slope * slope);
    weights[n - 1 - i] = weights[i]!;
  }
  return { nodes, weights };
}

const rules = new Map<number, ReturnType<typeof legendreRule>>();

/** Abscissae and weights on [-1, 1] of the n-point Gauss-Legendre rule, for sums that share their nodes. */
export function gaussRule(points: number): ReturnType<typeof legendreRule> {
  let rule = rules.get(points);
  if (rule === undefined) {
    rule = legendreRule(points);
    rules.set(points, rule);
  }
  return rule;
}

/**
 * Integral of a smooth function by one Gauss-Legendre rule, Abramowitz & Stegun 25.4.29.
 *
 * @param points  nodes of the rule, at least 2; 32 reaches rounding for the smooth integrands used here
 */
export function integrate(f: (x: number) => number, low: number, high: number, points = 32): number {
  const { nodes, weights } = gaussRule(points);
  const centre = (low + high) / 2;
  const half = (high - low) / 2;
  let sum = 0;
  for (let i = 0; i < points; i++) sum += weights[i]! * f(centre + half * nodes[i]!);
  return sum * half;
}
