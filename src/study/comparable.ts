/** What A has and what B has in its place. */
export interface Pair<T = string> {
  readonly a: T;
  readonly b: T;
}

export type Side = keyof Pair;
export const sides: readonly Side[] = ["a", "b"];

/** What is compared: names in each scenario. */
export interface Comparable {
  readonly mode: Pair;
  /** At least one. */
  readonly weathers: readonly Pair[];
  /** These covers on the feeds of both ends; undefined leaves each scenario its own. */
  readonly cover?: Pair | undefined;
}

/** The same of each. */
export function both<T>(of: (side: Side) => T): Pair<T> {
  return { a: of("a"), b: of("b") };
}
