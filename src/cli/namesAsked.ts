import { Option } from "commander";
import { knownName } from "./knownName.ts";

/** An option that takes one name an occurrence and may be given again; it never swallows what follows the name. */
export function namesOption(flags: string, description: string): Option {
  return new Option(flags, `${description}; again, or with commas, for more`).argParser(
    (name: string, before: readonly string[] | undefined) => [...(before ?? []), name],
  );
}

/**
 * The names that an option asks for, each once: as given, or cut at commas where no known name holds one.
 *
 * @param given  what the option took, undefined where it was not given: then all
 * @throws UserError naming the nearest of the known names if one is not known
 */
export function namesAsked(
  noun: string,
  given: readonly string[] | undefined,
  known: readonly string[],
): readonly string[] {
  if (given === undefined) return known;
  const whole = known.some((name) => name.includes(","));
  const asked = given.flatMap((text) =>
    whole || known.includes(text) ? text : text.split(",").map((name) => name.trim()),
  );
  for (const name of asked) knownName(noun, name, known);
  return [...new Set(asked)];
}
