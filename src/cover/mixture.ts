import { requireNotNegative, requireWithin } from "../numeric/check.ts";
import { abs, arg, multiply, polar } from "../numeric/complex.ts";

/**
 * Permittivity of a solid mixed with air: foam, cloth, printed infill.
 *
 * eps^(1/3) = 1 + v (eps_solid^(1/3) - 1), applied to the complex permittivity; v is the solid's share of the
 * volume, the mixture's density over the solid's.
 *
 * Source: Looyenga 1965, Physica 31, 401 (from memory)
 * Valid:  grains, fibres or cells far below the wavelength, no preferred direction
 *
 * @param permittivity  eps' of the solid, at least 1
 * @param lossTangent   of the solid, at least 0
 * @param solidShare    share of the volume, 0 to 1
 * @returns permittivity and lossTangent of the mixture
 * @throws RangeError on an argument outside these ranges
 */
export function mixture({
  permittivity,
  lossTangent,
  solidShare,
}: {
  readonly permittivity: number;
  readonly lossTangent: number;
  readonly solidShare: number;
}): { permittivity: number; lossTangent: number } {
  requireWithin("permittivity", permittivity, 1, Number.MAX_VALUE);
  requireNotNegative("lossTangent", lossTangent);
  requireWithin("solidShare", solidShare, 0, 1);
  const solid = { re: permittivity, im: -permittivity * lossTangent };
  const root = polar(Math.cbrt(abs(solid)), arg(solid) / 3);
  const mixed = { re: 1 + solidShare * (root.re - 1), im: solidShare * root.im };
  const { re, im } = multiply(mixed, multiply(mixed, mixed));
  return { permittivity: re, lossTangent: -im / re };
}
