import {
  requireFinite,
  requireNotNegative,
  requirePositive,
  requireWithin,
  type Validity,
} from "../numeric/check.ts";
import { RADIANS_PER_DEGREE } from "../numeric/constants.ts";

export interface RainInput {
  readonly frequencyGHz: number;
  readonly rainRateMmPerH: number;
  readonly tiltDeg: number;
  readonly elevationDeg: number;
}

export interface RainAttenuation {
  readonly k: number;
  readonly alpha: number;
  readonly dbPerKm: number;
}

export const rainValidity = { frequencyGHz: [1, 1000] } as const satisfies Validity;

/** A regression of P.838-3: bell curves (height, centre, width) over log10 f, on a straight line. */
interface Regression {
  readonly bells: readonly (readonly [a: number, b: number, c: number])[];
  readonly slope: number;
  readonly offset: number;
}

/** P.838-3 Tables 1 to 4; the first two yield log10 k, the others alpha itself. */
const regressions = {
  logKH: {
    bells: [
      [-5.3398, -0.10008, 1.13098],
      [-0.35351, 1.2697, 0.454],
      [-0.23789, 0.86036, 0.15354],
      [-0.94158, 0.64552, 0.16817],
    ],
    slope: -0.18961,
    offset: 0.71147,
  },
  logKV: {
    bells: [
      [-3.80595, 0.56934, 0.81061],
      [-3.44965, -0.22911, 0.51059],
      [-0.39902, 0.73042, 0.11899],
      [0.50167, 1.07319, 0.27195],
    ],
    slope: -0.16398,
    offset: 0.63297,
  },
  alphaH: {
    bells: [
      [-0.14318, 1.82442, -0.55187],
      [0.29591, 0.77564, 0.19822],
      [0.32177, 0.63773, 0.13164],
      [-5.3761, -0.9623, 1.47828],
      [16.1721, -3.2998, 3.4399],
    ],
    slope: 0.67849,
    offset: -1.95537,
  },
  alphaV: {
    bells: [
      [-0.07771, 2.3384, -0.76284],
      [0.56727, 0.95545, 0.54039],
      [-0.20238, 1.1452, 0.26809],
      [-48.2991, 0.791669, 0.116226],
      [48.5833, 0.791459, 0.116479],
    ],
    slope: -0.053739,
    offset: 0.83433,
  },
} as const satisfies Record<string, Regression>;

/**
 * Specific attenuation by rain: a power law of the rate, for any polarization and any elevation.
 *
 *     gamma = k R^alpha
 *
 * Source: ITU-R P.838-3 (03/2005), equations (1) to (5), Tables 1 to 4
 * Valid:  1 to 1000 GHz; liquid rain only, neither wet snow nor hail
 *
 * @param frequencyGHz    [GHz], above 0
 * @param rainRateMmPerH  rate averaged over one minute [mm/h], at least 0
 * @param tiltDeg         tilt of the polarization against horizontal [deg]: 0 horizontal, 90 vertical, 45 circular
 * @param elevationDeg    elevation of the path [deg], -90 to 90
 * @returns k [(dB/km)/(mm/h)^alpha], alpha, and the loss where that rain falls [dB/km]
 * @throws RangeError on a non-finite or impossible argument
 */
export function specificRainAttenuation(input: RainInput): RainAttenuation {
  const { frequencyGHz, rainRateMmPerH, tiltDeg, elevationDeg } = input;
  requirePositive("frequencyGHz", frequencyGHz);
  requireNotNegative("rainRateMmPerH", rainRateMmPerH);
  requireFinite("tiltDeg", tiltDeg);
  requireWithin("elevationDeg", elevationDeg, -90, 90);
  const x = Math.log10(frequencyGHz);
  const kH = 10 ** valueAt(regressions.logKH, x);
  const kV = 10 ** valueAt(regressions.logKV, x);
  const kAlphaH = kH * valueAt(regressions.alphaH, x);
  const kAlphaV = kV * valueAt(regressions.alphaV, x);
  const q = Math.cos(elevationDeg * RADIANS_PER_DEGREE) ** 2 * Math.cos(2 * tiltDeg * RADIANS_PER_DEGREE);
  const k = (kH + kV + (kH - kV) * q) / 2;
  const alpha = (kAlphaH + kAlphaV + (kAlphaH - kAlphaV) * q) / (2 * k);
  return { k, alpha, dbPerKm: k * rainRateMmPerH ** alpha };
}

function valueAt({ bells, slope, offset }: Regression, x: number): number {
  let sum = slope * x + offset;
  for (const [a, b, c] of bells) sum += a * Math.exp(-(((x - b) / c) ** 2));
  return sum;
}
