import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { momentsOf, type Scatter } from "../../src/numeric/scatter.ts";

/** Mean and standard deviation by a sum over the quantiles, from the inverse distribution function. */
function byQuantiles(quantile: (p: number) => number): { mean: number; sigma: number } {
  const n = 400_000;
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < n; i++) {
    const x = quantile((i + 0.5) / n);
    sum += x;
    squares += x * x;
  }
  return { mean: sum / n, sigma: Math.sqrt(squares / n - (sum / n) ** 2) };
}

describe("moments of a scatter", () => {
  it("are the value and nothing where nothing scatters", () => {
    expect(momentsOf(3, undefined)).toEqual({ mean: 3, sigma: 0 });
  });

  it("are as typed for a normal one", () => {
    expect(momentsOf(34.8, { kind: "normal", sigma: 0.5 })).toEqual({ mean: 34.8, sigma: 0.5 });
  });

  // Closed form with ln factor = 1: mean = median sqrt(e), variance = median^2 e (e - 1).
  it("are those of the closed form for a log-normal one", () => {
    const { mean, sigma } = momentsOf(2, { kind: "lognormal", factor: Math.E });
    expect(mean).toBeCloseTo(2 * 1.6487212707001282, 12);
    expect(sigma).toBeCloseTo(2 * 2.1611974158950877, 12);
  });

  it("of a log-normal one with a factor next to 1 are those of a normal one", () => {
    const { mean, sigma } = momentsOf(10, { kind: "lognormal", factor: 1 + 1e-6 });
    expect(mean).toBeCloseTo(10, 9);
    expect(sigma / 1e-5).toBeCloseTo(1, 5);
  });

  it.each<[string, Scatter, (p: number) => number]>([
    ["flat", { kind: "flat", low: 0.2, high: 0.8 }, (p) => 0.2 + 0.6 * p],
    ["exponential", { kind: "exponential", mean: 0.3 }, (p) => -0.3 * Math.log(1 - p)],
  ])("of a %s one are those of its quantiles", (_, scatter, quantile) => {
    const { mean, sigma } = byQuantiles(quantile);
    const ours = momentsOf(99, scatter);
    expect(ours.mean).toBeCloseTo(mean, 4);
    expect(ours.sigma).toBeCloseTo(sigma, 4);
  });

  // Two points 0 and 1 with the chance p of the latter: mean p, variance p (1 - p).
  it("of a mixture of two points are those of a toss", () => {
    const { mean, sigma } = momentsOf(0, {
      kind: "mixture",
      parts: [
        { share: 0.75, value: 0 },
        { share: 0.25, value: 1 },
      ],
    });
    expect(mean).toBeCloseTo(0.25, 14);
    expect(sigma).toBeCloseTo(Math.sqrt(0.1875), 14);
  });

  it("of a flat range cut in two are those of the whole", () => {
    const part = (share: number, low: number, high: number) => ({
      share,
      value: low,
      scatter: { kind: "flat", low, high } as const,
    });
    const { mean, sigma } = momentsOf(0, { kind: "mixture", parts: [part(0.3, 0, 3), part(0.7, 3, 10)] });
    expect(mean).toBeCloseTo(5, 12);
    expect(sigma).toBeCloseTo(10 / Math.sqrt(12), 12);
  });

  it("do not change when a mixture is put into a mixture", () => {
    const parts = fc
      .array(fc.record({ weight: fc.integer({ min: 1, max: 9 }), value: fc.integer({ min: -9, max: 9 }) }), {
        minLength: 2,
        maxLength: 6,
      })
      .map((some) => {
        const whole = some.reduce((sum, { weight }) => sum + weight, 0);
        return some.map(({ weight, value }) => ({
          share: weight / whole,
          value,
          scatter: { kind: "normal", sigma: weight / 3 } as const,
        }));
      });
    fc.assert(
      fc.property(parts, ([first, ...others]) => {
        const rest = 1 - first!.share;
        const inner = { kind: "mixture", parts: others.map((one) => ({ ...one, share: one.share / rest })) };
        const nested: Scatter = {
          kind: "mixture",
          parts: [first!, { share: rest, value: 0, scatter: inner as Scatter }],
        };
        const flat = momentsOf(0, { kind: "mixture", parts: [first!, ...others] });
        const deep = momentsOf(0, nested);
        expect(deep.mean).toBeCloseTo(flat.mean, 10);
        expect(deep.sigma).toBeCloseTo(flat.sigma, 10);
      }),
    );
  });

  it.each<[string, number, Scatter]>([
    ["a negative sigma", 1, { kind: "normal", sigma: -1 }],
    ["a factor below 1", 1, { kind: "lognormal", factor: 0.9 }],
    ["a median of 0", 0, { kind: "lognormal", factor: 2 }],
    ["ends swapped", 1, { kind: "flat", low: 2, high: 1 }],
    ["a negative mean", 1, { kind: "exponential", mean: -1 }],
    ["no parts", 1, { kind: "mixture", parts: [] }],
    ["half a whole", 1, { kind: "mixture", parts: [{ share: 0.5, value: 1 }] }],
    ["a value that is none", Number.NaN, { kind: "normal", sigma: 1 }],
  ])("are refused of %s", (_, value, scatter) => {
    expect(() => momentsOf(value, scatter)).toThrow(RangeError);
  });
});
