import { Composer, type Document, isScalar, type Pair, Parser, visit, type YAMLMap } from "yaml";
import { type Places, placesIn, positionsIn } from "./positions.ts";
import type { Diagnostic } from "./types.ts";

/** Groups within groups beyond this depth are no scenario; some thousands end the process inside the package. */
const DEEPEST = 40;
/** How often one anchor may be used, the uses within other anchors multiplied. */
const MOST_ALIASES = 100;
/** Longest key or name: reports print them [characters]. */
const LONGEST_NAME = 200;

export interface Reading {
  readonly faults: readonly Diagnostic[];
  /** What the text holds, every plain value as the text that was typed; undefined where YAML cannot be read. */
  readonly content?: { readonly raw: unknown; readonly places: Places };
}

/**
 * Reads one YAML document as typed: `24` and `true` stay words, so that a name may be either, and quantities are
 * read by `quantity.ts` alone. Never throws.
 */
export function readDocument(text: string): Reading {
  const at = positionsIn(text);
  const fault = (code: string, message: string, offset: number): Diagnostic => {
    return { code, message, ...at(offset) };
  };
  const tokens = [...new Parser().parse(text)];
  const deep = tooDeep(tokens);
  if (deep !== undefined) {
    return { faults: [fault("too_deep", `groups nested deeper than ${DEEPEST}`, deep)] };
  }
  // Failsafe: no number, date or yes/no is made of a text. Of the other types only "nothing" is told apart.
  const composer = new Composer({ schema: "failsafe", customTags: ["null"], resolveKnownTags: false });
  const [document, second] = [...composer.compose(tokens, true, text.length)] as Document.Parsed[];
  const syntax = document!.errors.map(({ code, message, pos }) => {
    return fault(`yaml_${code.toLowerCase()}`, inOurWords(code, message), pos[0]);
  });
  const faults = firstOfEachLine(syntax);
  if (document!.errors.some(({ code }) => code !== "DUPLICATE_KEY")) return { faults };

  for (const { code, message, pos } of document!.warnings) {
    faults.push(fault(`yaml_${code.toLowerCase()}`, `${lowered(message)}, expected plain YAML 1.2`, pos[0]));
  }
  if (document!.directives.yaml.version === "1.1") {
    faults.push(fault("yaml_version", "the file asks for YAML 1.1, expected 1.2", text.indexOf("%YAML")));
  }
  if (second) {
    faults.push(fault("yaml_multiple_docs", "a second document, expected one in a file", second.range[0]));
  }
  const keys = judgeKeys(document!);
  faults.push(...keys.faults.map(({ code, message, offset }) => fault(code, message, offset)));
  if (keys.fatal) return { faults };
  try {
    const raw: unknown = document!.toJS({ maxAliasCount: MOST_ALIASES });
    return { faults, content: { raw, places: placesIn(document!, at) } };
  } catch {
    // An alias of what stood under a refused key leads nowhere: that key is the fault then.
    if (faults.length > 0) return { faults };
    const message = `aliases that multiply to more than ${MOST_ALIASES}; write the values out`;
    return { faults: [fault("aliases", message, keys.firstAlias)] };
  }
}

type Token = ReturnType<Parser["parse"]> extends Generator<infer T> ? T : never;

/** Offset of the first group found beyond the greatest depth. */
function tooDeep(tokens: readonly Token[]): number | undefined {
  const open = tokens.map((token) => ({ token, depth: 0 }));
  for (let top = open.pop(); top; top = open.pop()) {
    const { token, depth } = top;
    if (depth > DEEPEST) return token.offset;
    if (token.type === "document" && token.value) open.push({ token: token.value, depth });
    if (!("items" in token)) continue;
    for (const { key, value } of token.items) {
      for (const child of [key, value]) if (child) open.push({ token: child, depth: depth + 1 });
    }
  }
  return undefined;
}

interface KeyFault {
  readonly code: string;
  readonly message: string;
  readonly offset: number;
}

/**
 * Keys that are no words, and aliases of nothing. Keys that cannot serve are taken out of the document, so that
 * the rest can still be judged; `fatal` where that does not help.
 */
function judgeKeys(document: Document.Parsed): { faults: KeyFault[]; fatal: boolean; firstAlias: number } {
  const faults: KeyFault[] = [];
  const refused: [YAMLMap, Pair][] = [];
  const anchors = new Set<string>();
  let fatal = false;
  let firstAlias: number | undefined;
  visit(document, {
    Node: (_, node) => {
      if ("anchor" in node && node.anchor) anchors.add(node.anchor);
    },
    Alias: (_, { source, range }) => {
      const offset = range?.[0] ?? 0;
      firstAlias ??= offset;
      if (anchors.has(source)) return;
      fatal = true;
      faults.push({ code: "aliases", message: `no anchor &${source} before this alias`, offset });
    },
    Pair: (_, pair, path) => {
      const map = path.at(-1) as YAMLMap;
      const split = splitNumber(map, pair);
      if (split !== undefined) {
        faults.push({ code: "decimal_comma", ...split });
        refused.push([map, pair]);
        return;
      }
      const node = pair.key as { range?: [number, number, number] } | null;
      const message = isScalar(node) ? faultOfKey(node.value) : "a key that is no plain word";
      if (message === undefined) return;
      faults.push({ code: "bad_key", message, offset: node?.range?.[0] ?? map.range?.[0] ?? 0 });
      refused.push([map, pair]);
    },
  });
  for (const [map, pair] of refused) map.items.splice(map.items.indexOf(pair), 1);
  return { faults, fatal, firstAlias: firstAlias ?? 0 };
}

/**
 * A number with a decimal comma between braces, which YAML has cut into a value and a key: `power: 2` and `5 W`. The
 * value is mended, so that it is no second fault.
 */
function splitNumber(map: YAMLMap, { key, value }: Pair): Omit<KeyFault, "code"> | undefined {
  const before = map.items[map.items.findIndex((pair) => pair.key === key) - 1]?.value;
  const tail = isScalar(key) ? String(key.value) : "";
  const isAlone = value === null || (isScalar(value) && value.value === null);
  if (!map.flow || !isAlone || !/^\d/.test(tail) || !isScalar(before)) return undefined;
  const head = String(before.value);
  if (!/^[+-]?\d+$/.test(head)) return undefined;
  const meant = `${head}.${tail}`;
  const whole = /^\d{3}(?!\d)/.test(tail) ? `, or ${head}${tail} if it parts thousands` : "";
  const message =
    `read "${head},${tail}", where the comma ends the item, expected a number with a point ` +
    `(a decimal comma? write ${meant}${whole})`;
  before.value = meant;
  return { message, offset: before.range?.[0] ?? 0 };
}

function faultOfKey(key: unknown): string | undefined {
  const name = typeof key === "string" ? key : "";
  if (name.trim() === "") return "a key without a name";
  if (name === "<<") return "merge keys are not read; write the values out";
  if (name === "__proto__") return "__proto__ cannot be a name here; choose another";
  if (name.length > LONGEST_NAME) return `a name longer than ${LONGEST_NAME} characters`;
  return /\p{Cc}/u.test(name) ? "a name with a line break or control character in it" : undefined;
}

const words: Readonly<Record<string, string>> = {
  BAD_INDENT: "wrong indentation, or a bracket that is not closed",
  BAD_SCALAR_START: "a text that begins with this sign must stand in quotes",
  BLOCK_AS_IMPLICIT_KEY: "a second colon, or a line indented too far; a text with a colon in it needs quotes",
  DUPLICATE_KEY: "the same key twice in one group",
  KEY_OVER_1024_CHARS: "a key longer than 1024 characters",
  MULTILINE_IMPLICIT_KEY: "a key over more than one line; is a colon missing?",
  TAB_AS_INDENT: "a tab at the start of a line; indent by spaces",
  UNEXPECTED_TOKEN: "does not belong here; check colons, brackets and indentation",
};

function inOurWords(code: string, message: string): string {
  return words[code] ?? lowered(message);
}

function lowered(message: string): string {
  return message.slice(0, 1).toLowerCase() + message.slice(1).replace("tag:yaml.org,2002:", "!!");
}

/** One slip makes the parser stumble more than once; what it says first is what helps. */
function firstOfEachLine(faults: readonly Diagnostic[]): Diagnostic[] {
  const seen = new Set<number>();
  return faults.filter(({ line }) => !seen.has(line) && seen.add(line));
}
