import { momentsOf, type Scatter, type ScatterPart } from "../numeric/scatter.ts";
import { type FieldOptions, judgedQuantity } from "./judgedQuantity.ts";
import type { FaultPath } from "./positions.ts";
import { kinds, type QuantityKind } from "./quantity.ts";
import { isGroup, type Raw } from "./raw.ts";
import type { Uncertain } from "./types.ts";
import { didYouMean, instead, unknownKey } from "./wording.ts";

/**
 * Reads an uncertain quantity: `3 W +/- 0.5 dB`, or a group that names how it scatters.
 *
 *     { normal: 3 W, sigma: 0.5 dB }           { flat: [0.2 dB, 0.6 dB] }
 *     { lognormal: 16 mm/h, factor: 1.6 }      { exponential: 0.3 dB }
 *     { mixture: [{ share: 96 %, of: 3 W +/- 0.5 dB }, { share: 4 %, of: { flat: [10 mW, 100 mW] } }] }
 */

export interface ScatteringField extends FieldOptions {
  /** True where what reads the field knows no distribution but the normal one. */
  readonly normalOnly?: boolean;
}

/** What was read, or what is wrong, with the path from the field on. */
export interface Scattering {
  readonly read?: Uncertain | undefined;
  readonly faults: readonly ScatteringFault[];
}

export interface ScatteringFault {
  readonly message: string;
  readonly path: FaultPath;
  /** Where the fault is the key itself. */
  readonly code?: "unknown_key" | undefined;
}

/** The keys of each form, the one that names it first. */
const forms = {
  normal: ["normal", "sigma"],
  lognormal: ["lognormal", "factor"],
  flat: ["flat"],
  exponential: ["exponential"],
  mixture: ["mixture"],
} as const;
type Form = keyof typeof forms;
const formNames = Object.keys(forms) as Form[];
const allKeys: readonly string[] = Object.values(forms).flat();

/** Kinds whose zero is a choice: nothing can be said of them by factors. */
const withoutTrueZero: readonly QuantityKind[] = ["powerDbm", "gainDbi", "temperatureC"];

/** A factor of five each way is more than any word for a quantity leaves open (common practice, no source). */
const LARGEST_FACTOR = 5;
/** Shares typed to two decimals still make a whole [%]. */
const SHARE_ROUNDING_PERCENT = 0.05;
/** An anchor may be used within itself, which would have no end. */
const DEEPEST_MIXTURE = 4;
const MOST_PARTS = 50;

/** The unit in which a quantity of a kind has its standard deviation. */
function kindOfSigma(kind: QuantityKind): QuantityKind {
  if (kind === "temperatureC") return "temperatureK";
  return kind === "powerDbm" || kind === "gainDbi" ? "levelDb" : kind;
}

/** Reads what stands in an uncertain field. */
export function readScattering(input: unknown, kind: QuantityKind, field: ScatteringField): Scattering {
  if (isGroup(input)) return readGroup(input, kind, field);
  const read = judgedQuantity(input, kind, field, true);
  if (typeof read === "string") return { faults: [{ message: read, path: [] }] };
  return { read: { value: read.value, sigma: read.sigma }, faults: [] };
}

function readGroup(raw: Raw, kind: QuantityKind, field: ScatteringField): Scattering {
  const faults: ScatteringFault[] = [];
  const desk: Desk = {
    kind,
    field,
    parts: 0,
    fault: (message, path, code) => {
      faults.push({ message, path, code });
      return undefined;
    },
  };
  const read = readForm(raw, [], desk, 0);
  return faults.length > 0 ? { faults } : { read, faults };
}

/** What one field is read with. */
interface Desk {
  readonly kind: QuantityKind;
  readonly field: ScatteringField;
  readonly fault: (message: string, path: FaultPath, code?: "unknown_key") => undefined;
  /** Parts of mixtures read so far. */
  parts: number;
}

function readForm(raw: Raw, path: FaultPath, desk: Desk, depth: number): Uncertain | undefined {
  const form = formOf(raw, path, desk);
  if (form === undefined) return undefined;
  const { kind, field, fault } = desk;
  if (field.normalOnly && form !== "normal") {
    return fault(`${form} is not read here, expected +/- or normal and sigma`, [...path, form]);
  }
  if ((form === "lognormal" || form === "exponential") && withoutTrueZero.includes(kind)) {
    const why = `${field.about} in ${kinds[kind].usual[0]} may be zero or negative`;
    return fault(`${form} is not read here, expected normal and sigma: ${why}`, [...path, form]);
  }
  switch (form) {
    case "normal":
      return readNormal(raw, path, desk);
    case "lognormal":
      return readLognormal(raw, path, desk);
    case "flat":
      return readFlat(raw["flat"], [...path, "flat"], desk);
    case "exponential": {
      const mean = readPositive(raw, "exponential", path, desk);
      return mean === undefined ? undefined : scattered(mean, { kind: "exponential", mean });
    }
    case "mixture":
      return readMixture(raw["mixture"], [...path, "mixture"], desk, depth);
  }
}

/** Which form a group has; keys that do not belong to it are told. */
function formOf(raw: Raw, path: FaultPath, { kind, fault }: Desk): Form | undefined {
  const keys = Object.keys(raw);
  const [form, ...more] = formNames.filter((name) => keys.includes(name));
  if (form === undefined) {
    const slips = keys.filter((key) => !allKeys.includes(key) && didYouMean(key, allKeys) !== "");
    for (const key of slips) fault(unknownKey(key, allKeys), [...path, key], "unknown_key");
    if (slips.length > 0) return undefined;
    const expected = `${kinds[kind].expected}, or a distribution: ${formNames.join(", ")}`;
    return fault(instead(raw, expected), path);
  }
  if (more.length > 0) {
    const found =
      more.length > 1 ? `more than one of ${[form, ...more].join(", ")}` : `both ${form} and ${more}`;
    return fault(`${found}; write one`, path);
  }
  const known: readonly string[] = forms[form];
  for (const key of keys.filter((key) => !known.includes(key))) {
    const owner = formNames.find((name) => (forms[name] as readonly string[]).includes(key));
    const message = owner
      ? `${key} beside ${form}, expected it beside ${owner} alone`
      : unknownKey(key, known);
    fault(message, [...path, key], "unknown_key");
  }
  return form;
}

function readNormal(raw: Raw, path: FaultPath, desk: Desk): Uncertain | undefined {
  const { kind, field } = desk;
  const [low, high] = field.range;
  const value = readOne(raw["normal"], [...path, "normal"], desk);
  const sigma = readOne(raw["sigma"], [...path, "sigma"], {
    ...desk,
    kind: kindOfSigma(kind),
    field: { about: "one standard deviation", range: [0, high - low] },
  });
  if (value === undefined || sigma === undefined) return undefined;
  return scattered(value, { kind: "normal", sigma });
}

function readLognormal(raw: Raw, path: FaultPath, desk: Desk): Uncertain | undefined {
  const median = readPositive(raw, "lognormal", path, desk);
  const factor = readOne(raw["factor"], [...path, "factor"], {
    ...desk,
    kind: "ratio",
    field: { about: "a factor by which one standard deviation multiplies", range: [1.001, LARGEST_FACTOR] },
  });
  if (median === undefined || factor === undefined) return undefined;
  return scattered(median, { kind: "lognormal", factor });
}

function readFlat(raw: unknown, path: FaultPath, desk: Desk): Uncertain | undefined {
  const expected = "a low end and then a higher one";
  if (!Array.isArray(raw)) return desk.fault(instead(raw, `a list of two, ${expected}`), path);
  if (raw.length !== 2) return desk.fault(`a list of ${raw.length}, expected two, ${expected}`, path);
  const low = readOne(raw[0], [...path, 0], desk);
  const high = readOne(raw[1], [...path, 1], desk);
  if (low === undefined || high === undefined) return undefined;
  if (low < high) return scattered(low, { kind: "flat", low, high });
  return desk.fault(`${low === high ? "two equal ends" : "the high end first"}, expected ${expected}`, path);
}

function readMixture(raw: unknown, path: FaultPath, desk: Desk, depth: number): Uncertain | undefined {
  const expected = "each with its share and what it is of: [{ share: 4 %, of: ... }]";
  if (!Array.isArray(raw)) return desk.fault(instead(raw, `a list of parts, ${expected}`), path);
  if (raw.length === 0) return desk.fault(`an empty list, expected one part or more, ${expected}`, path);
  if (depth >= DEEPEST_MIXTURE) {
    return desk.fault(`mixtures within mixtures, expected at most ${DEEPEST_MIXTURE} deep`, path);
  }
  desk.parts += raw.length;
  if (desk.parts > MOST_PARTS) return desk.fault(`more than ${MOST_PARTS} parts, expected fewer`, path);
  const parts: (ScatterPart | undefined)[] = [];
  for (const [i, part] of raw.entries()) parts.push(readPart(part, [...path, i], desk, depth));
  const whole = parts.filter((part) => part !== undefined);
  if (whole.length < raw.length) return undefined;
  const percent = whole.reduce((sum, { share }) => sum + share, 0);
  if (Math.abs(percent - 100) > SHARE_ROUNDING_PERCENT) {
    return desk.fault(`the shares add up to ${Number(percent.toPrecision(6))} %, expected 100 %`, path);
  }
  const shared = whole.map((part) => ({ ...part, share: part.share / percent }));
  return scattered(whole[0]!.value, { kind: "mixture", parts: shared });
}

/** One part of a mixture, its share still in percent. */
function readPart(raw: unknown, path: FaultPath, desk: Desk, depth: number): ScatterPart | undefined {
  const keys = ["share", "of"];
  if (!isGroup(raw)) return desk.fault(instead(raw, "a part of the mixture: share and of"), path);
  for (const key of Object.keys(raw).filter((key) => !keys.includes(key))) {
    desk.fault(unknownKey(key, keys), [...path, key], "unknown_key");
  }
  const share = readOne(raw["share"], [...path, "share"], {
    ...desk,
    kind: "percent",
    field: { about: "a share of the mixture", range: [0, 100] },
  });
  const of = readNested(raw["of"], [...path, "of"], desk, depth);
  if (share === undefined || of === undefined) return undefined;
  const { value, sigma } = of;
  const plain: Scatter | undefined = sigma === undefined ? undefined : { kind: "normal", sigma };
  return { share, value, scatter: of.scatter ?? plain };
}

function readNested(raw: unknown, path: FaultPath, desk: Desk, depth: number): Uncertain | undefined {
  if (isGroup(raw)) return readForm(raw, path, desk, depth + 1);
  const read = judgedQuantity(raw, desk.kind, desk.field, true);
  return typeof read === "string" ? desk.fault(read, path) : { value: read.value, sigma: read.sigma };
}

/** One number in its canonical unit, without a spread. */
function readOne(raw: unknown, path: FaultPath, desk: Desk): number | undefined {
  if (raw === undefined) {
    return desk.fault(instead(raw, `${desk.field.about}: ${kinds[desk.kind].expected}`), path);
  }
  const read = judgedQuantity(raw, desk.kind, desk.field, false);
  return typeof read === "string" ? desk.fault(read, path) : read.value;
}

function readPositive(
  raw: Raw,
  form: "lognormal" | "exponential",
  path: FaultPath,
  desk: Desk,
): number | undefined {
  const at = [...path, form];
  const value = readOne(raw[form], at, desk);
  if (value === undefined || value > 0) return value;
  return desk.fault(instead(raw[form], `${desk.field.about} above 0 for ${form}`), at);
}

/** What the budget takes of a scatter: its mean, for a log-normal its median, and its standard deviation. */
function scattered(value: number, scatter: Scatter): Uncertain {
  const { mean, sigma } = momentsOf(value, scatter);
  return { value: scatter.kind === "lognormal" ? value : mean, sigma, scatter };
}
