import { type HorizonRound, horizonSectors } from "../study/horizonRound.ts";
import { LINE_WIDTH } from "./words.ts";

/** Columns left of the skyline: a figure, a blank and the axis. */
const MARGIN = 8;
const WIDTH = LINE_WIDTH - MARGIN;
const ROWS = 12;
/** Degrees of elevation a row may stand for. */
const STEPS = [0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10];

/**
 * The skyline all round, from north over east: a column for each 5 degrees with the highest horizon in it.
 *
 * @returns lines of at most LINE_WIDTH characters; a question mark where no height is known
 */
export function horizonDrawing(horizon: HorizonRound): string {
  const { highest, lowest } = horizon;
  if (!highest || !lowest) return "";
  const skyline = horizonSectors(horizon, WIDTH).map((sector) => sector.highest?.elevationDeg);
  const top = Math.max(0, highest.elevationDeg!);
  const bottom = Math.min(0, lowest.elevationDeg!);
  const step = STEPS.find((one) => Math.ceil(top / one) - Math.floor(bottom / one) < ROWS) ?? STEPS.at(-1)!;
  const decimals = step < 0.1 ? 2 : step < 1 ? 1 : 0;
  const [first, last] = [Math.ceil(top / step), Math.floor(bottom / step)];
  const lines: string[] = [];
  for (let level = first; level >= last; level--) {
    const marks = skyline.map((elevationDeg) => {
      if (elevationDeg === undefined) return level === last ? "?" : " ";
      if (Math.round(elevationDeg / step) >= level) return "#";
      return level === 0 ? "-" : " ";
    });
    const figure = (level * step).toFixed(decimals).replace(/^-(?=0(\.0+)?$)/, "");
    lines.push(`${figure.padStart(MARGIN - 2)} |${marks.join("")}`.trimEnd());
  }
  const quarter = WIDTH / 4;
  const axis = Array.from({ length: WIDTH }, (_, i) => (i % quarter === 0 ? "+" : "-")).join("");
  const names = ["N 0", "E 90", "S 180", "W 270"].map((name) => name.padEnd(quarter)).join("");
  const blank = " ".repeat(MARGIN);
  return [
    ...lines,
    `${blank}${axis}`,
    `${blank}${names.trimEnd()}`,
    "elevation over true azimuth in degrees",
  ].join("\n");
}
