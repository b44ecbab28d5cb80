import { diffractionWavelengthM } from "./knifeEdge.ts";
import { type Profile, pathLengthKm, type SmoothSurface } from "./profile.ts";

/** What the ground does to the rays of a path. */
export interface PathAnalysis {
  /** `los`: no terrain rises to the ray between the antennas; `trans-horizon`: some does. */
  readonly pathType: "los" | "trans-horizon";
  /** Elevation of the radio horizon; line of sight: of the other antenna [mrad]. */
  readonly txHorizonMrad: number;
  readonly rxHorizonMrad: number;
  /** Distance from each antenna to its horizon; line of sight: to the point of least clearance [km]. */
  readonly txHorizonKm: number;
  readonly rxHorizonKm: number;
  /** Angle between the two horizon rays [mrad]. */
  readonly angularDistanceMrad: number;
  /** Slope of the steepest ray from transmitter to terrain over that to the receiver [m/km]. */
  readonly terrainExcessMPerKm: number;
  /** Antennas over the smooth surface [m]. */
  readonly txEffectiveHeightM: number;
  readonly rxEffectiveHeightM: number;
  /** Highest terrain over the smooth surface between the two horizon points [m]. */
  readonly roughnessM: number;
}

/**
 * Horizons, effective heights and roughness of a path, on bare ground.
 *
 * Elevation of a point at distance d: atan((h - h_antenna) / 1000 d - d / 2 a), in km and m.
 *
 * Source: ITU-R P.452-18, Attachment 2, sections 4 to 5.1.6.4, equations 150 to 171
 *
 * @param profile             as accepted by `requireProfile`
 * @param surface             of the same profile and antennas, by `smoothSurface`
 * @param frequencyGHz        [GHz]; decides the point of least clearance only
 * @param txHeightAmslM       transmitting antenna above mean sea level [m]
 * @param rxHeightAmslM       receiving antenna above mean sea level [m]
 * @param effectiveRadiusKm   radius of the Earth that makes median rays straight [km]
 */
export function analysePath({
  profile,
  surface,
  frequencyGHz,
  txHeightAmslM,
  rxHeightAmslM,
  effectiveRadiusKm,
}: {
  readonly profile: Profile;
  readonly surface: SmoothSurface;
  readonly frequencyGHz: number;
  readonly txHeightAmslM: number;
  readonly rxHeightAmslM: number;
  readonly effectiveRadiusKm: number;
}): PathAnalysis {
  const { distancesKm, heightsM } = profile;
  const last = distancesKm.length - 1;
  const distance = pathLengthKm(profile);
  const slopeTo = (riseM: number, km: number) => riseM / (1000 * km) - km / (2 * effectiveRadiusKm);

  let txSlope = -Infinity;
  let rxSlope = -Infinity;
  let txPoint = 1;
  let rxPoint = 1;
  for (let i = 1; i < last; i++) {
    const fromTx = slopeTo(heightsM[i]! - txHeightAmslM, distancesKm[i]!);
    const fromRx = slopeTo(heightsM[i]! - rxHeightAmslM, distance - distancesKm[i]!);
    // Of equal horizons each antenna takes the one nearest to itself.
    if (fromTx > txSlope) {
      txSlope = fromTx;
      txPoint = i;
    }
    if (fromRx >= rxSlope) {
      rxSlope = fromRx;
      rxPoint = i;
    }
  }
  const raySlope = slopeTo(rxHeightAmslM - txHeightAmslM, distance);
  const terrainExcessMPerKm = 1000 * (txSlope - raySlope);
  const lineOfSight = txSlope <= raySlope;
  if (lineOfSight) {
    txSlope = raySlope;
    rxSlope = slopeTo(txHeightAmslM - rxHeightAmslM, distance);
    txPoint = leastClearPoint(profile, frequencyGHz, txHeightAmslM, rxHeightAmslM, effectiveRadiusKm);
    rxPoint = txPoint;
  }
  const txHorizonMrad = 1000 * Math.atan(txSlope);
  const rxHorizonMrad = 1000 * Math.atan(rxSlope);

  const smoothTx = Math.min(surface.fitTxM, heightsM[0]!);
  const smoothRx = Math.min(surface.fitRxM, heightsM[last]!);
  let roughnessM = -Infinity;
  for (let i = txPoint; i <= rxPoint; i++) {
    const smooth = smoothTx + ((smoothRx - smoothTx) * distancesKm[i]!) / distance;
    roughnessM = Math.max(roughnessM, heightsM[i]! - smooth);
  }
  return {
    pathType: lineOfSight ? "los" : "trans-horizon",
    txHorizonMrad,
    rxHorizonMrad,
    txHorizonKm: distancesKm[txPoint]!,
    rxHorizonKm: distance - distancesKm[rxPoint]!,
    angularDistanceMrad: (1000 * distance) / effectiveRadiusKm + txHorizonMrad + rxHorizonMrad,
    terrainExcessMPerKm,
    txEffectiveHeightM: txHeightAmslM - smoothTx,
    rxEffectiveHeightM: rxHeightAmslM - smoothRx,
    roughnessM,
  };
}

/** Index of the interior point with the largest diffraction parameter, the last one of equals. */
function leastClearPoint(
  { distancesKm, heightsM }: Profile,
  frequencyGHz: number,
  txHeightAmslM: number,
  rxHeightAmslM: number,
  effectiveRadiusKm: number,
): number {
  const last = distancesKm.length - 1;
  const distance = distancesKm[last]!;
  const perProduct = (0.002 * distance) / diffractionWavelengthM(frequencyGHz);
  let largest = -Infinity;
  let point = 1;
  for (let i = 1; i < last; i++) {
    const d = distancesKm[i]!;
    const left = distance - d;
    const ray = (txHeightAmslM * left + rxHeightAmslM * d) / distance;
    const above = heightsM[i]! + (500 * d * left) / effectiveRadiusKm - ray;
    const nu = above * Math.sqrt(perProduct / (d * left));
    if (nu >= largest) {
      largest = nu;
      point = i;
    }
  }
  return point;
}
