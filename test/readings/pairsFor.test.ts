import { describe, expect, it } from "vitest";
import { pairsFor } from "../../src/readings/pairsFor.ts";
import { reduceReadings } from "../../src/readings/reduceReadings.ts";
import { randomSource } from "./bench.ts";

describe("the number of pairs", () => {
  it("reaches the wanted uncertainty when they are taken, and one fewer does not", () => {
    const wantedDb = 0.1;
    const { pairs, more } = pairsFor({ readingStandardDb: 0.1, wantedDb, pairsSoFar: 4 });
    expect(more).toBe(pairs! - 4);
    // root mean square of the type A uncertainty over many runs with that many pairs
    const typical = (n: number) => {
      const { normal } = randomSource(n);
      let sum = 0;
      for (let run = 0; run < 2000; run++) {
        const level = () => 0.1 * normal();
        const openDb = Array.from({ length: n + 1 }, level);
        sum += reduceReadings({ openDb, coveredDb: Array.from({ length: n }, level) }).typeADb ** 2 / 2000;
      }
      return 2 * Math.sqrt(sum + 0.05 ** 2 / 3);
    };
    expect(typical(pairs!)).toBeLessThan(wantedDb * 1.01);
    expect(typical(pairs! - 1)).toBeGreaterThan(wantedDb * 0.99);
  });

  it("says when no number will do, and what is left", () => {
    const { pairs, more, leastDb } = pairsFor({ readingStandardDb: 0.02, wantedDb: 0.05 });
    expect(pairs).toBeUndefined();
    expect(more).toBeUndefined();
    // 2 x 0.05/sqrt 3
    expect(leastDb).toBeCloseTo(0.0577, 4);
  });

  it("asks for more pairs where Student's factor is used", () => {
    const wanted = { readingStandardDb: 0.1, wantedDb: 0.15 };
    expect(pairsFor({ ...wanted, confidence: 0.9545 }).pairs).toBeGreaterThan(pairsFor(wanted).pairs!);
    expect(pairsFor({ ...wanted, pairsSoFar: 50 }).more).toBe(0);
  });

  it("refuses what cannot be wanted", () => {
    expect(() => pairsFor({ readingStandardDb: 0.1, wantedDb: 0 })).toThrow(RangeError);
    expect(() => pairsFor({ readingStandardDb: -0.1, wantedDb: 1 })).toThrow(RangeError);
  });
});
