import * as z from "zod";
import { readScattering, type ScatteringField } from "./distribution.ts";
import { definedAs } from "./distributionJson.ts";
import { described } from "./fields.ts";
import { type FieldOptions, judgedQuantity } from "./judgedQuantity.ts";
import { kinds, type QuantityKind } from "./quantity.ts";
import { instead } from "./wording.ts";

/** A field that holds a quantity with a unit; its value is the number in the canonical unit. */
export function quantity(kind: QuantityKind, options: FieldOptions) {
  const { expected } = kinds[kind];
  const typed = described(z.string({ error: ({ input }) => instead(input, expected) }), {
    description: `${options.about}: ${expected}`,
    ...(isBare(kind) && { type: ["string", "number"] }),
  });
  return typed.transform((input, context) => {
    const read = judgedQuantity(input, kind, options, false);
    if (typeof read !== "string") return read.value;
    context.addIssue({ code: "custom", message: read, input });
    return z.NEVER;
  });
}

/**
 * The same, where a spread is welcome: `3 W +/- 0.5 dB`, or a group that names a distribution.
 *
 * The schema knows no more of it than that it is there: a node for each form of a distribution in each field would
 * be felt at every start. What an editor may offer stands in `distributionJson.ts`, once.
 */
export function uncertain(kind: QuantityKind, options: ScatteringField) {
  const definition = options.normalOnly ? "normal" : isBare(kind) ? "distributionOfNumber" : "distribution";
  const typed = described(z.unknown(), {
    description: `${options.about}: ${kinds[kind].expected}`,
    anyOf: [{ type: isBare(kind) ? ["string", "number"] : "string" }, definedAs(definition)],
  });
  return typed.transform((input, context) => {
    const { read, faults } = readScattering(input, kind, options);
    for (const { message, path, code } of faults) {
      context.addIssue({
        code: "custom",
        message,
        path: [...path],
        input,
        ...(code && { params: { code } }),
      });
    }
    return read ?? z.NEVER;
  });
}

/** Whether numbers stand there without a unit. */
function isBare(kind: QuantityKind): boolean {
  return kinds[kind].usual[0] === "";
}
