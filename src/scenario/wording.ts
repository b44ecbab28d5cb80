import { nearest } from "./nearest.ts";

/** What a message shows of a list or of a text at most. */
const MOST_NAMES = 20;
const MOST_CHARACTERS = 60;

/** What stands in the place of something else; `issues.ts` puts the key's name to "missing". */
export function instead(input: unknown, expected: string): string {
  return `${input === undefined ? "missing" : `read ${shown(input)}`}, expected ${expected}`;
}

/** A value of the file as a message shows it. */
export function shown(input: unknown): string {
  if (input === null) return "nothing";
  if (Array.isArray(input)) return "a list";
  if (typeof input === "object") return "a group of keys";
  if (typeof input !== "string") return String(input);
  return JSON.stringify(input.length > MOST_CHARACTERS ? `${input.slice(0, MOST_CHARACTERS - 3)}...` : input);
}

/** ` (did you mean film?)` where a known word is close, otherwise nothing. */
export function didYouMean(written: unknown, words: Iterable<string>): string {
  const meant = typeof written === "string" ? nearest(written, words) : undefined;
  return meant === undefined ? "" : ` (did you mean ${meant}?)`;
}

/** A key that should not be there, beside those that may. */
export function unknownKey(key: string, known: readonly string[]): string {
  return `unknown key ${shown(key)}, expected ${listed(known)}${didYouMean(key, known)}`;
}

/** Names, as many as a message can hold. */
export function listed(names: readonly string[]): string {
  const more = names.length - MOST_NAMES;
  const some = names.slice(0, MOST_NAMES).map((name) => (name.length > MOST_CHARACTERS ? shown(name) : name));
  return some.join(", ") + (more > 0 ? ` and ${more} more` : "");
}

/** A message with nothing in it that a terminal would obey. */
export function visible(message: string): string {
  return message.replace(/[\p{Cc}\p{Cf}]/gu, (c) => `\\u{${c.codePointAt(0)!.toString(16)}}`);
}
