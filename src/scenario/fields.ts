import { z } from "zod";
import { nearest } from "./nearest.ts";
import { shown } from "./quantityField.ts";

/** A field that takes one of a few words. */
export function oneOf<const Words extends readonly [string, ...string[]]>(words: Words, about: string) {
  return z
    .enum(words, {
      error: ({ input }) => {
        const meant = typeof input === "string" ? nearest(input, words) : undefined;
        const hint = meant === undefined ? "" : ` (did you mean ${meant}?)`;
        const read = input === undefined ? "missing" : `read ${shown(input)}`;
        return `${read}; expected ${about}: ${words.join(", ")}${hint}`;
      },
    })
    .meta({ description: about });
}

/** A field that takes words of the user's own. YAML makes a number of a name such as `24`; it is a name all the same. */
export function text(about: string) {
  return z
    .union([z.string(), z.number()], {
      error: ({ input }) => `${input === undefined ? "missing" : `read ${shown(input)}`}; expected ${about}`,
    })
    .transform(String)
    .refine((value) => value.trim() !== "", { error: `expected ${about}, not an empty text` })
    .meta({ description: about });
}

/** A group of named things, each of one shape. */
export function named<T extends z.ZodType>(shape: T, about: string) {
  return z
    .record(z.string(), shape, {
      error: ({ input }) =>
        `${input === undefined ? "missing" : `read ${shown(input)}`}; expected ${about}, each under its name`,
    })
    .meta({ description: about });
}

/** A group of known keys; any other key is a fault. */
export function group<T extends z.core.$ZodLooseShape>(shape: T, about: string) {
  return z
    .strictObject(shape, {
      error: (issue) =>
        issue.code === "invalid_type"
          ? `${issue.input === undefined ? "missing" : `read ${shown(issue.input)}`}; expected ${about}`
          : undefined,
    })
    .meta({ description: about });
}
