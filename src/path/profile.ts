import { requireFinite } from "../numeric/check.ts";

/** Radio-climatic zone: `coastal` is low land near a large body of water, `inland` all other land. */
export type Zone = "inland" | "coastal" | "sea";

/** Terrain along a path: point 0 stands under the transmitter, the last one under the receiver. */
export interface Profile {
  /** Distance from the transmitter [km]: the first is 0, then rising strictly. */
  readonly distancesKm: ArrayLike<number>;
  /** Bare ground above mean sea level [m]. */
  readonly heightsM: ArrayLike<number>;
  /** Trees and buildings above ground [m]; absent: none. */
  readonly coverM?: ArrayLike<number> | undefined;
  /** Zone of each point; absent: all inland. */
  readonly zones?: readonly Zone[] | undefined;
}

/**
 * Refuses a profile that no path model can use.
 *
 * @throws RangeError on fewer than three points, lists of unequal length, distances that do not start at 0
 *   or do not rise, a non-finite number, a negative cover or an unknown zone
 */
export function requireProfile({ distancesKm, heightsM, coverM, zones }: Profile): void {
  const points = distancesKm.length;
  if (points < 3) throw new RangeError(`a profile needs at least 3 points, got ${points}`);
  for (const [name, list] of Object.entries({ heightsM, coverM, zones })) {
    if (list !== undefined && list.length !== points) {
      throw new RangeError(`${name} holds ${list.length} values for ${points} distances`);
    }
  }
  if (distancesKm[0] !== 0) throw new RangeError(`distancesKm must start at 0, got ${distancesKm[0]}`);
  const stuck = firstNotRising(distancesKm);
  if (stuck >= 0) throw new RangeError(`distancesKm must rise from point to point, point ${stuck} does not`);
  requireFinite("distancesKm", distancesKm[points - 1]!);
  const unknownHeight = firstBelow(heightsM, -Number.MAX_VALUE);
  if (unknownHeight >= 0) {
    throw new RangeError(`heightsM must hold finite numbers, point ${unknownHeight} does not`);
  }
  const negative = coverM === undefined ? -1 : firstBelow(coverM, 0);
  if (negative >= 0) {
    throw new RangeError(`coverM must hold finite numbers of at least 0, point ${negative} does not`);
  }
  const unknown = zones?.find((zone) => zone !== "inland" && zone !== "coastal" && zone !== "sea");
  if (unknown !== undefined) throw new RangeError(`unknown zone ${unknown}`);
}

/** Index of the first number that is not above the one before it, or -1. */
function firstNotRising(list: ArrayLike<number>): number {
  for (let i = 1; i < list.length; i++) {
    if (!(list[i]! > list[i - 1]!)) return i;
  }
  return -1;
}

/** Index of the first number that is below `low` or not finite, or -1. */
function firstBelow(list: ArrayLike<number>, low: number): number {
  for (let i = 0; i < list.length; i++) {
    if (!(list[i]! >= low && list[i]! < Infinity)) return i;
  }
  return -1;
}

/** Length of the path that a profile describes [km]. */
export function pathLengthKm({ distancesKm }: Profile): number {
  return distancesKm[distancesKm.length - 1]!;
}

/** The Earth bulges by 15 mm under a step of this length, which no model misses [km]. */
const WIDEST_STEP_KM = 1;

/**
 * The same ground with points put into its wide steps, straight between the known heights: the models look at points
 * alone, and would miss the bulge of the Earth between two that stand far apart. No trees are put in.
 *
 * Source: none needed; a^2 / (8 r) is the rise of an arc over its chord
 */
export function withoutWideSteps(profile: Profile): Profile {
  const { distancesKm, heightsM, coverM, zones } = profile;
  const last = distancesKm.length - 1;
  const places: { readonly from: number; readonly share: number }[] = [];
  for (let i = 0; i < last; i++) {
    const parts = Math.max(1, Math.ceil((distancesKm[i + 1]! - distancesKm[i]!) / WIDEST_STEP_KM));
    for (let part = 0; part < parts; part++) places.push({ from: i, share: part / parts });
  }
  if (places.length === last) return profile;
  places.push({ from: last, share: 0 });
  const between = (list: ArrayLike<number>) =>
    places.map(({ from, share }) =>
      share === 0 ? list[from]! : list[from]! + share * (list[from + 1]! - list[from]!),
    );
  return {
    distancesKm: between(distancesKm),
    heightsM: between(heightsM),
    coverM: coverM && places.map(({ from, share }) => (share === 0 ? coverM[from]! : 0)),
    zones: zones && places.map(({ from, share }) => zones[share < 0.5 ? from : from + 1]!),
  };
}

/** How the path divides between land and sea. */
export interface ZoneLengths {
  /** Longest unbroken run of coastal and inland points [km]. */
  readonly longestLandKm: number;
  /** Longest unbroken run of inland points [km]. */
  readonly longestInlandKm: number;
  /** Part of the path over sea, 0 to 1. */
  readonly seaFraction: number;
}

/**
 * Land and sea sections of a profile.
 *
 * A run of points of one kind reaches half a step towards its neighbours of another kind.
 *
 * Source: ITU-R P.452-18, section 3.2 and Table 3
 */
export function zoneLengths(profile: Profile): ZoneLengths {
  const { zones } = profile;
  const distanceKm = pathLengthKm(profile);
  if (zones === undefined) {
    return { longestLandKm: distanceKm, longestInlandKm: distanceKm, seaFraction: 0 };
  }
  const land = runsKm(profile.distancesKm, zones, (zone) => zone !== "sea");
  const inland = runsKm(profile.distancesKm, zones, (zone) => zone === "inland");
  const sea = runsKm(profile.distancesKm, zones, (zone) => zone === "sea");
  return {
    longestLandKm: land.longest,
    longestInlandKm: inland.longest,
    seaFraction: sea.total / distanceKm,
  };
}

function runsKm(
  distancesKm: ArrayLike<number>,
  zones: readonly Zone[],
  belongs: (zone: Zone) => boolean,
): { longest: number; total: number } {
  const last = zones.length - 1;
  let longest = 0;
  let total = 0;
  for (let i = 0; i <= last; i++) {
    if (!belongs(zones[i]!)) continue;
    const start = i;
    while (i < last && belongs(zones[i + 1]!)) i++;
    const from = start === 0 ? 0 : (distancesKm[start - 1]! + distancesKm[start]!) / 2;
    const to = i === last ? distancesKm[last]! : (distancesKm[i]! + distancesKm[i + 1]!) / 2;
    longest = Math.max(longest, to - from);
    total += to - from;
  }
  return { longest, total };
}

/** Heights above mean sea level [m] of a smooth surface under the two antennas. */
export interface SmoothSurface {
  /** Straight line of least squares through the ground. */
  readonly fitTxM: number;
  readonly fitRxM: number;
  /** The same lowered where terrain blocks the ray, and never above the ground: for diffraction. */
  readonly diffractionTxM: number;
  readonly diffractionRxM: number;
}

/**
 * Smooth surface that stands for the bare ground of a profile.
 *
 * Source: ITU-R P.452-18, Attachment 2, sections 5.1.6.2 and 5.1.6.3, equations 161 to 167
 *
 * @param profile         as accepted by `requireProfile`; its cover is not counted
 * @param txHeightAmslM   transmitting antenna above mean sea level [m]
 * @param rxHeightAmslM   receiving antenna above mean sea level [m]
 */
export function smoothSurface(profile: Profile, txHeightAmslM: number, rxHeightAmslM: number): SmoothSurface {
  const { distancesKm, heightsM } = profile;
  const last = distancesKm.length - 1;
  const distance = distancesKm[last]!;
  const { v1, v2 } = areaAndMoment(profile);
  const { obstruction, slopeTx, slopeRx } = highestOverRay(profile, txHeightAmslM, rxHeightAmslM);
  const fitTxM = (2 * v1 * distance - v2) / distance ** 2;
  const fitRxM = (v2 - v1 * distance) / distance ** 2;
  const lowering = obstruction > 0 ? obstruction / (slopeTx + slopeRx) : 0;
  return {
    fitTxM,
    fitRxM,
    diffractionTxM: Math.min(fitTxM - lowering * slopeTx, heightsM[0]!),
    diffractionRxM: Math.min(fitRxM - lowering * slopeRx, heightsM[last]!),
  };
}

/** Twice the area under the ground [km m] and six times its moment about the transmitter [km^2 m]. */
function areaAndMoment({ distancesKm, heightsM }: Profile): { v1: number; v2: number } {
  let v1 = 0;
  let v2 = 0;
  for (let i = 1; i < distancesKm.length; i++) {
    const d = distancesKm[i]!;
    const d0 = distancesKm[i - 1]!;
    const h = heightsM[i]!;
    const h0 = heightsM[i - 1]!;
    v1 += (d - d0) * (h + h0);
    v2 += (d - d0) * (h * (2 * d + d0) + h0 * (d + 2 * d0));
  }
  return { v1, v2 };
}

/** Highest ground over the straight ray [m], and the steepest rise over it as seen from each end [m/km]. */
function highestOverRay({ distancesKm, heightsM }: Profile, txHeightAmslM: number, rxHeightAmslM: number) {
  const last = distancesKm.length - 1;
  const distance = distancesKm[last]!;
  const raySlope = (rxHeightAmslM - txHeightAmslM) / distance;
  let obstruction = -Infinity;
  let slopeTx = -Infinity;
  let slopeRx = -Infinity;
  for (let i = 1; i < last; i++) {
    const d = distancesKm[i]!;
    const left = distance - d;
    const overRay = heightsM[i]! - txHeightAmslM - raySlope * d;
    const perProduct = overRay / (d * left);
    if (overRay > obstruction) obstruction = overRay;
    if (perProduct * left > slopeTx) slopeTx = perProduct * left;
    if (perProduct * d > slopeRx) slopeRx = perProduct * d;
  }
  return { obstruction, slopeTx, slopeRx };
}
