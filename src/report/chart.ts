import { LINE_WIDTH, paragraph } from "./words.ts";

/** One line of a chart: a mark of plain characters, and a value for each abscissa. */
export interface Series {
  readonly mark: string;
  readonly label: string;
  readonly values: readonly number[];
}

export interface Chart {
  /** Rising. */
  readonly x: readonly number[];
  readonly xLabel: string;
  readonly yLabel: string;
  /** Later ones are drawn over earlier ones. */
  readonly series: readonly Series[];
}

/** Rows of the plotting area. */
const ROWS = 11;
/** Columns left of the axis: a figure and a blank. */
const MARGIN = 7;
const WIDTH = LINE_WIDTH - MARGIN - 1;
/** Figures below the abscissa, about as many. */
const MOST_TICKS = 6;

/**
 * Lines over one abscissa in plain characters, LINE_WIDTH wide and 14 lines high, the marks explained in the
 * last, which takes more where they are many.
 *
 * Where many values fall into one column, the column shows all that lies between their least and greatest, so that
 * no peak and no null goes lost.
 */
export function chart({ x, xLabel, yLabel, series }: Chart): string {
  const [least, most] = extremes([0, ...series.flatMap(({ values }) => values)]);
  const bottomBy = (step: number) => Math.floor(least / step + 1e-9);
  const fits = (step: number) => most <= (bottomBy(step) + ROWS - 1) * step * (1 + 1e-9);
  const close = roundStep((most - least) / (ROWS - 1));
  const step = fits(close) ? close : roundStep(1.01 * close);
  const bottom = bottomBy(step);
  const rowOf = (value: number) => ROWS - 1 - (Math.round(value / step) - bottom);
  const [first, last] = [x[0]!, x.at(-1)!];
  const columnOf = (value: number) => Math.round(((value - first) / (last - first)) * (WIDTH - 1));

  const cells = Array.from({ length: ROWS }, () => Array<string>(WIDTH).fill(" "));
  for (const { mark, values } of series) {
    for (const [column, low, high] of spans(x.map(columnOf), values)) {
      for (let row = rowOf(high); row <= rowOf(low); row++) cells[row]![column] = mark;
    }
  }

  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const rows = cells.map((line, i) => {
    const level = bottom + ROWS - 1 - i;
    const value = level * step;
    const figure = level % 2 !== 0 ? "" : decimals > 4 ? value.toExponential(0) : value.toFixed(decimals);
    return `${figure.padStart(MARGIN - 1)} |${line.join("")}`.trimEnd();
  });
  const tick = roundStep((last - first) / MOST_TICKS);
  const ticks = Array.from({ length: MOST_TICKS + 2 }, (_, i) => (Math.ceil(first / tick - 1e-9) + i) * tick);
  const axis = Array<string>(WIDTH).fill("-");
  let figures = "";
  for (const value of ticks.filter((value) => value <= last * (1 + 1e-9))) {
    axis[columnOf(value)] = "+";
    const figure = String(Number(value.toPrecision(6)));
    figures = figures.padEnd(Math.min(columnOf(value), WIDTH - figure.length)) + figure;
  }
  const marks = series.map(({ mark, label }) => `${mark} ${label}`);
  const legend = `${yLabel} over ${xLabel}: ${marks.join("   ")}`;
  return [
    ...rows,
    `${" ".repeat(MARGIN)}${axis.join("")}`,
    `${" ".repeat(MARGIN)}${figures}`,
    legend.length <= LINE_WIDTH ? legend : paragraph(`${yLabel} over ${xLabel}: ${marks.join("; ")}`),
  ].join("\n");
}

function extremes(values: readonly number[]): [number, number] {
  let [low, high] = [Infinity, -Infinity];
  for (const value of values) {
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return [low, high];
}

/** Of every column between the first and the last: the column, least and greatest value; lines run on over empty ones. */
function spans(columns: readonly number[], values: readonly number[]): [number, number, number][] {
  const found: [number, number, number][] = [];
  for (const [i, column] of columns.entries()) {
    const value = values[i]!;
    const open = found.at(-1);
    if (open?.[0] === column)
      found[found.length - 1] = [column, Math.min(open[1], value), Math.max(open[2], value)];
    else {
      const [from, before] = [columns[i - 1], values[i - 1]];
      for (let between = (from ?? column) + 1; between < column; between++) {
        const there = before! + ((value - before!) * (between - from!)) / (column - from!);
        found.push([between, there, there]);
      }
      found.push([column, value, value]);
    }
  }
  return found;
}

/** The next of 1, 2, 2.5, 5 x 10^n; 1 for nothing. */
function roundStep(least: number): number {
  if (!(least > 0)) return 1;
  const decade = 10 ** Math.floor(Math.log10(least));
  return decade * [1, 2, 2.5, 5, 10].find((step) => step * decade >= least * (1 - 1e-9))!;
}
