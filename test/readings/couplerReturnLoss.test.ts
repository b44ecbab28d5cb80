import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { abs, add, type Complex, divide, multiply, ONE, polar, subtract } from "../../src/numeric/complex.ts";
import { couplerReturnLoss } from "../../src/readings/couplerReturnLoss.ts";

const phase = fc.double({ min: 0, max: 2 * Math.PI, noNaN: true });
const db = (x: number) => 20 * Math.log10(x);

/** Level at a coupler's port: leak plus the load's reflection, seen through the test port's own reflection. */
function level(load: Complex, leak: Complex, port: Complex): number {
  return db(abs(add(leak, divide(load, subtract(ONE, multiply(port, load))))));
}

describe("return loss by coupler", () => {
  it("holds the true return loss within its bounds, with one reference or two", () => {
    const leakage = 0.01;
    const match = 0.05;
    fc.assert(
      fc.property(phase, phase, phase, (a, b, c) => {
        const leak = polar(leakage, a);
        const port = polar(match, b);
        const readings = {
          reflectedDb: level(polar(0.2, c), leak, port),
          directivityDb: -db(leakage),
          sourceMatchDb: -db(match),
        };
        const openDb = level(ONE, leak, port);
        const shortDb = level({ re: -1, im: 0 }, leak, port);
        for (const reference of [{ openDb }, { shortDb }, { openDb, shortDb }]) {
          const { lowDb, highDb, returnLossDb } = couplerReturnLoss({ ...readings, ...reference });
          // the bounds are of the first order: the second, (d + m)^2 = 0.0036, is 0.03 dB
          expect(lowDb).toBeLessThanOrEqual(-db(0.2) + 0.03);
          expect(highDb).toBeGreaterThanOrEqual(-db(0.2) - 0.03);
          expect(returnLossDb).toBeGreaterThan(lowDb);
          expect(returnLossDb).toBeLessThan(highDb);
        }
      }),
    );
  });

  it("gains by taking open and short together", () => {
    const coupler = { reflectedDb: -14, directivityDb: 35, sourceMatchDb: 25 };
    const one = couplerReturnLoss({ ...coupler, shortDb: 0 });
    const both = couplerReturnLoss({ ...coupler, shortDb: 0.5, openDb: -0.5 });
    expect(both.returnLossDb).toBeCloseTo(14, 12);
    expect(both.referenceDb).toBeLessThan(one.referenceDb / 5);
  });

  it("adds the mismatch of an attenuator on both sides", () => {
    const coupler = { reflectedDb: -14, shortDb: 0, directivityDb: 35 };
    const without = couplerReturnLoss(coupler);
    const pad = couplerReturnLoss({ ...coupler, padMismatchDb: 0.3 });
    expect(without.lowDb - pad.lowDb).toBeCloseTo(0.3, 12);
    expect(pad.highDb - without.highDb).toBeCloseTo(0.3, 12);
  });

  it("refuses to guess a reference, or a load above it", () => {
    expect(() => couplerReturnLoss({ reflectedDb: -14, directivityDb: 30 })).toThrow(/openDb or shortDb/);
    expect(() => couplerReturnLoss({ reflectedDb: 1, shortDb: 0, directivityDb: 30 })).toThrow(RangeError);
    expect(() => couplerReturnLoss({ reflectedDb: -14, shortDb: 0, directivityDb: 0 })).toThrow(RangeError);
  });
});
