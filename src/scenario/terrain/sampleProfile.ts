import { geodesicPath, type Point, pointsAlong } from "../../path/geodesic.ts";
import { faultOf } from "./faults.ts";
import type {
  ElevationSource,
  Heights,
  SampledProfile,
  Sampling,
  TerrainEnd,
  TerrainFault,
  TerrainGap,
} from "./types.ts";

/** Longest path and most points that a profile is sampled for: beyond it something is mistyped. */
export const LONGEST_PATH_KM = 10_000;
const MOST_POINTS = 1_000_000;

/** The models of a path need a point between its ends. */
const FEWEST_POINTS = 3;

/**
 * Ground along the shortest line between two places, at equal distances with both ends.
 *
 * Points without a height are left out of the profile and listed as gaps, so that the ground runs straight over
 * them; at an end the `groundM` of that end is taken instead. Nothing unknown is ever taken for sea level.
 *
 * Source: geodesic on WGS84; step not above that of the grid by the sheet of terrain data, section 8.3
 *
 * @param spacingM  largest step, above 0; where neither it nor `points` is given the north-south step of the grid [m]
 * @param points    number of points instead, at least 3
 */
export async function sampleProfile({
  from,
  to,
  spacingM,
  points,
  source,
}: { from: TerrainEnd; to: TerrainEnd; source: ElevationSource } & Sampling): Promise<SampledProfile> {
  const refuse = (code: string, message: string): SampledProfile => {
    return { ok: false, faults: [{ code, message, file: source.name }] };
  };
  const { latitude, longitude } = from;
  if (latitude === to.latitude && longitude === to.longitude) {
    return refuse("same_place", "both ends are the same place, so there is no path");
  }
  const { distanceKm } = geodesicPath(from, to);
  if (distanceKm > LONGEST_PATH_KM) {
    return refuse("long_path", `path of ${distanceKm.toFixed(0)} km, expected at most ${LONGEST_PATH_KM} km`);
  }
  const count =
    points ?? Math.max(FEWEST_POINTS, Math.ceil((1000 * distanceKm) / (spacingM ?? source.stepM)) + 1);
  if (!(Number.isInteger(count) && count >= FEWEST_POINTS && count <= MOST_POINTS)) {
    return refuse("bad_sampling", `profile of ${count} points, expected ${FEWEST_POINTS} to ${MOST_POINTS}`);
  }

  const shares = Array.from({ length: count }, (_, i) => i / (count - 1));
  const places = pointsAlong({ from, to, shares });
  const distancesKm = places.map((_, i) => (distanceKm * i) / (count - 1));
  let heights: Heights;
  try {
    heights = await source.heightsAt(
      places.map((place) => place.latitude),
      places.map((place) => place.longitude),
    );
  } catch (error) {
    return { ok: false, faults: [faultOf(error)] };
  }
  const { heightsM } = heights;
  for (const [i, end] of [[0, from] as const, [count - 1, to] as const]) {
    if (Number.isNaN(heightsM[i]!) && end.groundM !== undefined) heightsM[i] = end.groundM;
  }
  const gaps = gapsOf(heights, places, distancesKm);
  const faults = [...unknownEnds(heights, source), ...tooFew(heights, source)];
  if (faults.length > 0) return { ok: false, faults };
  const known = (_: number, i: number) => !Number.isNaN(heightsM[i]!);
  const profile = { distancesKm: distancesKm.filter(known), heightsM: [...heightsM].filter(known) };
  return { ok: true, profile, gaps };
}

/** Runs of unknown points that share reason and tile. */
function gapsOf(
  { unknown }: Heights,
  places: readonly Point[],
  distancesKm: readonly number[],
): TerrainGap[] {
  const gaps: TerrainGap[] = [];
  let lastIndex = -2;
  for (const [i, { reason, source }] of unknown) {
    const before = gaps.at(-1);
    const toKm = distancesKm[i]!;
    if (before && lastIndex === i - 1 && before.reason === reason && before.source === source) {
      gaps[gaps.length - 1] = { ...before, toKm, points: before.points + 1 };
    } else gaps.push({ reason, source, fromKm: toKm, toKm, at: places[i]!, points: 1 });
    lastIndex = i;
  }
  return gaps;
}

function unknownEnds({ heightsM, unknown }: Heights, { name }: ElevationSource): TerrainFault[] {
  const last = heightsM.length - 1;
  return [0, last]
    .filter((i) => Number.isNaN(heightsM[i]!))
    .map((i) => {
      const { reason, source } = unknown.get(i)!;
      const message = `no height at the ${i === 0 ? "start" : "end"} of the path: ${reasonWords(reason, source)}`;
      return { code: "unknown_end", message, file: name };
    });
}

function tooFew({ heightsM }: Heights, { name }: ElevationSource): TerrainFault[] {
  const known = heightsM.filter((heightM) => !Number.isNaN(heightM)).length;
  if (known >= FEWEST_POINTS) return [];
  const message = `only ${known} of ${heightsM.length} points of the path have a height`;
  return [{ code: "no_heights", message, file: name }];
}

/** Why a height is unknown, as a message says it. */
export function reasonWords(reason: TerrainGap["reason"], source: string): string {
  if (reason === "outside") return `beyond the area of ${source}`;
  return reason === "void" ? `void in ${source}` : `no tile ${source}`;
}

/** A gap as a report tells it: what is missing, where along the path and where on the map. */
export function gapWords({ reason, source, fromKm, toKm, at, points }: TerrainGap): string {
  const [north, east] = [at.latitude, at.longitude];
  const place =
    `${Math.abs(north).toFixed(4)} ${north < 0 ? "S" : "N"}, ` +
    `${Math.abs(east).toFixed(4)} ${east < 0 ? "W" : "E"}`;
  const stretch =
    points === 1 ? `at ${fromKm.toFixed(2)} km` : `from ${fromKm.toFixed(2)} to ${toKm.toFixed(2)} km`;
  return `${reasonWords(reason, source)} ${stretch} (${place}), ${points === 1 ? "1 point" : `${points} points`}`;
}
