import { describe, expect, it } from "vitest";
import { pointingLoss } from "../../src/antenna/pointing.ts";
import { integrate } from "../../src/numeric/quadrature.ts";

describe("pointing loss", () => {
  it("has mean and deviation 24 (s/b)^2 without an offset", () => {
    // An exponential variate has equal mean and deviation; 0.5 deg in a beam of 3.37 deg: 0.53 dB
    const { meanDb, sigmaDb } = pointingLoss({ offsetDeg: 0, errorPerAxisDeg: 0.5, beamwidthDeg: 3.37 });
    expect(meanDb).toBeCloseTo(0.53, 2);
    expect(sigmaDb).toBeCloseTo(meanDb, 12);
  });

  it("is the plain loss without a random error", () => {
    // Half the width off is 3 dB by definition of the width
    expect(pointingLoss({ offsetDeg: -1.5, errorPerAxisDeg: 0, beamwidthDeg: 3 })).toEqual({
      meanDb: 3,
      sigmaDb: 0,
    });
  });

  it.each([
    [0.8, 0.5, 3.4],
    [0.2, 1.1, 2.2],
    [-1.5, 0.3, 6.7],
  ])("agrees with the density integrated, offset %f, error %f, width %f", (o, s, b) => {
    const expectation = (f: (lossDb: number) => number) =>
      integrate(
        (x) =>
          integrate(
            (y) =>
              (f((12 * ((o + s * x) ** 2 + (s * y) ** 2)) / b ** 2) * Math.exp(-(x * x + y * y) / 2)) /
              (2 * Math.PI),
            -9,
            9,
            64,
          ),
        -9,
        9,
        64,
      );
    const mean = expectation((loss) => loss);
    const deviation = Math.sqrt(expectation((loss) => (loss - mean) ** 2));
    const { meanDb, sigmaDb } = pointingLoss({ offsetDeg: o, errorPerAxisDeg: s, beamwidthDeg: b });
    expect(meanDb).toBeCloseTo(mean, 9);
    expect(sigmaDb).toBeCloseTo(deviation, 9);
  });

  it("refuses a beam without width", () => {
    expect(() => pointingLoss({ offsetDeg: 0, errorPerAxisDeg: 0.5, beamwidthDeg: 0 })).toThrow(RangeError);
  });
});
