import { expect } from "vitest";

/** Expects `actual` to lie within `tolerance` of `expected`, relative to `expected`; a 0 asks for 1e-12. */
export function expectRelative(actual: number, expected: number, tolerance: number, what = ""): void {
  const limit = expected === 0 ? 1e-12 : tolerance * Math.abs(expected);
  expect(Math.abs(actual - expected), `${what}: got ${actual}, expected ${expected}`).toBeLessThanOrEqual(
    limit,
  );
}
