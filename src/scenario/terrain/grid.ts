/** Heights on a regular grid of latitude and longitude: row 0 is the northern edge, rows run west to east. */
export interface Grid {
  readonly heightsM: ArrayLike<number>;
  readonly rows: number;
  readonly columns: number;
  /** Latitude of row 0 and longitude of column 0 [deg]. */
  readonly north: number;
  readonly west: number;
  readonly rowsPerDegree: number;
  readonly columnsPerDegree: number;
  /** What stands where no height is known. */
  readonly voidM: number;
}

/** Below it the known corners count for nothing: on a sample without a height rounding alone gives them weight. */
const LEAST_WEIGHT = 1e-9;

/**
 * Height at a place, bilinear between the four corners about it.
 *
 * Corners without a height are left out and the weights of the others scaled up; NaN where none has one.
 *
 * Source: sheet of terrain data, sections 8.1 and 8.2 (definitions of its own)
 *
 * @param latitude   inside the grid, both edges included [deg]
 * @param longitude  the same; a whole turn more or less does not matter [deg]
 */
export function heightIn(grid: Grid, latitude: number, longitude: number): number {
  const { heightsM, columns, voidM } = grid;
  const row = (grid.north - latitude) * grid.rowsPerDegree;
  const column = degreesEast(grid.west, longitude) * grid.columnsPerDegree;
  const r = cellOf(row, grid.rows);
  const c = cellOf(column, columns);
  const [u, w] = [row - r, column - c];
  const first = r * columns + c;
  let sum = 0;
  let weights = 0;
  const corner = (index: number, weight: number) => {
    const heightM = heightsM[index]!;
    if (heightM === voidM) return;
    sum += weight * heightM;
    weights += weight;
  };
  corner(first, (1 - u) * (1 - w));
  corner(first + 1, (1 - u) * w);
  corner(first + columns, u * (1 - w));
  corner(first + columns + 1, u * w);
  return weights > LEAST_WEIGHT ? sum / weights : Number.NaN;
}

/** Number of the cell between two samples; rounding at an edge must not leave the grid. */
function cellOf(position: number, samples: number): number {
  return Math.min(Math.max(Math.floor(position), 0), samples - 2);
}

/** A place this little west of a meridian lies on it, rounded [deg]. */
const ROUNDING_DEG = 1e-9;

/** How far east of a meridian a longitude lies, 0 up to 360 [deg]. */
export function degreesEast(of: number, longitude: number): number {
  const turned = (longitude - of) % 360;
  const east = turned < 0 ? turned + 360 : turned;
  return east > 360 - ROUNDING_DEG ? 0 : east;
}
