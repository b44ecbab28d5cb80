import { requirePositive } from "../numeric/check.ts";
import { geodesicPath, type Point, pointsTowards } from "../path/geodesic.ts";
import { effectiveRadiusKm, takeOffAngle } from "../path/horizon.ts";
import type { ElevationSource, UnknownReason } from "../scenario/terrain/types.ts";

/** Where the sky begins in one direction. */
export interface HorizonRow {
  /** True azimuth [deg]. */
  readonly azimuthDeg: number;
  /** Angle of the horizon above the local horizontal [deg]; undefined where no height at all is known. */
  readonly elevationDeg: number | undefined;
  /** Distance and ground above sea level of what makes the horizon. */
  readonly distanceKm: number | undefined;
  readonly groundM: number | undefined;
  /** Whether the horizon is the last point looked at, so that higher ground may stand behind it. */
  readonly atReach: boolean;
  /** Length of the line on which no height is known [km]. */
  readonly unknownKm: number;
}

/** A tile or file that knew no height on some of the lines. */
export interface HorizonGap {
  readonly reason: UnknownReason;
  readonly source: string;
  /** Lines concerned, and the nearest unknown place. */
  readonly azimuths: number;
  readonly nearestKm: number;
  readonly nearestAzimuthDeg: number;
}

export interface HorizonRound {
  readonly name: string;
  readonly latitude: number;
  readonly longitude: number;
  /** Ground at the place by the terrain, or as stated where the terrain has none there [m]. */
  readonly groundM: number;
  /** The same as the scenario states it [m]. */
  readonly statedGroundM: number | undefined;
  /** Antenna above that ground, and above sea level [m]. */
  readonly heightM: number;
  readonly heightAmslM: number;
  readonly kFactor: number;
  readonly reachKm: number;
  readonly stepM: number;
  readonly terrain: string;
  readonly rows: readonly HorizonRow[];
  readonly highest: HorizonRow | undefined;
  readonly lowest: HorizonRow | undefined;
  /** Shares of the circle, 0 to 1, on which the horizon lies below an elevation. */
  readonly open: readonly { readonly belowDeg: number; readonly share: number }[];
  /** The line to a place of interest, where one was given. */
  readonly towards: (HorizonRow & { readonly name: string }) | undefined;
  readonly gaps: readonly HorizonGap[];
}

export interface HorizonPlace extends Point {
  readonly name: string;
  readonly groundM?: number | undefined;
  /** Antenna above ground [m]. */
  readonly heightM: number;
}

export interface HorizonInput {
  readonly source: ElevationSource;
  readonly at: HorizonPlace;
  readonly kFactor: number;
  readonly azimuths: number;
  readonly reachKm: number;
  readonly towards?: (Point & { readonly name: string }) | undefined;
  /** Told of the lines that are done. */
  readonly progress?: ((done: number, of: number) => void) | undefined;
}

/** Elevations by which hills are compared: own choice [deg]. */
const OPEN_BELOW_DEG = [0.5, 1, 2];

/** Between points of the geodesic this far apart latitude and longitude run straight, to some centimetres. */
const CHORD_KM = 1;

/**
 * Local horizon round a place: on each azimuth the steepest line of sight to bare ground within reach.
 *
 * Each line is looked along at the grid's own step, from one step off the antenna; the Earth is curved by its
 * effective radius. Unknown ground hides nothing, and is counted.
 *
 * @returns undefined where neither the terrain nor the place knows the ground there
 * @throws TerrainError where a tile that is needed turns out to be broken
 */
export async function horizonRound(input: HorizonInput): Promise<HorizonRound | undefined> {
  const { source, at, kFactor, azimuths, reachKm, towards, progress } = input;
  requirePositive("azimuths", azimuths);
  requirePositive("reachKm", reachKm);
  const { heightsM } = await source.heightsAt([at.latitude], [at.longitude]);
  const groundM = Number.isNaN(heightsM[0]!) ? at.groundM : heightsM[0]!;
  if (groundM === undefined) return undefined;

  const gaps = new Map<string, HorizonGap>();
  const line = lineOfSight({ source, at, reachKm, kFactor, heightAmslM: groundM + at.heightM, gaps });
  const rows: HorizonRow[] = [];
  for (let i = 0; i < azimuths; i++) {
    rows.push(await line((360 * i) / azimuths));
    progress?.(i + 1, azimuths);
  }
  const known = rows.filter(({ elevationDeg }) => elevationDeg !== undefined);
  const gapsRound = [...gaps.values()]; // before the line to another place adds to them
  const heading = towards && geodesicPath(at, towards).headingDeg;
  return {
    name: at.name,
    latitude: at.latitude,
    longitude: at.longitude,
    groundM,
    statedGroundM: at.groundM,
    heightM: at.heightM,
    heightAmslM: groundM + at.heightM,
    kFactor,
    reachKm,
    stepM: source.stepM,
    terrain: source.name,
    rows,
    ...extremes(rows),
    open: OPEN_BELOW_DEG.map((belowDeg) => ({
      belowDeg,
      share: known.filter(({ elevationDeg }) => elevationDeg! < belowDeg).length / rows.length,
    })),
    towards: towards && { name: towards.name, ...(await line(heading!)) },
    gaps: gapsRound,
  };
}

/** A part of the circle from one azimuth up to, not including, another. */
export interface HorizonSector {
  readonly fromDeg: number;
  readonly toDeg: number;
  /** Undefined where no line in it knows a height. */
  readonly highest: HorizonRow | undefined;
  readonly lowest: HorizonRow | undefined;
}

/** The circle in equal sectors; one that no azimuth falls into takes the last azimuth before it. */
export function horizonSectors({ rows }: HorizonRound, count: number): HorizonSector[] {
  return Array.from({ length: count }, (_, i) => {
    const [fromDeg, toDeg] = [(360 * i) / count, (360 * (i + 1)) / count];
    const inside = rows.filter(({ azimuthDeg }) => azimuthDeg >= fromDeg && azimuthDeg < toDeg);
    const before = rows.filter(({ azimuthDeg }) => azimuthDeg <= fromDeg).slice(-1);
    return { fromDeg, toDeg, ...extremes(inside.length > 0 ? inside : before) };
  });
}

function extremes(rows: readonly HorizonRow[]): Pick<HorizonSector, "highest" | "lowest"> {
  const known = rows
    .filter(({ elevationDeg }) => elevationDeg !== undefined)
    .toSorted((a, b) => a.elevationDeg! - b.elevationDeg!);
  return { highest: known.at(-1), lowest: known[0] };
}

/** Looks along one azimuth after another from the same place; unknown ground is noted in `gaps`. */
function lineOfSight({
  source,
  at,
  reachKm,
  kFactor,
  heightAmslM,
  gaps,
}: {
  source: ElevationSource;
  at: Point;
  reachKm: number;
  kFactor: number;
  heightAmslM: number;
  gaps: Map<string, HorizonGap>;
}): (azimuthDeg: number) => Promise<HorizonRow> {
  const radiusKm = effectiveRadiusKm(kFactor);
  const count = Math.max(1, Math.ceil((1000 * reachKm) / source.stepM));
  const stepKm = reachKm / count;
  const latitudes = new Float64Array(count);
  const longitudes = new Float64Array(count);
  return async (azimuthDeg) => {
    alongLine(at, azimuthDeg, stepKm, latitudes, longitudes);
    const { heightsM, unknown } = await source.heightsAt(latitudes, longitudes);
    let steepest = -1;
    let slope = -Infinity;
    for (let i = 0; i < count; i++) {
      const distanceKm = (i + 1) * stepKm;
      // The tangent of the take-off angle, which rises with it and costs less; NaN is never steeper.
      const here = (heightsM[i]! - heightAmslM) / (1000 * distanceKm) - distanceKm / (2 * radiusKm);
      if (here > slope) {
        slope = here;
        steepest = i;
      }
    }
    noteGaps(gaps, unknown, azimuthDeg, stepKm);
    const unknownKm = unknown.size * stepKm;
    if (steepest < 0) {
      const nothing = { elevationDeg: undefined, distanceKm: undefined, groundM: undefined };
      return { azimuthDeg, ...nothing, atReach: false, unknownKm };
    }
    const distanceKm = (steepest + 1) * stepKm;
    const groundM = heightsM[steepest]!;
    const { angleMrad } = takeOffAngle({
      fromHeightM: heightAmslM,
      toHeightM: groundM,
      distanceKm,
      effectiveRadiusKm: radiusKm,
    });
    const elevationDeg = (angleMrad / 1000) * (180 / Math.PI);
    return { azimuthDeg, elevationDeg, distanceKm, groundM, atReach: steepest === count - 1, unknownKm };
  };
}

/** Fills in the points at one step, two steps and so on from a place. */
function alongLine(
  at: Point,
  azimuthDeg: number,
  stepKm: number,
  latitudes: Float64Array,
  longitudes: Float64Array,
): void {
  const stride = Math.max(1, Math.floor(CHORD_KM / stepKm));
  const chords = Math.ceil(latitudes.length / stride);
  const distancesKm = Array.from({ length: chords + 1 }, (_, i) => i * stride * stepKm);
  const knots = pointsTowards({ from: at, headingDeg: azimuthDeg, distancesKm });
  for (let i = 0; i < latitudes.length; i++) {
    const chord = Math.floor((i + 1) / stride);
    const share = (i + 1) / stride - chord;
    const near = knots[chord]!;
    const far = knots[Math.min(chord + 1, chords)]!;
    // The date line lies between two longitudes that are a turn apart.
    const east = far.longitude - near.longitude;
    const turn = east > 180 ? -360 : east < -180 ? 360 : 0;
    latitudes[i] = near.latitude + share * (far.latitude - near.latitude);
    longitudes[i] = near.longitude + share * (east + turn);
  }
}

function noteGaps(
  gaps: Map<string, HorizonGap>,
  unknown: ReadonlyMap<number, { readonly reason: UnknownReason; readonly source: string }>,
  azimuthDeg: number,
  stepKm: number,
): void {
  const onThisLine = new Set<string>();
  for (const [i, { reason, source }] of unknown) {
    const name = `${reason} ${source}`;
    if (onThisLine.has(name)) continue; // the first one on a line is the nearest
    onThisLine.add(name);
    const nearestKm = (i + 1) * stepKm;
    const before = gaps.get(name);
    const nearest =
      before && before.nearestKm <= nearestKm
        ? { nearestKm: before.nearestKm, nearestAzimuthDeg: before.nearestAzimuthDeg }
        : { nearestKm, nearestAzimuthDeg: azimuthDeg };
    gaps.set(name, { reason, source, azimuths: (before?.azimuths ?? 0) + 1, ...nearest });
  }
}
