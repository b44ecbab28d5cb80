import { describe, expect, it } from "vitest";
import { proportionInterval } from "../../src/numeric/proportion.ts";

describe("proportionInterval", () => {
  it("gives the worked figures of the method", () => {
    // Newcombe, Statistics in Medicine 17, 857-872, 1998, table I, method 3 (from memory): 81 of 263, 15 of 148, 0 of 20
    const cases = [
      [81, 263, 0.2553, 0.3662],
      [15, 148, 0.0624, 0.1605],
      [0, 20, 0, 0.1611],
      [1, 29, 0.0061, 0.1718],
    ] as const;
    for (const [hits, trials, low, high] of cases) {
      const interval = proportionInterval({ hits, trials });
      expect(interval.low).toBeCloseTo(low, 4);
      expect(interval.high).toBeCloseTo(high, 4);
    }
  });

  it("is the mirror of itself, and narrows as the root of the trials", () => {
    const few = proportionInterval({ hits: 30, trials: 100 });
    const other = proportionInterval({ hits: 70, trials: 100 });
    expect(other.low).toBeCloseTo(1 - few.high, 12);
    const many = proportionInterval({ hits: 3000, trials: 10_000 });
    expect(few.halfWidth / many.halfWidth).toBeCloseTo(10, 0);
  });

  it("refuses what cannot be", () => {
    for (const [hits, trials] of [
      [1, 0],
      [-1, 10],
      [11, 10],
    ] as const)
      expect(() => proportionInterval({ hits, trials })).toThrow(RangeError);
  });
});
