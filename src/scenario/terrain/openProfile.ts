import { geodesicPath } from "../../path/geodesic.ts";
import { pathLengthKm } from "../../path/profile.ts";
import { readProfile } from "./profileCsv.ts";
import type { OpenedTerrain, TerrainEnd } from "./types.ts";

/** How far the length of a profile may be from that of the path, beside what the positions leave open: own choice. */
const LENGTH_TOLERANCE = 0.01;
const LEAST_TOLERANCE_KM = 0.1;

/**
 * A profile from CSV as terrain: it knows one path, and gives the profile as it stands for any path of its length.
 *
 * The length has to agree within 1 % or 100 m, whichever is more, and the position errors of both ends.
 */
export function openProfile(path: string, name: string): OpenedTerrain {
  const { profile, faults } = readProfile(path, name);
  if (profile === undefined) return { ok: false, faults };
  return {
    ok: true,
    kind: "profile",
    name,
    profileBetween: async (from, to) => {
      const pathKm = geodesicPath(from, to).distanceKm;
      const profileKm = pathLengthKm(profile);
      const toleranceKm = toleranceFor(pathKm, from, to);
      if (Math.abs(profileKm - pathKm) <= toleranceKm) return { ok: true, profile, gaps: [] };
      const message =
        `profile ends at ${profileKm.toFixed(2)} km, expected ${pathKm.toFixed(2)} km, the length of the path, ` +
        `within ${toleranceKm.toFixed(2)} km`;
      return { ok: false, faults: [{ code: "wrong_length", message, file: name }] };
    },
  };
}

function toleranceFor(pathKm: number, from: TerrainEnd, to: TerrainEnd): number {
  const byPositions = (from.positionErrorKm ?? 0) + (to.positionErrorKm ?? 0);
  return Math.max(LEAST_TOLERANCE_KM, LENGTH_TOLERANCE * pathKm) + byPositions;
}
