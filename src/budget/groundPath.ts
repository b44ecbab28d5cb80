import { type DeltaBullingtonLoss, deltaBullingtonLoss } from "../path/deltaBullington.ts";
import { effectiveRadiusKm } from "../path/horizon.ts";
import { type Obstacle, obstacles, type Sight } from "../path/obstacles.ts";
import { analysePath, type PathAnalysis } from "../path/pathAnalysis.ts";
import { type Profile, pathLengthKm, smoothSurface, withoutWideSteps } from "../path/profile.ts";
import type { LinearPolarization } from "../path/smoothEarth.ts";
import type { Polarization, Scenario, Site } from "../scenario/types.ts";
import { type PathSettings, pathSettings } from "./pathSettings.ts";
import type { PathGeometry } from "./types.ts";

/** Points of a smooth Earth that stands in for terrain: more change no loss by 0.01 dB. */
const SMOOTH_POINTS = 201;
/** P.452 knows no antenna on the bare ground [m]. */
const LOWEST_ANTENNA_M = 0.1;

/** The ground between two ends, and what it does to the ray on the usual day. */
export interface GroundPath {
  readonly settings: PathSettings;
  readonly profile: Profile;
  /** Whether the profile was read, or a smooth Earth at sea level stands in for it. */
  readonly fromTerrain: boolean;
  /** The ray over the profile, at the median k. */
  readonly sight: Sight;
  /** Antennas above the ground of the profile [m]. */
  readonly txHeightM: number;
  readonly rxHeightM: number;
  readonly polarization: LinearPolarization;
  readonly analysis: PathAnalysis;
  readonly obstacles: readonly Obstacle[];
  readonly diffraction: DeltaBullingtonLoss;
}

/** The ground that a budget counts: terrain, or a smooth Earth where the path reaches past its horizon. */
export function countedGround(scenario: Scenario, path: PathGeometry): GroundPath | undefined {
  const counted = scenario.path.profile !== undefined || path.distanceKm > path.radioHorizonKm;
  return counted ? groundPath(scenario, path) : undefined;
}

/** The ground of any path; without terrain a smooth Earth at sea level. */
export function groundPath(
  { path, frequencyGHz, polarization }: Scenario,
  geometry: PathGeometry,
): GroundPath {
  const settings = pathSettings(path);
  const profile = path.profile ? withoutWideSteps(path.profile) : smoothEarth(geometry);
  const groundM = [profile.heightsM[0]!, profile.heightsM[profile.heightsM.length - 1]!] as const;
  const over = ({ groundM: siteM, heightM }: Site, underM: number) =>
    Math.max(LOWEST_ANTENNA_M, siteM + heightM - underM);
  const txHeightM = over(path.from, groundM[0]);
  const rxHeightM = over(path.to, groundM[1]);
  const sight: Sight = {
    profile,
    frequencyGHz,
    txHeightAmslM: groundM[0] + txHeightM,
    rxHeightAmslM: groundM[1] + rxHeightM,
    effectiveRadiusKm: effectiveRadiusKm(settings.k),
  };
  const linear = linearOf(polarization);
  return {
    settings,
    profile,
    fromTerrain: path.profile !== undefined,
    sight,
    txHeightM,
    rxHeightM,
    polarization: linear,
    analysis: analysePath({
      ...sight,
      surface: smoothSurface(profile, sight.txHeightAmslM, sight.rxHeightAmslM),
    }),
    obstacles: obstacles(sight),
    diffraction: deltaBullingtonLoss({ ...sight, txHeightM, rxHeightM, polarization: linear }),
  };
}

/** The ray on a day when the air bends it as `k` says. */
export function sightAt({ sight }: GroundPath, k: number): Sight {
  return { ...sight, effectiveRadiusKm: effectiveRadiusKm(k) };
}

/** Half of a circular wave is of either kind, and at these frequencies both fare alike over ground. */
function linearOf(polarization: Polarization): LinearPolarization {
  return polarization === "circular" ? "vertical" : polarization;
}

/** Sea level all the way, or the lower end's ground where that lies deeper. */
function smoothEarth({ distanceKm, from, to }: PathGeometry): Profile {
  const levelM = Math.min(0, from.groundM, to.groundM);
  const distancesKm = new Array<number>(SMOOTH_POINTS);
  for (let i = 0; i < SMOOTH_POINTS; i++) distancesKm[i] = (distanceKm * i) / (SMOOTH_POINTS - 1);
  return { distancesKm, heightsM: new Array<number>(SMOOTH_POINTS).fill(levelM) };
}

/** Share of the path that a cut of a single clean ridge may span: common practice, no source. */
const RIDGE_SHARE = 0.1;

/**
 * 1-sigma of a diffraction loss [dB], never more than the loss: 3 behind a single bare ridge, 8 behind trees or
 * several obstacles, else 5 (common practice, no source); or as the scenario states it.
 */
export function diffractionSigma(
  { obstacles, profile, fromTerrain, diffraction }: GroundPath,
  statedDb: number | undefined,
): number {
  if (statedDb !== undefined) return Math.min(statedDb, diffraction.lossDb);
  const [first, ...more] = obstacles.filter(({ clearanceM }) => clearanceM < 0);
  const wooded = (first?.coverM ?? 0) > 0;
  const ridge = first !== undefined && first.widthKm <= RIDGE_SHARE * pathLengthKm(profile);
  const sigma = more.length > 0 || wooded ? 8 : fromTerrain && ridge ? 3 : 5;
  return Math.min(sigma, diffraction.lossDb);
}
