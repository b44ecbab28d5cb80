import { bisect } from "../numeric/roots.ts";

/**
 * How far a figure may be off before something goes wrong: walks from `from` in steps until `excess` rises above 0,
 * then finds the place by bisection.
 *
 * @param excess  at most 0 where all is well
 * @param step    signed; finer than what `excess` may do between two crossings
 * @param end     where the walk stops
 * @returns the place; undefined if there is none up to `end`; `from` if it is wrong there already
 */
export function reach(
  excess: (x: number) => number,
  { from, step, end }: { readonly from: number; readonly step: number; readonly end: number },
): number | undefined {
  if (excess(from) > 0) return from;
  const count = Math.ceil((end - from) / step - 1e-9);
  let last = from;
  for (let i = 1; i <= count; i++) {
    const next = i === count ? end : from + i * step;
    if (excess(next) > 0) return bisect(excess, Math.min(last, next), Math.max(last, next));
    last = next;
  }
  return undefined;
}

/** A range about a value; an end that is not given was not met within the search. */
export interface Reach {
  readonly low: number | undefined;
  readonly high: number | undefined;
}
