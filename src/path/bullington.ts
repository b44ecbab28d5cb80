import { diffractionWavelengthM, knifeEdgeLoss } from "./knifeEdge.ts";

/** Ground along a path; without heights a smooth surface at height 0. */
export interface Ground {
  readonly distancesKm: ArrayLike<number>;
  readonly heightsM?: ArrayLike<number> | undefined;
  readonly coverM?: ArrayLike<number> | undefined;
}

/** Ground cover is left out nearer than this to either end, where an antenna stands among it [km]. */
const BARE_END_KM = 0.05;

/**
 * Diffraction loss of a whole profile replaced by one equivalent edge.
 *
 * The edge stands where the steepest rays from both ends meet; on a clear path it is the point of least
 * clearance. A correction that grows with distance makes up for the edges that one edge cannot stand for.
 * The profile is read once and no list is allocated.
 *
 * Source: ITU-R P.526-15, section 4.5.1; ITU-R P.452-18, section 4.2.1, equations 13 to 22
 *
 * @param ground             distances from 0, rising strictly, at least three
 * @param frequencyGHz       [GHz], above 0
 * @param txHeightM          transmitting antenna over the level of the heights [m]
 * @param rxHeightM          receiving antenna over the level of the heights [m]
 * @param effectiveRadiusKm  radius of the Earth that makes rays straight [km], above 0
 * @returns loss [dB] against free space
 */
export function bullingtonLoss(
  ground: Ground,
  frequencyGHz: number,
  txHeightM: number,
  rxHeightM: number,
  effectiveRadiusKm: number,
): number {
  const distance = ground.distancesKm[ground.distancesKm.length - 1]!;
  const rays = steepestRays(ground, txHeightM, rxHeightM, 500 / effectiveRadiusKm);
  const clear = rays.steepestTx < 0;
  const product = clear ? rays.leastProduct : rays.steepestTx * rays.steepestRx;
  const size = Math.sqrt(((0.002 * distance) / diffractionWavelengthM(frequencyGHz)) * product);
  const edgeDb = knifeEdgeLoss(clear ? -size : size);
  return edgeDb + (1 - Math.exp(-edgeDb / 6)) * (10 + 0.02 * distance);
}

/**
 * Slopes of the steepest rays from each end to the ground, over the ray between the antennas [m/km].
 *
 * With the height x of a point over that ray the slopes are x/d and x/left, so that their product is nu^2
 * but for a factor: at a point of the ground (the least one counts where all is clear) as well as at the
 * edge where the two steepest rays meet.
 */
function steepestRays(
  { distancesKm, heightsM, coverM }: Ground,
  txHeightM: number,
  rxHeightM: number,
  halfCurvature: number,
) {
  const last = distancesKm.length - 1;
  const distance = distancesKm[last]!;
  const raySlope = (rxHeightM - txHeightM) / distance;
  let steepestTx = -Infinity;
  let steepestRx = -Infinity;
  let leastProduct = Infinity;
  for (let i = 1; i < last; i++) {
    const d = distancesKm[i]!;
    const left = distance - d;
    let height = heightsM === undefined ? 0 : heightsM[i]!;
    if (coverM !== undefined && d >= BARE_END_KM && left >= BARE_END_KM) height += coverM[i]!;
    const overRay = (height - txHeightM - raySlope * d) / (d * left) + halfCurvature;
    const fromTx = overRay * left;
    const fromRx = overRay * d;
    if (fromTx > steepestTx) steepestTx = fromTx;
    if (fromRx > steepestRx) steepestRx = fromRx;
    if (fromTx * fromRx < leastProduct) leastProduct = fromTx * fromRx;
  }
  return { steepestTx, steepestRx, leastProduct };
}
