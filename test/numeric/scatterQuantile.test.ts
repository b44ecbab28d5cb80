import { describe, expect, it } from "vitest";
import { momentsOf, type Scatter } from "../../src/numeric/scatter.ts";
import { scatterQuantile } from "../../src/numeric/scatterQuantile.ts";

/** Mean and deviation of a quantile function over evenly spaced probabilities. */
function momentsBySum(value: number, scatter: Scatter, points = 200_000) {
  const quantile = scatterQuantile(value, scatter);
  let [sum, squares] = [0, 0];
  for (let i = 0; i < points; i++) {
    const x = quantile((i + 0.5) / points);
    sum += x;
    squares += x * x;
  }
  const mean = sum / points;
  return { mean, sigma: Math.sqrt(squares / points - mean * mean) };
}

const all: readonly (readonly [string, number, Scatter])[] = [
  ["normal", 3, { kind: "normal", sigma: 0.7 }],
  ["log-normal", 16, { kind: "lognormal", factor: 1.6 }],
  ["flat", 0, { kind: "flat", low: -1, high: 4 }],
  ["exponential", 0.5, { kind: "exponential", mean: 0.5 }],
  [
    "mixture in a mixture",
    0,
    {
      kind: "mixture",
      parts: [
        { share: 0.6, value: 2, scatter: { kind: "normal", sigma: 0.5 } },
        {
          share: 0.4,
          value: 9,
          scatter: {
            kind: "mixture",
            parts: [
              { share: 0.5, value: 8 },
              { share: 0.5, value: 0, scatter: { kind: "flat", low: 10, high: 12 } },
            ],
          },
        },
      ],
    },
  ],
];

describe("scatterQuantile", () => {
  it.each(all)("has the moments of the distribution: %s", (_, value, scatter) => {
    const { mean, sigma } = momentsOf(value, scatter);
    const by = momentsBySum(value, scatter);
    expect(by.mean).toBeCloseTo(mean, 3);
    expect(by.sigma / sigma).toBeCloseTo(1, 3);
  });

  it("gives known quantiles", () => {
    expect(scatterQuantile(10, { kind: "normal", sigma: 2 })(0.975)).toBeCloseTo(10 + 2 * 1.959964, 5);
    expect(scatterQuantile(16, { kind: "lognormal", factor: 2 })(0.8413447)).toBeCloseTo(32, 4);
    expect(scatterQuantile(1, { kind: "exponential", mean: 1 })(0.5)).toBeCloseTo(Math.LN2, 12);
    expect(scatterQuantile(0, { kind: "flat", low: 2, high: 6 })(0.25)).toBe(3);
  });

  it("keeps to the parts of a mixture, up to the last probability there is", () => {
    const quantile = scatterQuantile(0, {
      kind: "mixture",
      parts: [
        { share: 1 / 3, value: 1 },
        { share: 1 / 3, value: 2 },
        { share: 1 / 3, value: 3 },
      ],
    });
    expect([0.1, 0.5, 0.9, 1 - 2 ** -53].map(quantile)).toEqual([1, 2, 3, 3]);
  });
});
