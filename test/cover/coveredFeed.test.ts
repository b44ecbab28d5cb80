import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Bounded } from "../../src/cover/bounded.ts";
import { type CoveredFeed, type CoveredFeedInput, coveredFeed } from "../../src/cover/coveredFeed.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { reflectionFigures } from "../../src/cover/reflectionFigures.ts";
import { abs, abs2, polar } from "../../src/numeric/complex.ts";
import { describeReference, num } from "../reference.ts";
import { parseStack } from "./stack.ts";

const figures = [
  "returnLossDb",
  "insertionLossDb",
  "transducerLossDb",
  "mismatchLossDb",
  "dissipationDb",
  "sidewaysLossDb",
] as const satisfies (keyof CoveredFeed)[];

const straightOn = { incidenceDeg: 0, polarization: "te" } as const;

/** Passive reciprocal sheets: a reflection and what it leaves, less some heat. */
const sheets = fc
  .tuple(
    fc.double({ min: 0, max: 0.98, noNaN: true }),
    fc.double({ min: -Math.PI, max: Math.PI, noNaN: true }),
    fc.double({ min: 0.01, max: 1, noNaN: true }),
  )
  .map(([a, phase, passed]) => ({
    reflection: polar(a, phase),
    transmission: polar(Math.sqrt((1 - a * a) * passed), 0.3),
  }));
const feeds = fc.double({ min: 0.5, max: 60, noNaN: true });

/** Mean over the unknown phase by equal steps, which converges geometrically for a periodic function. */
function overPhase(input: CoveredFeedInput, value: (result: CoveredFeed) => number): number {
  const steps = 4096;
  let sum = 0;
  for (let i = 0; i < steps; i++) sum += value(coveredFeed({ ...input, phaseDeg: (360 * i) / steps }));
  return sum / steps;
}

describe("a perfectly matched feed", () => {
  // Orfanidis, Electromagnetic Waves and Antennas, ch. 5 (from memory): quarter-wave slab of n = 1.5,
  // 14.79 % reflected, 0.695 dB lost.
  it("takes on the reflection and the loss of the sheet, whatever the phase", () => {
    const sheet = layeredSheet({
      ...straightOn,
      frequencyGHz: 10,
      layers: [{ permittivity: 2.25, lossTangent: 0, thicknessMm: 4.99654097 }],
    });
    const result = coveredFeed({ feedReturnLossDb: Infinity, sheet });
    for (const side of ["low", "nominal", "high"] as const) {
      expect(result.returnLossDb[side]).toBeCloseTo(8.3, 2);
      expect(result.insertionLossDb[side]).toBeCloseTo(0.695, 3);
      expect(result.transducerLossDb[side]).toBeCloseTo(0.695, 3);
    }
    expect(result.phaseSpreadDb).toBe(0);
  });
});

describeReference("covers/check-mismatch.csv", (row) => {
  const sheet = layeredSheet({ ...straightOn, frequencyGHz: 10.4, layers: parseStack(row["stack"]!) });
  const feed = { feedReturnLossDb: num(row, "feed_rl_db"), sheet };
  const known = coveredFeed({
    ...feed,
    phaseDeg: num(row, "phi22_deg"),
    gapMm: num(row, "gap_mm"),
    frequencyGHz: 10.4,
  });
  const unknown = coveredFeed(feed);
  const near = (value: number, column: string, tolerance = 1e-3) =>
    expect(Math.abs(value - num(row, column)), `${row["id"]} ${column}`).toBeLessThanOrEqual(tolerance);
  near(abs(sheet.reflection), "gamma_cover", 1e-5);
  near(known.returnLossDb.nominal, "rl_with_db");
  near(reflectionFigures({ returnLossDb: known.returnLossDb.nominal }).vswr, "vswr_with");
  near(known.insertionLossDb.nominal, "il_change_db");
  near(known.transducerLossDb.nominal, "transducer_loss_db");
  near(unknown.returnLossDb.low, "rl_bound_worst_db");
  near(unknown.returnLossDb.high, "rl_bound_best_db");
});

describe("an independent computation of the cascade", () => {
  it("equals the sum of the waves that go to and fro", () => {
    const sheet = layeredSheet({
      ...straightOn,
      frequencyGHz: 10.4,
      layers: [{ permittivity: 2.75, lossTangent: 0.02, thicknessMm: 2 }],
    });
    const g = 10 ** (-11 / 20);
    const [phi, gapMm] = [0.7, 3];
    const a = abs(sheet.reflection);
    const roundTrip =
      Math.atan2(sheet.reflection.im, sheet.reflection.re) -
      (2 * 2 * Math.PI * 10.4e9 * gapMm * 1e-3) / 299792458;
    // S11 = g, S22 = g e^(j phi), S21^2 = -(1 - g^2) e^(j phi): lossless and reciprocal.
    let [inRe, inIm, outRe, outIm] = [g, 0, 0, 0];
    for (let trip = 0; trip < 60; trip++) {
      const magnitude = (g * a) ** trip;
      const angle = trip * (phi + roundTrip);
      outRe += magnitude * Math.cos(angle);
      outIm += magnitude * Math.sin(angle);
      inRe -= (1 - g * g) * a * magnitude * Math.cos(angle + phi + roundTrip);
      inIm -= (1 - g * g) * a * magnitude * Math.sin(angle + phi + roundTrip);
    }
    const gain = (1 - g * g) * abs2(sheet.transmission) * (outRe ** 2 + outIm ** 2);
    const result = coveredFeed({
      feedReturnLossDb: 11,
      sheet,
      phaseDeg: (phi * 180) / Math.PI,
      gapMm,
      frequencyGHz: 10.4,
    });
    expect(result.returnLossDb.nominal).toBeCloseTo(-10 * Math.log10(inRe ** 2 + inIm ** 2), 9);
    expect(result.transducerLossDb.nominal).toBeCloseTo(-10 * Math.log10(gain), 9);
  });
});

describe("averages over the phase", () => {
  it("equal the closed forms", () => {
    fc.assert(
      fc.property(fc.double({ min: 2, max: 60, noNaN: true }), sheets, (feedReturnLossDb, sheet) => {
        fc.pre(abs(sheet.reflection) < 0.9);
        const input = { feedReturnLossDb, sheet };
        const closed = coveredFeed(input);
        const mean = (figure: (typeof figures)[number]) =>
          overPhase(input, (result) => result[figure].nominal);
        for (const figure of [
          "insertionLossDb",
          "transducerLossDb",
          "mismatchLossDb",
          "dissipationDb",
        ] as const) {
          expect(closed[figure].nominal).toBeCloseTo(mean(figure), 8);
        }
        const meanPower = overPhase(input, (result) => 10 ** (-result.returnLossDb.nominal / 10));
        expect(10 ** (-closed.returnLossDb.nominal / 10)).toBeCloseTo(meanPower, 10);
        const variance = overPhase(
          input,
          (result) => (result.insertionLossDb.nominal - closed.insertionLossDb.nominal) ** 2,
        );
        expect(closed.phaseSpreadDb).toBeCloseTo(Math.sqrt(variance), 8);
      }),
      { numRuns: 30 },
    );
  });
});

describe("what every covered feed obeys", () => {
  const shares = fc.double({ min: 0, max: 1, noNaN: true });
  const phases = fc.double({ min: -720, max: 720, noNaN: true });

  it("low <= nominal <= high, and any known phase lies between", () => {
    fc.assert(
      fc.property(feeds, sheets, shares, phases, (feedReturnLossDb, sheet, collectedShare, phaseDeg) => {
        const input = { feedReturnLossDb, sheet, collectedShare };
        const unknown = coveredFeed(input);
        const known = coveredFeed({ ...input, phaseDeg });
        for (const figure of figures) {
          const { low, nominal, high } = unknown[figure];
          expect(low).toBeLessThanOrEqual(nominal);
          expect(nominal).toBeLessThanOrEqual(high);
          expect(known[figure].low).toBe(known[figure].high);
          // Return loss near a perfect null is compared as a power: its decibels have no digits there.
          const value = (it: number) => (figure === "returnLossDb" ? -(10 ** (-it / 10)) : it);
          expect(value(known[figure].nominal)).toBeGreaterThanOrEqual(value(low) - 1e-9);
          expect(value(known[figure].nominal)).toBeLessThanOrEqual(value(high) + 1e-9);
        }
      }),
    );
  });

  it("transducer loss is mismatch, heat and sideways loss together, none charged twice", () => {
    fc.assert(
      fc.property(feeds, sheets, shares, phases, (feedReturnLossDb, sheet, collectedShare, phaseDeg) => {
        for (const phase of [phaseDeg, undefined]) {
          const result = coveredFeed({ feedReturnLossDb, sheet, collectedShare, phaseDeg: phase });
          const parts = (["mismatchLossDb", "dissipationDb", "sidewaysLossDb"] as const).map(
            (figure) => result[figure].nominal,
          );
          expect(parts.reduce((sum, part) => sum + part)).toBeCloseTo(result.transducerLossDb.nominal, 8);
          for (const part of parts) expect(part).toBeGreaterThan(-1e-9);
        }
      }),
    );
  });

  it("a sheet of air changes nothing", () => {
    const sheet = layeredSheet({ ...straightOn, frequencyGHz: 10, layers: [] });
    const { returnLossDb, insertionLossDb, transducerLossDb } = coveredFeed({ feedReturnLossDb: 14, sheet });
    const all = (value: number) => ({ low: value, nominal: value, high: value }) satisfies Bounded;
    expect(insertionLossDb).toEqual(all(0));
    expect(returnLossDb.low).toBeCloseTo(14, 10);
    expect(returnLossDb.high).toBeCloseTo(14, 10);
    // Mismatch loss of 14 dB return loss: -10 log10(1 - 10^-1.4).
    expect(transducerLossDb.nominal).toBeCloseTo(0.1764, 4);
  });

  it("a share of 0 collected leaves the bare match, and the sheet's loss as it is", () => {
    const sheet = { reflection: polar(0.4, 1), transmission: polar(0.9, 0) };
    const result = coveredFeed({ feedReturnLossDb: 12, sheet, collectedShare: 0, phaseDeg: 30 });
    expect(result.returnLossDb.nominal).toBeCloseTo(12, 10);
    expect(result.insertionLossDb.nominal).toBeCloseTo(0.9151, 4); // -20 log10 0.9
  });

  it("a gap of half a wave changes nothing, a quarter wave turns the sheet's phase round", () => {
    const sheet = { reflection: polar(0.2, 0), transmission: polar(0.95, 0) };
    const at = (gapMm: number, phaseDeg: number) =>
      coveredFeed({ feedReturnLossDb: 12, sheet, phaseDeg, gapMm, frequencyGHz: 10 }).returnLossDb.nominal;
    expect(at(14.9896229, 40)).toBeCloseTo(at(0, 40), 8);
    expect(at(7.49481145, 40)).toBeCloseTo(at(0, 220), 8);
  });
});

describe("refusals", () => {
  const sheet = { reflection: polar(0.2, 0), transmission: polar(0.95, 0) };
  it.each([
    [{ feedReturnLossDb: 0, sheet }, /feedReturnLossDb/],
    [{ feedReturnLossDb: -3, sheet }, /feedReturnLossDb/],
    [{ feedReturnLossDb: 12, sheet: { ...sheet, reflection: polar(1, 0) } }, /sheet.reflection/],
    [{ feedReturnLossDb: 12, sheet, phaseDeg: Number.NaN }, /phaseDeg/],
    [{ feedReturnLossDb: 12, sheet, phaseDeg: 10, gapMm: 3 }, /frequencyGHz/],
    [{ feedReturnLossDb: 12, sheet, gapMm: -1 }, /gapMm/],
    [{ feedReturnLossDb: 12, sheet, collectedShare: 1.1 }, /collectedShare/],
  ])("%o", (input, named) => expect(() => coveredFeed(input)).toThrow(named));
});
