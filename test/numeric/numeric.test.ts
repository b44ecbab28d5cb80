import { all, create } from "mathjs";
import { describe, expect, it } from "vitest";
import { outside, requireWithin } from "../../src/numeric/check.ts";
import * as C from "../../src/numeric/complex.ts";
import { dbmToWatt, dbToPower, powerToDb, wattToDbm } from "../../src/numeric/decibels.ts";
import { fresnelIntegrals } from "../../src/numeric/fresnelIntegrals.ts";
import { interpolateLinear } from "../../src/numeric/interpolate.ts";
import { normalCdf, normalQuantile } from "../../src/numeric/normal.ts";
import { integrate } from "../../src/numeric/quadrature.ts";
import { bisect } from "../../src/numeric/roots.ts";

const math = create(all!, {});

describe("complex arithmetic against mathjs", () => {
  const samples = [
    [3, -4, 1, 2],
    [-0.3, 1e-9, 2e3, -5],
    [0, 2, -1, 0],
    [-7, 0, 0, -0.25],
  ] as const;
  it.each(samples)("(%d, %d) with (%d, %d)", (ar, ai, br, bi) => {
    const a = C.complex(ar, ai);
    const b = C.complex(br, bi);
    const x = math.complex(ar, ai);
    const y = math.complex(br, bi);
    const pairs: [C.Complex, unknown][] = [
      [C.multiply(a, b), math.multiply(x, y)],
      [C.divide(a, b), math.divide(x, y)],
      [C.sqrt(a), math.sqrt(x)],
      [C.exp(C.scale(a, 0.1)), math.exp(math.complex(ar * 0.1, ai * 0.1))],
      [C.subtract(C.add(a, b), b), x],
    ];
    for (const [ours, theirs] of pairs) {
      const { re, im } = theirs as C.Complex;
      expect(Math.hypot(ours.re - re, ours.im - im)).toBeLessThan(1e-13 * (1 + Math.hypot(re, im)));
    }
  });
});

describe("decibels", () => {
  it("20 W are 43.0103 dBm and back", () => {
    expect(wattToDbm(20)).toBeCloseTo(43.0103, 4);
    expect(dbmToWatt(43.0103)).toBeCloseTo(20, 4);
    expect(powerToDb(dbToPower(-17.3))).toBeCloseTo(-17.3, 12);
  });
});

describe("normal distribution", () => {
  // Abramowitz & Stegun, Handbook of Mathematical Functions, Table 26.1.
  it.each([
    [0, 0.5],
    [1, 0.841344746068543],
    [2, 0.977249868051821],
    [-3, 0.00134989803163009],
    [-5, 2.86651571879194e-7],
  ])("P(%d) = %d", (z, p) => expect(Math.abs(normalCdf(z) / p - 1)).toBeLessThan(2e-13));

  it("agrees with mathjs erf across the switch of method", () => {
    for (let z = -6; z <= 6; z += 0.37) {
      expect(normalCdf(z)).toBeCloseTo(0.5 * (1 + math.erf(z / Math.SQRT2)), 13);
    }
  });

  it("quantile inverts it, from 1e-9 to the upper tail", () => {
    expect(normalQuantile(0.975)).toBeCloseTo(1.959963984540054, 12); // A&S Table 26.5
    for (const p of [1e-9, 1e-4, 0.02, 0.4, 0.5, 0.9, 0.9999]) {
      expect(Math.abs(normalCdf(normalQuantile(p)) / p - 1)).toBeLessThan(1e-11);
    }
    expect(() => normalQuantile(1)).toThrow(RangeError);
  });
});

describe("Fresnel integrals", () => {
  // Abramowitz & Stegun, Table 7.7 (7 figures).
  it.each([
    [0.5, 0.4923442, 0.0647324],
    [1, 0.7798934, 0.4382591],
    [2, 0.4882534, 0.3434157],
    [4.9, 0.500161, 0.4350674],
  ])("C and S at %d", (x, c, s) => {
    const value = fresnelIntegrals(x);
    expect(Math.abs(value.c - c)).toBeLessThan(6e-8);
    expect(Math.abs(value.s - s)).toBeLessThan(6e-8);
  });

  it("is odd, and continuous where the method changes", () => {
    expect(fresnelIntegrals(-2).c).toBe(-fresnelIntegrals(2).c);
    const below = fresnelIntegrals(5);
    const above = fresnelIntegrals(5 + 1e-12);
    expect(Math.abs(below.c - above.c)).toBeLessThan(1e-11);
    expect(Math.abs(below.s - above.s)).toBeLessThan(1e-11);
  });
});

describe("quadrature, roots, interpolation, guards", () => {
  it("integrates a polynomial of degree 2n-1 exactly", () => {
    expect(integrate((x) => x ** 7 + x ** 2, 0, 1, 4)).toBeCloseTo(1 / 8 + 1 / 3, 14);
  });
  it("finds a root to the last bits and says when there is none", () => {
    expect(bisect((x) => x * x - 2, 0, 2)).toBeCloseTo(Math.SQRT2, 15);
    expect(bisect((x) => x * x + 1, 0, 2)).toBeUndefined();
  });
  it("holds the end values", () => {
    expect([-1, 0.5, 3, 9].map((x) => interpolateLinear([0, 1, 4], [10, 20, 50], x))).toEqual([
      10, 15, 40, 50,
    ]);
  });
  it("names the argument that is wrong", () => {
    expect(() => requireWithin("tiltDeg", Number.NaN, 0, 90)).toThrow(/tiltDeg.*0 to 90.*NaN/);
    expect(outside({ frequencyGHz: [1, 40] }, { frequencyGHz: 47 })).toEqual([
      { field: "frequencyGHz", value: 47, low: 1, high: 40 },
    ]);
  });
});
