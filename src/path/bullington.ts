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
 * The profile is read twice at most and nothing is allocated.
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
  { distancesKm, heightsM, coverM }: Ground,
  frequencyGHz: number,
  txHeightM: number,
  rxHeightM: number,
  effectiveRadiusKm: number,
): number {
  const last = distancesKm.length - 1;
  const distance = distancesKm[last]!;
  const halfCurvature = 500 / effectiveRadiusKm;
  let firstCovered = last;
  let lastCovered = -1;
  if (coverM !== undefined) {
    firstCovered = 1;
    while (firstCovered < last && distancesKm[firstCovered]! < BARE_END_KM) firstCovered++;
    lastCovered = last - 1;
    while (lastCovered > 0 && distance - distancesKm[lastCovered]! < BARE_END_KM) lastCovered--;
  }

  let txSlope = -Infinity;
  let rxSlope = -Infinity;
  for (let i = 1; i < last; i++) {
    const d = distancesKm[i]!;
    const left = distance - d;
    let height = heightsM === undefined ? 0 : heightsM[i]!;
    if (i >= firstCovered && i <= lastCovered) height += coverM![i]!;
    // One division serves both slopes: 1/d = left/(d left) and 1/left = d/(d left).
    const perProduct = 1 / (d * left);
    const fromTx = (height - txHeightM) * left * perProduct + halfCurvature * left;
    const fromRx = (height - rxHeightM) * d * perProduct + halfCurvature * d;
    if (fromTx > txSlope) txSlope = fromTx;
    if (fromRx > rxSlope) rxSlope = fromRx;
  }

  const raySlope = (rxHeightM - txHeightM) / distance;
  const nuFactor = (0.002 * distance) / diffractionWavelengthM(frequencyGHz);
  let nu = -Infinity;
  if (txSlope < raySlope) {
    for (let i = 1; i < last; i++) {
      const d = distancesKm[i]!;
      const product = d * (distance - d);
      let height = heightsM === undefined ? 0 : heightsM[i]!;
      if (i >= firstCovered && i <= lastCovered) height += coverM![i]!;
      const above = height + halfCurvature * product - txHeightM - raySlope * d;
      const here = above * Math.sqrt(nuFactor / product);
      if (here > nu) nu = here;
    }
  } else {
    // Equations 18 and 19 with the crossing of the two rays inserted: no division by the sum of slopes,
    // which vanishes where the terrain just grazes.
    nu = Math.sqrt(nuFactor * (txSlope - raySlope) * Math.max(rxSlope + raySlope, 0));
  }
  const edgeDb = knifeEdgeLoss(nu);
  return edgeDb + (1 - Math.exp(-edgeDb / 6)) * (10 + 0.02 * distance);
}
