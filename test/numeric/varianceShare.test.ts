import { describe, expect, it } from "vitest";
import { uniformStream } from "../../src/numeric/uniformStream.ts";
import { varianceShare } from "../../src/numeric/varianceShare.ts";

const COUNT = 60_000;

describe("varianceShare", () => {
  it("gives the indices of the Ishigami function", () => {
    // sin x1 + 7 sin^2 x2 + 0.1 x3^4 sin x1, each x from -pi to pi: 0.3139, 0.4424 and 0, of variance 13.845
    // (Saltelli et al., Global Sensitivity Analysis. The Primer, 2008, 4.9; from memory)
    const drawn = (name: string) => {
      const out = new Float64Array(COUNT);
      uniformStream(11, name).fill(out);
      return out.map((u) => (2 * u - 1) * Math.PI);
    };
    const a = ["a1", "a2", "a3"].map(drawn);
    const b = ["b1", "b2", "b3"].map(drawn);
    const f = ([x, y, z]: readonly Float64Array[]) =>
      x!.map((_, i) => Math.sin(x![i]!) + 7 * Math.sin(y![i]!) ** 2 + 0.1 * z![i]! ** 4 * Math.sin(x![i]!));
    const shares = [0, 1, 2].map((k) =>
      varianceShare(f(a), f(b), f(a.map((column, i) => (i === k ? b[i]! : column)))),
    );
    for (const [k, published] of [0.3139, 0.4424, 0].entries()) {
      expect(Math.abs(shares[k]! - published)).toBeLessThan(0.02);
    }
  });

  it("is nothing where nothing varies", () => {
    const flat = new Float64Array(10).fill(3);
    expect(varianceShare(flat, flat, flat)).toBe(0);
  });
});
