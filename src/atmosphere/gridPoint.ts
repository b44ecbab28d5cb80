import { requireWithin } from "../numeric/check.ts";

/** One direction of a grid of even steps; a step may be negative. */
export interface GridAxis {
  /** Position of the first row or column [deg]. */
  readonly firstDeg: number;
  readonly lastDeg: number;
  /** At least 2. */
  readonly count: number;
}

/**
 * Value of a map between the four points of its grid about a place, straight in both directions.
 *
 * Source: ITU-R P.1144, Annex 1, section 1b
 * Valid:  within the grid, edges included
 *
 * @param rows       latitudes of the grid's rows
 * @param columns    longitudes of its columns
 * @param latitude   [deg]
 * @param longitude  [deg], in the turn that the columns have
 * @param valueAt    value at a row and a column, both from 0
 * @throws RangeError on a place beyond the grid
 */
export function bilinear({
  rows,
  columns,
  latitude,
  longitude,
  valueAt,
}: {
  readonly rows: GridAxis;
  readonly columns: GridAxis;
  readonly latitude: number;
  readonly longitude: number;
  readonly valueAt: (row: number, column: number) => number;
}): number {
  const [row, down] = cellOf("latitude", rows, latitude);
  const [column, along] = cellOf("longitude", columns, longitude);
  return (
    valueAt(row, column) * (1 - down) * (1 - along) +
    valueAt(row + 1, column) * down * (1 - along) +
    valueAt(row, column + 1) * (1 - down) * along +
    valueAt(row + 1, column + 1) * down * along
  );
}

/** Row or column before a position, and the share of a step beyond it. */
function cellOf(name: string, { firstDeg, lastDeg, count }: GridAxis, positionDeg: number): [number, number] {
  requireWithin(name, positionDeg, Math.min(firstDeg, lastDeg), Math.max(firstDeg, lastDeg));
  const steps = ((positionDeg - firstDeg) / (lastDeg - firstDeg)) * (count - 1);
  const before = Math.min(Math.floor(steps), count - 2);
  return [before, steps - before];
}
