import { describe, expect, it } from "vitest";
import { inferSheet } from "../../src/readings/inferSheet.ts";
import { foretell } from "../../src/readings/sheetOnFeed.ts";
import { describeReference, num } from "../reference.ts";
import { randomSource } from "./bench.ts";

const frequencyGHz = 10.4;
const exact = { returnLossStandardDb: 1e-5, lossStandardDb: 1e-5 };

describe("a sheet from a known feed", () => {
  // 10.4 GHz, sheet on the mouth, forward by a network cascade of another program
  it.each([
    [14, 5.854417, 2.4, -30, 1.165777, 2.6, 0.007],
    [15.2, 8.12302, 2.2, -130, 0.62365, 2.75, 0.006],
    [13, 9.270828, 1, -100, 0.323828, 2.34, 0.0002],
  ])("of %d dB, %d dB covered, is that of an independent cascade", (...row) => {
    const [feedReturnLossDb, coveredReturnLossDb, thicknessMm, phaseDeg, insertionLossDb, eps, tan] = row;
    const { solutions } = inferSheet({
      frequencyGHz,
      feedReturnLossDb,
      coveredReturnLossDb,
      thicknessMm,
      phaseDeg,
      insertionLossDb,
      ...exact,
    });
    const nearest = solutions.find((one) => Math.abs(one.permittivity - eps) < 1e-3)!;
    expect(nearest.lossTangent).toBeCloseTo(tan, 4);
    expect(nearest.exact).toBe(true);
  });

  describeReference("covers/check-inverse.csv", (row) => {
    if (row["kind"] !== "sheet_eps") return;
    const given = Object.fromEntries(
      row["given"]!.split(";").map((pair) => pair.split("=") as [string, string]),
    );
    const { solutions } = inferSheet({
      frequencyGHz,
      feedReturnLossDb: num(row, "rl_bare_db"),
      coveredReturnLossDb: num(row, "rl_with_db"),
      thicknessMm: Number(given["d_mm"]),
      phaseDeg: Number(given["phi22_deg"]),
      insertionLossDb: Number(given["il_db"]),
      ...exact,
    });
    const tan = num(row, "tan_delta");
    expect(
      solutions.some(
        (one) =>
          Math.abs(one.permittivity - num(row, "eps_real")) <= 0.01 &&
          Math.abs(one.lossTangent - tan) <= Math.max(0.1 * tan, 0.0005),
      ),
    ).toBe(true);
  });

  const feed = { frequencyGHz, feedReturnLossDb: 14, gapMm: 0 };
  const read = (permittivity: number, lossTangent: number, thicknessMm: number, phaseDeg: number) =>
    foretell({ ...feed, phaseDeg, layer: { permittivity, lossTangent, thicknessMm } });

  it("is listed among all that give the same readings, with a reading that tells them apart", () => {
    const phaseDeg = 20;
    const { returnLossDb, insertionLossDb } = read(2.2, 0.004, 8, phaseDeg);
    const input = { ...feed, phaseDeg, thicknessMm: 8, insertionLossDb, ...exact };
    const found = inferSheet({ ...input, coveredReturnLossDb: returnLossDb });
    expect(found.outcome).toBe("ambiguous");
    expect(found.solutions.length).toBeGreaterThan(1);
    for (const { permittivity, lossTangent } of found.solutions) {
      const again = read(permittivity, lossTangent, 8, phaseDeg);
      expect(again.returnLossDb).toBeCloseTo(returnLossDb, 3);
      expect(again.insertionLossDb).toBeCloseTo(insertionLossDb, 3);
    }
    expect(found.solutions.some((one) => Math.abs(one.permittivity - 2.2) < 1e-3)).toBe(true);
    const branches = new Set(found.solutions.map((one) => one.halfWaves));
    expect(branches.size).toBeGreaterThan(1);
    const best = found.advice[0]!;
    expect(best.decides).toBe(true);
    const foretold = found.solutions.map(
      ({ permittivity, lossTangent }) =>
        foretell({
          ...feed,
          phaseDeg,
          frequencyGHz: best.frequencyGHz,
          gapMm: best.gapMm,
          layer: { permittivity, lossTangent, thicknessMm: best.thicknessMm },
        }).returnLossDb,
    );
    best.returnLossDb.forEach((returnLoss, i) => {
      expect(returnLoss).toBeCloseTo(foretold[i]!, 9);
    });
  });

  it("lies in the stated intervals, with noise in all three readings", () => {
    const { normal, uniform } = randomSource(41);
    const trials = 150;
    let permittivityHeld = 0;
    let lossTangentHeld = 0;
    for (let trial = 0; trial < trials; trial++) {
      const permittivity = 2 + 1.5 * uniform();
      const lossTangent = 0.02 * uniform();
      const phaseDeg = 360 * uniform() - 180;
      const { returnLossDb, insertionLossDb } = read(permittivity, lossTangent, 2, phaseDeg);
      const { solutions } = inferSheet({
        ...feed,
        feedReturnLossDb: 14 + 0.1 * normal(),
        coveredReturnLossDb: returnLossDb + 0.1 * normal(),
        insertionLossDb: insertionLossDb + 0.02 * normal(),
        thicknessMm: 2,
        phaseDeg,
        returnLossStandardDb: 0.1,
        lossStandardDb: 0.02,
      });
      const own = solutions.filter(
        (one) => permittivity >= one.permittivityLow && permittivity <= one.permittivityHigh,
      );
      if (own.length > 0) permittivityHeld++;
      if (own.some((one) => lossTangent >= one.lossTangentLow && lossTangent <= one.lossTangentHigh)) {
        lossTangentHeld++;
      }
    }
    // k = 2 is 95.45 %; the random error of 150 trials is 1.7 %
    expect(permittivityHeld / trials).toBeGreaterThan(0.91);
    expect(lossTangentHeld / trials).toBeGreaterThan(0.87); // both at once
  });

  it("of a good plastic has a loss tangent known only as below something", () => {
    const { returnLossDb, insertionLossDb } = read(2.1, 0.0004, 1.5, 60);
    const { solutions } = inferSheet({
      ...feed,
      coveredReturnLossDb: returnLossDb,
      insertionLossDb,
      thicknessMm: 1.5,
      phaseDeg: 60,
      returnLossStandardDb: 0.05,
    });
    const own = solutions.find((one) => one.permittivityLow <= 2.1 && one.permittivityHigh >= 2.1)!;
    expect(own).toMatchObject({ onlyBelow: true, lossTangentLow: 0 });
    expect(own.lossTangentHigh).toBeGreaterThan(0.0004);
  });

  it("without the feed's phase is an interval that holds every phase's readings", () => {
    for (const phaseDeg of [-150, -90, -30, 30, 90, 150]) {
      const { returnLossDb, insertionLossDb } = read(2.6, 0.005, 2, phaseDeg);
      const input = { ...feed, coveredReturnLossDb: returnLossDb, insertionLossDb, thicknessMm: 2 };
      const found = inferSheet({ ...input, returnLossStandardDb: 0.1 });
      expect(found).toMatchObject({ outcome: "undetermined", solutions: [] });
      expect(found.permittivityIntervals.some(([low, high]) => low <= 2.6 && high >= 2.6)).toBe(true);
    }
  });

  it("is contradicted by a loss below the energy floor, and by a match that no sheet makes", () => {
    const input = { ...feed, thicknessMm: 2, phaseDeg: 0, returnLossStandardDb: 0.1 };
    const below = inferSheet({ ...input, coveredReturnLossDb: 6, insertionLossDb: 0.3 });
    expect(below).toMatchObject({ outcome: "contradictory", solutions: [] });
    // -10 log10(1 - 10^-0.6) + 10 log10(1 - 10^-1.4) = 1.256 - 0.177
    expect(below.heatDb).toBeCloseTo(0.3 - 1.079, 2);
    const thin = inferSheet({ ...input, thicknessMm: 0.05, coveredReturnLossDb: 6 });
    expect(thin).toMatchObject({ outcome: "contradictory", solutions: [] });
  });

  it("is air where nothing changed", () => {
    const { solutions } = inferSheet({
      ...feed,
      coveredReturnLossDb: 14,
      insertionLossDb: 0,
      thicknessMm: 0.5,
      phaseDeg: 90,
      permittivityRange: [1, 3],
      returnLossStandardDb: 0.05,
    });
    expect(solutions[0]!.permittivityLow).toBe(1);
  });

  it("refuses what cannot be", () => {
    const input = { ...feed, coveredReturnLossDb: 10, thicknessMm: 2, phaseDeg: 0 };
    expect(() => inferSheet({ ...input, thicknessMm: 0 })).toThrow(RangeError);
    expect(() => inferSheet({ ...input, permittivityRange: [4, 2] })).toThrow(RangeError);
    expect(() => inferSheet({ ...input, lossStandardDb: -1 })).toThrow(RangeError);
  });
});
