import { requireFinite, requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { RADIANS_PER_DEGREE, wavelengthM } from "../numeric/constants.ts";
import { powerToDb } from "../numeric/decibels.ts";
import { rainCrossSection } from "./rainCrossSection.ts";
import { type LinearPolarization, requireLinearPolarization } from "./smoothEarth.ts";

/** Squared dielectric factor of water, (eps - 1) / (eps + 2), at centimetre waves. */
const WATER_FACTOR = 0.93;

/** What a Gaussian of unit half-power width holds: exp(-SHARPNESS x^2). */
const SHARPNESS = 4 * Math.LN2;

export interface RainScatterInput {
  readonly frequencyGHz: number;
  readonly rainRateMmPerH: number;
  readonly r1Km: number;
  readonly r2Km: number;
  readonly scatterDeg: number;
  readonly g1Dbi: number;
  readonly g2Dbi: number;
  readonly beamwidth1Deg: number;
  readonly beamwidth2Deg: number;
  readonly cellWidthKm: number;
  readonly cellHeightKm: number;
  readonly polarization: LinearPolarization;
  /** Each beam beside the cell [deg]; absent: 0. */
  readonly offAxis1Deg?: number | undefined;
  readonly offAxis2Deg?: number | undefined;
  /** Centre of the volume over the rain height, where ice scatters less [km]; absent: 0. */
  readonly heightOverRainKm?: number | undefined;
  /** `rayleigh` (default): drops small against the wave; `polynomial`: the fit of P.452-18. */
  readonly crossSection?: "rayleigh" | "polynomial" | undefined;
  /** Temperature of the rain for the polynomial [degC]; absent: 10. */
  readonly temperatureC?: number | undefined;
}

export interface RainScatterLoss {
  /** Between the ports of the two antennas, without gas and without rain on the way [dB]. */
  readonly lossDb: number;
  readonly commonVolumeKm3: number;
  readonly reflectivityDbz: number;
  /** Cross-section per volume, without the factor of polarization [1/m]. */
  readonly crossSectionPerM: number;
}

/**
 * Loss of a path that is closed by scatter from a rain cell.
 *
 * The bistatic radar equation over a volume in which two Gaussian beams and a Gaussian cell overlap; both beams
 * lie near the horizontal. Vertical polarization scatters alike to all sides, horizontal by the squared cosine
 * of the scatter angle.
 *
 * Source: radar equation; Z = 200 R^1.6 by J. S. Marshall and W. McK. Palmer, J. Meteor. 5, 165 (1948); loss of
 *   6.5 dB/km over the rain height and constant as ITU-R P.452-18, equation 73; volume derived in closed form
 * Valid:  narrow beams; the rain itself is uncertain by 5 dB and more (common practice, no source)
 *
 * @param frequencyGHz    [GHz], above 0
 * @param rainRateMmPerH  in the cell [mm/h], above 0
 * @param r1Km            from one antenna to the cell [km], above 0
 * @param r2Km            from the other antenna to the cell [km], above 0
 * @param scatterDeg      0 straight on, 180 back [deg]
 * @param g1Dbi           gain of one antenna [dBi]
 * @param g2Dbi           gain of the other antenna [dBi]
 * @param beamwidth1Deg   half-power width [deg], above 0
 * @param beamwidth2Deg   half-power width [deg], above 0
 * @param cellWidthKm     half-power width of the cell across the ground [km], above 0
 * @param cellHeightKm    half-power height of the cell [km], above 0
 * @param polarization    horizontal or vertical, the same at both ends
 * @throws RangeError on a non-finite argument or one out of range
 */
export function rainScatterLoss(input: RainScatterInput): RainScatterLoss {
  const { frequencyGHz, rainRateMmPerH, r1Km, r2Km, scatterDeg, g1Dbi, g2Dbi, polarization } = input;
  const { offAxis1Deg = 0, offAxis2Deg = 0, heightOverRainKm = 0, temperatureC = 10 } = input;
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("rainRateMmPerH", rainRateMmPerH);
  for (const name of [
    "r1Km",
    "r2Km",
    "beamwidth1Deg",
    "beamwidth2Deg",
    "cellWidthKm",
    "cellHeightKm",
  ] as const) {
    requirePositive(name, input[name]);
  }
  requireWithin("scatterDeg", scatterDeg, 0, 180);
  for (const [name, value] of Object.entries({ g1Dbi, g2Dbi, offAxis1Deg, offAxis2Deg })) {
    requireFinite(name, value);
  }
  requireNotNegative("heightOverRainKm", heightOverRainKm);
  requireLinearPolarization(polarization);

  const iceDb = 6.5 * heightOverRainKm;
  const reflectivityDbz = powerToDb(200 * rainRateMmPerH ** 1.6) - iceDb;
  const crossSectionPerM =
    input.crossSection === "polynomial"
      ? rainCrossSection({ frequencyGHz, rainRateMmPerH, temperatureC, scatterDeg }).perM *
        10 ** (-iceDb / 10)
      : rayleighCrossSection(frequencyGHz, reflectivityDbz);
  const towardsReceiver = polarization === "vertical" ? 1 : Math.cos(scatterDeg * RADIANS_PER_DEGREE) ** 2;
  const commonVolumeKm3 = commonVolume(input);

  const unitsDb = powerToDb((4 * Math.PI) ** 3 * 1000) - 2 * powerToDb(wavelengthM(frequencyGHz));
  const scattered = (towardsReceiver * crossSectionPerM * commonVolumeKm3) / (r1Km * r2Km) ** 2;
  const offAxisDb =
    powerToDb(Math.exp(SHARPNESS)) *
    ((offAxis1Deg / input.beamwidth1Deg) ** 2 + (offAxis2Deg / input.beamwidth2Deg) ** 2);
  return {
    lossDb: unitsDb - powerToDb(scattered) - g1Dbi - g2Dbi + offAxisDb,
    commonVolumeKm3,
    reflectivityDbz,
    crossSectionPerM,
  };
}

/** eta = pi^5 |K|^2 Z / lambda^4 with Z in mm^6/m^3 [1/m]. */
function rayleighCrossSection(frequencyGHz: number, reflectivityDbz: number): number {
  const reflectivity = 1e-18 * 10 ** (reflectivityDbz / 10);
  return (Math.PI ** 5 * WATER_FACTOR * reflectivity) / wavelengthM(frequencyGHz) ** 4;
}

/**
 * Volume of the product of two Gaussian beams and a Gaussian cell with one centre [km^3]:
 * pi^1.5 / sqrt(det(4 ln 2 M)), where M adds up what each confines across its axis.
 */
function commonVolume(input: RainScatterInput): number {
  const { scatterDeg, cellWidthKm, cellHeightKm } = input;
  const perWidth1 = (input.r1Km * input.beamwidth1Deg * RADIANS_PER_DEGREE) ** -2;
  const perWidth2 = (input.r2Km * input.beamwidth2Deg * RADIANS_PER_DEGREE) ** -2;
  const cosine = Math.cos(scatterDeg * RADIANS_PER_DEGREE);
  const sine = Math.sin(scatterDeg * RADIANS_PER_DEGREE);
  // Axes: x along the first beam, y across it on the ground, z up; the second beam is turned about z.
  const xx = perWidth2 * sine ** 2 + cellWidthKm ** -2;
  const yy = perWidth1 + perWidth2 * cosine ** 2 + cellWidthKm ** -2;
  const xy = -perWidth2 * sine * cosine;
  const zz = perWidth1 + perWidth2 + cellHeightKm ** -2;
  const determinant = (xx * yy - xy ** 2) * zz;
  return (Math.PI / SHARPNESS) ** 1.5 / Math.sqrt(determinant);
}
