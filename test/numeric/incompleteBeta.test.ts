import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { incompleteBeta, logGamma } from "../../src/numeric/incompleteBeta.ts";

const share = fc.double({ min: 0, max: 1, noNaN: true });
const exponent = fc.double({ min: 0.1, max: 200, noNaN: true });

describe("logarithm of the gamma function", () => {
  it("agrees with factorials and with Gamma(1/2) = sqrt(pi)", () => {
    expect(logGamma(5)).toBeCloseTo(Math.log(24), 13);
    expect(logGamma(0.5)).toBeCloseTo(Math.log(Math.PI) / 2, 13);
    expect(logGamma(1)).toBeCloseTo(0, 13);
    // Abramowitz & Stegun table 6.1: Gamma(1.25) = 0.90640 24771 (from memory)
    expect(Math.exp(logGamma(1.25))).toBeCloseTo(0.9064024771, 10);
  });

  it("obeys Gamma(x + 1) = x Gamma(x)", () => {
    fc.assert(
      fc.property(exponent, (x) => {
        expect(logGamma(x + 1) - logGamma(x)).toBeCloseTo(Math.log(x), 10);
      }),
    );
  });
});

describe("regularised incomplete beta function", () => {
  it("agrees with its closed forms I_x(1, b) and I_x(a, 1)", () => {
    fc.assert(
      fc.property(share, exponent, (x, a) => {
        expect(incompleteBeta(x, a, 1)).toBeCloseTo(x ** a, 11);
        expect(incompleteBeta(x, 1, a)).toBeCloseTo(1 - (1 - x) ** a, 11);
      }),
    );
  });

  it("obeys the recurrence of Abramowitz & Stegun 26.5.16", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 0.99, noNaN: true }),
        fc.double({ min: 0.5, max: 40, noNaN: true }),
        fc.double({ min: 0.5, max: 40, noNaN: true }),
        (x, a, b) => {
          const step = x ** a * (1 - x) ** b * Math.exp(logGamma(a + b) - logGamma(a + 1) - logGamma(b));
          expect(incompleteBeta(x, a, b) - incompleteBeta(x, a + 1, b)).toBeCloseTo(step, 11);
        },
      ),
    );
  });
});
