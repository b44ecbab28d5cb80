import { describe, expect, it } from "vitest";
import { correlation, mean, variance } from "../../src/numeric/ranking.ts";
import { uniformStream } from "../../src/numeric/uniformStream.ts";

const COUNT = 100_000;

function drawn(seed: number, name: string, count = COUNT): Float64Array {
  const out = new Float64Array(count);
  uniformStream(seed, name).fill(out);
  return out;
}

describe("uniformStream", () => {
  it("is evenly spread strictly inside (0, 1)", () => {
    const some = drawn(1, "tx.power");
    expect(Math.min(...some.subarray(0, 50_000))).toBeGreaterThan(0);
    expect(Math.max(...some.subarray(0, 50_000))).toBeLessThan(1);
    expect(Math.abs(mean(some) - 0.5)).toBeLessThan(4 / Math.sqrt(12 * COUNT));
    expect(variance(some)).toBeCloseTo(1 / 12, 3);
    // Pearson's chi-squared over 100 cells of 1000: 99 degrees of freedom, 4 deviations of sqrt(198).
    const cells = new Array<number>(100).fill(0);
    for (const u of some) cells[Math.floor(100 * u)]!++;
    const chi2 = cells.reduce((sum, n) => sum + (n - 1000) ** 2 / 1000, 0);
    expect(Math.abs(chi2 - 99)).toBeLessThan(4 * Math.sqrt(198));
  });

  it("gives the same numbers for one seed and name, however they are asked for", () => {
    const whole = drawn(5, "rain.rate", 300);
    const stream = uniformStream(5, "rain.rate");
    const parts = new Float64Array(100);
    for (let from = 0; from < 300; from += 100) {
      stream.fill(parts);
      expect(parts).toEqual(whole.slice(from, from + 100));
    }
  });

  it("gives independent numbers for names and seeds that hardly differ, from the first ones on", () => {
    const names = ["tx.power", "rx.power", "tx.powes", "a", "b", ""];
    const all = [...names.map((name) => drawn(1, name)), drawn(2, "tx.power"), drawn(0, "tx.power")];
    for (let i = 0; i < all.length; i++) {
      for (let j = 0; j < i; j++) {
        expect(Math.abs(correlation(all[i]!, all[j]!))).toBeLessThan(5 / Math.sqrt(COUNT));
      }
    }
    const firsts = Float64Array.from({ length: 2000 }, (_, seed) => drawn(seed, "x", 1)[0]!);
    expect(Math.abs(mean(firsts) - 0.5)).toBeLessThan(4 / Math.sqrt(12 * 2000));
    const [before, after] = [firsts.subarray(0, 1999), firsts.subarray(1)];
    expect(Math.abs(correlation(before, after))).toBeLessThan(5 / Math.sqrt(2000));
  });
});
