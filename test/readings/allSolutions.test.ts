import { describe, expect, it } from "vitest";
import { allSolutions } from "../../src/readings/allSolutions.ts";

const grid = Array.from({ length: 101 }, (_, i) => i / 10);

describe("all solutions", () => {
  it("are the roots, with the stretch in which the miss stays small", () => {
    const found = allSolutions(
      (x) => (x - 2.03) * (x - 7.51),
      () => 0.1,
      grid,
    );
    expect(found.map(({ x }) => x)).toEqual([expect.closeTo(2.03, 12), expect.closeTo(7.51, 12)]);
    // (x - 2.03)(x - 7.51) = +-0.1 by the quadratic formula
    const edge = (limit: number) => 4.77 - Math.sqrt(2.74 ** 2 + limit);
    expect(found[0]!.from).toBeCloseTo(edge(0.1), 9);
    expect(found[0]!.to).toBeCloseTo(edge(-0.1), 9);
    expect(found.every(({ exact }) => exact)).toBe(true);
  });

  it("hold a near miss only where the uncertainty allows it", () => {
    const near = (x: number) => (x - 4) ** 2 + 0.01;
    expect(allSolutions(near, () => 0.005, grid)).toEqual([]);
    expect(allSolutions(near, () => 0.05, grid)).toEqual([
      { x: 4, exact: false, from: expect.closeTo(3.8, 9), to: expect.closeTo(4.2, 9) },
    ]);
  });

  it("may lie at an end of the range, and stop there", () => {
    const [only] = allSolutions(
      (x) => x + 0.01,
      () => 0.5,
      grid,
    );
    expect(only).toMatchObject({ x: 0, exact: false, from: 0 });
    expect(only!.to).toBeCloseTo(0.49, 9);
  });
});
