import { readFileSync, statSync } from "node:fs";
import { readDocument } from "./document.ts";
import { faultsOf } from "./issues.ts";
import { danglingNames } from "./references.ts";
import { scenarioSchema } from "./schema.ts";
import type { Diagnostic, Scenario } from "./types.ts";

/** A scenario is a page of text; what is longer than this is something else [bytes, characters]. */
const LARGEST = 100_000;

export type Loaded =
  | { readonly scenario: Scenario; readonly diagnostics?: undefined }
  | { readonly scenario?: undefined; readonly diagnostics: readonly Diagnostic[] };

/**
 * Reads a scenario and checks all of it.
 *
 * @param pathOrText  path of a YAML file, or the YAML itself (anything with a line break or ": " in it, unless it
 *                    starts as a path does: / ./ ../)
 * @returns the scenario in canonical units, or every fault of the file with its line and column (from 1)
 * @throws nothing for a bad file: an unreadable one is a diagnostic at line 1
 */
export async function loadScenario(pathOrText: string): Promise<Loaded> {
  const isText = !/^\.{0,2}\//.test(pathOrText) && (/\n|:\s/.test(pathOrText) || pathOrText.trim() === "");
  const source = isText ? { text: pathOrText } : readText(pathOrText);
  const diagnostics = source.text === undefined ? [source.fault] : await judge(source.text);
  return Array.isArray(diagnostics) ? { diagnostics: inOrder(diagnostics) } : { scenario: diagnostics };
}

function atStart(code: string, message: string): Diagnostic {
  return { code, message, line: 1, column: 1 };
}

function readText(path: string): { text: string } | { text?: undefined; fault: Diagnostic } {
  const fault = (code: string, message: string) => ({ fault: atStart(code, message) });
  try {
    const status = statSync(path);
    if (status.isDirectory()) return fault("not_a_file", "is a folder, expected a scenario file");
    if (!status.isFile()) return fault("not_a_file", "is no plain file, expected a scenario file");
    if (status.size > LARGEST) return fault("too_large", tooLarge(status.size));
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

function tooLarge(length: number): string {
  return `is ${length} characters long, expected a scenario of at most ${LARGEST}`;
}

async function judge(text: string): Promise<Scenario | Diagnostic[]> {
  if (text.length > LARGEST) return [atStart("too_large", tooLarge(text.length))];
  const plain = text.replace(/^\ufeff/, "").replace(/\r\n?/g, "\n");
  const { faults, content } = readDocument(plain);
  if (content === undefined) return [...faults];
  const { raw, places } = content;
  if (raw === null && faults.length === 0) {
    return [atStart("empty", "the file is empty; `oilskin new FILE` writes a starter")];
  }
  const parsed = await scenarioSchema.safeParseAsync(raw);
  const found = [...(parsed.success ? [] : parsed.error.issues.flatMap(faultsOf)), ...danglingNames(raw)];
  if (parsed.success && faults.length + found.length === 0) return parsed.data;
  const placed = found.map(({ code, message, path }) => {
    const place = code === "unknown_key" ? places.ofKey : places.ofValue;
    return { code, message, ...place(path) };
  });
  return [...faults, ...placed];
}

/** By place; a fault that an alias shows twice is told once, and nothing that a terminal would obey is kept. */
function inOrder(diagnostics: readonly Diagnostic[]): Diagnostic[] {
  const once = new Map(
    diagnostics.map((one) => {
      const message = one.message.replace(
        /[\p{Cc}\p{Cf}]/gu,
        (c) => `\\u{${c.codePointAt(0)!.toString(16)}}`,
      );
      return [JSON.stringify([one.line, one.column, message]), { ...one, message }] as const;
    }),
  );
  return [...once.values()].sort((a, b) => a.line - b.line || a.column - b.column);
}
