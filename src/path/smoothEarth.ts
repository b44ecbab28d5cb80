import { requireNotNegative, requirePositive, requireWithin, type Validity } from "../numeric/check.ts";
import { diffractionWavelengthM } from "./knifeEdge.ts";

/** Linear polarization of a wave that travels along the ground. */
export type LinearPolarization = "horizontal" | "vertical";

/** Where the residue series may be cut after its first term; the lower limit from memory. */
export const smoothEarthValidity = { frequencyGHz: [0.01, 50] } as const satisfies Validity;

export interface SmoothEarthInput {
  readonly frequencyGHz: number;
  readonly distanceKm: number;
  readonly h1M: number;
  readonly h2M: number;
  readonly effectiveRadiusKm: number;
  readonly seaFraction: number;
  readonly polarization: LinearPolarization;
}

/** @throws RangeError unless `value` is a linear polarization. */
export function requireLinearPolarization(value: string): asserts value is LinearPolarization {
  if (value !== "horizontal" && value !== "vertical") {
    throw new RangeError(`polarization must be horizontal or vertical, got ${value}`);
  }
}

/**
 * Diffraction loss over a spherical Earth.
 *
 * Beyond the smooth horizon the first term of the residue series gives it. Within, the loss fades from that
 * term, taken for the radius at which the path would just graze, to 0 where 0.55 of the first Fresnel zone
 * is clear.
 *
 * Source: ITU-R P.526-15, section 3.2; ITU-R P.452-18, section 4.2.2, equations 23 to 29
 * Valid:  0.01 to 50 GHz
 *
 * @param frequencyGHz       [GHz], above 0
 * @param distanceKm         [km], above 0
 * @param h1M                one antenna over the smooth surface [m], at least 0
 * @param h2M                the other antenna over the smooth surface [m], at least 0
 * @param effectiveRadiusKm  radius of the Earth that makes rays straight [km], above 0
 * @param seaFraction        part of the path over sea, 0 to 1; the rest is land of average ground
 * @param polarization       horizontal or vertical
 * @returns loss [dB] against free space
 * @throws RangeError on a non-finite argument or one out of range
 */
export function smoothEarthLoss(input: SmoothEarthInput): { readonly lossDb: number } {
  const { frequencyGHz, distanceKm, h1M, h2M, effectiveRadiusKm, seaFraction, polarization } = input;
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("distanceKm", distanceKm);
  requireNotNegative("h1M", h1M);
  requireNotNegative("h2M", h2M);
  requirePositive("effectiveRadiusKm", effectiveRadiusKm);
  requireWithin("seaFraction", seaFraction, 0, 1);
  requireLinearPolarization(polarization);

  const roots = Math.sqrt(h1M) + Math.sqrt(h2M);
  const horizonKm = Math.sqrt(0.002 * effectiveRadiusKm) * roots;
  if (distanceKm >= horizonKm) return { lossDb: firstTermLoss(input) };

  const c = (h1M - h2M) / (h1M + h2M);
  const m = (250 * distanceKm ** 2) / (effectiveRadiusKm * (h1M + h2M));
  const third = Math.acos(clampToUnit(1.5 * c * Math.sqrt((3 * m) / (m + 1) ** 3))) / 3;
  const b = clampToUnit(2 * Math.sqrt((m + 1) / (3 * m)) * Math.cos(Math.PI / 3 + third));
  const d1 = (distanceKm * (1 + b)) / 2;
  const d2 = distanceKm - d1;
  const leastClearanceM =
    ((h1M - (500 * d1 ** 2) / effectiveRadiusKm) * d2 + (h2M - (500 * d2 ** 2) / effectiveRadiusKm) * d1) /
    distanceKm;
  const neededM = 17.456 * Math.sqrt((d1 * d2 * diffractionWavelengthM(frequencyGHz)) / distanceKm);
  if (leastClearanceM > neededM) return { lossDb: 0 };
  // For an antenna on the ground the point of least clearance is that antenna: nothing is clear.
  const clearShare = neededM > 0 ? leastClearanceM / neededM : 0;

  const grazingRadiusKm = 500 * (distanceKm / roots) ** 2;
  const grazing = firstTermLoss({ ...input, effectiveRadiusKm: grazingRadiusKm });
  return { lossDb: grazing < 0 ? 0 : (1 - clearShare) * grazing };
}

/** Keeps rounding from pushing a cosine, or a point of the path, past its end. */
function clampToUnit(value: number): number {
  return Math.max(-1, Math.min(1, value));
}

interface GroundConstants {
  readonly permittivity: number;
  readonly conductivitySPerM: number;
}

const land: GroundConstants = { permittivity: 22, conductivitySPerM: 0.003 };
const sea: GroundConstants = { permittivity: 80, conductivitySPerM: 5 };

/** First term of the residue series, mixed by the part of the path over sea; equation 30. */
function firstTermLoss(input: SmoothEarthInput): number {
  const { seaFraction } = input;
  let lossDb = 0;
  if (seaFraction > 0) lossDb += seaFraction * firstTermLossOver(sea, input);
  if (seaFraction < 1) lossDb += (1 - seaFraction) * firstTermLossOver(land, input);
  return lossDb;
}

/** Equations 31 to 37. */
function firstTermLossOver(ground: GroundConstants, input: SmoothEarthInput): number {
  const { frequencyGHz: f, distanceKm, h1M, h2M, effectiveRadiusKm: a, polarization } = input;
  const conduction = (18 * ground.conductivitySPerM) / f;
  const horizontal =
    0.036 * (a * f) ** (-1 / 3) * ((ground.permittivity - 1) ** 2 + conduction ** 2) ** -0.25;
  const K =
    polarization === "horizontal" ? horizontal : horizontal * Math.hypot(ground.permittivity, conduction);
  const beta = (1 + 1.6 * K ** 2 + 0.67 * K ** 4) / (1 + 4.5 * K ** 2 + 1.53 * K ** 4);
  const X = 21.88 * beta * Math.cbrt(f / a ** 2) * distanceKm;
  const distanceTerm =
    X >= 1.6 ? 11 + 10 * Math.log10(X) - 17.6 * X : -20 * Math.log10(X) - 5.6488 * X ** 1.425;

  const normalizedHeight = 0.9575 * beta * Math.cbrt(f ** 2 / a);
  const heightGain = (heightM: number) => {
    const B = beta * normalizedHeight * heightM;
    const gain =
      B > 2 ? 17.6 * Math.sqrt(B - 1.1) - 5 * Math.log10(B - 1.1) - 8 : 20 * Math.log10(B + 0.1 * B ** 3);
    return Math.max(gain, 2 + 20 * Math.log10(K));
  };
  return -distanceTerm - heightGain(h1M) - heightGain(h2M);
}
