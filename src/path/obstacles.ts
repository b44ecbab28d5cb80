import { wavelengthM } from "../numeric/constants.ts";
import { fresnelRadius } from "./fresnelRadius.ts";
import { rayClearance } from "./horizon.ts";
import { type Profile, pathLengthKm } from "./profile.ts";

/** Share of the first Fresnel zone that must be clear for free space: common practice, no source. */
export const CLEAR_ZONE_SHARE = 0.6;

/** A profile seen from the straight ray between two antennas, heights above mean sea level. */
export interface Sight {
  readonly profile: Profile;
  readonly frequencyGHz: number;
  readonly txHeightAmslM: number;
  readonly rxHeightAmslM: number;
  readonly effectiveRadiusKm: number;
}

/** How the ray passes one point of the profile. */
export interface Passing {
  readonly index: number;
  readonly distanceKm: number;
  /** Ground with what stands on it, above mean sea level [m]. */
  readonly topM: number;
  readonly coverM: number;
  /** Ray over the top [m]; negative where it is cut. */
  readonly clearanceM: number;
  /** Radius of the first Fresnel zone [m]. */
  readonly fresnelM: number;
  /** Clearance in radii of that zone. */
  readonly zones: number;
}

/** A stretch that reaches into the ray's zone, by its worst point. */
export interface Obstacle extends Passing {
  /** Length of the stretch where less than 0.6 of the zone is clear [km]; 0 where all is clear. */
  readonly widthKm: number;
}

/**
 * Clearance of the ray at one interior point.
 *
 * Source: `rayClearance`, `fresnelRadius`
 */
export function passing(sight: Sight, index: number): Passing {
  const { profile, frequencyGHz, txHeightAmslM, rxHeightAmslM, effectiveRadiusKm } = sight;
  const distanceKm = profile.distancesKm[index]!;
  const leg = { d1Km: distanceKm, d2Km: pathLengthKm(profile) - distanceKm };
  const coverM = profile.coverM?.[index] ?? 0;
  const topM = profile.heightsM[index]! + coverM;
  const { clearanceM } = rayClearance({
    ...leg,
    height1M: txHeightAmslM,
    height2M: rxHeightAmslM,
    obstacleM: topM,
    effectiveRadiusKm,
  });
  const fresnelM = fresnelRadius({ frequencyGHz, ...leg }).radiusM;
  return { index, distanceKm, topM, coverM, clearanceM, fresnelM, zones: clearanceM / fresnelM };
}

/**
 * Stretches of a profile that leave less than 0.6 of the first Fresnel zone clear, in order along the path;
 * the point of least clearance where there is none.
 *
 * @param sight  a profile of at least three points, as `requireProfile` accepts it
 */
export function obstacles(sight: Sight): Obstacle[] {
  const { distancesKm } = sight.profile;
  const last = distancesKm.length - 1;
  const zonesAt = zonesOver(sight);
  const found: Obstacle[] = [];
  let least = 1;
  let leastZones = Infinity;
  for (let i = 1; i < last; i++) {
    let worst = i;
    let worstZones = zonesAt(i);
    const start = i;
    if (worstZones < CLEAR_ZONE_SHARE) {
      for (; i + 1 < last; i++) {
        const zones = zonesAt(i + 1);
        if (zones >= CLEAR_ZONE_SHARE) break;
        if (zones < worstZones) [worst, worstZones] = [i + 1, zones];
      }
      // A stretch reaches half a step towards its neighbours.
      const widthKm =
        (distancesKm[i + 1]! + distancesKm[i]! - distancesKm[start]! - distancesKm[start - 1]!) / 2;
      found.push({ ...passing(sight, worst), widthKm });
    }
    if (worstZones < leastZones) [least, leastZones] = [worst, worstZones];
  }
  return found.length > 0 ? found : [{ ...passing(sight, least), widthKm: 0 }];
}

/** `zones` of `passing` at any interior point, without an object for each: a profile has thousands of points. */
function zonesOver(sight: Sight): (index: number) => number {
  const { profile, frequencyGHz, txHeightAmslM, rxHeightAmslM, effectiveRadiusKm } = sight;
  const { distancesKm, heightsM, coverM } = profile;
  const wholeKm = pathLengthKm(profile);
  const radius2PerProduct = (1000 * wavelengthM(frequencyGHz)) / wholeKm;
  return (index) => {
    const d1Km = distancesKm[index]!;
    const d2Km = wholeKm - d1Km;
    const rayM = (txHeightAmslM * d2Km + rxHeightAmslM * d1Km) / wholeKm;
    const topM = heightsM[index]! + (coverM?.[index] ?? 0);
    const clearanceM = rayM - topM - (500 * d1Km * d2Km) / effectiveRadiusKm;
    return clearanceM / Math.sqrt(radius2PerProduct * d1Km * d2Km);
  };
}

/** How far antennas must go up [m]: one of the two alone, or both by the same; 0 where nothing is missing. */
export interface Raise {
  readonly txM: number;
  readonly rxM: number;
  readonly bothM: number;
}

/**
 * Least raise of the antennas that clears 0.6 of the first Fresnel zone over all of the profile.
 *
 * Raising one end by x lifts the ray at a point by x times its share of the distance from the other end.
 */
export function raiseToClear(sight: Sight): Raise {
  const { distancesKm } = sight.profile;
  const distance = pathLengthKm(sight.profile);
  let [txM, rxM, bothM] = [0, 0, 0];
  for (let i = 1; i < distancesKm.length - 1; i++) {
    const { clearanceM, fresnelM, distanceKm } = passing(sight, i);
    const missingM = CLEAR_ZONE_SHARE * fresnelM - clearanceM;
    txM = Math.max(txM, (missingM * distance) / (distance - distanceKm));
    rxM = Math.max(rxM, (missingM * distance) / distanceKm);
    bothM = Math.max(bothM, missingM);
  }
  return { txM, rxM, bothM };
}
