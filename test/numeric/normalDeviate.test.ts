import { describe, expect, it } from "vitest";
import { normalQuantile } from "../../src/numeric/normal.ts";
import { normalDeviate } from "../../src/numeric/normalDeviate.ts";

describe("normalDeviate", () => {
  it("agrees with the quantile that is found by iteration, from the middle to the far tails", () => {
    for (let exponent = -1; exponent >= -300; exponent -= 1) {
      const p = 0.4 * 10 ** exponent;
      expect(normalDeviate(p) / normalQuantile(p)).toBeCloseTo(1, 12);
    }
    for (let p = 0.001; p < 1; p += 0.001) expect(normalDeviate(p)).toBeCloseTo(normalQuantile(p), 12);
  });

  it("gives the published check values", () => {
    // AS 241 prints these (from memory): p = 0.25, 0.001, 1e-20
    expect(normalDeviate(0.25)).toBeCloseTo(-0.6744897501960817, 14);
    expect(normalDeviate(0.001)).toBeCloseTo(-3.090232306167814, 14);
    expect(normalDeviate(1e-20)).toBeCloseTo(-9.26234008979841, 13);
  });

  it("is odd about one half", () => {
    for (const p of [0.5, 0.3, 0.07, 0.01, 2 ** -40])
      expect(normalDeviate(1 - p)).toBeCloseTo(-normalDeviate(p), 10);
  });
});
