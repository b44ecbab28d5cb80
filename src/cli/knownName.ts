import { nearest } from "../index.ts";
import { UserError } from "./terminal.ts";

/** @throws UserError naming the nearest of the names if `name` is none of them. */
export function knownName(noun: string, name: string, names: readonly string[]): void {
  if (names.includes(name)) return;
  const meant = nearest(name, names);
  const hint = meant === undefined ? "" : ` (did you mean ${meant}?)`;
  throw new UserError(`no ${noun} "${name}" in the scenario; expected one of ${names.join(", ")}${hint}`);
}
