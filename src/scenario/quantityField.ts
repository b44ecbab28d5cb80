import { z } from "zod";
import {
  describeRefusal,
  kinds,
  type Quantity,
  type QuantityKind,
  type Reading,
  readQuantity,
} from "./quantity.ts";
import { rangeHint } from "./rangeHints.ts";
import type { Uncertain } from "./types.ts";

export interface FieldOptions {
  /** What the field means; an editor shows it. */
  readonly about: string;
  /** Lowest and highest value that can be meant, in the canonical unit of the kind. */
  readonly range: readonly [low: number, high: number];
}

/** A field that holds a quantity with a unit; its value is the number in the canonical unit. */
export function quantity(kind: QuantityKind, options: FieldOptions) {
  return field(kind, options, false, ({ value }) => value);
}

/** The same, where `3 W +/- 0.5 dB` is welcome. */
export function uncertain(kind: QuantityKind, options: FieldOptions) {
  return field(kind, options, true, ({ value, sigma }): Uncertain => ({ value, sigma }));
}

function field<T>(kind: QuantityKind, options: FieldOptions, spread: boolean, take: (read: Quantity) => T) {
  const { expected } = kinds[kind];
  return z
    .union([z.string(), z.number()], {
      error: ({ input }) =>
        `${input === undefined ? "missing" : `read ${shown(input)}`}; expected ${expected}`,
    })
    .meta({ description: `${options.about}: ${expected}` })
    .transform((input, context) => {
      const judge = (reading: Reading): T => {
        const fault = reading.ok ? outOfRange(reading, kind, options) : describeRefusal(reading);
        if (reading.ok && fault === undefined) return take(reading);
        context.addIssue({ code: "custom", message: fault ?? "", input });
        return z.NEVER;
      };
      const reading = readQuantity(input, kind, { spread });
      if (reading.ok || !reading.libraryMayRead) return judge(reading);
      // mathjs is slow to start: it is loaded for arithmetic and rare units alone.
      return import("./mathUnits.ts").then(({ readArithmetic }) =>
        judge(readArithmetic(String(input), kind)),
      );
    });
}

function outOfRange(read: Quantity, kind: QuantityKind, { about, range }: FieldOptions): string | undefined {
  const [low, high] = range;
  if (read.value >= low && read.value <= high) return undefined;
  const unit = kinds[kind].usual[0]!;
  const hint = rangeHint(read, kind, range);
  return (
    `read "${`${read.number} ${read.unit}`.trim()}", expected ${about} from ${low} to ${high} ${unit}`.trim() +
    (hint === undefined ? "" : ` (${hint})`)
  );
}

/** A value of the file as a message shows it. */
export function shown(input: unknown): string {
  if (input === null) return "nothing";
  const text =
    typeof input === "string" ? JSON.stringify(input) : Array.isArray(input) ? "a list" : undefined;
  const full = text ?? (typeof input === "object" ? "a group of keys" : String(input));
  return full.length > 60 ? `${full.slice(0, 57)}...` : full;
}
