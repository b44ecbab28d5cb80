import * as z from "zod";
import { didYouMean, instead, shown } from "./wording.ts";

/** Longest text of the user's own: a name, a title, the path of a file [characters]. */
const LONGEST_TEXT = 500;

/** What goes into the JSON Schema beside, or in place of, what the package finds out. */
interface Described {
  readonly description: string;
  readonly type?: readonly string[];
  readonly anyOf?: readonly object[];
}

/**
 * A schema with what an editor is to be told of it. The package's own `.meta()` copies the schema for that, which a
 * hundred fields would feel at every start.
 */
export function described<T extends z.ZodType>(schema: T, meta: Described): T {
  z.globalRegistry.add(schema, meta as z.GlobalMeta);
  return schema;
}

/** A field that takes one of a few words. */
export function oneOf<const Words extends readonly [string, ...string[]]>(words: Words, about: string) {
  const field = z.enum(words, {
    error: ({ input }) => instead(input, `${about}: ${words.join(", ")}`) + didYouMean(input, words),
  });
  return described(field, { description: about });
}

/** A field that takes words of the user's own. A name such as `24` is a number to YAML; it is a name all the same. */
export function text(about: string) {
  const field = z.string({ error: ({ input }) => instead(input, about) }).superRefine((value, context) => {
    const message = faultOfText(value);
    if (message) context.addIssue({ code: "custom", message: `${message}, expected ${about}`, input: value });
  });
  return described(field, { description: about, type: ["string", "number"] });
}

/** What is wrong with a name or other text of the user's own. */
export function faultOfText(value: string): string | undefined {
  if (value.trim() === "") return "read an empty text";
  if (/\p{Cc}/u.test(value)) return `read ${shown(value)}, which holds a line break or control character`;
  if (value.length > LONGEST_TEXT) return `read a text longer than ${LONGEST_TEXT} characters`;
  return undefined;
}

/** A group of named things, each of one shape. */
export function named<T extends z.ZodType>(shape: T, about: string) {
  const field = z.record(z.string(), shape, {
    error: ({ input }) => instead(input, `${about}, each under its name`),
  });
  return described(field, { description: about });
}

/**
 * A group of known keys; any other key is a fault.
 *
 * @param judge  what is wrong with the keys taken together, told at once with the faults of the values; `has` says
 *               whether a key was typed
 */
export function group<T extends z.core.$ZodLooseShape>(
  shape: T,
  about: string,
  judge?: (has: (key: keyof T & string) => boolean) => string | undefined,
) {
  const field = z.strictObject(shape, {
    error: ({ code, input }) => (code === "invalid_type" ? instead(input, about) : undefined),
  });
  if (judge === undefined) return described(field, { description: about });
  const judged = field.superRefine(
    (value, context) => {
      const message = judge((key) => Object.hasOwn(value, key));
      if (message) context.addIssue({ code: "custom", message, input: value });
    },
    { when: ({ value }) => typeof value === "object" && value !== null && !Array.isArray(value) },
  );
  return described(judged, { description: about });
}
