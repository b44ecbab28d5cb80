import { specificRainAttenuation } from "../atmosphere/rainAttenuation.ts";
import { requireNotNegative, requirePositive, requireWithin, type Validity } from "../numeric/check.ts";

export const rainFadeValidity = {
  frequencyGHz: [1, 40],
  distanceKm: [0, 60],
  percent: [0.001, 1],
} as const satisfies Validity;

export type RainPolarization = "horizontal" | "vertical" | "circular";

export interface RainPathInput {
  readonly frequencyGHz: number;
  /** Rain rate exceeded for 0.01 % of an average year, over one minute [mm/h]. */
  readonly rainRate001MmPerH: number;
  readonly distanceKm: number;
  readonly polarization: RainPolarization;
}

export interface RainFade {
  /** Attenuation exceeded for `percent` of an average year [dB]. */
  readonly lossDb: number;
  /** Effective over true length. */
  readonly distanceFactor: number;
  readonly effectiveLengthKm: number;
}

/**
 * Rain attenuation of a level path that is exceeded for a percentage of an average year.
 *
 * The rate of 0.01 % fills an effective length with rain; a power law of the time carries the result to
 * other percentages. At 0.01 % that law gives back 0.998 of its base, as published.
 *
 * Source: Rec. ITU-R P.530-17 and -18, section 2.4.1, equations 32 to 35; coefficients by P.838-3. Of two
 *         readings of C0 in circulation, 0.12 + 0.4 log((f/10)^0.8) is taken; the other moves 10 GHz by 0.6 %
 * Valid:  to 40 GHz, 60 km and 0.001 to 1 %, all parts of the world; beyond, the same law is extended
 *
 * @param percent  of the year, above 0 up to 100
 * @throws RangeError on a non-finite or impossible argument
 */
export function rainFade({ percent, ...path }: RainPathInput & { percent: number }): RainFade {
  requirePositive("percent", percent);
  requireWithin("percent", percent, 0, 100);
  const { loss001Db, distanceFactor, lengthKm } = baseFade(path);
  const { c1, c2, c3 } = timeLaw(path.frequencyGHz);
  const x = Math.log10(percent);
  return {
    lossDb: loss001Db * c1 * 10 ** (-x * (c2 + c3 * x)),
    distanceFactor,
    effectiveLengthKm: lengthKm,
  };
}

export interface RainFadePercent {
  /** Share of an average year in which the fade is exceeded [%], within 0.001 to 1. */
  readonly percent: number;
  /** Beyond the ends of the model only a bound is known. */
  readonly relation: "equal" | "atMost" | "atLeast";
}

/**
 * Share of an average year in which rain fades the path deeper than `fadeDb`; inverse of `rainFade`.
 *
 * Source: as `rainFade`; its law is quadratic in log p and is solved in closed form
 *
 * @param fadeDb  above 0
 */
export function rainFadePercent({ fadeDb, ...path }: RainPathInput & { fadeDb: number }): RainFadePercent {
  requirePositive("fadeDb", fadeDb);
  const [rarest, commonest] = rainFadeValidity.percent;
  if (fadeDb > rainFade({ ...path, percent: rarest }).lossDb) return { percent: rarest, relation: "atMost" };
  if (fadeDb < rainFade({ ...path, percent: commonest }).lossDb) {
    return { percent: commonest, relation: "atLeast" };
  }
  const { c1, c2, c3 } = timeLaw(path.frequencyGHz);
  const depth = Math.log10(fadeDb / (baseFade(path).loss001Db * c1));
  // c3 x^2 + c2 x + depth = 0, the root on which the fade falls with time
  const x = (Math.sqrt(c2 * c2 - 4 * c3 * depth) - c2) / (2 * c3);
  return { percent: 10 ** x, relation: "equal" };
}

/**
 * Length of path that would give the same attenuation if the rate filled it evenly.
 *
 * The factor was fitted to the rate of 0.01 % of the year. Fed with the rate of a shower that falls now, it
 * stands for how far such rain usually reaches (common practice, no source); rain below some 10 mm/h then
 * yields more than the path itself, so a caller who asks about now should not let it exceed the distance.
 *
 * Source: Rec. ITU-R P.530-17 and -18, section 2.4.1, equation 32, with its cap of 2.5
 * Valid:  to 40 GHz and 60 km
 *
 * @param alpha  exponent of the specific attenuation by P.838
 */
export function effectiveRainLength({
  frequencyGHz,
  rainRateMmPerH,
  alpha,
  distanceKm,
}: {
  frequencyGHz: number;
  rainRateMmPerH: number;
  alpha: number;
  distanceKm: number;
}): { distanceFactor: number; lengthKm: number } {
  requirePositive("frequencyGHz", frequencyGHz);
  requireNotNegative("rainRateMmPerH", rainRateMmPerH);
  requirePositive("alpha", alpha);
  requirePositive("distanceKm", distanceKm);
  const divisor =
    0.477 * distanceKm ** 0.633 * rainRateMmPerH ** (0.073 * alpha) * frequencyGHz ** 0.123 -
    10.579 * (1 - Math.exp(-0.024 * distanceKm));
  // Short or dry paths drive the divisor below 0.4 and even below 0: both mean the cap.
  const distanceFactor = divisor > 0.4 ? 1 / divisor : 2.5;
  return { distanceFactor, lengthKm: distanceFactor * distanceKm };
}

/**
 * Rain attenuation at another frequency, same path and same percentage, from one that is known.
 *
 * Source: Rec. ITU-R P.530-17 and -18, section 2.4.3
 * Valid:  7 to 50 GHz
 *
 * @param lossDb  attenuation at `fromGHz` [dB], at least 0
 */
export function scaleRainFade({
  lossDb,
  fromGHz,
  toGHz,
}: {
  lossDb: number;
  fromGHz: number;
  toGHz: number;
}): { lossDb: number } {
  requireNotNegative("lossDb", lossDb);
  requirePositive("fromGHz", fromGHz);
  requirePositive("toGHz", toGHz);
  const phi = (f: number) => (f * f) / (1 + 1e-4 * f * f);
  const ratio = phi(toGHz) / phi(fromGHz);
  const h = 1.12e-3 * Math.sqrt(ratio) * (phi(fromGHz) * lossDb) ** 0.55;
  return { lossDb: lossDb * ratio ** (1 - h) };
}

const tiltDeg = { horizontal: 0, vertical: 90, circular: 45 } as const satisfies Record<
  RainPolarization,
  number
>;

/** Attenuation in the rain of 0.01 % over the effective length, before the law of time. */
function baseFade({ frequencyGHz, rainRate001MmPerH, distanceKm, polarization }: RainPathInput) {
  const { alpha, dbPerKm } = specificRainAttenuation({
    frequencyGHz,
    rainRateMmPerH: rainRate001MmPerH,
    tiltDeg: tiltDeg[polarization],
    elevationDeg: 0,
  });
  const length = effectiveRainLength({
    frequencyGHz,
    rainRateMmPerH: rainRate001MmPerH,
    alpha,
    distanceKm,
  });
  return { ...length, loss001Db: dbPerKm * length.lengthKm };
}

/** Coefficients of A(p) = A(0.01 %) C1 p^-(C2 + C3 log p). */
function timeLaw(frequencyGHz: number): { c1: number; c2: number; c3: number } {
  const c0 = frequencyGHz < 10 ? 0.12 : 0.12 + 0.4 * Math.log10((frequencyGHz / 10) ** 0.8);
  return {
    c1: 0.07 ** c0 * 0.12 ** (1 - c0),
    c2: 0.855 * c0 + 0.546 * (1 - c0),
    c3: 0.139 * c0 + 0.043 * (1 - c0),
  };
}
