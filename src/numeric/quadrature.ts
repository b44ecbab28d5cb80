/** Abscissae and weights of the n-point Gauss-Legendre rule on [-1, 1], by Newton steps on P_n. */
function legendreRule(n: number): { nodes: Float64Array; weights: Float64Array } {
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 0;
    for (let step = 0; step < 100; step++) {
      let p0 = 1;
      let p1 = x;
      for (let k = 2; k <= n; k++) [p0, p1] = [p1, ((2 * k - 1) * x * p1 - (k - 1) * p0) / k];
      slope = (n * (x * p1 - p0)) / (x * x - 1);
      const change = p1 / slope;
      x -= change;
      if (Math.abs(change) < 1e-15) break;
    }
    nodes[i] = x;
    weights[i] = 2 / ((1 - x * x) * slope * slope);
  }
  return { nodes, weights };
}

const rules = new Map<number, ReturnType<typeof legendreRule>>();

/**
 * Integral of a smooth function by one Gauss-Legendre rule, Abramowitz & Stegun 25.4.29.
 *
 * @param points  nodes of the rule, at least 2; 32 reaches rounding for the smooth integrands used here
 */
export function integrate(f: (x: number) => number, low: number, high: number, points = 32): number {
  let rule = rules.get(points);
  if (rule === undefined) {
    rule = legendreRule(points);
    rules.set(points, rule);
  }
  const centre = (low + high) / 2;
  const half = (high - low) / 2;
  let sum = 0;
  for (let i = 0; i < points; i++) sum += rule.weights[i]! * f(centre + half * rule.nodes[i]!);
  return sum * half;
}
