import { integrate } from "./quadrature.ts";

/**
 * Fresnel integrals C(x) and S(x) with kernel cos, sin(pi t^2 / 2), Abramowitz & Stegun 7.3.1-2.
 *
 * Below |x| = 5 by composite Gauss quadrature over pieces of equal phase, above by the asymptotic
 * auxiliary functions f and g (A&S 7.3.27-28); absolute error below 1e-12.
 */
export function fresnelIntegrals(x: number): { c: number; s: number } {
  const z = Math.abs(x);
  const sign = x < 0 ? -1 : 1;
  if (z <= 5) {
    // Equal steps of phase: pi/2 each, so that every piece holds at most a quarter turn.
    const pieces = Math.max(1, Math.ceil(z * z));
    let c = 0;
    let s = 0;
    for (let i = 0; i < pieces; i++) {
      const low = z * Math.sqrt(i / pieces);
      const high = z * Math.sqrt((i + 1) / pieces);
      c += integrate((t) => Math.cos((Math.PI / 2) * t * t), low, high, 16);
      s += integrate((t) => Math.sin((Math.PI / 2) * t * t), low, high, 16);
    }
    return { c: sign * c, s: sign * s };
  }
  const p = Math.PI * z * z;
  let f = 1;
  let g = 1;
  let termF = 1;
  let termG = 1;
  for (let m = 1; m <= 12; m++) {
    const nextF = (-termF * (4 * m - 3) * (4 * m - 1)) / (p * p);
    const nextG = (-termG * (4 * m - 1) * (4 * m + 1)) / (p * p);
    if (Math.abs(nextF) < 1e-18) break;
    f += termF = nextF;
    g += termG = nextG;
  }
  f /= Math.PI * z;
  g /= Math.PI * p * z;
  const phase = (Math.PI / 2) * z * z;
  return {
    c: sign * (0.5 + f * Math.sin(phase) - g * Math.cos(phase)),
    s: sign * (0.5 - f * Math.cos(phase) - g * Math.sin(phase)),
  };
}
