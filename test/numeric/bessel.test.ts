import { describe, expect, it } from "vitest";
import { lambdaFunction } from "../../src/numeric/bessel.ts";
import { integrate } from "../../src/numeric/quadrature.ts";

describe("lambda functions", () => {
  it.each([
    // Abramowitz & Stegun Table 9.1: J_0(1), J_0(5), J_1(2), J_2(4)
    [0, 1, 0.7651976866],
    [0, 5, -0.1775967713],
    [1, 2, 0.5767248078],
    [2, 4, 0.3641281459],
  ])("of order %d at %d agree with the tabled Bessel function", (q, u, bessel) => {
    // u^q / (q! 2^q) turns the lambda function back into J_q
    const factor = [1, u / 2, u ** 2 / 8][q]!;
    expect(factor * lambdaFunction(q, u)).toBeCloseTo(bessel, 9);
  });

  it("vanish at the zeros of J_0 and J_1", () => {
    // Abramowitz & Stegun Table 9.5
    expect(lambdaFunction(0, 2.4048255577)).toBeCloseTo(0, 9);
    expect(lambdaFunction(1, 3.8317059702)).toBeCloseTo(0, 9);
    expect(lambdaFunction(1, 13.3236919363)).toBeCloseTo(0, 9);
  });

  it("are the closed form for order 1/2 and Poisson's integral for others", () => {
    // Lam_1/2 = sin u / u (A&S 10.1.1); Lam_q is the mean of cos(u t) under (1 - t^2)^(q - 1/2) (A&S 9.1.20)
    for (const u of [0.3, 2, 7, 12]) {
      expect(lambdaFunction(0.5, u)).toBeCloseTo(Math.sin(u) / u, 9);
      for (const q of [1.5, 2.5, 3.5]) {
        const weight = (t: number) => (1 - t * t) ** (q - 0.5);
        const mean = integrate((t) => weight(t) * Math.cos(u * t), -1, 1, 64) / integrate(weight, -1, 1, 64);
        expect(lambdaFunction(q, u)).toBeCloseTo(mean, 9);
      }
    }
  });
});
