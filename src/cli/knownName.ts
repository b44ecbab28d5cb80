import { nearest } from "../index.ts";
import { UserError } from "./terminal.ts";

/**
 * @param place  where the names stand
 *
 * @throws UserError naming the nearest of the names if `name` is none of them.
 */
export function knownName(
  noun: string,
  name: string,
  names: readonly string[],
  place = "the scenario",
): void {
  if (names.includes(name)) return;
  const meant = nearest(name, names);
  const hint = meant === undefined ? "" : ` (did you mean ${meant}?)`;
  throw new UserError(`no ${noun} "${name}" in ${place}; expected one of ${names.join(", ")}${hint}`);
}
