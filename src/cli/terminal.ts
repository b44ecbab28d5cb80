import { styleText } from "node:util";
import type { Diagnostic, Meaning, Paint } from "../index.ts";

const styles = {
  strong: "bold",
  quiet: "dim",
  good: "green",
  doubtful: "yellow",
  bad: "red",
} as const satisfies Record<Meaning, string>;

/** Colours for a terminal; none where NO_COLOR is set or the output goes elsewhere. */
export function paintFor(stream: NodeJS.WriteStream): Paint {
  const colour = stream.isTTY && !process.env["NO_COLOR"] && process.env["TERM"] !== "dumb";
  return colour
    ? (meaning, text) => styleText(styles[meaning], text, { validateStream: false })
    : (_, text) => text;
}

/** Something that the user can mend: printed without a stack, exit status 2. */
export class UserError extends Error {}

export function print(text: string): void {
  process.stdout.write(text);
}

/** All faults of a file, each with its place. */
export function diagnosticsText(file: string, diagnostics: readonly Diagnostic[]): string {
  return diagnostics.map(({ line, column, message }) => `${file}:${line}:${column}: ${message}`).join("\n");
}
