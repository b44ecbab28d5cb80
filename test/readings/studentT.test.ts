import { describe, expect, it } from "vitest";
import { coverageFactorFor, studentCdf, studentQuantile } from "../../src/readings/studentT.ts";

describe("Student's t", () => {
  // JCGM 100:2008 table G.2, t_p(v) (from memory)
  const shares = [0.6827, 0.9, 0.95, 0.9545, 0.99, 0.9973];
  const table: readonly (readonly [v: number, ...t: number[]])[] = [
    [1, 1.84, 6.31, 12.71, 13.97, 63.66, 235.8],
    [2, 1.32, 2.92, 4.3, 4.53, 9.92, 19.21],
    [3, 1.2, 2.35, 3.18, 3.31, 5.84, 9.22],
    [5, 1.11, 2.02, 2.57, 2.65, 4.03, 5.51],
    [10, 1.05, 1.81, 2.23, 2.28, 3.17, 3.96],
    [20, 1.03, 1.72, 2.09, 2.13, 2.85, 3.42],
    [50, 1.01, 1.68, 2.01, 2.05, 2.68, 3.16],
    [Infinity, 1, 1.645, 1.96, 2, 2.576, 3],
  ];
  it.each(table)("agrees with the printed table at %d degrees of freedom", (v, ...printed) => {
    printed.forEach((t, i) => {
      // 235.80 is t for 99.73 % proper, whose last digit moves it by less than half a unit
      const tolerance = t > 100 ? 0.3 : 0.0055;
      expect(Math.abs(coverageFactorFor(shares[i]!, v) - t)).toBeLessThan(tolerance);
    });
  });

  it("agrees with the closed forms for one and two degrees of freedom", () => {
    for (const t of [-300, -4, -0.5, 0, 1e-6, 0.3, 2, 50]) {
      expect(studentCdf(t, 1)).toBeCloseTo(0.5 + Math.atan(t) / Math.PI, 13);
      expect(studentCdf(t, 2)).toBeCloseTo(0.5 + t / (2 * Math.sqrt(2 + t * t)), 13);
    }
  });

  it("has a quantile that undoes it, for degrees that are not whole too", () => {
    for (const v of [0.7, 1, 3.6, 17.2, 400]) {
      for (const p of [1e-6, 0.025, 0.4, 0.5, 0.77, 0.999]) {
        expect(studentCdf(studentQuantile(p, v), v)).toBeCloseTo(p, 12);
      }
    }
  });

  it("cuts effective degrees of freedom to the whole number below", () => {
    expect(coverageFactorFor(0.99, 16.9)).toBe(coverageFactorFor(0.99, 16));
  });

  it("refuses what cannot be", () => {
    expect(() => studentCdf(1, 0)).toThrow(RangeError);
    expect(() => studentCdf(Number.NaN, 3)).toThrow(RangeError);
    expect(() => studentQuantile(1, 3)).toThrow(RangeError);
    expect(() => coverageFactorFor(0.95, 0.5)).toThrow(RangeError);
    expect(() => coverageFactorFor(1.2, 5)).toThrow(RangeError);
  });
});
