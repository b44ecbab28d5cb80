import type { Span } from "../study/span.ts";

const HOURS_OF_YEAR = 8766;
const MINUTES_OF_MONTH = 43_830;

/** A lower bound this much below the upper one adds nothing to it. */
const NEGLIGIBLE = 0.05;

/** Two figures, three from a hundred on; the rain is known far worse. */
function figure(value: number): string {
  if (value < 0.001) return "0";
  return Number(value.toPrecision(value >= 100 ? 3 : 2)).toString();
}

/** Hours of a year, known or only bounded: `6.2`, `<0.09`, `>88`, `1.2-1.9`. */
export function hoursFigure(span: Span): string {
  return boundedFigure(span, HOURS_OF_YEAR, figure, ["<", ">", "-"]);
}

/** The same for minutes of a month. */
export function minutesFigure(span: Span): string {
  return boundedFigure(span, MINUTES_OF_MONTH, figure, ["<", ">", "-"]);
}

/** Hours of a year in words, short times in minutes. */
export function hoursWords(span: Span): string {
  return boundedFigure(span, HOURS_OF_YEAR, timeWords, ["under ", "over ", " to "]);
}

/** Minutes of a month in words. */
export function monthWords(span: Span): string {
  const told = (minutes: number) => timeWords(minutes / 60);
  return boundedFigure(span, MINUTES_OF_MONTH, told, ["under ", "over ", " to "]);
}

function boundedFigure(
  { low, high }: Span,
  whole: number,
  told: (value: number) => string,
  [under, over, to]: readonly [string, string, string],
): string {
  if (low === high) return told(low);
  if (high >= 0.999 * whole) return `${over}${told(Math.max(0, low))}`;
  return low < NEGLIGIBLE * high ? `${under}${told(high)}` : `${told(low)}${to}${told(high)}`;
}

function timeWords(hours: number): string {
  if (hours < 1 / 3600) return hours === 0 ? "no time" : "a second";
  const [value, unit] =
    hours >= 1 ? [hours, "hour"] : hours >= 1 / 60 ? [60 * hours, "minute"] : [3600 * hours, "second"];
  return `${figure(value)} ${unit}${figure(value) === "1" ? "" : "s"}`;
}

/** An availability with two figures of what is missing to 100 %. */
export function availabilityFigure({ low, high }: Span): string {
  const told = (value: number) => {
    const missing = 100 - value;
    if (missing <= 0) return "100";
    return value.toFixed(Math.min(7, Math.max(0, 1 - Math.floor(Math.log10(missing) + 1e-9))));
  };
  if (low === high) return told(low);
  return low > 0.1 ? `>${told(low)}` : `<${told(high)}`;
}
