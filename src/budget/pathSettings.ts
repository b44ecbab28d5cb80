import type { ScenarioPath } from "../scenario/types.ts";

/** The usual bending of rays, and that of a day when they bend least: common practice, no source. */
const USUAL_K = 4 / 3;
const LOW_K = 2 / 3;
/** Median refractivity at sea level in temperate climates [N-units]: common practice, no source. */
const USUAL_N0 = 325;
/** Distance to a coast that there is not [km], ITU-R P.452-18. */
const NO_COAST_KM = 500;
/** Curvature of the Earth in N-units/km, as P.452 and P.530 round it. */
const EARTH_CURVATURE_N_PER_KM = 157;

/** The air and the coasts of a path, all of them known. */
export interface PathSettings {
  readonly k: number;
  readonly kLow: number;
  readonly N0: number;
  readonly dN: number;
  readonly txCoastKm: number;
  readonly rxCoastKm: number;
}

/** What the scenario says, and defaults for the rest; k and dN follow from each other where one is given. */
export function pathSettings({ k, kLow, N0 = USUAL_N0, dN, coastKm }: ScenarioPath): PathSettings {
  const fromGradient =
    dN === undefined ? USUAL_K : EARTH_CURVATURE_N_PER_KM / (EARTH_CURVATURE_N_PER_KM - dN);
  const usual = k ?? fromGradient;
  return {
    k: usual,
    kLow: Math.min(kLow ?? LOW_K, usual),
    N0,
    dN: dN ?? EARTH_CURVATURE_N_PER_KM * (1 - 1 / usual),
    txCoastKm: coastKm?.from ?? NO_COAST_KM,
    rxCoastKm: coastKm?.to ?? NO_COAST_KM,
  };
}
