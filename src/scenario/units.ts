import { wattToDbm } from "../numeric/decibels.ts";
import { nearest } from "./nearest.ts";

export type Dimension = keyof typeof dimensionNouns;

/** Each dimension as a message names it. */
export const dimensionNouns = {
  length: "a length",
  frequency: "a frequency",
  power: "a power",
  level: "a ratio in dB",
  gain: "an antenna gain",
  angle: "an angle",
  rainRate: "a rain rate",
  speed: "a speed",
  temperature: "a temperature",
  pressure: "a pressure",
  percent: "a percentage",
  density: "a density",
  duration: "a duration",
  number: "a bare number",
};

export interface Unit {
  readonly dimension: Dimension;
  readonly names: readonly string[];
  /** Base units of the dimension in this unit: integers where the definition allows, so that 5 mil is 0.127 mm. */
  readonly factor: number;
  /** Added before scaling: degrees that do not start at the base's zero, decibels of another reference. */
  readonly shift: number;
}

/** The half-wave dipole over the isotropic radiator, 10 lg 1.641 rounded as the trade rounds it (from memory). */
const DIPOLE_GAIN_DBI = 2.15;

// Foot and inch: international yard and pound agreement, 1959 (1 yd = 0.9144 m exactly). Nautical mile 1852 m:
// Monaco 1929. Inch of mercury: conventional, 3386.389 Pa (NIST SP 811, appendix B.8, from memory).
const units: readonly Unit[] = [
  ...family("length", { "um µm micron microns": 10, "mm millimetre millimeter": 1e4 }), // base 0.1 um
  ...family("length", { "cm centimetre centimeter": 1e5, "m metre meter metres meters": 1e7 }),
  ...family("length", { "km kilometre kilometer": 1e10, "mil mils thou": 254, 'in inch inches "': 254_000 }),
  ...family("length", { "ft foot feet '": 3_048_000, "yd yard yards": 9_144_000 }),
  ...family("length", { "mi mile miles": 16_093_440_000 }),
  ...family("frequency", { Hz: 1, kHz: 1e3, MHz: 1e6, GHz: 1e9 }),
  ...family("power", { "W watt watts": 1, mW: 1e-3, "uW µW": 1e-6, kW: 1e3 }), // to dBm by logarithm
  ...family("power", { dBm: 1 }),
  ...family("power", { dBW: 1 }, 30),
  ...family("level", { dB: 1 }),
  ...family("gain", { dBi: 1 }),
  ...family("gain", { dBd: 1 }, DIPOLE_GAIN_DBI),
  ...family("angle", { "deg ° degree degrees": 3600, arcmin: 60, arcsec: 1 }),
  ...family("angle", { mrad: 648 / Math.PI, "rad radian radians": 648_000 / Math.PI }),
  ...family("rainRate", { "mm/h mm/hr mm/hour": 10, "cm/h cm/hr": 100, "in/h in/hr inch/h inch/hr": 254 }),
  ...family("speed", { "m/s": 3_600_000, "km/h km/hr kph": 1_000_000, mph: 1_609_344 }), // base mm/h
  ...family("speed", { "kn kt knot knots": 1_852_000, "ft/s": 1_097_280 }),
  ...family("temperature", { "degC °C C celsius": 1 }),
  ...family("temperature", { "K kelvin": 1 }, -273.15),
  ...family("temperature", { "degF °F F fahrenheit": 5 / 9 }, -32),
  ...family("pressure", { Pa: 1, "hPa mbar mb": 100, kPa: 1000, bar: 1e5, inHg: 3386.389 }),
  ...family("percent", { "% percent": 1 }),
  ...family("density", { "g/m3 g/m^3 g/m³": 1, "kg/m3 kg/m^3 kg/m³": 1e3, "g/cm3 g/cm^3 g/cm³": 1e6 }),
  ...family("duration", { "s sec second seconds": 1, "min minute minutes": 60 }),
  ...family("duration", { "h hr hour hours": 3600, "d day days": 86_400 }),
  { dimension: "number", names: [""], factor: 1, shift: 0 },
];

function family(dimension: Dimension, factors: Readonly<Record<string, number>>, shift = 0): Unit[] {
  return Object.entries(factors).map(([names, factor]) => {
    return { dimension, names: names.split(" "), factor, shift };
  });
}

/** Units whose first letter is read as written, because m and M are a thousand million apart. */
const strictCase = new Set(["MHz", "mW", "mm", "m", "mbar", "mb", "mrad"]);
const strictUnits = new Map<string, Unit>();
const looseUnits = new Map<string, Unit>();
for (const unit of units) {
  for (const name of unit.names) {
    if (strictCase.has(name)) strictUnits.set(firstAsWritten(name), unit);
    else looseUnits.set(name.toLowerCase(), unit);
  }
}

function firstAsWritten(name: string): string {
  return name.slice(0, 1) + name.slice(1).toLowerCase();
}

/** The unit of a name or alias; the case of letters matters only between m and M. */
export function findUnit(name: string): Unit | undefined {
  return strictUnits.get(firstAsWritten(name)) ?? looseUnits.get(name.toLowerCase());
}

/** From unit to unit of one dimension; NaN for a power that has no level. */
export function convert(number: number, from: Unit, to: Unit): number {
  if (from === to) return number;
  if (isWatts(from)) return number > 0 ? wattToDbm(number * from.factor) : Number.NaN;
  return ((number + from.shift) * from.factor) / to.factor - to.shift;
}

function isWatts({ dimension, names }: Unit): boolean {
  return dimension === "power" && !names[0]!.startsWith("dB");
}

/** The name that would be a unit if its m were an M, or the other way round. */
export function withOtherCase(written: string): string | undefined {
  return [...strictCase].find((name) => name.toLowerCase() === written.toLowerCase());
}

/** The unit closest to a mistyped one; one of the wanted dimension is preferred. */
export function nearestUnit(written: string, dimension: Dimension): string | undefined {
  const namesOf = (some: readonly Unit[]) => some.flatMap(({ names }) => names);
  const fitting = units.filter((unit) => unit.dimension === dimension);
  return nearest(written, namesOf(fitting)) ?? nearest(written, namesOf(units));
}

export function isDecibel({ names }: Unit): boolean {
  return names[0]!.startsWith("dB");
}
