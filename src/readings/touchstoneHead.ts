import { TouchstoneFault } from "./touchstoneFault.ts";

/** A word of the network data, with its line and how many words that line holds. */
export interface Token {
  readonly text: string;
  readonly line: number;
  readonly place: number;
  readonly wordsInLine: number;
}

export interface Options {
  readonly unitHz: number;
  readonly parameter: "S" | "Y" | "Z";
  readonly format: "MA" | "DB" | "RI";
  readonly referenceOhm: number;
}

/** All that a file says of its data, and the data as words. */
export interface TouchstoneParts extends Options {
  readonly version: 1 | 2;
  readonly order: "21_12" | "12_21";
  readonly matrix: "FULL" | "LOWER" | "UPPER";
  readonly announced: { readonly count: number; readonly line: number } | undefined;
  readonly tokens: readonly Token[];
  readonly lineCount: number;
}

const UNITS: Readonly<Record<string, number>> = { HZ: 1, KHZ: 1e3, MHZ: 1e6, GHZ: 1e9 };

type Section = "head" | "information" | "network" | "noise" | "end";

/** What the lines read so far have said. */
interface Draft {
  readonly ports: 1 | 2;
  section: Section;
  version: 1 | 2;
  options?: Options;
  order?: "21_12" | "12_21";
  matrix: "FULL" | "LOWER" | "UPPER";
  announced: { count: number; line: number } | undefined;
  references?: number[];
  readonly tokens: Token[];
}

/**
 * Takes a Touchstone file apart: options, keywords, and the words of its network data.
 *
 * @throws TouchstoneFault on a line that cannot be read
 */
export function touchstoneParts(text: string, ports: 1 | 2): TouchstoneParts {
  const lines = text.replace(/^\uFEFF/, "").split(/\r\n|\r|\n/);
  const draft: Draft = {
    ports,
    section: "head",
    version: 1,
    matrix: "FULL",
    announced: undefined,
    tokens: [],
  };
  lines.forEach((raw, i) => {
    const content = raw.replace(/!.*/, "").trim();
    if (content !== "" && draft.section !== "end") readLine(draft, content, i + 1);
  });

  const { options, references, order, version, matrix, announced, tokens } = draft;
  const lineCount = lines.length;
  if (options === undefined) throw new TouchstoneFault(lineCount, "no option line (# ...)");
  if (version === 2 && ports === 2 && order === undefined) {
    throw new TouchstoneFault(lineCount, "no [Two-Port Data Order]");
  }
  if (references !== undefined && references.length !== ports) {
    throw new TouchstoneFault(lineCount, `[Reference] holds ${references.length} values for ${ports} ports`);
  }
  return {
    ...options,
    referenceOhm: references?.[0] ?? options.referenceOhm,
    version,
    order: order ?? "21_12",
    matrix,
    announced,
    tokens,
    lineCount,
  };
}

function readLine(draft: Draft, content: string, line: number): void {
  const marked = /^\[([^\]]*)\]\s*(.*)$/.exec(content);
  const name = marked === null ? undefined : (marked[1] ?? "").trim().toUpperCase();
  if (draft.section === "information") {
    if (name === "END INFORMATION") draft.section = "head";
  } else if (name !== undefined) {
    if (draft.version === 1 && name !== "VERSION") {
      throw new TouchstoneFault(line, `[${name}] needs [Version] 2.0 before it`);
    }
    readKeyword(draft, name, marked?.[2]?.trim() ?? "", line);
  } else if (content.startsWith("#")) {
    draft.options ??= readOptions(content.slice(1), line); // later option lines have no meaning
  } else if (draft.section !== "noise") {
    readData(draft, wordsOf(content), line);
  }
}

function readData(draft: Draft, words: readonly string[], line: number): void {
  if (draft.options === undefined) throw new TouchstoneFault(line, "data before the option line (# ...)");
  if (draft.version === 1 || draft.section === "network") {
    words.forEach((text, place) => {
      draft.tokens.push({ text, line, place, wordsInLine: words.length });
    });
    return;
  }
  const { references, ports } = draft;
  if (references === undefined || references.length >= ports) {
    throw new TouchstoneFault(line, "data before [Network Data]");
  }
  references.push(...words.map((word) => positive(word, line)));
}

function readKeyword(draft: Draft, name: string, value: string, line: number): void {
  switch (name) {
    case "VERSION":
      if (!/^2\.[01]$/.test(value)) throw new TouchstoneFault(line, `version ${value} is not known`);
      draft.version = 2;
      break;
    case "NUMBER OF PORTS":
      if (Number(value) !== draft.ports) {
        throw new TouchstoneFault(line, `${value} ports, but the file is read as one of ${draft.ports}`);
      }
      break;
    case "TWO-PORT DATA ORDER":
    case "TWO-PORT ORDER":
      draft.order = oneOf(line, name, value, ["21_12", "12_21"]);
      break;
    case "MATRIX FORMAT":
      draft.matrix = oneOf(line, name, value.toUpperCase(), ["FULL", "LOWER", "UPPER"]);
      break;
    case "NUMBER OF FREQUENCIES":
      draft.announced = { count: numberOf(value, line), line };
      break;
    case "REFERENCE":
      draft.references = wordsOf(value).map((word) => positive(word, line));
      break;
    case "BEGIN INFORMATION":
      draft.section = "information";
      break;
    case "NETWORK DATA":
      draft.section = "network";
      break;
    case "NOISE DATA":
      draft.section = "noise";
      break;
    case "END":
      draft.section = "end";
      break;
    case "NUMBER OF NOISE FREQUENCIES":
      break;
    case "MIXED-MODE ORDER":
      throw new TouchstoneFault(line, "mixed-mode parameters are not read");
    default:
      throw new TouchstoneFault(line, `keyword [${name}] is not known`);
  }
}

/** `# <unit> <parameter> <format> R <ohm>` in any order; missing items are GHz, S, MA and 50. */
function readOptions(text: string, line: number): Options {
  let unitHz = 1e9;
  let parameter: Options["parameter"] = "S";
  let format: Options["format"] = "MA";
  let referenceOhm = 50;
  const words = wordsOf(text.toUpperCase());
  for (let i = 0; i < words.length; i++) {
    const word = words[i]!;
    if (UNITS[word] !== undefined) unitHz = UNITS[word];
    else if (word === "S" || word === "Y" || word === "Z") parameter = word;
    else if (word === "MA" || word === "DB" || word === "RI") format = word;
    else if (word === "R") referenceOhm = positive(words[++i] ?? "", line);
    else if (word === "G" || word === "H") {
      throw new TouchstoneFault(line, `${word} parameters are not read: export S parameters`);
    } else throw new TouchstoneFault(line, `the option line holds ${word}, which has no meaning there`);
  }
  return { unitHz, parameter, format, referenceOhm };
}

/** A finite decimal number. */
export function numberOf(text: string, line: number): number {
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(text)) {
    throw new TouchstoneFault(line, `${text === "" ? "nothing" : text} stands where a number must stand`);
  }
  return Number(text);
}

function positive(text: string, line: number): number {
  const value = numberOf(text, line);
  if (value <= 0) throw new TouchstoneFault(line, `a reference resistance must be above 0, got ${text}`);
  return value;
}

function oneOf<Word extends string>(line: number, name: string, value: string, words: readonly Word[]): Word {
  const found = words.find((word) => word === value);
  if (found === undefined) throw new TouchstoneFault(line, `[${name}] must be one of ${words.join(", ")}`);
  return found;
}

function wordsOf(text: string): string[] {
  return text.split(/\s+/).filter((word) => word !== "");
}
