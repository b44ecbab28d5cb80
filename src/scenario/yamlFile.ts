import { readFileSync, statSync } from "node:fs";
import { isAbsolute, join } from "node:path";
import type * as z from "zod";
import { readDocument } from "./document.ts";
import { type Fault, faultsOf } from "./issues.ts";
import { ARITHMETIC_WANTED, loadArithmetic } from "./judgedQuantity.ts";
import type { Places } from "./positions.ts";
import type { Diagnostic } from "./types.ts";
import { visible } from "./wording.ts";

/** A file that people type is a page of text; what is longer than this is something else [bytes, characters]. */
const LARGEST = 100_000;

export type FileText =
  | { readonly text: string; readonly fault?: undefined }
  | { readonly text?: undefined; readonly fault: Diagnostic };

function atStart(code: string, message: string): Diagnostic {
  return { code, message, line: 1, column: 1 };
}

/**
 * The text of a file, or why there is none: it never throws.
 *
 * @param noun  what the file should be, such as "scenario"
 */
export function readText(path: string, noun: string): FileText {
  const fault = (code: string, message: string) => ({ fault: atStart(code, message) });
  try {
    const status = statSync(path);
    if (status.isDirectory()) return fault("not_a_file", `is a folder, expected a ${noun} file`);
    if (!status.isFile()) return fault("not_a_file", `is no plain file, expected a ${noun} file`);
    if (status.size > LARGEST) return fault("too_large", tooLarge(status.size, noun));
    const bytes = readFileSync(path);
    if (bytes.includes(0)) return fault("not_text", "is a binary file, expected YAML in UTF-8");
    return { text: new TextDecoder("utf-8", { fatal: true }).decode(bytes) };
  } catch (error) {
    const { code = "" } = error as NodeJS.ErrnoException;
    if (code === "ENOENT" || code === "ENOTDIR") return fault("no_file", "no such file");
    if (code === "EACCES" || code === "EPERM") {
      return fault("no_permission", "no permission to read the file");
    }
    if (code === "ERR_ENCODING_INVALID_ENCODED_DATA") {
      return fault("not_text", "is no text in UTF-8, expected YAML in UTF-8");
    }
    return fault("unreadable", `cannot be read (${code || (error as Error).message})`);
  }
}

function tooLarge(length: number, noun: string): string {
  return `is ${length} characters long, expected a ${noun} of at most ${LARGEST}`;
}

/** A path that a file names, which starts from the folder of that file. */
export function fromFolder(folder: string, path: string): string {
  return isAbsolute(path) ? path : join(folder, path);
}

/** A reader compiled for each group pays where many values come, not for one file. */
const ONCE = { jitless: true };

export interface YamlForm<T> {
  readonly schema: z.ZodType<T>;
  /** What the file should be, such as "scenario". */
  readonly noun: string;
  /** How to get started from an empty one. */
  readonly starter: string;
  /** Faults beyond the schema, and the content with what other files hold put in. */
  readonly resolve: (raw: unknown) => Promise<{ readonly raw: unknown; readonly faults: readonly Fault[] }>;
}

export type Judged<T> =
  | {
      readonly value: T;
      /** The document as typed. */
      readonly typed: unknown;
      readonly places: Places;
      readonly diagnostics?: undefined;
    }
  | {
      readonly value?: undefined;
      readonly typed?: undefined;
      readonly places?: undefined;
      readonly diagnostics: readonly Diagnostic[];
    };

/** Reads the text of a YAML file by its schema: the value, or every fault with its place. */
export async function judgeYaml<T>(text: string, form: YamlForm<T>): Promise<Judged<T>> {
  const { schema, noun, starter, resolve } = form;
  if (text.length > LARGEST) return { diagnostics: [atStart("too_large", tooLarge(text.length, noun))] };
  const plain = text.replace(/^\ufeff/, "").replace(/\r\n?/g, "\n");
  const { faults, content } = readDocument(plain);
  if (content === undefined) return { diagnostics: inOrder(faults) };
  const { places } = content;
  if (content.raw === null && faults.length === 0) {
    return { diagnostics: [atStart("empty", `the file is empty; ${starter}`)] };
  }
  const { raw, faults: more } = await resolve(content.raw);
  let parsed = schema.safeParse(raw, ONCE);
  if (parsed.error?.issues.some(({ message }) => message === ARITHMETIC_WANTED)) {
    await loadArithmetic();
    parsed = schema.safeParse(raw, ONCE);
  }
  const issues = parsed.success ? [] : parsed.error.issues.flatMap((issue) => faultsOf(issue, schema));
  const found = [...issues, ...more];
  if (parsed.success && faults.length + found.length === 0) {
    return { value: parsed.data, typed: content.raw, places };
  }
  const placed = found.map(({ code, message, path }) => {
    const place = code === "unknown_key" ? places.ofKey : places.ofValue;
    return { code, message, ...place(path) };
  });
  return { diagnostics: inOrder([...faults, ...placed]) };
}

/** By place; a fault that an alias shows twice is told once, and nothing that a terminal would obey is kept. */
function inOrder(diagnostics: readonly Diagnostic[]): Diagnostic[] {
  const once = new Map(
    diagnostics.map((one) => {
      const message = visible(one.message);
      return [JSON.stringify([one.line, one.column, message]), { ...one, message }] as const;
    }),
  );
  return [...once.values()].sort((a, b) => a.line - b.line || a.column - b.column);
}
