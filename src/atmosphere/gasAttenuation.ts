import { requireNotNegative, requirePositive, type Validity } from "../numeric/check.ts";
import { oxygenLines, VALUES_PER_LINE, vapourLines } from "./gasLines.ts";

export interface GasInput {
  readonly frequencyGHz: number;
  readonly dryPressureHPa: number;
  readonly vapourPressureHPa: number;
  readonly temperatureK: number;
}

export interface GasAttenuation {
  readonly oxygenDbPerKm: number;
  readonly vapourDbPerKm: number;
  readonly totalDbPerKm: number;
}

export const gasValidity = { frequencyGHz: [1, 1000] } as const satisfies Validity;

/**
 * Specific attenuation by the gases of the air, summed line by line.
 *
 *     gamma = 0.182 f N"(f),  N" = sum of S_i F_i over the lines, plus the dry continuum for oxygen
 *
 * Source: ITU-R P.676-13 (08/2022) Annex 1, equations (1) to (9)
 * Valid:  1 to 1000 GHz; pressures and temperatures of the atmosphere
 *
 * @param frequencyGHz       [GHz], above 0
 * @param dryPressureHPa     pressure of the dry air alone [hPa], above 0: a barometer reads this plus the vapour
 * @param vapourPressureHPa  partial pressure of the water vapour [hPa], at least 0
 * @param temperatureK       [K], above 0
 * @returns shares of oxygen (with the dry continuum) and of water vapour, and their sum [dB/km]
 * @throws RangeError on a non-finite or impossible argument
 */
export function specificGasAttenuation(input: GasInput): GasAttenuation {
  const { frequencyGHz: f, dryPressureHPa: p, vapourPressureHPa: e, temperatureK } = input;
  requirePositive("frequencyGHz", f);
  requirePositive("dryPressureHPa", p);
  requireNotNegative("vapourPressureHPa", e);
  requirePositive("temperatureK", temperatureK);
  const theta = 300 / temperatureK;
  const oxygenDbPerKm = 0.182 * f * (oxygenLineSum(f, p, e, theta) + dryContinuum(f, p, e, theta));
  const vapourDbPerKm = 0.182 * f * vapourLineSum(f, p, e, theta);
  return { oxygenDbPerKm, vapourDbPerKm, totalDbPerKm: oxygenDbPerKm + vapourDbPerKm };
}

function oxygenLineSum(f: number, p: number, e: number, theta: number): number {
  const lnTheta = Math.log(theta);
  const strengthScale = 1e-7 * p * theta ** 3;
  const mixingScale = 1e-4 * (p + e) * theta ** 0.8;
  let sum = 0;
  for (let i = 0; i < oxygenLines.length; i += VALUES_PER_LINE) {
    const a1 = oxygenLines[i + 1]!;
    const a2 = oxygenLines[i + 2]!;
    const a3 = oxygenLines[i + 3]!;
    const a4 = oxygenLines[i + 4]!;
    const a5 = oxygenLines[i + 5]!;
    const a6 = oxygenLines[i + 6]!;
    const strength = a1 * strengthScale * Math.exp(a2 * (1 - theta));
    const collisions = a3 * 1e-4 * (p * Math.exp((0.8 - a4) * lnTheta) + 1.1 * e * theta);
    const width = Math.sqrt(collisions * collisions + 2.25e-6); // Zeeman splitting bounds it from below
    sum += strength * lineShape(f, oxygenLines[i]!, width, (a5 + a6 * theta) * mixingScale);
  }
  return sum;
}

function vapourLineSum(f: number, p: number, e: number, theta: number): number {
  const lnTheta = Math.log(theta);
  const strengthScale = 1e-1 * e * theta ** 3.5;
  let sum = 0;
  for (let i = 0; i < vapourLines.length; i += VALUES_PER_LINE) {
    const f0 = vapourLines[i]!;
    const b1 = vapourLines[i + 1]!;
    const b2 = vapourLines[i + 2]!;
    const b3 = vapourLines[i + 3]!;
    const b4 = vapourLines[i + 4]!;
    const b5 = vapourLines[i + 5]!;
    const b6 = vapourLines[i + 6]!;
    const strength = b1 * strengthScale * Math.exp(b2 * (1 - theta));
    const collisions = b3 * 1e-4 * (p * Math.exp(b4 * lnTheta) + b5 * e * Math.exp(b6 * lnTheta));
    // The thermal motion of the molecules (Doppler) bounds the width from below.
    const width =
      0.535 * collisions + Math.sqrt(0.217 * collisions * collisions + (2.1316e-12 * f0 * f0) / theta);
    sum += strength * lineShape(f, f0, width, 0);
  }
  return sum;
}

/** Equation (5): a line at f0 and its image at -f0, with `mixing` for the interference of neighbours. */
function lineShape(f: number, f0: number, width: number, mixing: number): number {
  const below = f0 - f;
  const above = f0 + f;
  return (
    (f / f0) *
    ((width - mixing * below) / (below * below + width * width) +
      (width - mixing * above) / (above * above + width * width))
  );
}

/** Equations (8) and (9): the Debye spectrum of oxygen and the pressure-induced loss of nitrogen. */
function dryContinuum(f: number, p: number, e: number, theta: number): number {
  const d = 5.6e-4 * (p + e) * theta ** 0.8;
  return (
    f *
    p *
    theta ** 2 *
    (6.14e-5 / (d * (1 + (f / d) ** 2)) + (1.4e-12 * p * theta ** 1.5) / (1 + 1.9e-5 * f ** 1.5))
  );
}
