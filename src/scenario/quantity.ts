import {
  convert,
  dimensionNouns,
  findUnit,
  isDecibel,
  nearestUnit,
  type Unit,
  withOtherCase,
} from "./units.ts";
import { shown } from "./wording.ts";

/** What a field of a scenario holds; the name ends in the canonical unit of the value read. */
export type QuantityKind =
  | "frequencyGHz"
  | "bandwidthHz"
  | "thicknessMm"
  | "lengthM"
  | "distanceKm"
  | "powerDbm"
  | "levelDb"
  | "gainDbi"
  | "angleDeg"
  | "rainRateMmPerH"
  | "temperatureC"
  | "temperatureK"
  | "pressureHPa"
  | "percent"
  | "densityGcm3"
  | "densityGm3"
  | "speedMPerS"
  | "durationMin"
  | "ratio";

/** A quantity read: `value` in the canonical unit of its kind, `number` and `unit` as they were written. */
export interface Quantity {
  readonly ok: true;
  readonly value: number;
  readonly number: number;
  readonly unit: string;
  /** Standard deviation in the canonical unit; in dB for powers and gains. Only where a spread was written. */
  readonly sigma?: number;
}

export type RefusalCode =
  | "bare_number" // a number where a unit is needed
  | "wrong_dimension" // a known unit of another quantity
  | "unknown_unit"
  | "no_number" // nothing numeric in the text
  | "unreadable" // a number, then something that is no unit
  | "decimal_comma"
  | "thousands_separator"
  | "not_finite" // too large, or divided by zero
  | "no_level" // zero or negative power has no level in dBm
  | "spread" // +/- where none is read, or one that makes no sense
  | "too_long"
  | "forbidden" // arithmetic that a scenario may not hold: functions, names, lists
  | "contradiction" // position: sign against letter, letter against axis
  | "out_of_range"; // position: beyond the globe

/** A text refused, with everything that a message needs but the place in the file. */
export interface Refusal {
  readonly ok: false;
  readonly code: RefusalCode;
  readonly read: string;
  readonly expected: string;
  readonly hint?: string;
  /** True where `mathUnits.ts` may still read the text: arithmetic or a rare unit. */
  readonly libraryMayRead: boolean;
}

export type Reading = Quantity | Refusal;

/** `read "5", expected a length with a unit, such as ... (bare number; write 5 mm or 5 mil)` */
export function describeRefusal({ read, expected, hint }: Refusal): string {
  return `read ${shown(read)}, expected ${expected}${hint === undefined ? "" : ` (${hint})`}`;
}

interface Kind {
  readonly expected: string;
  /** The units people use for it, the canonical one first. */
  readonly usual: readonly string[];
}

export const kinds: Readonly<Record<QuantityKind, Kind>> = {
  frequencyGHz: kind("a frequency", "10.368 GHz or 5760 MHz", "GHz", "MHz"),
  bandwidthHz: kind("a bandwidth", "500 Hz or 2.4 kHz", "Hz", "kHz", "MHz"),
  thicknessMm: kind("a length", "0.8 mm, 5 mil or 3/32 in", "mm", "mil", "in"),
  lengthM: kind("a length", "60 cm, 5 ft or 412 m", "m", "cm", "ft"),
  distanceKm: kind("a distance", "8 km or 5 mi", "km", "mi", "m"),
  powerDbm: kind("a power", "3 W, 200 mW or 34.8 dBm", "dBm", "W", "mW"),
  levelDb: kind("a loss or ratio", "0.25 dB", "dB"),
  gainDbi: kind("an antenna gain", "34.5 dBi or 32.4 dBd", "dBi", "dBd"),
  angleDeg: kind("an angle", "0.5 deg", "deg", "mrad"),
  rainRateMmPerH: kind("a rain rate", "16 mm/h or 0.6 in/h", "mm/h", "in/h"),
  temperatureC: kind("a temperature", "20 degC, 68 degF or 293 K", "degC", "degF", "K"),
  temperatureK: kind("a temperature", "200 K", "K"),
  pressureHPa: kind("a pressure", "1013 hPa or 29.92 inHg", "hPa", "kPa", "inHg"),
  percent: { expected: "a percentage, such as 90 %", usual: ["%"] },
  densityGcm3: kind("a density", "0.3 g/cm3 or 300 kg/m3", "g/cm3", "kg/m3"),
  densityGm3: kind("a density", "0.05 g/m3", "g/m3", "kg/m3"),
  speedMPerS: kind("a speed", "12 m/s, 43 km/h or 23 kn", "m/s", "km/h", "kn"),
  durationMin: kind("a duration", "30 min or 2 h", "min", "h", "s"),
  ratio: { expected: "a number without a unit, such as 0.4 or 4/3", usual: [""] },
};

function kind(noun: string, examples: string, ...usual: string[]): Kind {
  return { expected: `${noun} with a unit, such as ${examples}`, usual };
}

/** The canonical unit of a kind. */
export function unitOf(kind: QuantityKind): Unit {
  return findUnit(kinds[kind].usual[0]!)!;
}

/** Longest text that is read at all; the longest sensible sum of lengths is far shorter. */
export const LONGEST_TEXT = 200;

const numberThenRest = /^([+-]?)(?:(\d+) +(\d+\/\d+)|(\d+\/\d+)|((?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?))(.*)$/i;
const spreadSign = /\s*(?:\+\/?-|\u00b1)\s*/;

/**
 * Reads what stands in a scenario where a quantity is needed.
 *
 * Optional sign, then a decimal number, a fraction `3/32` or a mixed number `1 1/2`, then the unit, which only
 * `ratio` goes without. The case of letters matters only between m and M. Arithmetic and rare units are left to
 * `mathUnits.ts`: the refusal says whether it may help. Whether the value makes sense is the caller's question.
 *
 * @param input  text of the scalar, or the number that YAML made of it
 * @param kind  what the field holds, and so the canonical unit of the value
 * @param spread  true where `0.22 dB +/- 0.05 dB` is welcome; then `sigma` is returned where one was written
 */
export function readQuantity(
  input: string | number,
  kind: QuantityKind,
  { spread = false }: { spread?: boolean } = {},
): Reading {
  const text = tidy(String(input));
  const early = refuseEarly(text, kind);
  if (early) return early;
  if (!spreadSign.test(text)) return readPlain(text, kind);
  if (!spread) return refuse("spread", text, kind, "no uncertainty is taken here");
  return readSpread(text, kind);
}

/**
 * Typographic signs to the plain ones that the grammar knows. Patterns have them by number: the bundler leaves patterns
 * as they are, and the program is read as plain ASCII.
 */
export function tidy(text: string): string {
  return text
    .trim()
    .replace(/\s/g, " ")
    .replace(/[\u2212\u2013]/g, "-")
    .replace(/\u03bc/g, "µ") // Greek mu to the micro sign
    .replace(/\u00ba/g, "°") // ordinal sign, a common slip
    .replace(/[\u2032\u2019]/g, "'")
    .replace(/[\u2033\u201d]|''/g, '"');
}

export function refuse(
  code: RefusalCode,
  read: string,
  kind: QuantityKind,
  hint?: string,
  libraryMayRead = false,
): Refusal {
  const { expected } = kinds[kind];
  return { ok: false, code, read, expected, libraryMayRead, ...(hint === undefined ? {} : { hint }) };
}

/** Shapes that must not reach the grammar, nor the arithmetic, because they would be read as something else. */
function refuseEarly(text: string, kind: QuantityKind): Refusal | undefined {
  if (text.length > LONGEST_TEXT) {
    return refuse("too_long", text, kind, `longer than ${LONGEST_TEXT} characters`);
  }
  if (!/\d/.test(text)) return refuse("no_number", text, kind);
  const thousands = /^[+-]?\d{1,3}([, _']\d{3})+(?![\d/])/.exec(text);
  if (thousands) {
    const joined = thousands[0].replace(/[, _']/g, "");
    const point = thousands[1]!.startsWith(",")
      ? `, or ${thousands[0].replace(",", ".")} if the comma is a decimal sign`
      : "";
    return refuse("thousands_separator", text, kind, `write ${joined} without a separator${point}`);
  }
  const comma = /(\d*),(\d+)/.exec(text);
  if (comma) return refuse("decimal_comma", text, kind, `write ${comma[1] || "0"}.${comma[2]} with a point`);
  const hyphened = /^(\d+)-(\d+\/\d+)(?!\d)\s*(.*)$/.exec(text);
  if (hyphened) {
    return refuse("unreadable", text, kind, `write ${`${hyphened[1]} ${hyphened[2]} ${hyphened[3]}`.trim()}`);
  }
  const proportion = kind === "ratio" && /^(\d+\.?\d*)\s*:\s*(\d+\.?\d*)$/.exec(text);
  if (proportion) {
    const [, above, below] = proportion;
    return refuse("unreadable", text, kind, `write ${Number(below) === 1 ? above : `${above}/${below}`}`);
  }
  const feetAndInches = /^(\d+)\s*(?:ft|feet|foot|')\s*(\d[\d./ ]*?)\s*(?:in|inch|inches|")?$/i.exec(text);
  if (feetAndInches) {
    return refuse("unreadable", text, kind, `write ${feetAndInches[1]} ft + ${feetAndInches[2]} in`);
  }
  return undefined;
}

function readPlain(text: string, kind: QuantityKind): Reading {
  const parts = split(text);
  if (!parts) return refuse("unreadable", text, kind, undefined, true);
  const { number, unit: written } = parts;
  if (!Number.isFinite(number)) return refuse("not_finite", text, kind, "too large, or divided by zero");
  const unit = findUnit(written);
  if (!unit) return refuseUnit(text, written, kind);
  const target = unitOf(kind);
  if (unit.dimension !== target.dimension) return refuseDimension(text, number, unit, kind);
  if (kind === "temperatureK" && unit !== target) {
    const kelvin = round(convert(number, unit, target));
    return refuse("wrong_dimension", text, kind, `a noise temperature is in kelvin; write ${kelvin} K`);
  }
  const value = convert(number, unit, target);
  if (Number.isNaN(value)) {
    return refuse("no_level", text, kind, "a power of zero or less has no level in dBm");
  }
  if (!Number.isFinite(value)) return refuse("not_finite", text, kind, "too large");
  return { ok: true, value, number, unit: written };
}

function split(text: string): { number: number; unit: string } | undefined {
  const match = numberThenRest.exec(text);
  if (!match) return undefined;
  const [, sign, whole = "0", mixed, fraction, decimal, rest] = match;
  const part = mixed ?? fraction;
  const [above, below] = (part ?? "0/1").split("/").map(Number);
  const magnitude = decimal === undefined ? Number(whole) + above! / below! : Number(decimal);
  const unit = rest!
    .trim()
    .replace(/ *\/ */g, "/")
    .replace(/\u00b0 (?=[CF]$)/i, "°");
  return { number: sign === "-" ? -magnitude : magnitude, unit };
}

function refuseUnit(text: string, written: string, kind: QuantityKind): Refusal {
  if (!/^[\p{L}\u00b0%"'\u00b5][\p{L}\d\u00b0/^\u00b3-]*$/u.test(written)) {
    return refuse("unreadable", text, kind, undefined, true);
  }
  const strict = withOtherCase(written);
  if (strict) return refuse("unknown_unit", text, kind, `case matters: did you mean ${strict}?`);
  const close = nearestUnit(written, unitOf(kind).dimension);
  return refuse("unknown_unit", text, kind, close && `unknown unit; did you mean ${close}?`, true);
}

function refuseDimension(text: string, number: number, unit: Unit, kind: QuantityKind): Refusal {
  const { usual } = kinds[kind];
  const withUnit = `write ${either(usual.map((name) => `${number} ${name}`))}`;
  const target = unitOf(kind);
  if (unit.dimension === "number") {
    const meant =
      kind === "percent" && number > 0 && number <= 1 ? `write ${round(number * 100)} %` : withUnit;
    return refuse("bare_number", text, kind, `bare number; ${meant}`);
  }
  const fact = `${text} is ${dimensionNouns[unit.dimension]}`;
  if (kind === "ratio" && unit.dimension === "percent") {
    return refuse("wrong_dimension", text, kind, `write ${round(number / 100)}`);
  }
  const bothDecibels = isDecibel(unit) && isDecibel(target);
  return refuse("wrong_dimension", text, kind, bothDecibels ? `${fact}; ${withUnit}` : fact);
}

/** `3 W +/- 0.5 dB`, `0.22 +/- 0.05 dB`, `(0.22 ± 0.05) dB`; powers and gains have their spread in dB. */
function readSpread(text: string, kind: QuantityKind): Reading {
  const open = text.replace(/^\(([^()]*)\)(.+)$/, "$1 $2");
  const [left = "", right = "", ...more] = open.split(spreadSign);
  const deviation = split(right);
  if (more.length > 0 || !deviation || !(deviation.number >= 0) || deviation.number === Infinity) {
    return refuse("spread", text, kind, "write one spread, not negative, after +/-");
  }
  const shared = /[^\d.eE/+\s-]/.test(left) ? left : `${left} ${deviation.unit}`;
  const centre = readPlain(shared, kind);
  if (!centre.ok) return { ...centre, read: text, libraryMayRead: false };
  const target = unitOf(kind);
  const unit = findUnit(deviation.unit);
  const fits = unit && (isDecibel(target) ? isDecibel(unit) : unit.dimension === target.dimension);
  if (!fits) {
    const wanted = isDecibel(target) ? "dB" : either(kinds[kind].usual) || "a bare number";
    return refuse("spread", text, kind, `write the spread in ${wanted}`);
  }
  return { ...centre, sigma: (deviation.number * unit.factor) / target.factor };
}

/** `a`, `a or b`, `a, b or c` */
export function either(choices: readonly string[]): string {
  return choices.join(", ").replace(/, ([^,]*)$/, " or $1");
}

/** Ten digits: enough for a hint, and free of the last binary digit's noise. */
export function round(value: number): number {
  return Number(value.toPrecision(10));
}
