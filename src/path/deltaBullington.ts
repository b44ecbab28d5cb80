import { requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { bullingtonLoss } from "./bullington.ts";
import { type Profile, pathLengthKm, requireProfile, smoothSurface, zoneLengths } from "./profile.ts";
import { type LinearPolarization, requireLinearPolarization, smoothEarthLoss } from "./smoothEarth.ts";

export interface DeltaBullingtonInput {
  readonly profile: Profile;
  readonly frequencyGHz: number;
  readonly txHeightM: number;
  readonly rxHeightM: number;
  readonly effectiveRadiusKm: number;
  readonly polarization: LinearPolarization;
  readonly seaFraction?: number | undefined;
}

/** Diffraction loss [dB] against free space, with the three losses it is made of. */
export interface DeltaBullingtonLoss {
  readonly lossDb: number;
  /** Equivalent edge of the real profile. */
  readonly actualDb: number;
  /** Equivalent edge of the smooth surface. */
  readonly smoothDb: number;
  /** Spherical Earth over the smooth surface. */
  readonly sphericalDb: number;
}

/**
 * Diffraction loss over a general terrain profile.
 *
 * loss = actual + max(spherical - smooth, 0): the equivalent edge misses what a rounded Earth adds, and the
 * same method on a smooth path shows by how much.
 *
 * Source: ITU-R P.526-15, section 4.5.3; ITU-R P.452-18, section 4.2.3, equations 38 to 40
 * Valid:  as `smoothEarthValidity`
 *
 * @param profile            bare ground above mean sea level, with or without cover
 * @param frequencyGHz       [GHz], above 0
 * @param txHeightM          transmitting antenna above ground [m], at least 0
 * @param rxHeightM          receiving antenna above ground [m], at least 0
 * @param effectiveRadiusKm  radius of the Earth that makes rays straight [km], above 0
 * @param polarization       horizontal or vertical
 * @param seaFraction        part of the path over sea, 0 to 1; by default from the zones of the profile
 * @throws RangeError on a broken profile, a non-finite argument or one out of range
 */
export function deltaBullingtonLoss({
  profile,
  frequencyGHz,
  txHeightM,
  rxHeightM,
  effectiveRadiusKm,
  polarization,
  seaFraction,
}: DeltaBullingtonInput): DeltaBullingtonLoss {
  requireProfile(profile);
  requirePositive("frequencyGHz", frequencyGHz);
  requireNotNegative("txHeightM", txHeightM);
  requireNotNegative("rxHeightM", rxHeightM);
  requirePositive("effectiveRadiusKm", effectiveRadiusKm);
  requireLinearPolarization(polarization);
  const overSea = seaFraction ?? zoneLengths(profile).seaFraction;
  requireWithin("seaFraction", overSea, 0, 1);

  const { heightsM } = profile;
  const txAmslM = heightsM[0]! + txHeightM;
  const rxAmslM = heightsM[heightsM.length - 1]! + rxHeightM;
  const { diffractionTxM, diffractionRxM } = smoothSurface(profile, txAmslM, rxAmslM);
  const h1M = txAmslM - diffractionTxM;
  const h2M = rxAmslM - diffractionRxM;

  const actualDb = bullingtonLoss(profile, frequencyGHz, txAmslM, rxAmslM, effectiveRadiusKm);
  const smooth = { distancesKm: profile.distancesKm };
  const smoothDb = bullingtonLoss(smooth, frequencyGHz, h1M, h2M, effectiveRadiusKm);
  const sphericalDb = smoothEarthLoss({
    frequencyGHz,
    distanceKm: pathLengthKm(profile),
    h1M,
    h2M,
    effectiveRadiusKm,
    seaFraction: overSea,
    polarization,
  }).lossDb;
  return { lossDb: actualDb + Math.max(sphericalDb - smoothDb, 0), actualDb, smoothDb, sphericalDb };
}
