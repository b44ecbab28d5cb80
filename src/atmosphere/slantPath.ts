import { requirePositive, requireWithin } from "../numeric/check.ts";
import { EARTH_RADIUS_KM, RADIANS_PER_DEGREE } from "../numeric/constants.ts";
import { dbToPower } from "../numeric/decibels.ts";
import { specificGasAttenuation } from "./gasAttenuation.ts";
import { referenceAtmosphere } from "./referenceAtmosphere.ts";
import { refractivity } from "./refractivity.ts";

export interface StationInput {
  readonly frequencyGHz: number;
  readonly stationHeightKm?: number;
}

export interface SlantInput extends StationInput {
  readonly elevationDeg: number;
}

export interface ClearSky {
  readonly skyK: number;
  readonly attenuationDb: number;
}

/** A shell of air round the Earth, uniform within. */
interface Shell {
  readonly radiusKm: number;
  readonly thicknessKm: number;
  readonly refractiveIndex: number;
  readonly dbPerKm: number;
  /** Brightness of a black body as warm as the shell [K]. */
  readonly brightnessK: number;
}

const TOP_OF_ATMOSPHERE_KM = 100;
/** Cosmic background as P.676-13 Annex 1 section 4 takes it [K]. */
const COSMIC_K = 2.73;

/**
 * Attenuation by the gases from a station to space, through the mean annual reference atmosphere.
 *
 * The ray is followed through shells of air and refracted at their borders.
 *
 * Source: ITU-R P.676-13 (08/2022) Annex 1 section 2.2, equations (13) to (19), with P.835-6 and P.453-14
 * Valid:  1 to 1000 GHz
 *
 * @param frequencyGHz     [GHz], above 0
 * @param elevationDeg     elevation of the ray at the station [deg], 0 to 90
 * @param stationHeightKm  height of the station above sea level [km], -1 to 10, default 0
 * @returns attenuation [dB]
 * @throws RangeError on a non-finite or impossible argument
 */
export function slantGasAttenuation(input: SlantInput): { attenuationDb: number } {
  const losses = shellLosses(airShells(input), input.elevationDeg);
  return { attenuationDb: losses.reduce((sum, loss) => sum + loss, 0) };
}

/**
 * Brightness of the clear sky in one direction, with the attenuation that causes it.
 *
 * Source: ITU-R P.676-13 (08/2022) Annex 1 section 4.1, over the path of `slantGasAttenuation`
 * Valid:  1 to 1000 GHz
 *
 * @param frequencyGHz     [GHz], above 0
 * @param elevationDeg     elevation of the ray at the station [deg], 0 to 90
 * @param stationHeightKm  height of the station above sea level [km], -1 to 10, default 0
 * @returns brightness temperature [K] and attenuation to space [dB]
 * @throws RangeError on a non-finite or impossible argument
 */
export function clearSkyTemperature(input: SlantInput): ClearSky {
  return clearSkyAbove(input)(input.elevationDeg);
}

/**
 * As `clearSkyTemperature`, for many directions from one station: the air is prepared once.
 *
 * @returns function of the elevation [deg]
 */
export function clearSkyAbove(station: StationInput): (elevationDeg: number) => ClearSky {
  const shells = airShells(station);
  const cosmicK = blackBodyBrightness(station.frequencyGHz, COSMIC_K);
  return (elevationDeg) => {
    const losses = shellLosses(shells, elevationDeg);
    let skyK = cosmicK;
    let attenuationDb = 0;
    // From the top down: each shell dims what comes from above and adds its own glow.
    for (let i = shells.length - 1; i >= 0; i--) {
      const passed = dbToPower(-losses[i]!);
      skyK = skyK * passed + shells[i]!.brightnessK * (1 - passed);
      attenuationDb += losses[i]!;
    }
    return { skyK, attenuationDb };
  };
}

/**
 * The air above a station, cut into shells that begin 10 cm thick and grow upwards by 1 % each: 922 of them
 * from sea level, as P.676-13 equations (13) and (14) have it. A higher station stacks the same shells on its
 * own height.
 */
function airShells({ frequencyGHz, stationHeightKm = 0 }: StationInput): Shell[] {
  requirePositive("frequencyGHz", frequencyGHz);
  requireWithin("stationHeightKm", stationHeightKm, -1, 10);
  const shells: Shell[] = [];
  let bottomKm = stationHeightKm;
  for (;;) {
    const thicknessKm = 1e-4 * Math.exp(shells.length / 100);
    const heightKm = bottomKm + thicknessKm / 2;
    if (heightKm > TOP_OF_ATMOSPHERE_KM) return shells;
    const air = referenceAtmosphere({ heightKm });
    shells.push({
      radiusKm: EARTH_RADIUS_KM + bottomKm,
      thicknessKm,
      refractiveIndex: 1 + 1e-6 * refractivity(air).nUnits,
      dbPerKm: specificGasAttenuation({ frequencyGHz, ...air }).totalDbPerKm,
      brightnessK: blackBodyBrightness(frequencyGHz, air.temperatureK),
    });
    bottomKm += thicknessKm;
  }
}

/** Loss of a ray in each shell [dB]: its length there, equations (17) to (19), times the specific attenuation. */
function shellLosses(shells: readonly Shell[], elevationDeg: number): Float64Array {
  requireWithin("elevationDeg", elevationDeg, 0, 90);
  const first = shells[0]!;
  // n r sin(beta) stays the same along the ray, beta being its angle to the vertical (Snell in shells).
  const invariant = first.refractiveIndex * first.radiusKm * Math.cos(elevationDeg * RADIANS_PER_DEGREE);
  return Float64Array.from(shells, ({ radiusKm: r, thicknessKm, refractiveIndex, dbPerKm }) => {
    const sine = invariant / (refractiveIndex * r);
    const inward = r * Math.sqrt(1 - sine * sine);
    const squareGrowth = thicknessKm * (2 * r + thicknessKm);
    return (dbPerKm * squareGrowth) / (inward + Math.sqrt(inward * inward + squareGrowth));
  });
}

/** P.676-13 equation (26): Planck's law written as a temperature; 0.048 K/GHz is h/k. */
function blackBodyBrightness(frequencyGHz: number, temperatureK: number): number {
  const quantumK = 0.048 * frequencyGHz;
  return quantumK / Math.expm1(quantumK / temperatureK);
}
