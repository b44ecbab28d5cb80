import { requireFinite, requireWithin } from "../numeric/check.ts";
import { geodesicPath, type Point } from "./geodesic.ts";

export interface LocatorCell extends Point {
  /** South-west corner; `latitude` and `longitude` are the centre. */
  readonly southWest: Point;
  /** Half the cell's east-west extent on the ground, at the latitude of the centre [km]. */
  readonly halfWidthKm: number;
  /** Half the cell's north-south extent on the ground [km]. */
  readonly halfHeightKm: number;
  /** From the centre to the farthest corner: how far off the station may be, at the worst [km]. */
  readonly halfDiagonalKm: number;
}

/** One pair of characters: how many parts it makes of the cell before it, and what they are called. */
interface Pair {
  readonly parts: number;
  readonly firstCharacter: string;
  readonly expected: string;
}

const subsquare: Pair = { parts: 24, firstCharacter: "A", expected: "a letter from A to X" };
const square: Pair = { parts: 10, firstCharacter: "0", expected: "a digit" };
const pairs: readonly Pair[] = [
  { parts: 18, firstCharacter: "A", expected: "a letter from A to R" },
  square,
  subsquare,
  square,
  subsquare,
];

/** Cells of the tenth character round the Earth, and from pole to pole: whole numbers keep borders exact. */
const FINEST_CELLS = pairs.reduce((product, { parts }) => product * parts, 1);

/** Share of a finest cell within which a place counts as lying on the border, so in the cell north-east. */
const BORDER = 1e-6;

/**
 * Place and size of the cell that a Maidenhead locator names.
 *
 * The position of a station is its cell's centre, give or take `halfWidthKm` east and west and
 * `halfHeightKm` north and south; `halfDiagonalKm` is the worst case in any direction.
 *
 * Source: convention of the IARU; E. T. Tyson, Conversion between geodetic and grid locator systems, QST,
 *         January 1989 (from memory); letters in the fifth pair are common practice, no source
 *
 * @param locator  2, 4, 6, 8 or 10 characters, capital or small
 * @throws RangeError that names the character at fault
 */
export function locatorToPoint(locator: string): LocatorCell {
  requireLength(locator.length, `locator "${locator}"`);
  const { column, row, cells } = cellOf(locator);
  const at = (x: number, y: number): Point => ({
    latitude: (180 * y) / cells - 90,
    longitude: (360 * x) / cells - 180,
  });
  const centre = at(column + 0.5, row + 0.5);
  const middleOfWest = at(column, row + 0.5);
  const middleOfSouth = at(column + 0.5, row);
  const middleOfNorth = at(column + 0.5, row + 1);
  // Meridians converge, so the corners on the side of the equator are the far ones.
  const farCorner = at(column, centre.latitude > 0 ? row : row + 1);
  return {
    ...centre,
    southWest: at(column, row),
    halfWidthKm: geodesicPath(centre, middleOfWest).distanceKm,
    halfHeightKm: geodesicPath(middleOfSouth, middleOfNorth).distanceKm / 2,
    halfDiagonalKm: geodesicPath(centre, farCorner).distanceKm,
  };
}

/** Column from the date line, row from the south pole, and how many cells of that size go round. */
function cellOf(locator: string): { column: number; row: number; cells: number } {
  let column = 0;
  let row = 0;
  let cells = 1;
  pairs.slice(0, locator.length / 2).forEach((pair, index) => {
    column = column * pair.parts + indexOf(locator, 2 * index, pair);
    row = row * pair.parts + indexOf(locator, 2 * index + 1, pair);
    cells *= pair.parts;
  });
  return { column, row, cells };
}

/**
 * Centre of the cell that holds a place: from centre to centre contests count their distances.
 *
 * Source: as `locatorToPoint`; the use by contests is common practice, no source
 *
 * @param point       as `pointToLocator` takes it
 * @param characters  of the locator that names the cell: 2, 4, 6, 8 or 10
 */
export function squareCentre(point: Point, characters: number): Point {
  const { column, row, cells } = cellOf(pointToLocator(point, characters));
  return { latitude: (180 * (row + 0.5)) / cells - 90, longitude: (360 * (column + 0.5)) / cells - 180 };
}

/**
 * Maidenhead locator of a place.
 *
 * A place on a border belongs to the cell north or east of it; the north pole to the last cell south of it.
 *
 * Source: as `locatorToPoint`
 *
 * @param point       latitude -90 to 90 deg, any longitude
 * @param characters  length of the answer: 2, 4, 6, 8 or 10
 */
export function pointToLocator({ latitude, longitude }: Point, characters: number): string {
  requireWithin("latitude", latitude, -90, 90);
  requireFinite("longitude", longitude);
  requireLength(characters, "a locator");
  const eastward = (((longitude + 180) % 360) + 360) % 360;
  let column = finestCell(eastward / 360) % FINEST_CELLS;
  let row = Math.min(finestCell((latitude + 90) / 180), FINEST_CELLS - 1);
  let cells = FINEST_CELLS;
  let locator = "";
  for (const pair of pairs.slice(0, characters / 2)) {
    cells /= pair.parts;
    locator += character(pair, Math.floor(column / cells)) + character(pair, Math.floor(row / cells));
    column %= cells;
    row %= cells;
  }
  return locator.slice(0, 4) + locator.slice(4).toLowerCase();
}

function finestCell(share: number): number {
  return Math.floor(share * FINEST_CELLS + BORDER);
}

function requireLength(characters: number, what: string): void {
  if (![2, 4, 6, 8, 10].includes(characters)) {
    throw new RangeError(`${what} has ${characters} characters, where 2, 4, 6, 8 or 10 are possible`);
  }
}

function indexOf(locator: string, position: number, { parts, firstCharacter, expected }: Pair): number {
  const found = locator.charAt(position);
  const index = found.toUpperCase().charCodeAt(0) - firstCharacter.charCodeAt(0);
  if (index < 0 || index >= parts) {
    throw new RangeError(`locator "${locator}": character ${position + 1}, "${found}", must be ${expected}`);
  }
  return index;
}

function character({ firstCharacter }: Pair, index: number): string {
  return String.fromCharCode(firstCharacter.charCodeAt(0) + index);
}
