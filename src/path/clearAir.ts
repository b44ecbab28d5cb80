import { specificGasAttenuation } from "../atmosphere/gasAttenuation.ts";
import { vapourPressureFromDensity } from "../atmosphere/humidity.ts";
import {
  requireFinite,
  requireNotNegative,
  requirePositive,
  requireWithin,
  type Validity,
} from "../numeric/check.ts";
import { EARTH_RADIUS_KM, RADIANS_PER_DEGREE, ZERO_CELSIUS_K } from "../numeric/constants.ts";
import { combineMechanisms } from "./clearAirCombination.ts";
import { deltaBullingtonLoss } from "./deltaBullington.ts";
import { ductClimate, ductingLoss } from "./ducting.ts";
import { analysePath, type PathAnalysis } from "./pathAnalysis.ts";
import {
  type Profile,
  pathLengthKm,
  requireProfile,
  smoothSurface,
  type ZoneLengths,
  zoneLengths,
} from "./profile.ts";
import type { LinearPolarization } from "./smoothEarth.ts";
import { interferenceTroposcatterLoss } from "./troposcatter.ts";

export const clearAirValidity = {
  frequencyGHz: [0.1, 50],
  percent: [0.001, 50],
} as const satisfies Validity;

interface Position {
  readonly latitude: number;
  readonly longitude: number;
}

export interface ClearAirInput {
  readonly profile: Profile;
  readonly frequencyGHz: number;
  readonly percent: number;
  readonly polarization: LinearPolarization;
  readonly txHeightM: number;
  readonly rxHeightM: number;
  readonly txGainDbi: number;
  readonly rxGainDbi: number;
  readonly txCoastKm: number;
  readonly rxCoastKm: number;
  readonly pressureHPa: number;
  readonly temperatureC: number;
  readonly from: Position;
  readonly to: Position;
  readonly dN: number;
  readonly N0: number;
}

/** Loss of each mechanism [dB] and what led to it. */
export interface ClearAirLoss extends PathAnalysis, ZoneLengths {
  /** Basic transmission loss not exceeded for the percentage of time, all mechanisms together. */
  readonly lossDb: number;
  /** Free space and gas. */
  readonly freeSpaceDb: number;
  /** Free space, gas and the focusing of the percentage of time. */
  readonly lineOfSightDb: number;
  /** The same at beta0. */
  readonly lineOfSightBeta0Db: number;
  /** Diffraction not exceeded for the percentage of time, against free space. */
  readonly diffractionDb: number;
  readonly diffractionMedianDb: number;
  readonly diffractionBeta0Db: number;
  /** The parts of the median diffraction. */
  readonly bullingtonActualMedianDb: number;
  readonly bullingtonSmoothMedianDb: number;
  readonly sphericalMedianDb: number;
  readonly troposcatterDb: number;
  readonly ductingDb: number;
  readonly distanceKm: number;
  readonly effectiveRadiusKm: number;
  readonly beta0Percent: number;
  readonly gasDbPerKm: number;
  readonly troposcatterGasDbPerKm: number;
  readonly txHeightAmslM: number;
  readonly rxHeightAmslM: number;
  /** Smooth surface under each end for diffraction, above mean sea level [m]. */
  readonly txSmoothSurfaceM: number;
  readonly rxSmoothSurfaceM: number;
}

/** Effective radius where the refractivity gradient is one exceeded for beta0 of time only: k = 3. */
const BETA0_RADIUS_KM = 3 * EARTH_RADIUS_KM;

/**
 * Basic transmission loss of a path in clear air, not exceeded for a percentage of time: line of sight,
 * diffraction, troposcatter, ducting and their combination.
 *
 * Rain and the screening by clutter around the antennas are not counted.
 *
 * Source: ITU-R P.452-18, sections 4.2 to 4.6, equations 2 to 64; gas by P.676-13 instead of the
 *   approximation, with `pressureHPa` as that of the dry air
 * Valid:  0.1 to 50 GHz, 0.001 to 50 % of time
 *
 * @param profile        with zones where the path meets the sea
 * @param frequencyGHz   [GHz], above 0
 * @param percent        time for which the loss is not exceeded [%], above 0, at most 50: 50 is the normal day
 * @param polarization   horizontal or vertical
 * @param txHeightM      transmitting antenna above ground [m], above 0
 * @param rxHeightM      receiving antenna above ground [m], above 0
 * @param txGainDbi      gain towards the horizon of the path [dBi]; it costs coupling to troposcatter
 * @param rxGainDbi      gain towards the horizon of the path [dBi]
 * @param txCoastKm      distance over land to the coast along the path [km], 500 where there is none
 * @param rxCoastKm      distance over land to the coast along the path [km], 500 where there is none
 * @param pressureHPa    pressure of the dry air [hPa], above 0
 * @param temperatureC   [degC]
 * @param from           position of the transmitter [deg], north and east positive
 * @param to             position of the receiver [deg]
 * @param dN             median fall of refractivity over the lowest kilometre [N-units/km], below 157
 * @param N0             median sea-level refractivity at mid-path [N-units]
 * @throws RangeError on a broken profile, a non-finite argument or one out of range
 */
export function clearAirLoss(input: ClearAirInput): ClearAirLoss {
  requireInput(input);
  const { profile, frequencyGHz, percent, polarization, dN, N0, txGainDbi, rxGainDbi } = input;
  const distanceKm = pathLengthKm(profile);
  const zones = zoneLengths(profile);
  const { seaFraction } = zones;
  const climate = ductClimate({
    latitudeDeg: midLatitudeDeg(input.from, input.to, distanceKm),
    longestLandKm: zones.longestLandKm,
    longestInlandKm: zones.longestInlandKm,
  });
  const { beta0Percent } = climate;
  const effectiveRadiusKm = (EARTH_RADIUS_KM * 157) / (157 - dN);
  const txHeightAmslM = profile.heightsM[0]! + input.txHeightM;
  const rxHeightAmslM = profile.heightsM[profile.heightsM.length - 1]! + input.rxHeightM;
  const surface = smoothSurface(profile, txHeightAmslM, rxHeightAmslM);
  const ends = { frequencyGHz, txHeightAmslM, rxHeightAmslM, effectiveRadiusKm };
  const analysis = analysePath({ profile, surface, ...ends });

  const gasDbPerKm = gasAttenuation(input, 7.5 + 2.5 * seaFraction);
  const troposcatterGasDbPerKm = gasAttenuation(input, 3);
  const rayKm = Math.hypot(distanceKm, (txHeightAmslM - rxHeightAmslM) / 1000);
  const freeSpaceDb = 92.4 + 20 * Math.log10(frequencyGHz * rayKm) + gasDbPerKm * rayKm;
  const horizonsKm = analysis.txHorizonKm + analysis.rxHorizonKm;
  const focusing = (percentage: number) =>
    2.6 * (1 - Math.exp(-0.1 * horizonsKm)) * Math.log10(percentage / 50);
  const lineOfSightDb = freeSpaceDb + focusing(percent);
  const lineOfSightBeta0Db = freeSpaceDb + focusing(beta0Percent);

  const diffractionAt = (radiusKm: number) =>
    deltaBullingtonLoss({
      profile,
      frequencyGHz,
      txHeightM: input.txHeightM,
      rxHeightM: input.rxHeightM,
      effectiveRadiusKm: radiusKm,
      polarization,
      seaFraction,
    });
  const median = diffractionAt(effectiveRadiusKm);
  const diffractionBeta0Db = diffractionAt(BETA0_RADIUS_KM).lossDb;
  const timeWeight = percent <= beta0Percent ? 1 : upperTail(percent) / upperTail(beta0Percent);
  const diffractionDb = median.lossDb + timeWeight * (diffractionBeta0Db - median.lossDb);

  const troposcatterDb = interferenceTroposcatterLoss({
    frequencyGHz,
    distanceKm,
    angularDistanceMrad: analysis.angularDistanceMrad,
    N0,
    txGainDbi,
    rxGainDbi,
    gasDb: troposcatterGasDbPerKm * distanceKm,
    percent,
  });
  const ductingDb = ductingLoss({
    ...ends,
    ...analysis,
    distanceKm,
    percent,
    txCoastKm: input.txCoastKm,
    rxCoastKm: input.rxCoastKm,
    seaFraction,
    climate,
    gasDb: gasDbPerKm * distanceKm,
  });

  const mechanisms = {
    freeSpaceDb,
    lineOfSightDb,
    lineOfSightBeta0Db,
    diffractionDb,
    diffractionMedianDb: median.lossDb,
    troposcatterDb,
    ductingDb,
    beta0Percent,
    distanceKm,
  };
  return {
    ...zones,
    ...analysis,
    ...mechanisms,
    lossDb: combineMechanisms({ ...zones, ...analysis, ...mechanisms, percent, timeWeight }),
    diffractionBeta0Db,
    bullingtonActualMedianDb: median.actualDb,
    bullingtonSmoothMedianDb: median.smoothDb,
    sphericalMedianDb: median.sphericalDb,
    effectiveRadiusKm,
    gasDbPerKm,
    troposcatterGasDbPerKm,
    txHeightAmslM,
    rxHeightAmslM,
    txSmoothSurfaceM: surface.diffractionTxM,
    rxSmoothSurfaceM: surface.diffractionRxM,
  };
}

function requireInput(input: ClearAirInput): void {
  requireProfile(input.profile);
  requirePositive("frequencyGHz", input.frequencyGHz);
  requirePositive("txHeightM", input.txHeightM);
  requirePositive("rxHeightM", input.rxHeightM);
  requireNotNegative("txCoastKm", input.txCoastKm);
  requireNotNegative("rxCoastKm", input.rxCoastKm);
  for (const name of ["txGainDbi", "rxGainDbi", "dN", "N0"] as const) requireFinite(name, input[name]);
  if (!(input.dN < 157)) throw new RangeError(`dN must be below 157, got ${input.dN}: rays are trapped`);
  if (!(input.percent > 0 && input.percent <= 50)) {
    throw new RangeError(`percent must lie above 0 and at most at 50, got ${input.percent}`);
  }
  for (const [end, position] of Object.entries({ from: input.from, to: input.to })) {
    requireWithin(`${end}.latitude`, position.latitude, -90, 90);
    requireWithin(`${end}.longitude`, position.longitude, -360, 360);
  }
}

/** Specific attenuation by gas at a density of water vapour [g/m3]. */
function gasAttenuation(input: ClearAirInput, vapourDensityGm3: number): number {
  const temperatureK = input.temperatureC + ZERO_CELSIUS_K;
  return specificGasAttenuation({
    frequencyGHz: input.frequencyGHz,
    dryPressureHPa: input.pressureHPa,
    vapourPressureHPa: vapourPressureFromDensity({ vapourDensityGm3, temperatureK }).vapourPressureHPa,
    temperatureK,
  }).totalDbPerKm;
}

/** Latitude half the profile length along the great circle from one end, on a sphere of 6371 km. */
function midLatitudeDeg(from: Position, to: Position, distanceKm: number): number {
  const start = from.latitude * RADIANS_PER_DEGREE;
  const end = to.latitude * RADIANS_PER_DEGREE;
  const turn = (to.longitude - from.longitude) * RADIANS_PER_DEGREE;
  const heading = Math.atan2(
    Math.cos(end) * Math.sin(turn),
    Math.cos(start) * Math.sin(end) - Math.sin(start) * Math.cos(end) * Math.cos(turn),
  );
  const half = distanceKm / (2 * EARTH_RADIUS_KM);
  const sine = Math.sin(start) * Math.cos(half) + Math.cos(start) * Math.sin(half) * Math.cos(heading);
  return Math.asin(Math.min(1, sine)) / RADIANS_PER_DEGREE;
}

/**
 * Normal deviate that is exceeded for a percentage of time, at most 50 %, with the sign turned; the rational
 * fit of ITU-R P.452-18, equation 172, which the published losses contain, errors up to 5e-4 included.
 */
function upperTail(percent: number): number {
  const T = Math.sqrt(-2 * Math.log(Math.max(percent / 100, 1e-6)));
  const ratio =
    ((0.010328 * T + 0.802853) * T + 2.515516698) / (((0.001308 * T + 0.189269) * T + 1.432788) * T + 1);
  return ratio - T;
}
