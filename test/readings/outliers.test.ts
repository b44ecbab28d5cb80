import { describe, expect, it } from "vitest";
import { outlyingReading } from "../../src/readings/outliers.ts";

/** A reading a value: the shift of one value, the mean taken out. */
function ownShifts(n: number): number[][] {
  return Array.from({ length: n }, (_, r) => Array.from({ length: n }, (_, i) => (i === r ? 1 : 0) - 1 / n));
}

/** n - 1 values scattered evenly with mean 0 and one far out, of a given Grubbs statistic G = |x - mean|/s. */
function sampleOfGrubbs(n: number, g: number): number[] {
  // One value at d from the mean of the others (0), whose sum of squares is q: mean d/n, d (n-1)/n = G s.
  const others = Array.from({ length: n - 1 }, (_, i) => i - (n - 2) / 2);
  const q = others.reduce((sum, x) => sum + x * x, 0);
  const d = Math.sqrt((g * g * q) / ((n - 1) * ((n - 1) / n) ** 2 - (g * g * (n - 1)) / n));
  const mean = d / n;
  return [...others, d].map((x) => x - mean);
}

describe("the outlying reading", () => {
  // Critical values of Grubbs' test, one outlier, two-sided 5 %: ISO 5725-2 table 5 (from memory)
  it.each([
    [4, 1.481],
    [5, 1.715],
    [6, 1.887],
    [7, 2.02],
    [8, 2.126],
    [10, 2.29],
    [20, 2.709],
  ])("of %d values is flagged from the printed limit %d of Grubbs on", (n, limit) => {
    const flag = (g: number) =>
      outlyingReading({ values: sampleOfGrubbs(n, g), shifts: ownShifts(n), degreesOfFreedom: n - 1 });
    expect(flag(limit - 0.002)).toBeUndefined();
    expect(flag(limit + 0.002)?.index).toBe(n - 1);
  });

  it("is found where two values share it, and its shift is told", () => {
    // reading 1 moves values 1 and 2 by half of its error of 0.8
    const values = [0.01, 0.4, 0.4, -0.01, 0.01, -0.01, 0];
    const mean = values.reduce((sum, x) => sum + x) / values.length;
    const shared = Array.from({ length: 6 }, (_, r) =>
      values.map((_, i) => (i === r || i === r + 1 ? 0.5 : 0)),
    );
    const shifts = shared.map((row) => row.map((x) => x - 1 / values.length));
    const found = outlyingReading({
      values: values.map((x) => x - mean),
      shifts,
      degreesOfFreedom: values.length - 1,
    });
    expect(found?.index).toBe(1);
    expect(found?.shift).toBeCloseTo(0.8, 1);
  });

  it("is never one within the repeatability, nor among equal values, nor among two", () => {
    const values = sampleOfGrubbs(8, 2.4).map((x) => x * 0.001);
    const rest = { shifts: ownShifts(8), degreesOfFreedom: 7 };
    expect(outlyingReading({ values, ...rest })?.index).toBe(7);
    expect(outlyingReading({ values, ...rest, leastShift: 0.05 })).toBeUndefined();
    expect(outlyingReading({ values: values.map(() => 0), ...rest })).toBeUndefined();
    expect(outlyingReading({ values: [-1, 1], shifts: ownShifts(2), degreesOfFreedom: 1 })).toBeUndefined();
  });

  it("refuses what cannot be", () => {
    const set = { values: [-1, 0, 1], shifts: ownShifts(3), degreesOfFreedom: 2 };
    expect(() => outlyingReading({ ...set, significance: 0 })).toThrow(RangeError);
    expect(() => outlyingReading({ ...set, leastShift: -1 })).toThrow(RangeError);
  });
});
