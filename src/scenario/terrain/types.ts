import type { Point } from "../../path/geodesic.ts";
import type { Profile } from "../../path/profile.ts";

/** What is wrong with terrain, and in which file; lines count from 1 and are absent where a file has none. */
export interface TerrainFault {
  readonly code: string;
  readonly message: string;
  readonly file: string;
  readonly line?: number | undefined;
}

/** Why no height is known: the tile holds a void there, there is no such tile, or it lies beyond the file. */
export type UnknownReason = "void" | "no tile" | "outside";

/** A stretch of a path where no height is known. */
export interface TerrainGap {
  readonly reason: UnknownReason;
  /** Tile or file concerned, such as N46E007. */
  readonly source: string;
  /** Distance from the start of the first and the last unknown point [km]. */
  readonly fromKm: number;
  readonly toKm: number;
  /** The first unknown point. */
  readonly at: Point;
  /** Unknown points in a row. */
  readonly points: number;
}

/** One end of a path; a `Site` of a scenario is one. */
export interface TerrainEnd extends Point {
  /** Ground above mean sea level, taken where the terrain has a gap at this end [m]. */
  readonly groundM?: number | undefined;
  /** How far off the position may be; it widens the tolerance of a profile's length [km]. */
  readonly positionErrorKm?: number | undefined;
}

/** How densely to sample: a largest step or a count with both ends; the grid's own step where neither is given. */
export interface Sampling {
  readonly spacingM?: number | undefined;
  readonly points?: number | undefined;
}

export type SampledProfile =
  | {
      readonly ok: true;
      /** Bare ground; points of unknown height are left out of it, so that the ground runs straight over a gap. */
      readonly profile: Profile;
      /** In order along the path; empty where all is known. */
      readonly gaps: readonly TerrainGap[];
    }
  | { readonly ok: false; readonly faults: readonly TerrainFault[] };

/** Heights of many places, NaN where unknown; `unknown` says why, by index. */
export interface Heights {
  readonly heightsM: Float64Array;
  readonly unknown: ReadonlyMap<number, { readonly reason: UnknownReason; readonly source: string }>;
}

/** A model of elevation that knows heights anywhere it reaches. */
export interface ElevationSource {
  /** As the user named it. */
  readonly name: string;
  /** North-south step of its grid [m]. */
  readonly stepM: number;
  /**
   * Ground above mean sea level, bilinear between the corners of the grid.
   *
   * @throws TerrainError where a tile that is needed turns out to be broken
   */
  readonly heightsAt: (latitudes: ArrayLike<number>, longitudes: ArrayLike<number>) => Promise<Heights>;
}

export interface Terrain {
  readonly ok: true;
  readonly kind: "profile" | "tiles" | "geotiff";
  /** As the user named it. */
  readonly name: string;
  /** Absent for a profile, which knows heights along one path only. */
  readonly elevation?: ElevationSource | undefined;
  /** Profile of the path, its first point under `from`; never rejects for what is wrong with a file. */
  readonly profileBetween: (from: TerrainEnd, to: TerrainEnd, sampling?: Sampling) => Promise<SampledProfile>;
}

export type OpenedTerrain = Terrain | { readonly ok: false; readonly faults: readonly TerrainFault[] };
