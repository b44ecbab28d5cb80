import { describe, expect, it } from "vitest";
import {
  correlation,
  mean,
  quantilesOf,
  rankCorrelation,
  shareAbove,
  skewness,
  variance,
} from "../../src/numeric/ranking.ts";

const list = (...values: number[]) => Float64Array.from(values);

describe("quantiles", () => {
  it("lie between the members of a sample: Hyndman & Fan's type 7", () => {
    // 1, 2, 3, 4: position 1 + 3 p, so 1.75 at the lower quartile and 2.5 in the middle
    expect(quantilesOf(list(4, 1, 3, 2), [0, 0.25, 0.5, 1])).toEqual([1, 1.75, 2.5, 4]);
    expect(quantilesOf(list(7), [0.05, 0.95])).toEqual([7, 7]);
  });
});

describe("correlation", () => {
  it("is 1 for whatever rises together, in ranks even where the line bends", () => {
    const x = Float64Array.from({ length: 50 }, (_, i) => i / 10);
    expect(rankCorrelation(x, x.map(Math.exp))).toBeCloseTo(1, 12);
    expect(
      rankCorrelation(
        x,
        x.map((v) => -(v ** 3)),
      ),
    ).toBeCloseTo(-1, 12);
    expect(correlation(x, x.map(Math.exp))).toBeLessThan(0.9);
  });

  it("gives Spearman's figure for five pairs, by hand", () => {
    // ranks 1 2 3 4 5 and 2 1 4 3 5: 1 - 6 (1 + 1 + 1 + 1)/(5 * 24) = 0.8
    expect(rankCorrelation(list(10, 20, 30, 40, 50), list(2.5, 1.5, 9, 8, 100))).toBeCloseTo(0.8, 12);
  });

  it("is 0 where one of the two does not vary", () => {
    expect(correlation(list(1, 2, 3), list(5, 5, 5))).toBe(0);
    expect(rankCorrelation(list(1, 1, 1), list(1, 2, 3))).toBe(0);
  });
});

describe("moments", () => {
  it("by hand", () => {
    const sample = list(1, 2, 3, 6);
    expect(mean(sample)).toBe(3);
    expect(variance(sample)).toBe(3.5); // (4 + 1 + 0 + 9)/4
    expect(skewness(sample)).toBeCloseTo(4.5 / 3.5 ** 1.5, 12); // (-8 - 1 + 0 + 27)/4 = 4.5
    expect(skewness(list(2, 2))).toBe(0);
  });
});

describe("the share above a level", () => {
  it("does not count the level itself", () => {
    expect(shareAbove(list(-1, 0, 0, 2), 0)).toBe(0.25);
    expect(shareAbove(list(3, 4), -1)).toBe(1);
  });
});
