/**
 * Arithmetic with units, `2 * 3/32 in`, `3 ft + 2 in`, `0.3 furlong`: what `quantity.ts` leaves unread.
 *
 * Load this file only when needed, by `await import("./mathUnits.ts")`: it takes mathjs along, whose start costs
 * a fifth of a second bundled and more than one unbundled. Naming the parts here, in a static import, lets the
 * bundler drop the rest of mathjs: 325 kB and 0.2 s remain, where `await import("mathjs")` keeps 758 kB and 0.8 s.
 *
 * No text of a file is ever evaluated. mathjs parses it to a tree; the walk below computes numbers, units, the
 * four operations, a sign and small powers, and refuses any other node, so that no function can be reached.
 */
import {
  addDependencies,
  create,
  createUnitDependencies,
  divideDependencies,
  type FactoryFunctionMap,
  type MathNode,
  multiplyDependencies,
  parseDependencies,
  powDependencies,
  subtractDependencies,
  type Unit,
  unaryMinusDependencies,
  unitDependencies,
} from "mathjs";
import {
  LONGEST_TEXT,
  type QuantityKind,
  type Reading,
  type RefusalCode,
  readQuantity,
  refuse,
  tidy,
  unitOf,
} from "./quantity.ts";
import { nearestUnit } from "./units.ts";

const parts = {
  addDependencies,
  createUnitDependencies,
  divideDependencies,
  multiplyDependencies,
  parseDependencies,
  powDependencies,
  subtractDependencies,
  unaryMinusDependencies,
  unitDependencies,
};
const math = create(parts as FactoryFunctionMap); // typed as a record, whose entries might be absent

math.createUnit("dB"); // decibels add and take factors like any length; as a dimension of their own, no more
math.createUnit({
  thou: { definition: "25.4 um", aliases: ["mils"] },
  micron: { definition: "1 um", aliases: ["microns"] },
  furlong: { definition: "660 ft", aliases: ["furlongs"] },
  fathom: { definition: "6 ft", aliases: ["fathoms"] },
  nmi: { definition: "1852 m" },
  knot: { definition: "1852 m/h", aliases: ["kn", "kt", "knots"] },
  mph: { definition: "1 mi/h" },
  inHg: { definition: "3386.389 Pa" },
});

/** The unit that mathjs hands the result over in; `quantity.ts` knows it under the same name. */
const handover: Readonly<Partial<Record<QuantityKind, string>>> = {
  frequencyGHz: "GHz",
  bandwidthHz: "Hz",
  thicknessMm: "mm",
  lengthM: "m",
  distanceKm: "km",
  powerDbm: "W",
  levelDb: "dB",
  angleDeg: "deg",
  rainRateMmPerH: "mm/h",
  temperatureC: "K",
  temperatureK: "K",
  pressureHPa: "hPa",
  densityGcm3: "g/cm^3",
  densityGm3: "g/m^3",
  speedMPerS: "m/s",
  durationMin: "min",
};

const DEEPEST_NESTING = 20;
const HIGHEST_POWER = 9;

/**
 * Reads arithmetic with units, and units that the small grammar lacks, to the canonical unit of the kind.
 *
 * The result's `number` and `unit` are those of the handover, not of the text. Decibels of a reference (dBm, dBi)
 * and degrees that do not start at zero (degC, degF) have no sums and are refused.
 */
export function readArithmetic(input: string, kind: QuantityKind): Reading {
  const text = tidy(input);
  const no = (code: RefusalCode, hint: string) => refuse(code, text, kind, hint);
  if (text.length > LONGEST_TEXT) return no("too_long", `longer than ${LONGEST_TEXT} characters`);
  const unit = handover[kind];
  if (unit === undefined && kind !== "ratio") return no("forbidden", "no arithmetic here; write one number");
  try {
    const result = compute(parse(text), kind, 0);
    const number = typeof result === "number" ? result : inUnit(result, unit);
    if (typeof result === "number" && unit !== undefined) {
      return no("bare_number", `it comes to ${number} without a unit`);
    }
    if (!Number.isFinite(number)) return no("not_finite", "too large, or divided by zero");
    // mathjs converts to and fro through SI units: the last two digits of a double are its noise
    return finish(readQuantity(`${Number(number.toPrecision(14))} ${unit ?? ""}`, kind), text);
  } catch (error) {
    if (error instanceof Refused) return no(error.code, error.message);
    throw error;
  }
}

function finish(reading: Reading, text: string): Reading {
  return reading.ok ? reading : { ...reading, read: text, libraryMayRead: false };
}

/** Leaves the walk; caught in `readArithmetic`, never seen outside. */
class Refused extends Error {
  readonly code: RefusalCode;
  constructor(code: RefusalCode, message: string) {
    super(message);
    this.code = code;
  }
}

/** Spellings that mathjs takes for operators or does not know: `in` would convert, a quote would open a string. */
function parse(text: string): MathNode {
  const spelled = text
    .replace(/\bin\b/g, "inch")
    .replace(/(\d)\s*"/g, "$1 inch")
    .replace(/(\d)\s*'/g, "$1 ft")
    .replace(/µ/g, "u")
    .replace(/°/g, " deg")
    .replace(/[×·]/g, "*")
    .replace(/²/g, "^2")
    .replace(/³/g, "^3")
    .replace(/(?<![\d./^])(\d+)\s+(\d+\/\d+)/g, "($1+$2)"); // mixed numbers, which mathjs would multiply
  const stranger = /[^\w\s.+\-*/^()]/.exec(spelled)?.[0];
  if (stranger !== undefined) throw new Refused("forbidden", `${stranger} has no place in a quantity`);
  if (spelled.split("(").length - 1 > DEEPEST_NESTING) throw new Refused("forbidden", "too many parentheses");
  try {
    return math.parse(spelled);
  } catch {
    throw new Refused("unreadable", "neither a number with a unit nor a sum of such");
  }
}

type Operand = number | Unit;

function compute(node: MathNode, kind: QuantityKind, depth: number): Operand {
  if (depth > DEEPEST_NESTING * 3) throw new Refused("forbidden", "nested too deep");
  const below = (child: MathNode) => compute(child, kind, depth + 1);
  if (math.isParenthesisNode(node)) return below(node.content);
  if (math.isConstantNode(node) && typeof node.value === "number") return node.value;
  if (math.isSymbolNode(node)) return unitNamed(node.name, kind);
  if (math.isOperatorNode(node)) {
    const operands = node.args.map(below);
    if (node.implicit && typeof operands[1] === "number") {
      throw new Refused("unreadable", "write + or * before a second number, as in 3 ft + 2 in");
    }
    return operate(node.fn, operands);
  }
  if (math.isFunctionNode(node)) throw new Refused("forbidden", "functions cannot be called here");
  throw new Refused("forbidden", "only numbers, units, + - * / ^ and parentheses are read");
}

function operate(name: string, [a = 0, b]: Operand[]): Operand {
  if (b === undefined) {
    if (name === "unaryPlus") return a;
    if (name === "unaryMinus") return math.unaryMinus(a as Unit);
    throw new Refused("forbidden", "only + - * / and ^ are read");
  }
  switch (name) {
    case "add":
    case "subtract":
      return sum(name, a, b);
    case "multiply":
      return math.multiply(a as Unit, b as Unit);
    case "divide":
      return math.divide(a as Unit, b as Unit) as Operand;
    case "pow":
      if (typeof b !== "number" || !Number.isInteger(b) || Math.abs(b) > HIGHEST_POWER) {
        throw new Refused("forbidden", `powers are whole numbers up to ${HIGHEST_POWER}`);
      }
      return math.pow(a as Unit, b) as Operand;
    default:
      throw new Refused("forbidden", "only + - * / and ^ are read");
  }
}

function sum(name: "add" | "subtract", a: Operand, b: Operand): Operand {
  const alike = typeof a === "number" ? typeof b === "number" : typeof b !== "number" && a.equalBase(b);
  if (!alike) {
    throw new Refused(
      "wrong_dimension",
      "a sum needs the same kind of quantity, with its unit, on both sides",
    );
  }
  return math[name](a as Unit, b as Unit);
}

function unitNamed(name: string, kind: QuantityKind): Unit {
  if (/^dB./i.test(name))
    throw new Refused("forbidden", `${name} is a level: work it out and write one number`);
  if (!math.Unit.isValuelessUnit(name)) {
    const close = nearestUnit(name, unitOf(kind).dimension);
    const hint = close === undefined ? "" : `; did you mean ${close}?`;
    throw new Refused("unknown_unit", `${name} is no unit${hint}`);
  }
  const unit = math.unit(1, name);
  if (unit.equalBase(math.unit(1, "K")) && math.unit(0, name).toNumber("K") !== 0) {
    throw new Refused("forbidden", `${name} does not start at zero: write one number, or use K`);
  }
  return unit;
}

function inUnit(result: Unit, unit: string | undefined): number {
  if (unit === undefined) throw new Refused("wrong_dimension", "a unit remains");
  if (!result.equalBase(math.unit(1, unit))) {
    throw new Refused("wrong_dimension", `it comes to ${result.formatUnits()}, which is another quantity`);
  }
  return result.toNumber(unit);
}
