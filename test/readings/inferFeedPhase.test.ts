import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { inferFeedPhase, wrapped } from "../../src/readings/inferFeedPhase.ts";
import { foretell } from "../../src/readings/sheetOnFeed.ts";
import { describeReference, num } from "../reference.ts";
import { randomSource } from "./bench.ts";

const frequencyGHz = 10.4;

/** Cells of the inversion table's feed_phase rows: permittivity/loss tangent/thickness. */
function sheetFields(text: string) {
  const [permittivity, lossTangent, thicknessMm] = text.split("/").map(Number) as [number, number, number];
  return { permittivity, lossTangent, thicknessMm };
}

const holds = (one: { lowDeg: number; highDeg: number }, phaseDeg: number) =>
  [-720, -360, 0, 360, 720].some((turn) => phaseDeg + turn >= one.lowDeg && phaseDeg + turn <= one.highDeg);

describe("the phase of a feed from a known sheet", () => {
  // 10.4 GHz, sheets on the mouth, forward by a network cascade of another program
  it.each([
    [12, 7.917786, "2.08/0.0004/1.5", -0.999705],
    [15.2, 6.61828, "2.75/0.006/2.5", -0.413773],
    [15, 18.021476, "3.3/0.008/0.5", 0.71933],
  ])("of %d dB, %d dB covered, has the cosine of an independent cascade", (bare, covered, sheet, cosSum) => {
    const found = inferFeedPhase({
      frequencyGHz,
      ...sheetFields(sheet),
      feedReturnLossDb: bare,
      coveredReturnLossDb: covered,
    });
    expect(found.cosSum).toBeCloseTo(cosSum, 5);
    expect(found.outcome).toBe("ambiguous");
  });

  describeReference("covers/check-inverse.csv", (row) => {
    if (row["kind"] !== "feed_phase") return;
    const { cosSum } = inferFeedPhase({
      frequencyGHz,
      ...sheetFields(row["given"]!),
      feedReturnLossDb: num(row, "rl_bare_db"),
      coveredReturnLossDb: num(row, "rl_with_db"),
    });
    expect(Math.abs(cosSum - num(row, "cos_sum"))).toBeLessThanOrEqual(1e-3);
  });

  const sheet = { permittivity: 2.6, lossTangent: 0.006, thicknessMm: 2 };
  const phase = fc.double({ min: -179, max: 179, noNaN: true });

  it("is one of two, both of which give the same reading, gap or not", () => {
    fc.assert(
      fc.property(phase, fc.constantFrom(0, 1.7, 12), (phaseDeg, gapMm) => {
        const feed = { frequencyGHz, feedReturnLossDb: 14, layer: sheet, gapMm };
        const coveredReturnLossDb = foretell({ ...feed, phaseDeg }).returnLossDb;
        const { solutions } = inferFeedPhase({
          frequencyGHz,
          ...sheet,
          gapMm,
          feedReturnLossDb: 14,
          coveredReturnLossDb,
        });
        const nearest = Math.min(...solutions.map((one) => Math.abs(wrapped(one.phaseDeg - phaseDeg))));
        expect(nearest).toBeLessThan(0.01);
        for (const one of solutions) {
          const again = foretell({ ...feed, phaseDeg: one.phaseDeg }).returnLossDb;
          expect(again).toBeCloseTo(coveredReturnLossDb, 6);
        }
      }),
    );
  });

  it("lies in the stated interval of one solution, with noise in both readings", () => {
    const { normal, uniform } = randomSource(31);
    let held = 0;
    const trials = 600;
    for (let trial = 0; trial < trials; trial++) {
      const phaseDeg = 360 * uniform() - 180;
      const clean = foretell({ frequencyGHz, feedReturnLossDb: 12, phaseDeg, layer: sheet, gapMm: 0 });
      const { solutions } = inferFeedPhase({
        frequencyGHz,
        ...sheet,
        feedReturnLossDb: 12 + 0.1 * normal(),
        coveredReturnLossDb: clean.returnLossDb + 0.1 * normal(),
        returnLossStandardDb: 0.1,
      });
      if (solutions.some((one) => holds(one, phaseDeg))) held++;
    }
    // k = 2 is 95.45 %; two intervals overlap at times, which may only help
    expect(held / trials).toBeGreaterThan(0.93);
  });

  it("is told apart by the advised reading", () => {
    const feed = { frequencyGHz, feedReturnLossDb: 14, layer: sheet, gapMm: 0 };
    const coveredReturnLossDb = foretell({ ...feed, phaseDeg: -70 }).returnLossDb;
    const { advice, solutions } = inferFeedPhase({
      frequencyGHz,
      ...sheet,
      feedReturnLossDb: 14,
      coveredReturnLossDb,
      returnLossStandardDb: 0.2,
    });
    const best = advice[0]!;
    expect(best.decides).toBe(true);
    const truth = foretell({
      ...feed,
      phaseDeg: -70,
      frequencyGHz: best.frequencyGHz,
      gapMm: best.gapMm,
      layer: { ...sheet, thicknessMm: best.thicknessMm },
    }).returnLossDb;
    const right = solutions.findIndex((one) => Math.abs(wrapped(one.phaseDeg + 70)) < 0.01);
    expect(best.returnLossDb[right]).toBeCloseTo(truth, 3);
    expect(Math.abs(best.returnLossDb[1 - right]! - truth)).toBeCloseTo(best.separationDb, 3);
  });

  it("says when the readings cannot belong to the sheet", () => {
    const contradiction = { frequencyGHz, ...sheet, feedReturnLossDb: 20, coveredReturnLossDb: 3 };
    const found = inferFeedPhase({ ...contradiction, returnLossStandardDb: 0.1 });
    expect(found.cosSum).toBeLessThan(-1);
    expect(found).toMatchObject({ outcome: "contradictory", ambiguous: false, solutions: [] });
  });

  it("is the end of the range where the readings pass it within their uncertainty", () => {
    const feed = { frequencyGHz, feedReturnLossDb: 14, layer: sheet, gapMm: 0 };
    const worst = Math.min(
      ...Array.from({ length: 360 }, (_, phaseDeg) => foretell({ ...feed, phaseDeg }).returnLossDb),
    );
    const found = inferFeedPhase({
      frequencyGHz,
      ...sheet,
      feedReturnLossDb: 14,
      coveredReturnLossDb: worst - 0.05,
      returnLossStandardDb: 0.1,
    });
    expect(found.cosSum).toBeLessThan(-1);
    expect(found.outcome).toBe("decided");
    const [only] = found.solutions;
    expect(only!.highDeg - only!.phaseDeg).toBeCloseTo(only!.phaseDeg - only!.lowDeg, 9);
    expect(only!.highDeg).toBeGreaterThan(only!.lowDeg + 10);
  });

  it("refuses a sheet or a feed that reflects nothing", () => {
    const input = { frequencyGHz, ...sheet, feedReturnLossDb: 14, coveredReturnLossDb: 10 };
    expect(() => inferFeedPhase({ ...input, permittivity: 1, lossTangent: 0 })).toThrow(/reflects nothing/);
    expect(() => inferFeedPhase({ ...input, feedReturnLossDb: Infinity })).toThrow(/reflects nothing/);
    expect(() => inferFeedPhase({ ...input, gapMm: -1 })).toThrow(RangeError);
  });
});
