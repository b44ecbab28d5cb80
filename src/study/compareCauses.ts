/** What lies behind an entry of a budget, in the words in which a difference is told. */
export type Cause =
  | "power"
  | "lines"
  | "match of the feeds"
  | "covers"
  | "water or ice on covers"
  | "antennas"
  | "free space"
  | "gases"
  | "rain and fog"
  | "trees"
  | "the way over the ground"
  | "noise"
  | "mode";

/** The first pattern that fits an entry's id names its cause; the rest of the ends' entries are the antennas'. */
const patterns: readonly (readonly [RegExp, Cause])[] = [
  [/^(noise\.thermal$|mode\.)/, "mode"],
  [/^noise\./, "noise"],
  [/^path\.free_space$/, "free space"],
  [/^path\.gas$/, "gases"],
  [/^path\.(rain|fog)$/, "rain and fog"],
  [/^path\.foliage$/, "trees"],
  [/^path\./, "the way over the ground"],
  [/\.power$/, "power"],
  [/\.line$/, "lines"],
  [/\.feed_mismatch$/, "match of the feeds"],
  [/water/, "water or ice on covers"],
  [/cover/, "covers"],
];

/** Cause of an entry by its id. */
export function causeOf(id: string): Cause {
  return patterns.find(([pattern]) => pattern.test(id))?.[1] ?? "antennas";
}
