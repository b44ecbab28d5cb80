import type { PathStudy, ProfilePoint } from "../study/pathStudy.ts";
import { LINE_WIDTH, lengthOf, paragraph } from "./words.ts";

/** Rows of the drawing. */
const ROWS = 16;
/** Columns left of the axis: a figure and a blank. */
const MARGIN = 7;
const WIDTH = LINE_WIDTH - MARGIN - 1;
/** Obstacles past this are drawn without a number. */
const MOST_NUMBERED = 9;

/**
 * The path from the side in plain characters: the ground on a curved Earth, the ray, its first Fresnel zone and the
 * obstacles by number. Heights are over the chord that joins sea level under both ends.
 */
export function profileDrawing({ points, obstacles, settings }: PathStudy): string {
  const lengthKm = points.at(-1)!.distanceKm;
  const columns = Array.from({ length: WIDTH }, (_, column) => columnOf(points, column, lengthKm));
  const low = Math.min(...columns.map(({ groundM }) => groundM));
  const high = Math.max(...columns.flatMap(({ topM, rayM, fresnelM }) => [topM, rayM + fresnelM]));
  const stepM = roundStep((high - low) / (ROWS - 2));
  const bottomM = Math.floor(low / stepM) * stepM;
  const rows = Math.ceil((high - bottomM) / stepM) + 1;
  const rowOf = (heightM: number) => rows - 1 - Math.round((heightM - bottomM) / stepM);
  const cells = Array.from({ length: rows }, () => Array<string>(WIDTH).fill(" "));
  for (const [i, { groundM, topM, rayM, fresnelM }] of columns.entries()) {
    for (let row = rowOf(topM); row < rowOf(groundM); row++) cells[row]![i] = "^";
    for (let row = rowOf(groundM); row < rows; row++) cells[row]![i] = row === rowOf(groundM) ? "#" : ":";
    for (const edge of [rayM - fresnelM, rayM + fresnelM]) {
      const row = cells[rowOf(edge)];
      if (row?.[i] === " ") row[i] = "-";
    }
    cells[rowOf(rayM)]![i] = "*";
  }
  for (const [i, { distanceKm }] of obstacles.slice(0, MOST_NUMBERED).entries()) {
    const column = Math.round((distanceKm / lengthKm) * (WIDTH - 1));
    const above = Math.max(0, rowOf(columns[column]!.topM) - 1);
    cells[above]![column] = String(i + 1);
  }
  const cover = points.some(({ coverM }) => coverM > 0) ? ", ^ trees, buildings" : "";
  const k = Number(settings.k.toPrecision(3));
  return [
    ...cells.map((line, i) => {
      const levelM = bottomM + (rows - 1 - i) * stepM;
      const figure = i % 2 === (rows - 1) % 2 ? String(Number(levelM.toPrecision(6))) : "";
      return `${figure.padStart(MARGIN - 1)} |${line.join("")}`.trimEnd();
    }),
    `${" ".repeat(MARGIN)}+${"-".repeat(WIDTH)}`,
    scale(lengthKm),
    paragraph(
      `m over km: # ground on the curved Earth, k = ${k}${cover}, * ray, - first Fresnel zone, 1.. obstacles`,
    ),
  ].join("\n");
}

/** What one column of the drawing shows: its highest ground and top, and the ray in its middle. */
function columnOf(points: readonly ProfilePoint[], column: number, lengthKm: number) {
  const middleKm = (column / (WIDTH - 1)) * lengthKm;
  const halfKm = lengthKm / (WIDTH - 1) / 2;
  const next = Math.max(
    1,
    points.findIndex(({ distanceKm }) => distanceKm >= middleKm),
  );
  const [before, after] = [points[next - 1]!, points[next]!];
  const share = (middleKm - before.distanceKm) / (after.distanceKm - before.distanceKm);
  const between = (figure: (point: ProfilePoint) => number) =>
    figure(before) + share * (figure(after) - figure(before));
  const ground = ({ groundM, bulgeM }: ProfilePoint) => groundM + bulgeM;
  const top = (point: ProfilePoint) => ground(point) + point.coverM;
  const inside = points.filter(({ distanceKm }) => Math.abs(distanceKm - middleKm) <= halfKm);
  return {
    groundM: inside.reduce((high, point) => Math.max(high, ground(point)), between(ground)),
    topM: inside.reduce((high, point) => Math.max(high, top(point)), between(top)),
    rayM: between(({ rayM }) => rayM),
    fresnelM: between(({ fresnelM }) => fresnelM),
  };
}

/** Distances below the axis, in quarters. */
function scale(lengthKm: number): string {
  let line = " ".repeat(MARGIN + 1);
  for (const quarter of [0, 1, 2, 3, 4]) {
    const figure = (Math.round((lengthKm * quarter * 10) / 4) / 10).toString();
    const place =
      MARGIN + 1 + Math.round(((WIDTH - 1) * quarter) / 4) - (quarter === 4 ? lengthOf(figure) - 1 : 0);
    line = line.padEnd(place) + figure;
  }
  return line;
}

/** The next of 1, 2, 5 x 10^n metres, 1 at the least. */
function roundStep(least: number): number {
  const decade = 10 ** Math.floor(Math.log10(Math.max(1, least)));
  return decade * [1, 2, 5, 10].find((step) => step * decade >= Math.max(1, least) * (1 - 1e-9))!;
}
