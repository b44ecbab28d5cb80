import { requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { dbToPower, powerToDb } from "../numeric/decibels.ts";

export interface DishInput {
  readonly diameterM: number;
  readonly frequencyGHz: number;
  /** Aperture efficiency, 0 to 1, of everything that is not listed apart below. */
  readonly efficiency: number;
  /** Deviation of the surface from its best-fit paraboloid, root mean square [mm]. */
  readonly surfaceRmsMm?: number;
  /** Fixed angle between beam and path [deg]. */
  readonly pointingErrorDeg?: number;
  /** Diameter of the feed or of what else stands in the middle of the aperture [m]. */
  readonly blockageDiameterM?: number;
}

export interface DishGain {
  /** Gain of the uniformly lit aperture, efficiency 1 [dBi]. */
  readonly apertureGainDbi: number;
  /** Aperture gain times `efficiency`; the three losses below are not yet taken off [dBi]. */
  readonly gainDbi: number;
  /** `gainDbi` less surface, pointing and blockage loss [dBi]. */
  readonly netGainDbi: number;
  /** Full width between half-power points [deg]. */
  readonly beamwidthDeg: number;
  readonly surfaceLossDb: number;
  readonly pointingLossDb: number;
  readonly blockageLossDb: number;
  /** Distance beyond which the phase error over the aperture stays below 22.5 deg [m]. */
  readonly farFieldM: number;
}

/**
 * Gain, beamwidth and losses of a parabolic dish.
 *
 *     G = eta (pi D / lambda)^2        theta3 = 70 lambda / D        far field from 2 D^2 / lambda
 *     surface (4 pi eps / lambda)^2 Np, pointing 12 (theta / theta3)^2 dB, blockage (1 - (d/D)^2)^2
 *
 * Source: aperture gain and far field, IEEE Std 145 definitions (from memory); beamwidth, common practice,
 *         no source; surface, J. Ruze, Proc. IEEE 54, 633-640, 1966; pointing, Gaussian main lobe;
 *         blockage, uniformly lit aperture
 * Valid:  diameter of several wavelengths; surface error below about lambda/16; pointing error within
 *         about one beamwidth. Beyond, the formulas still answer
 *
 * @throws RangeError on a non-finite or impossible argument, such as a blockage as wide as the dish
 */
export function dishGain({
  diameterM,
  frequencyGHz,
  efficiency,
  surfaceRmsMm = 0,
  pointingErrorDeg = 0,
  blockageDiameterM = 0,
}: DishInput): DishGain {
  requirePositive("efficiency", efficiency);
  requireWithin("efficiency", efficiency, 0, 1);
  requireNotNegative("surfaceRmsMm", surfaceRmsMm);
  requireWithin("pointingErrorDeg", pointingErrorDeg, -180, 180);
  const diameterWavelengths = inWavelengths(diameterM, frequencyGHz);
  requireNotNegative("blockageDiameterM", blockageDiameterM);
  if (blockageDiameterM >= diameterM) {
    throw new RangeError(`blockageDiameterM must be below diameterM, got ${blockageDiameterM}`);
  }

  const wavelength = wavelengthM(frequencyGHz);
  const apertureGainDbi = 2 * powerToDb(Math.PI * diameterWavelengths);
  const gainDbi = apertureGainDbi + powerToDb(efficiency);
  const beamwidthDeg = 70 / diameterWavelengths;
  const surfaceLossDb = powerToDb(Math.E) * ((4 * Math.PI * surfaceRmsMm) / (1000 * wavelength)) ** 2;
  const pointingLossDb = 12 * (pointingErrorDeg / beamwidthDeg) ** 2;
  const blockageLossDb = 2 * powerToDb(1 / (1 - (blockageDiameterM / diameterM) ** 2));
  return {
    apertureGainDbi,
    gainDbi,
    netGainDbi: gainDbi - surfaceLossDb - pointingLossDb - blockageLossDb,
    beamwidthDeg,
    surfaceLossDb,
    pointingLossDb,
    blockageLossDb,
    farFieldM: 2 * diameterM * diameterWavelengths,
  };
}

/**
 * Aperture efficiency of a dish of known gain: eta = G / (pi D / lambda)^2; inverse of `dishGain`.
 *
 * Source: as aperture gain above
 */
export function apertureEfficiency({
  gainDbi,
  diameterM,
  frequencyGHz,
}: {
  gainDbi: number;
  diameterM: number;
  frequencyGHz: number;
}): { efficiency: number } {
  return {
    efficiency: dbToPower(gainDbi) / (Math.PI * inWavelengths(diameterM, frequencyGHz)) ** 2,
  };
}

/**
 * Loss on the axis of a dish that is read or worked closer than its far field [dB].
 *
 *     (sin x / x)^2,  x = pi D^2 / (8 lambda R)
 *
 * Source: quadratic phase over a uniformly lit circular aperture, integrated
 * Valid:  distance beyond about D^2 / (4 lambda); nearer, the answer runs through the nulls of the Fresnel
 *         region and means little
 */
export function nearFieldLoss({
  diameterM,
  frequencyGHz,
  distanceM,
}: {
  diameterM: number;
  frequencyGHz: number;
  distanceM: number;
}): { lossDb: number } {
  requirePositive("distanceM", distanceM);
  const x = (Math.PI * diameterM * inWavelengths(diameterM, frequencyGHz)) / (8 * distanceM);
  return { lossDb: -2 * powerToDb(Math.abs(Math.sin(x) / x)) };
}

function inWavelengths(diameterM: number, frequencyGHz: number): number {
  requirePositive("diameterM", diameterM);
  requirePositive("frequencyGHz", frequencyGHz);
  return diameterM / wavelengthM(frequencyGHz);
}
