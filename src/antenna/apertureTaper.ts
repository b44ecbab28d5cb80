import { lambdaFunction } from "../numeric/bessel.ts";
import { requirePositive, requireWithin } from "../numeric/check.ts";
import { RADIANS_PER_DEGREE } from "../numeric/constants.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import { bisect } from "../numeric/roots.ts";

export interface ApertureTaper {
  /** Gain over that of an evenly lit aperture. */
  readonly taper: number;
  /** Half-power full width = this times lambda / D [deg]. */
  readonly beamwidthFactorDeg: number;
  /** First side lobe under the main lobe [dB], positive. */
  readonly firstSideLobeDb: number;
}

/**
 * Taper efficiency, beamwidth and first side lobe of a round aperture lit by C + (1 - C)(1 - rho^2)^p.
 *
 *     taper = [C + (1-C)/(p+1)]^2 / [C^2 + 2C(1-C)/(p+1) + (1-C)^2/(2p+1)]
 *     field over angle ~ C Lam_1(u) + (1-C)/(p+1) Lam_{p+1}(u),  u = (pi D / lambda) sin theta
 *
 * Source: S. Silver, Microwave Antenna Theory and Design; W. L. Stutzman and G. A. Thiele, Antenna Theory and
 *         Design
 * Valid:  apertures of several wavelengths, without blockage or phase error
 *
 * @param edgeField  C, the field at the rim over that at the centre, 0 to 1
 * @param power      p, above 0 up to 4
 */
export function apertureTaper({
  edgeField: c,
  power: p,
}: {
  edgeField: number;
  power: number;
}): ApertureTaper {
  requireWithin("edgeField", c, 0, 1);
  requirePositive("power", p);
  requireWithin("power", p, 0, 4);
  const w = (1 - c) / (p + 1);
  const pattern = (u: number) => (c * lambdaFunction(1, u) + w * lambdaFunction(p + 1, u)) / (c + w);
  /** Minus the slope of the pattern over u / 2: it first vanishes at the crest of the first side lobe. */
  const slope = (u: number) => (c / 2) * lambdaFunction(2, u) + (w / (p + 2)) * lambdaFunction(p + 2, u);

  let beyond = 1;
  while (slope(beyond) > 0) beyond += 0.1;
  const crest = bisect(slope, beyond - 0.1, beyond)!;
  const halfPower = bisect((u) => pattern(u) - Math.SQRT1_2, 0, crest)!;
  return {
    taper: (c + w) ** 2 / (c ** 2 + 2 * c * w + (1 - c) ** 2 / (2 * p + 1)),
    beamwidthFactorDeg: (2 * halfPower) / Math.PI / RADIANS_PER_DEGREE,
    firstSideLobeDb: -amplitudeToDb(Math.abs(pattern(crest))),
  };
}
