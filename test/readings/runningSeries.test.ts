import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { TimedReading } from "../../src/readings/bracket.ts";
import { reduceSeries } from "../../src/readings/reduceSeries.ts";
import { runningSeries } from "../../src/readings/runningSeries.ts";
import { randomSource } from "./bench.ts";

function run(readings: readonly TimedReading[]) {
  const running = runningSeries();
  for (const [i, reading] of readings.entries()) running.add(reading, i);
  return running.end();
}

/** Bare, a cover, bare, ... with noise and a drift that is not straight. */
function alternating(count: number, start: number, spoil: (i: number) => number = () => 0): TimedReading[] {
  const { normal } = randomSource(start);
  return Array.from({ length: count }, (_, i) => {
    const state = i % 2 === 0 ? "open" : i % 4 === 1 ? "film" : "sheet";
    const loss = state === "film" ? 0.1 : state === "sheet" ? 0.3 : 0;
    const levelDb = -40 - loss + Math.sin(i / 300) + 0.02 * normal() + spoil(i);
    return { time: i, state, levelDb };
  });
}

describe("runningSeries", () => {
  it("agrees with the same series held whole, in any order of states and steps of time", () => {
    const one = fc.record({
      state: fc.constantFrom("open", "open", "film", "sheet"),
      levelDb: fc.double({ min: -50, max: -30, noNaN: true }),
      step: fc.double({ min: 0.1, max: 10, noNaN: true }),
    });
    fc.assert(
      fc.property(fc.array(one, { minLength: 12, maxLength: 60 }), (raw) => {
        let time = 0;
        const readings = raw.map(({ step, ...rest }) => {
          time += step;
          return { ...rest, time };
        });
        let held: ReturnType<typeof reduceSeries>;
        try {
          held = reduceSeries({ readings });
        } catch {
          expect(() => run(readings)).toThrow("at least two covered readings");
          return;
        }
        const running = run(readings);
        expect(running.degreesOfFreedom).toBe(held.degreesOfFreedom);
        expect(running.unbracketedCount).toBe(held.unbracketed.length);
        expect(running.readingStandardDb).toBeCloseTo(held.readingStandardDb, 8);
        for (const { state, lossDb, typeADb, differencesDb } of held.covers) {
          const other = running.covers.find((cover) => cover.state === state)!;
          expect(other.count).toBe(differencesDb.length);
          expect(other.lossDb).toBeCloseTo(lossDb, 9);
          expect(other.typeADb).toBeCloseTo(typeADb, 8);
        }
      }),
    );
  });

  it("finds the truth in a long run, and no outlier where there is none", () => {
    const { covers, readingStandardDb, outlier } = run(alternating(40_001, 7));
    expect(covers.map(({ state, count }) => [state, count])).toEqual([
      ["film", 10_000],
      ["sheet", 10_000],
    ]);
    // Four standard uncertainties of the mean: 0.02 sqrt(1.5/10000) dB.
    expect(Math.abs(covers[0]!.lossDb - 0.1)).toBeLessThan(0.001);
    expect(Math.abs(covers[1]!.lossDb - 0.3)).toBeLessThan(0.001);
    expect(readingStandardDb).toBeCloseTo(0.02, 3);
    expect(outlier).toBeUndefined();
  });

  it.each([
    ["covered", 20_001],
    ["bare", 20_000],
  ])("names the one %s reading that does not fit", (_, bad) => {
    const { outlier } = run(alternating(40_001, 8, (i) => (i === bad ? 1 : 0)));
    expect(outlier?.place).toBe(bad);
    expect(outlier?.shiftDb).toBeCloseTo(1, 1);
  });

  it("refuses a time that does not rise and a heap of covered readings without a bare one", () => {
    expect(() => run([reading(0, "open"), reading(0, "film")])).toThrow(RangeError);
    const { add } = runningSeries();
    add(reading(0, "open"), 0);
    expect(() => {
      for (let i = 1; i <= 100_001; i++) add(reading(i, "film"), i);
    }).toThrow("without a bare one between");
  });
});

function reading(time: number, state: string): TimedReading {
  return { time, state, levelDb: -40 };
}
