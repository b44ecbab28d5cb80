import { describe, expect, it } from "vitest";
import { minimum } from "../../src/numeric/minimum.ts";

describe("least value", () => {
  it("is found to the last bits at a kink", () => {
    expect(minimum((x) => Math.abs(x - 1 / 3), 0, 1)).toBeCloseTo(1 / 3, 15);
  });

  // The cosine is least at pi; a smooth minimum hides within the square root of the rounding.
  it("is found to half the digits where it is smooth", () => {
    expect(Math.abs(minimum(Math.cos, 2, 5) - Math.PI)).toBeLessThan(1e-7);
  });

  it("lies at the end of a slope", () => {
    expect(minimum((x) => x, 2, 5)).toBeCloseTo(2, 12);
    expect(minimum((x) => -x, 2, 5)).toBeCloseTo(5, 12);
  });
});
