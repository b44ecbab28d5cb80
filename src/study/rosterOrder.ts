import type { Verdict } from "../budget/types.ts";

/** Which stations a roster keeps; what is undefined asks nothing. */
export interface RosterFilter {
  /** A mode must close under the own cover in this weather of the plan: 0 dry, 1 wet. */
  readonly closesIn?: number | undefined;
  readonly withinKm?: number | undefined;
  readonly beyondKm?: number | undefined;
  /** True headings, clockwise from the first to the second [deg]. */
  readonly towardsDeg?: readonly [from: number, to: number] | undefined;
}

/** What a filter looks at. */
export interface Filtered {
  readonly distanceKm: number;
  readonly headingDeg: number;
  /** Verdict of the best mode under the own cover, by weather of the plan. */
  readonly best: readonly { readonly verdict: Verdict | undefined }[];
}

/** Whether a heading lies in a sector, which may go round by north. */
export function inSector(headingDeg: number, [from, to]: readonly [number, number]): boolean {
  const turned = (deg: number) => ((deg % 360) + 360) % 360;
  if (Math.abs(to - from) >= 360) return true;
  return turned(headingDeg - from) <= turned(to - from);
}

export function keeps(filter: RosterFilter, { distanceKm, headingDeg, best }: Filtered): boolean {
  const { closesIn, withinKm = Infinity, beyondKm = 0, towardsDeg } = filter;
  if (distanceKm > withinKm || distanceKm < beyondKm) return false;
  if (towardsDeg !== undefined && !inSector(headingDeg, towardsDeg)) return false;
  return closesIn === undefined || best[Math.min(closesIn, best.length - 1)]?.verdict === "closes";
}

/** What a roster can be sorted by. */
export const sortKeys = ["heading", "distance", "margin", "name", "row"] as const;
export type SortKey = (typeof sortKeys)[number];

/** What an order looks at. */
export interface Ranked {
  readonly line: number;
  readonly name: string;
  readonly headingDeg: number;
  readonly distanceKm: number;
  /** Under the own cover in the last weather of the plan, in the mode that the station is judged by [dB]. */
  readonly rankDb: number;
}

/** Nearest and clockwise from north first, most margin first; rows that are equal keep the order of the file. */
export function comparing(key: SortKey): (a: Ranked, b: Ranked) => number {
  const by: Record<SortKey, (a: Ranked, b: Ranked) => number> = {
    heading: (a, b) => a.headingDeg - b.headingDeg,
    distance: (a, b) => a.distanceKm - b.distanceKm,
    margin: (a, b) => b.rankDb - a.rankDb,
    name: (a, b) => (a.name < b.name ? -1 : a.name > b.name ? 1 : 0),
    row: () => 0,
  };
  return (a, b) => by[key](a, b) || a.line - b.line;
}

/** Keeps the best of many by an order, the memory of no more than twice as many. */
export function keepBest<T>(most: number, order: (a: T, b: T) => number) {
  let kept: T[] = [];
  let seen = 0;
  const cut = () => {
    kept = kept.sort(order).slice(0, most);
  };
  return {
    add: (item: T): void => {
      seen++;
      kept.push(item);
      if (kept.length >= 2 * most) cut();
    },
    seen: (): number => seen,
    best: (): readonly T[] => {
      cut();
      return kept;
    },
  };
}
