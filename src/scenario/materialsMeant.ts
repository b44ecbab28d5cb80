import { materials } from "../cover/materials.ts";
import { nearest } from "./nearest.ts";

/** Most materials that a hint names. */
const MOST_NAMES = 6;

/** Shortest text that is looked for within a word. */
const SHORTEST_PART = 3;

/**
 * The materials that a name which is none may mean, best guess first; none where nothing is like it.
 *
 * A short name is often part of a longer one: `PE` of PE-HD, where a letter's change would make it PC. So names that
 * hold it as a word come first, then those that begin with it, then the nearest by letters, then those that hold it
 * anywhere.
 */
export function materialsMeant(name: string): readonly string[] {
  const written = name.trim();
  if (written === "") return [];
  const text = written.replace(/[.*+?^${}()|[\]\\]/g, "\\$&");
  const ofWords = (pattern: string) => {
    const fits = new RegExp(pattern, "iu");
    return materials.filter((one) => [one.name, ...one.aliases].some((word) => fits.test(word)));
  };
  const part = written.length >= SHORTEST_PART;
  const close = nearest(
    written,
    materials.flatMap((one) => [one.name, ...one.aliases]),
  );
  const guesses = [
    () => ofWords(`(?<![\\p{L}\\d])${text}(?![\\p{L}\\d])`),
    () => (part ? ofWords(`^${text}`) : []),
    () => (close === undefined ? [] : [{ name: close }]),
    () => (part ? ofWords(text) : []),
  ];
  for (const guess of guesses) {
    const found = guess();
    if (found.length > 0) return found.slice(0, MOST_NAMES).map((one) => one.name);
  }
  return [];
}

/** ` (did you mean HDPE, UHMWPE?)`, or where to look. */
export function materialHint(name: string): string {
  const meant = materialsMeant(name);
  return meant.length === 0 ? " (`oilskin materials` lists them)" : ` (did you mean ${meant.join(", ")}?)`;
}
