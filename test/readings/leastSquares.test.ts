import { describe, expect, it } from "vitest";
import { leastSquares } from "../../src/readings/leastSquares.ts";

describe("least squares", () => {
  // JCGM 100:2008 annex H.3, calibration of a thermometer, table H.6 and results (from memory)
  const readingC = [21.521, 22.012, 22.512, 23.003, 23.507, 23.999, 24.513, 25.002, 25.503, 26.01, 26.511];
  const correctionC = [-0.171, -0.169, -0.166, -0.159, -0.164, -0.165, -0.156, -0.157, -0.159, -0.161, -0.16];
  it("reproduces the line through a thermometer's corrections", () => {
    const fit = leastSquares({
      measured: correctionC,
      standard: correctionC.map(() => 1),
      predict: ([y1, y2]) => readingC.map((t) => y1! + y2! * (t - 20)),
      start: [0, 0],
      step: [1, 1],
    });
    const [y1, y2] = fit.parameters;
    const variance = fit.chiSquared / fit.degreesOfFreedom;
    const [[v11, v12], [, v22]] = fit.covariance! as [[number, number], [number, number]];
    expect(fit.degreesOfFreedom).toBe(9);
    expect(y1).toBeCloseTo(-0.1712, 4);
    expect(y2).toBeCloseTo(0.00218, 5);
    expect(Math.sqrt(variance)).toBeCloseTo(0.0035, 4);
    expect(Math.sqrt(variance * v11)).toBeCloseTo(0.0029, 4);
    expect(Math.sqrt(variance * v22)).toBeCloseTo(0.00067, 5);
    expect(v12 / Math.sqrt(v11 * v22)).toBeCloseTo(-0.93, 3);
    // predicted correction at 30 degC: -0.1494 with u_c = 0.0041
    expect(y1! + 10 * y2!).toBeCloseTo(-0.1494, 4);
    expect(Math.sqrt(variance * (v11 + 100 * v22 + 20 * v12))).toBeCloseTo(0.0041, 4);
  });

  it("finds a curved model's parameters to rounding", () => {
    const xs = [0, 0.5, 1, 1.5, 2, 3];
    const fit = leastSquares({
      measured: xs.map((x) => 2.5 * Math.exp(-0.8 * x)),
      standard: xs.map(() => 0.01),
      predict: ([a, b]) => xs.map((x) => a! * Math.exp(-b! * x)),
      start: [1, 1],
      step: [1e-5, 1e-5],
    });
    expect(fit.parameters[0]).toBeCloseTo(2.5, 8);
    expect(fit.parameters[1]).toBeCloseTo(0.8, 8);
  });

  it("weighs data by their uncertainty", () => {
    const fit = leastSquares({
      measured: [1, 4],
      standard: [1, 2],
      predict: ([mean]) => [mean!, mean!],
      start: [0],
      step: [1],
    });
    // weighted mean (1/1 + 4/4)/(1/1 + 1/4) = 1.6, u^2 = 1/(1 + 1/4)
    expect(fit.parameters[0]).toBeCloseTo(1.6, 9);
    expect(fit.covariance![0]![0]).toBeCloseTo(0.8, 9);
  });

  it("says when the data leave a parameter free, or are too few", () => {
    const loose = {
      measured: [1, 2, 3],
      standard: [1, 1, 1],
      predict: ([a, b]: readonly number[]) => [a! + b!, a! + b!, a! + b!],
      start: [0, 0],
      step: [1, 1],
    };
    expect(leastSquares(loose).covariance).toBeUndefined();
    expect(() => leastSquares({ ...loose, measured: [1], standard: [1] })).toThrow(/need at least/);
  });
});
