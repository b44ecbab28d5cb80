import * as z from "zod";
import { described } from "./fields.ts";
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
import { instead } from "./wording.ts";

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
  const { expected, usual } = kinds[kind];
  const error = ({ input }: { input?: unknown }) => instead(input, expected);
  const needsUnit = usual[0] !== "";
  const typed = described(z.string({ error }), {
    description: `${options.about}: ${expected}`,
    ...(!needsUnit && { type: ["string", "number"] }),
  });
  return typed.transform((input, context) => {
    const judge = (reading: Reading): T => {
      const fault = reading.ok ? outOfRange(reading, kind, options) : describeRefusal(reading);
      if (reading.ok && fault === undefined) return take(reading);
      context.addIssue({ code: "custom", message: fault ?? "", input });
      return z.NEVER;
    };
    const reading = readQuantity(input, kind, { spread });
    if (reading.ok || !reading.libraryMayRead) return judge(reading);
    // mathjs is slow to start: it is loaded for arithmetic and rare units alone.
    return import("#math-units").then(({ readArithmetic }) => judge(readArithmetic(String(input), kind)));
  });
}

function outOfRange(read: Quantity, kind: QuantityKind, { about, range }: FieldOptions): string | undefined {
  const [low, high] = range;
  const { value, sigma = 0 } = read;
  const unit = kinds[kind].usual[0]!;
  if (value >= low && value <= high) {
    if (sigma <= high - low) return undefined;
    return `read a spread of ${sigma}, expected less than the range from ${low} to ${high} ${unit}`;
  }
  const hint = rangeHint(read, kind, range);
  return (
    `read "${`${read.number} ${read.unit}`.trim()}", expected ${about} from ${low} to ${high} ${unit}`.trim() +
    (hint === undefined ? "" : ` (${hint})`)
  );
}
