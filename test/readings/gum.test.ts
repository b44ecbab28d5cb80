import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { combineUncertainty, rectangular, resolution, uShaped } from "../../src/readings/gum.ts";
import { coverageFactorFor } from "../../src/readings/studentT.ts";

describe("combined uncertainty", () => {
  // JCGM 100:2008 annex H.1, end-gauge calibration, table H.1 (from memory): u_c = 32 nm, v_eff = 16, U99 = 93 nm
  it("reproduces the end gauge", () => {
    const lengthNm = 50e6;
    const { standard, effectiveDegreesOfFreedom } = combineUncertainty([
      { name: "standard", standard: 25, degreesOfFreedom: 18 },
      { name: "difference, repeated", standard: 5.8, degreesOfFreedom: 24 },
      { name: "comparator, random", standard: 3.9, degreesOfFreedom: 5 },
      { name: "comparator, systematic", standard: 6.7, degreesOfFreedom: 8 },
      {
        name: "expansion coefficients",
        sensitivity: lengthNm * 0.1,
        standard: 0.58e-6,
        degreesOfFreedom: 50,
      },
      { name: "temperatures", sensitivity: lengthNm * 11.5e-6, standard: 0.029, degreesOfFreedom: 2 },
    ]);
    expect(Math.round(standard)).toBe(32);
    expect(Math.floor(effectiveDegreesOfFreedom)).toBe(16);
    const k = coverageFactorFor(0.99, effectiveDegreesOfFreedom);
    expect(k).toBeCloseTo(2.92, 2);
    expect(Math.round(k * 32)).toBe(93);
  });

  // JCGM 100:2008 5.2.2 note 1: ten resistors of 1000 ohm calibrated against one standard of u = 0.1 ohm are
  // fully correlated, and in series have u_c = 1 ohm, not 0.32 ohm
  it("adds fully correlated inputs linearly", () => {
    const resistors = Array.from({ length: 10 }, () => ({ standard: 0.1 }));
    const pairs = resistors.flatMap((_, second) =>
      Array.from({ length: second }, (__, first) => ({ first, second, coefficient: 1 })),
    );
    expect(combineUncertainty(resistors, pairs).standard).toBeCloseTo(1, 12);
    expect(combineUncertainty(resistors).standard).toBeCloseTo(0.316, 3);
  });

  it("lets a difference of fully correlated inputs vanish", () => {
    const pair = [{ standard: 2 }, { standard: 2, sensitivity: -1 }];
    expect(combineUncertainty(pair, [{ first: 0, second: 1, coefficient: 1 }]).standard).toBe(0);
  });

  it("never has fewer effective degrees of freedom than the least, nor more than their sum", () => {
    const component = fc.record({
      standard: fc.double({ min: 0.01, max: 10, noNaN: true }),
      degreesOfFreedom: fc.integer({ min: 1, max: 50 }),
    });
    fc.assert(
      fc.property(fc.array(component, { minLength: 1, maxLength: 6 }), (components) => {
        const { effectiveDegreesOfFreedom: v } = combineUncertainty(components);
        const degrees = components.map((one) => one.degreesOfFreedom);
        expect(v).toBeGreaterThanOrEqual(Math.min(...degrees) * (1 - 1e-9));
        expect(v).toBeLessThanOrEqual(degrees.reduce((sum, one) => sum + one) * (1 + 1e-9));
      }),
    );
  });

  it("knows without doubt what comes from limits", () => {
    expect(combineUncertainty([{ standard: rectangular(0.05) }])).toEqual({
      standard: 0.05 / Math.sqrt(3),
      effectiveDegreesOfFreedom: Infinity,
    });
    // JCGM 100:2008 F.2.2.1: a step of one unit has u = 0.29 units
    expect(resolution(1)).toBeCloseTo(0.29, 2);
    expect(uShaped(1)).toBeCloseTo(Math.SQRT1_2, 12);
  });

  it("refuses what cannot be", () => {
    expect(() => combineUncertainty([])).toThrow(RangeError);
    expect(() => combineUncertainty([{ standard: -1 }])).toThrow(RangeError);
    expect(() => combineUncertainty([{ standard: 1, degreesOfFreedom: 0 }])).toThrow(RangeError);
    const three = [{ standard: 1 }, { standard: 1 }, { standard: 1 }];
    expect(() => combineUncertainty(three, [{ first: 0, second: 3, coefficient: 0.5 }])).toThrow(RangeError);
    expect(() => combineUncertainty(three, [{ first: 0, second: 1, coefficient: 2 }])).toThrow(RangeError);
    const impossible = [
      { first: 0, second: 1, coefficient: -1 },
      { first: 0, second: 2, coefficient: -1 },
      { first: 1, second: 2, coefficient: -1 },
    ];
    expect(() => combineUncertainty(three, impossible)).toThrow(/contradict/);
  });
});
