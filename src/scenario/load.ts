import { readFileSync, statSync } from "node:fs";
import { LineCounter, parseDocument } from "yaml";
import type { z } from "zod";
import { nearest } from "./nearest.ts";
import { at, positionOf, positionOfKey } from "./positions.ts";
import { danglingNames, type Fault } from "./references.ts";
import { scenarioSchema } from "./schema.ts";
import type { Diagnostic, Scenario } from "./types.ts";

/** A scenario is a page of text; a file beyond this size is something else [bytes]. */
const LARGEST_FILE = 2_000_000;

export type Loaded =
  | { readonly scenario: Scenario; readonly diagnostics?: undefined }
  | { readonly scenario?: undefined; readonly diagnostics: readonly Diagnostic[] };

/**
 * Reads a scenario and checks all of it.
 *
 * @param pathOrText  path of a YAML file, or the YAML itself (anything with a line break or ": " in it)
 * @returns the scenario in canonical units, or every fault of the file with its line and column (from 1)
 * @throws nothing for a bad file: an unreadable one is a diagnostic at line 1
 */
export async function loadScenario(pathOrText: string): Promise<Loaded> {
  const isText = /\n|:\s/.test(pathOrText) || pathOrText.trim() === "";
  const source = isText ? { text: pathOrText } : readText(pathOrText);
  if (source.text === undefined) return { diagnostics: [source.fault] };
  return parseScenario(source.text);
}

function readText(path: string): { text: string } | { text?: undefined; fault: Diagnostic } {
  const fault = (code: string, message: string) => ({ fault: { code, message, line: 1, column: 1 } });
  try {
    const status = statSync(path);
    if (status.isDirectory()) return fault("not_a_file", "is a folder; expected a scenario file");
    if (!status.isFile()) return fault("not_a_file", "is no plain file; expected a scenario file");
    if (status.size > LARGEST_FILE) {
      return fault("too_large", `holds ${status.size} bytes; a scenario holds at most ${LARGEST_FILE}`);
    }
    const bytes = readFileSync(path);
    if (bytes.includes(0)) return fault("not_text", "is a binary file; expected YAML text");
    return { text: new TextDecoder("utf-8", { fatal: true }).decode(bytes) };
  } catch (error) {
    const { code = "" } = error as NodeJS.ErrnoException;
    if (code === "ENOENT" || code === "ENOTDIR") return fault("no_file", "no such file");
    if (code === "EACCES" || code === "EPERM")
      return fault("no_permission", "no permission to read the file");
    if (code === "ERR_ENCODING_INVALID_ENCODED_DATA") {
      return fault("not_text", "is no UTF-8 text; expected YAML in UTF-8");
    }
    return fault("unreadable", `cannot be read (${code || (error as Error).message})`);
  }
}

async function parseScenario(text: string): Promise<Loaded> {
  const lines = new LineCounter();
  const document = parseDocument(text, { lineCounter: lines, prettyErrors: false, uniqueKeys: true });
  if (document.errors.length > 0) {
    return {
      diagnostics: document.errors.map(({ code, message, pos }) => ({
        code: `yaml_${code.toLowerCase()}`,
        message: code === "DUPLICATE_KEY" ? "the same key twice in one group" : message,
        ...at(lines, pos[0]),
      })),
    };
  }
  if (document.contents === null) {
    return {
      diagnostics: [
        {
          code: "empty",
          message: "the file is empty; `oilskin new FILE` writes a starter",
          line: 1,
          column: 1,
        },
      ],
    };
  }
  let raw: unknown;
  try {
    raw = document.toJS({ maxAliasCount: 100 });
  } catch (error) {
    const message = `anchors expand without bound (${(error as Error).message}); write the values out`;
    return { diagnostics: [{ code: "aliases", message, line: 1, column: 1 }] };
  }

  const parsed = await scenarioSchema.safeParseAsync(raw);
  const faults = [...(parsed.success ? [] : parsed.error.issues.flatMap(faultsOf)), ...danglingNames(raw)];
  if (parsed.success && faults.length === 0) return { scenario: parsed.data };
  const diagnostics = faults.map(({ code, message, path }) => ({
    code,
    message,
    ...(code === "unknown_key" ? positionOfKey : positionOf)(document, lines, path),
  }));
  return { diagnostics: diagnostics.sort((a, b) => a.line - b.line || a.column - b.column) };
}

/** A schema's issue in our words; one unknown key, one fault. */
function faultsOf(issue: z.core.$ZodIssue): Fault[] {
  const { path } = issue;
  if (issue.code === "unrecognized_keys") {
    const known = keysAt(scenarioSchema, path);
    return issue.keys.map((key) => {
      const meant = nearest(key, known);
      const hint = meant === undefined ? "" : ` (did you mean ${meant}?)`;
      return {
        code: "unknown_key",
        message: `unknown key "${key}"; expected ${known.join(", ")}${hint}`,
        path: [...path, key],
      };
    });
  }
  if (issue.code === "invalid_union") {
    const inner = issue.errors.flat()[0];
    return [
      {
        code: "bad_value",
        message: issue.message === "Invalid input" && inner ? inner.message : issue.message,
        path,
      },
    ];
  }
  const missing = issue.message.startsWith("missing;");
  const name = String(path.at(-1) ?? "");
  return [
    {
      code: missing ? "missing_key" : "bad_value",
      message: missing ? issue.message.replace("missing;", `missing key "${name}";`) : issue.message,
      path,
    },
  ];
}

/** The keys that the group at a path may have: a walk through the schema along the path. */
function keysAt(schema: z.core.$ZodType, path: readonly PropertyKey[]): string[] {
  let node: z.core.$ZodTypes = schema as z.core.$ZodTypes;
  const rest = [...path];
  for (;;) {
    const { def } = node._zod;
    if (def.type === "pipe") node = def.in as z.core.$ZodTypes;
    else if (def.type === "optional") node = def.innerType as z.core.$ZodTypes;
    else if (def.type === "record") {
      rest.shift();
      node = def.valueType as z.core.$ZodTypes;
    } else if (def.type === "array") {
      rest.shift();
      node = def.element as z.core.$ZodTypes;
    } else if (def.type === "object") {
      if (rest.length === 0) return Object.keys(def.shape);
      node = def.shape[String(rest.shift())] as z.core.$ZodTypes;
    } else return [];
  }
}
