import { requireFinite, requireNotNegative, requirePositive } from "../numeric/check.ts";

/**
 * Mean and spread of the pointing loss of a beam with a standing offset and a random error in each axis.
 *
 *     loss = 12 theta^2 / b^2,  theta^2 = (o + x)^2 + y^2,  x and y normal with deviation s
 *     mean = 12 (o^2 + 2 s^2) / b^2,  deviation = 24 s sqrt(o^2 + s^2) / b^2
 *
 * Without an offset theta^2 is exponential, so that mean and deviation are both 24 (s/b)^2. The loss has a
 * long tail: its deviation is no half-width of a symmetric spread.
 *
 * Source: Gaussian main lobe; moments of the noncentral chi-square distribution with two degrees of freedom
 * Valid:  angles within about one beamwidth
 *
 * @param offsetDeg        standing offset o [deg]
 * @param errorPerAxisDeg  standard deviation s in each axis [deg], at least 0
 * @param beamwidthDeg     full half-power width b [deg], above 0
 */
export function pointingLoss({
  offsetDeg,
  errorPerAxisDeg,
  beamwidthDeg,
}: {
  offsetDeg: number;
  errorPerAxisDeg: number;
  beamwidthDeg: number;
}): { meanDb: number; sigmaDb: number } {
  requireFinite("offsetDeg", offsetDeg);
  requireNotNegative("errorPerAxisDeg", errorPerAxisDeg);
  requirePositive("beamwidthDeg", beamwidthDeg);
  const offset = offsetDeg / beamwidthDeg;
  const error = errorPerAxisDeg / beamwidthDeg;
  return { meanDb: 12 * (offset ** 2 + 2 * error ** 2), sigmaDb: 24 * error * Math.hypot(offset, error) };
}
