import { requireNotNegative, requirePositive, requireWithin, type Validity } from "../numeric/check.ts";
import { dbToPower } from "../numeric/decibels.ts";
import { integrate } from "../numeric/quadrature.ts";
import { clearSkyAbove, type StationInput } from "./slantPath.ts";

/** Cosmic background as P.618-14 takes it [K]. */
const COSMIC_K = 2.7;

/** Above 2 GHz the galaxy may be left out (P.372, from memory). */
export const skyValidity = { frequencyGHz: [2, 1000] } as const satisfies Validity;

/** Emissivity of dry land in the example of P.676-13 Annex 1 section 4.2. */
export const LAND_EMISSIVITY = 0.95;

/** Physical temperature of the ground where none is given [K]: about that of the reference atmosphere. */
const GROUND_K = 288;

/**
 * Brightness of the sky from the attenuation along the line of sight.
 *
 *     T = Tm (1 - 10^(-A/10)) + 2.7 * 10^(-A/10)
 *
 * Source: ITU-R P.618-14 section 3
 * Valid:  above 2 GHz
 *
 * @param attenuationDb  everything that absorbs (gas, cloud, rain), not spreading or diffraction [dB], at least 0
 * @param mediumK        effective temperature of what absorbs [K], above 0: see `mediumTemperature`
 * @returns brightness temperature [K]
 * @throws RangeError on a non-finite or impossible argument
 */
export function skyTemperature({
  attenuationDb,
  mediumK,
}: {
  readonly attenuationDb: number;
  readonly mediumK: number;
}): { skyK: number } {
  requireNotNegative("attenuationDb", attenuationDb);
  requirePositive("mediumK", mediumK);
  const passed = dbToPower(-attenuationDb);
  return { skyK: mediumK * (1 - passed) + COSMIC_K * passed };
}

/**
 * Effective temperature of the absorbing air: 37.34 + 0.81 Ts, or 275 K where Ts is unknown.
 *
 * It holds for rays well above the horizon. The clear air near the ground is warmer: at 10 GHz a level ray
 * comes out 4 K too cold.
 *
 * Source: ITU-R P.618-14 section 3
 *
 * @param surfaceK  air temperature at the ground [K], above 0
 * @returns medium temperature [K]
 * @throws RangeError on a non-finite or impossible argument
 */
export function mediumTemperature({ surfaceK }: { readonly surfaceK?: number }): { mediumK: number } {
  if (surfaceK === undefined) return { mediumK: 275 };
  requirePositive("surfaceK", surfaceK);
  return { mediumK: 37.34 + 0.81 * surfaceK };
}

/**
 * Brightness of the ground: its own glow and the mirrored sky.
 *
 * Source: balance of emission and reflection, ITU-R P.676-13 Annex 1 section 4.2
 *
 * @param skyK        brightness of the sky in the mirror direction [K], at least 0
 * @param groundK     physical temperature of the ground [K], above 0, default 288
 * @param emissivity  0 to 1, default 0.95; far lower for calm water at grazing incidence (P.372, from memory)
 * @returns brightness temperature [K]
 * @throws RangeError on a non-finite or impossible argument
 */
export function groundTemperature({
  skyK,
  groundK = GROUND_K,
  emissivity = LAND_EMISSIVITY,
}: {
  readonly skyK: number;
  readonly groundK?: number;
  readonly emissivity?: number;
}): { brightnessK: number } {
  requireNotNegative("skyK", skyK);
  requirePositive("groundK", groundK);
  requireWithin("emissivity", emissivity, 0, 1);
  return { brightnessK: emissivity * groundK + (1 - emissivity) * skyK };
}

/**
 * Noise temperature of a level antenna over a flat, open horizon under a clear sky.
 *
 * Half of the beam sees the sky, half the ground with the sky mirrored in it. The beam is a round Gaussian one;
 * side lobes are left out.
 *
 * Source: `clearSkyTemperature` and `groundTemperature`, averaged over the beam (own derivation)
 * Valid:  above 2 GHz; beams that are narrow against the sky, up to some 20 deg
 *
 * @param frequencyGHz     [GHz], above 0
 * @param beamwidthDeg     full width of the beam at half power [deg], above 0, at most 60
 * @param stationHeightKm  height of the station above sea level [km], -1 to 10, default 0
 * @param groundK          physical temperature of the ground [K], above 0, default 288
 * @param emissivity       of the ground, 0 to 1, default 0.95
 * @returns means over the sky half, the ground half, and the entire beam [K]
 * @throws RangeError on a non-finite or impossible argument
 */
export function levelBeamTemperature({
  beamwidthDeg,
  groundK = GROUND_K,
  emissivity = LAND_EMISSIVITY,
  ...station
}: StationInput & {
  readonly beamwidthDeg: number;
  readonly groundK?: number;
  readonly emissivity?: number;
}): { skyHalfK: number; groundHalfK: number; antennaK: number } {
  requirePositive("beamwidthDeg", beamwidthDeg);
  requireWithin("beamwidthDeg", beamwidthDeg, 0, 60);
  const skyAt = clearSkyAbove(station);
  const weight = (elevationDeg: number) => dbToPower(-12 * (elevationDeg / beamwidthDeg) ** 2);
  const edgeDeg = 1.5 * beamwidthDeg; // 27 dB down: what lies beyond weighs less than 0.05 %
  const skyHalfK =
    integrate((angle) => weight(angle) * skyAt(angle).skyK, 0, edgeDeg, 24) /
    integrate(weight, 0, edgeDeg, 24);
  const { brightnessK: groundHalfK } = groundTemperature({ skyK: skyHalfK, groundK, emissivity });
  return { skyHalfK, groundHalfK, antennaK: (skyHalfK + groundHalfK) / 2 };
}
