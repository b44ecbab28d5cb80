import { bisect } from "../numeric/roots.ts";

export interface FoundSolution {
  readonly x: number;
  /** A root; otherwise a least miss within the limit. */
  readonly exact: boolean;
  /** Ends of the stretch around it where the miss stays within the limit. */
  readonly from: number;
  readonly to: number;
}

/**
 * All x of a grid's range at which a miss vanishes, or comes as near to 0 as its uncertainty allows.
 *
 * Roots are refined by bisection; a least miss that is no root keeps to the grid. A least miss inside the stretch of
 * another solution is not listed again.
 *
 * Valid:  a grid fine enough that no two roots share one of its steps
 *
 * @param miss     continuous, to be 0 at a solution
 * @param limitAt  largest miss that the uncertainty allows near x
 * @param grid     rising strictly
 * @returns solutions, x rising
 */
export function allSolutions(
  miss: (x: number) => number,
  limitAt: (x: number) => number,
  grid: readonly number[],
): readonly FoundSolution[] {
  const misses = grid.map(miss);
  const size = (i: number) => Math.abs(misses[i] ?? Infinity);
  const found: FoundSolution[] = [];

  /** The place lies on the grid, at x or just below it. */
  const include = (x: number, exact: boolean, place: number) => {
    const limit = limitAt(x);
    const edge = (first: number, step: number) => {
      let inner = x;
      for (let i = first; grid[i] !== undefined; i += step) {
        const outer = grid[i]!;
        if (size(i) > limit) {
          const [low, high] = step < 0 ? [outer, inner] : [inner, outer];
          return bisect((at) => Math.abs(miss(at)) - limit, low, high) ?? inner;
        }
        inner = outer;
      }
      return inner;
    };
    found.push({ x, exact, from: edge(place, -1), to: edge(place + 1, 1) });
  };

  for (let i = 0; i + 1 < grid.length; i++) {
    if (misses[i]! < 0 !== misses[i + 1]! < 0) include(bisect(miss, grid[i]!, grid[i + 1]!)!, true, i);
  }
  grid.forEach((x, i) => {
    const least = size(i) <= size(i - 1) && size(i) < size(i + 1);
    const known = found.some(({ from, to }) => x >= from && x <= to);
    if (least && !known && size(i) <= limitAt(x) && !besideRoot(found, grid, i)) include(x, false, i);
  });
  return found.sort((a, b) => a.x - b.x);
}

/** The grid point nearest to a root is a least miss too. */
function besideRoot(found: readonly FoundSolution[], grid: readonly number[], i: number): boolean {
  const [low, high] = [grid[i - 1] ?? -Infinity, grid[i + 1] ?? Infinity];
  return found.some(({ x }) => x >= low && x <= high);
}
