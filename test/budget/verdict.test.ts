import { describe, expect, it } from "vitest";
import { gainEntry } from "../../src/budget/entry.ts";
import { combinedSigma, probabilityAboveZero, verdictOf } from "../../src/budget/verdict.ts";
import { budgetOf, scenarioOf } from "./scenarios.ts";

describe("the verdict", () => {
  // Normal distribution, printed tables: P(z < 1.2816) = 0.9000, P(z < 1.6449) = 0.9500, P(z < 0) = 0.5.
  it.each([
    // margin, sigma, reserve, confidence
    [-0.001, 2, 3, 0.9, "fails"],
    [-20, 0, 0, 0.5, "fails"],
    [0, 2, 3, 0.9, "thin"],
    [0, 2, 0, 0.5, "closes"],
    [0, 2, 0, 0.51, "thin"],
    [2.999, 1, 3, 0.9, "thin"],
    [3, 1, 3, 0.9, "closes"],
    [3, 2.34, 3, 0.9, "closes"], // 3/2.34 = 1.2821
    [3, 2.342, 3, 0.9, "thin"], // 3/2.342 = 1.2810
    [3, 1.823, 3, 0.95, "closes"], // 1.6456
    [3, 1.825, 3, 0.95, "thin"], // 1.6438
    [3, 0, 3, 0.9999, "closes"],
    [0, 0, 0, 0.5, "thin"], // a margin of nothing, known for sure, is not above 0
    [50, 100, 3, 0.9, "thin"], // much in hand and nothing known
  ] as const)("margin %d dB, sigma %d dB, reserve %d dB, confidence %d: %s", (...row) => {
    const [marginDb, sigmaDb, reserveDb, confidence, verdict] = row;
    const hold = probabilityAboveZero(marginDb, sigmaDb);
    expect(verdictOf(marginDb, hold, { reserveDb, confidence })).toBe(verdict);
  });

  it("stands on the margin, its spread and the decision of the scenario", () => {
    const at = (powerDbm: number) =>
      budgetOf(scenarioOf({ transmitter: { powerDbm: { value: powerDbm, sigma: 0.5 } } }));
    const { marginDb, marginSigmaDb } = at(30);
    const least = 30 - marginDb; // the power of no margin
    const wanted = Math.max(3, 1.2816 * marginSigmaDb);
    expect(at(least - 0.01).verdict).toBe("fails");
    expect(at(least + 0.01).verdict).toBe("thin");
    expect(at(least + wanted - 0.01).verdict).toBe("thin");
    expect(at(least + wanted + 0.01).verdict).toBe("closes");
  });
});

describe("the spread of a margin", () => {
  const entry = (sigma: number) => gainEntry({ id: "", stage: "path", label: "", source: "" }, 0, sigma);

  it("is the root of the sum of squares", () => {
    expect(combinedSigma([entry(3), entry(4), entry(12)])).toBe(13);
    expect(combinedSigma([])).toBe(0);
  });

  // Uncertainty table of a practice sheet: common practice, no source. A dry line of sight lands at 1.5 to 2 dB.
  // The threshold of an operator by ear, 3 dB, comes on top.
  it("of a dry line of sight lands at 1.5 to 2 dB without the operator", () => {
    const { marginSigmaDb, requirement } = budgetOf(scenarioOf());
    const path = Math.sqrt(marginSigmaDb ** 2 - requirement.sigma ** 2);
    expect(path).toBeGreaterThan(1.3);
    expect(path).toBeLessThan(2);
  });

  it("takes what the user typed in place of the usual", () => {
    const sigmaAt = (sigma: number | undefined) =>
      budgetOf(scenarioOf({ transmitter: { powerDbm: { value: 30, sigma } } })).marginSigmaDb;
    // Usual for a power by coupler and diode: 0.7 dB, common practice, no source.
    expect(sigmaAt(undefined)).toBeCloseTo(sigmaAt(0.7), 12);
    expect(sigmaAt(5) ** 2 - sigmaAt(0) ** 2).toBeCloseTo(25, 9);
  });
});
