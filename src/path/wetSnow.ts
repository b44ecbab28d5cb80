import { requireFinite, requirePositive, requireWithin } from "../numeric/check.ts";
import { bisect } from "../numeric/roots.ts";

/**
 * Factor on rain attenuation in and under the melting layer: wet snow attenuates more than the rain it
 * becomes, dry snow not at all.
 *
 * G = 4 E^2 / (1 + (1 - exp(-(dh/600)^2))^2 (4 E^2 - 1)), E = 1 - exp(dh/70)
 *
 * Source: ITU-R P.530-17, section 2.4.2, equation 43 (the same in -18)
 *
 * @param heightOverRainM  height over the rain height [m]; the layer reaches from 0 down to -1200 m, where
 *   the law ends in a step of 2.8 %
 * @returns factor, 0 above the rain height, 1 below the layer
 * @throws RangeError on a non-finite height
 */
export function wetSnowMultiplier(heightOverRainM: number): number {
  requireFinite("heightOverRainM", heightOverRainM);
  if (heightOverRainM > 0) return 0;
  if (heightOverRainM < -1200) return 1;
  const melting = 4 * Math.expm1(heightOverRainM / 70) ** 2;
  const depth = -Math.expm1(-((heightOverRainM / 600) ** 2));
  return melting / (1 + depth ** 2 * (melting - 1));
}

/**
 * Probability that the rain height lies in a step of 100 m about its mean, from the mean outwards; the other
 * side is alike.
 *
 * Source: ITU-R P.2001-4, Table C.2.1 (the 49 steps of ITU-R P.530-17, section 2.4.2)
 */
const stepProbability = [
  0.049978, 0.049589, 0.048439, 0.046583, 0.044104, 0.04111, 0.037724, 0.034081, 0.030312, 0.026542, 0.022881,
  0.019419, 0.016225, 0.013346, 0.010808, 0.008617, 0.006764, 0.005227, 0.003976, 0.002978, 0.002196,
  0.001594, 0.001139, 0.000802, 0.000555,
] as const;

/** Widest offset of the rain height from its mean [m]. */
const SPREAD_M = 100 * (stepProbability.length - 1);

/** Probability of a rain height that lies `offsetM`, a multiple of 100 m, from its mean; sums to 1 within 2e-5. */
export function rainHeightProbability(offsetM: number): number {
  return stepProbability[Math.abs(offsetM) / 100] ?? 0;
}

/** Mean rain height above mean sea level [m] from the mean height of the 0 degC isotherm; ITU-R P.839-4. */
export function meanRainHeightM(isothermKm: number): number {
  requireFinite("isothermKm", isothermKm);
  return 1000 * (isothermKm + 0.36);
}

/** A path and the height of its rain, all above mean sea level. */
export interface RainHeightPath {
  readonly lowerAntennaM: number;
  readonly upperAntennaM: number;
  readonly meanRainHeightM: number;
  /** Share of time [%] for which rain alone fades the path deeper than a depth [dB], falling with depth. */
  readonly rainPercent: (fadeDb: number) => number;
}

/**
 * Share of time for which rain and wet snow together fade a path deeper than a given depth.
 *
 * For each rain height that occurs, rain of 1/g of the depth is enough, where g is the multiplier averaged
 * over the heights that the path crosses.
 *
 * Source: ITU-R P.530-17, section 2.4.2; T(A) as given instead of its table of ten points a decade
 *
 * @param fadeDb           [dB], above 0
 * @param lowerAntennaM    lower antenna [m]
 * @param upperAntennaM    upper antenna [m], not below the lower one
 * @param meanRainHeightM  as `meanRainHeightM` [m]
 * @param rainPercent      what rain alone does
 * @returns share of time [%]
 * @throws RangeError on a non-finite argument or one out of range
 */
export function wetSnowPercent(input: RainHeightPath & { readonly fadeDb: number }): {
  readonly percent: number;
} {
  const { lowerAntennaM, upperAntennaM, meanRainHeightM: mean, rainPercent, fadeDb } = input;
  requirePositive("fadeDb", fadeDb);
  requireFinite("lowerAntennaM", lowerAntennaM);
  requireWithin("upperAntennaM", upperAntennaM, lowerAntennaM, Number.MAX_VALUE);
  requireFinite("meanRainHeightM", mean);
  if (upperAntennaM <= mean - SPREAD_M - 1200) return { percent: rainPercent(fadeDb) };
  let percent = 0;
  for (let offset = -SPREAD_M; offset <= SPREAD_M; offset += 100) {
    const multiplier = meanMultiplier(lowerAntennaM - mean - offset, upperAntennaM - mean - offset);
    if (multiplier > 0) percent += rainHeightProbability(offset) * rainPercent(fadeDb / multiplier);
  }
  return { percent };
}

/**
 * Fade by rain and wet snow that is exceeded for a share of time; inverse of `wetSnowPercent`.
 *
 * @param percent  share of time [%], above 0
 * @returns attenuation [dB]; 0 where the path lies in dry snow for all but a smaller share
 */
export function wetSnowFade({ percent, ...path }: RainHeightPath & { readonly percent: number }): {
  readonly lossDb: number;
} {
  requirePositive("percent", percent);
  const excess = (lossDb: number) => wetSnowPercent({ ...path, fadeDb: lossDb }).percent - percent;
  return { lossDb: bisect(excess, 1e-6, 1000) ?? 0 };
}

/** Multiplier averaged over a range of heights over the rain height, in slices of 100 m at their centres. */
function meanMultiplier(lowM: number, highM: number): number {
  if (lowM === highM) return wetSnowMultiplier(lowM);
  let sum = 0;
  let from = lowM;
  while (from < highM) {
    const to = Math.min(highM, 100 * (Math.floor(from / 100) + 1));
    sum += (to - from) * wetSnowMultiplier((from + to) / 2);
    from = to;
  }
  return sum / (highM - lowM);
}
