import { requireFinite, requireNotNegative, requirePositive, type Validity } from "../numeric/check.ts";

/** Paths that the forms of P.530-17 were fitted to; limits from memory. */
export const multipathValidity = {
  frequencyGHz: [0.45, 45],
  distanceKm: [7.5, 185],
  pathInclinationMrad: [0, 37],
  lowerAntennaM: [17, 2300],
  terrainRoughnessM: [6, 850],
  occurrencePercent: [0, 2000],
} as const satisfies Validity;

/** Paths shorter than this show no multipath fading worth counting [km]. */
const SHORTEST_FADING_PATH_KM = 5;

export interface MultipathPath {
  readonly dN1: number;
  readonly terrainRoughnessM?: number | undefined;
  readonly distanceKm: number;
  readonly lowerAntennaM: number;
  readonly pathInclinationMrad: number;
  readonly frequencyGHz: number;
}

/**
 * Multipath occurrence factor by the refractivity gradient: what the law of deep fades gives at a fade of 0 dB.
 *
 * It scales the law and is no share of time: it may exceed 100 %. Given the roughness of the terrain the
 * detailed form is taken, else the quick one for planning.
 *
 * Source: ITU-R P.530-17, section 2.3.1, equations 4 and 7; quick form also in P.2001-4, Attachment B.2
 * Valid:  `multipathValidity`; 0 for paths below 5 km
 *
 * @param dN1                   refractivity gradient of the lowest 65 m not exceeded for 1 % of an average year
 *   [N-units/km], mostly negative
 * @param terrainRoughnessM     standard deviation of terrain height over 110 km by 110 km [m], at least 0
 * @param distanceKm            [km], above 0
 * @param lowerAntennaM         lower antenna above mean sea level [m]
 * @param pathInclinationMrad   difference in height of the antennas over the distance [mrad], at least 0
 * @param frequencyGHz          [GHz], above 0
 * @returns factor [%] for the average worst month
 * @throws RangeError on a non-finite argument or one out of range
 */
export function multipathOccurrence(path: MultipathPath): number {
  const { dN1, terrainRoughnessM, distanceKm, lowerAntennaM, pathInclinationMrad, frequencyGHz } = path;
  requireFinite("dN1", dN1);
  requirePositive("distanceKm", distanceKm);
  requireFinite("lowerAntennaM", lowerAntennaM);
  requireNotNegative("pathInclinationMrad", pathInclinationMrad);
  requirePositive("frequencyGHz", frequencyGHz);
  if (terrainRoughnessM !== undefined) requireNotNegative("terrainRoughnessM", terrainRoughnessM);
  if (distanceKm < SHORTEST_FADING_PATH_KM) return 0;
  if (terrainRoughnessM === undefined) {
    return (
      10 ** (-4.6 - 0.0027 * dN1 - 0.00089 * lowerAntennaM) *
      distanceKm ** 3.1 *
      (1 + pathInclinationMrad) ** -1.29 *
      frequencyGHz ** 0.8
    );
  }
  return (
    10 ** (-4.4 - 0.0027 * dN1 - 0.00076 * lowerAntennaM) *
    (10 + terrainRoughnessM) ** -0.46 *
    distanceKm ** 3.4 *
    (1 + pathInclinationMrad) ** -1.03 *
    frequencyGHz ** 0.8
  );
}

export interface MappedMultipathPath {
  readonly logK: number;
  readonly dN75: number;
  readonly distanceKm: number;
  readonly txHeightAmslM: number;
  readonly rxHeightAmslM: number;
  readonly terrainHeightM: number;
  readonly frequencyGHz: number;
}

/**
 * Multipath occurrence factor by the maps of the later edition, whose values must be given.
 *
 * Source: ITU-R P.530-18, section 2.3.1
 * Valid:  as `multipathOccurrence`; 0 for paths below 5 km
 *
 * @param logK            decimal logarithm of the geoclimatic factor, from the map
 * @param dN75            refractivity statistic of the lowest 75 m, from the map [N-units], at least 0
 * @param distanceKm      [km], above 0
 * @param txHeightAmslM   one antenna above mean sea level [m]
 * @param rxHeightAmslM   the other antenna above mean sea level [m]
 * @param terrainHeightM  mean height of the ground along the path above mean sea level, without trees [m]
 * @param frequencyGHz    [GHz], above 0
 * @returns factor [%] for the average worst month
 * @throws RangeError on a non-finite argument or one out of range
 */
export function mappedMultipathOccurrence({
  logK,
  dN75,
  distanceKm,
  txHeightAmslM,
  rxHeightAmslM,
  terrainHeightM,
  frequencyGHz,
}: MappedMultipathPath): number {
  for (const [name, value] of Object.entries({ logK, txHeightAmslM, rxHeightAmslM, terrainHeightM })) {
    requireFinite(name, value);
  }
  requireNotNegative("dN75", dN75);
  requirePositive("distanceKm", distanceKm);
  requirePositive("frequencyGHz", frequencyGHz);
  if (distanceKm < SHORTEST_FADING_PATH_KM) return 0;
  const inclinationMrad = Math.abs(rxHeightAmslM - txHeightAmslM) / distanceKm;
  const lowerM = Math.min(txHeightAmslM, rxHeightAmslM);
  const clearanceM = (rxHeightAmslM + txHeightAmslM) / 2 - distanceKm ** 2 / 102 - terrainHeightM;
  const limit = (dN75 * distanceKm ** 1.5 * Math.sqrt(frequencyGHz)) / 24730;
  const reflection = Math.min(
    (dN75 / 50) ** 1.8 * Math.exp(-clearanceM / (2.5 * Math.sqrt(distanceKm))),
    limit,
  );
  const exponent =
    logK -
    0.376 * Math.tanh((clearanceM - 147) / 125) -
    0.334 * inclinationMrad ** 0.39 -
    0.00027 * lowerM +
    17.85 * reflection;
  return 10 ** exponent * distanceKm ** 3.51 * (frequencyGHz ** 2 + 13) ** 0.447;
}
