import { cautions } from "../safety/cautions.ts";
import {
  type HorizonRound,
  type HorizonRow,
  type HorizonSector,
  horizonSectors,
} from "../study/horizonRound.ts";
import { type Cell, cell, columns, RULE } from "./columns.ts";
import { horizonDrawing } from "./horizonDrawing.ts";
import { warningText } from "./notes.ts";
import { hundredth, listed, type Paint, paragraph, percent, plain } from "./words.ts";

/** Sectors of the table. */
const SECTORS = 36;

/** Further apart than this, the two grounds are hardly of one place: own choice [m]. */
const GROUNDS_APART_M = 15;

/** The local horizon: the answer, a drawing of the skyline, a table by sectors of 10 degrees, and what is unknown. */
export function horizonText(horizon: HorizonRound, paint: Paint = plain): string {
  const parts = [
    headText(horizon, paint),
    answer(horizon),
    horizonDrawing(horizon),
    `${paint("strong", "By sectors: highest horizon, its distance, and lowest horizon")}\n${table(horizon)}`,
    warningText(warnings(horizon), paint),
    [paint("strong", "Caution"), ...hazards.map((sentence) => paragraph(sentence, "  - "))].join("\n"),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

/** Of who goes up a hill with an antenna, two sentences each. */
const hazards = ["masts and height", "lightning"].map((hazard) =>
  cautions
    .find((caution) => caution.hazard === hazard)!
    .sentences.slice(0, 2)
    .join(" "),
);

function headText(horizon: HorizonRound, paint: Paint): string {
  const { name, latitude, longitude, groundM, heightM, kFactor, reachKm, terrain, stepM } = horizon;
  const north = `${Math.abs(latitude).toFixed(4)} ${latitude < 0 ? "S" : "N"}`;
  const east = `${Math.abs(longitude).toFixed(4)} ${longitude < 0 ? "W" : "E"}`;
  const where = `${north}, ${east}`;
  return [
    paint("strong", name === where ? `Horizon from ${where}` : `Horizon from ${name} (${where})`),
    paragraph(
      `Ground ${Math.round(groundM)} m above sea level, antenna ${heightM} m above that ground; ` +
        `k = ${Number(kFactor.toPrecision(3))}; out to ${reachKm} km by steps of ${Math.round(stepM)} m in ${terrain}.`,
    ),
  ].join("\n");
}

function answer({ highest, lowest, open, towards }: HorizonRound): string {
  if (!highest || !lowest) return "No height is known in any direction.";
  const shares = open.map(({ belowDeg, share }) => `${belowDeg} deg on ${percent(share)}`);
  const other = towards ? ` Towards ${towards.name}: ${rowWords(towards)}.` : "";
  return paragraph(
    `Lowest ${rowWords(lowest)}; highest ${rowWords(highest)}. ` +
      `The horizon lies below ${listed(shares)} of the circle.${other}`,
  );
}

function rowWords({ elevationDeg, azimuthDeg, distanceKm, groundM }: HorizonRow): string {
  const azimuth = `${azimuthDeg.toFixed(1)} deg true`;
  if (elevationDeg === undefined) return `unknown at ${azimuth}`;
  return `${hundredth(elevationDeg)} deg at ${azimuth} (${distanceKm!.toFixed(1)} km off, ${Math.round(groundM!)} m)`;
}

/** Two halves of the circle beside each other. */
function table(horizon: HorizonRound): string {
  const sectors = horizonSectors(horizon, SECTORS);
  const half = SECTORS / 2;
  const head = ["azimuth", "highest", "km", "lowest"].map((text) => cell(text));
  const between = cell("|");
  return columns([
    [...head, between, ...head],
    RULE,
    ...sectors.slice(0, half).map((east, i) => [...cells(east), between, ...cells(sectors[i + half]!)]),
  ]);
}

function cells({ fromDeg, toDeg, highest, lowest }: HorizonSector): Cell[] {
  return [
    cell(`${fromDeg} to ${toDeg}`),
    cell(highest ? hundredth(highest.elevationDeg!) : "?"),
    cell(highest ? highest.distanceKm!.toFixed(1) : "?"),
    cell(lowest ? hundredth(lowest.elevationDeg!) : "?"),
  ];
}

function warnings(horizon: HorizonRound): { code: string; where: string; message: string }[] {
  const { rows, groundM, statedGroundM, reachKm, gaps } = horizon;
  const found: { code: string; where: string; message: string }[] = [];
  const warn = (code: string, where: string, message: string) => found.push({ code, where, message });
  if (statedGroundM !== undefined && Math.abs(statedGroundM - groundM) > GROUNDS_APART_M) {
    const message =
      `${Math.round(groundM)} m by the terrain, ${Math.round(statedGroundM)} m as stated; the horizon stands on the ` +
      "terrain's. Is the position as good as the height?";
    warn("ground_differs", "ground", message);
  }
  for (const { reason, source, azimuths, nearestKm, nearestAzimuthDeg } of gaps) {
    const what =
      reason === "outside" ? "nothing known beyond its area" : reason === "void" ? "voids" : "no such tile";
    const message =
      `${what}, on ${azimuths} of ${rows.length} azimuths, nearest ${nearestKm.toFixed(1)} km off at ` +
      `${nearestAzimuthDeg.toFixed(1)} deg; unknown ground hides nothing here`;
    warn("gap", source, message);
  }
  const atReach = rows.filter((row) => row.atReach).length;
  if (atReach > 0) {
    const message = `the horizon is the last point looked at on ${atReach} of ${rows.length} azimuths; look farther`;
    warn("at_reach", `${reachKm} km`, message);
  }
  const near =
    "elevation tiles smooth summits and hold part of the trees; a house, mast or tree nearby is not in these figures";
  warn("bare_ground", "terrain", near);
  return found;
}
