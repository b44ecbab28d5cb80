import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { coveredFeed } from "../../src/cover/coveredFeed.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { matchingGap, pairReturnLoss, sheetPair } from "../../src/cover/sheetGap.ts";
import { wavelengthM } from "../../src/numeric/constants.ts";

const layer = fc.record({
  permittivity: fc.double({ min: 1.2, max: 6, noNaN: true }),
  lossTangent: fc.double({ min: 0, max: 0.05, noNaN: true }),
  thicknessMm: fc.double({ min: 0.1, max: 6, noNaN: true }),
});
const stack = fc.array(layer, { minLength: 1, maxLength: 3 });
const frequencies = fc.double({ min: 5, max: 25, noNaN: true });

describe("two equal sheets", () => {
  // Own closed form 2 k0 s = arg(G^2 - T^2), evaluated apart from this program.
  it("of 2.08 and 0.5 mm cancel at 10 GHz with a gap of 6.7256 mm", () => {
    const layers = [{ permittivity: 2.08, lossTangent: 0, thicknessMm: 0.5 }];
    const pair = sheetPair({ frequencyGHz: 10, layers })!;
    expect(pair.gapMm).toBeCloseTo(6.7256, 4);
    expect(pair.returnLossDb).toBeGreaterThan(200);
    expect(pair.periodMm).toBeCloseTo(14.99, 2);
  });

  // Two equal shunt susceptances b = k0 t (eps - 1) on a line cancel at a distance of arctan(2/b): line theory, by
  // hand. Each stands in the middle of its sheet.
  it("act as two susceptances on a line while they are thin", () => {
    for (const thicknessMm of [0.05, 0.1, 0.2]) {
      const wavenumber = (2 * Math.PI) / (1e3 * wavelengthM(10.368));
      const susceptance = wavenumber * thicknessMm * (3 - 1);
      const pair = sheetPair({
        frequencyGHz: 10.368,
        layers: [{ permittivity: 3, lossTangent: 0, thicknessMm }],
      })!;
      const distance = Math.atan(2 / susceptance) / wavenumber;
      expect(Math.abs(pair.gapMm + thicknessMm - distance)).toBeLessThan(thicknessMm / 100);
    }
  });

  it("reflect at no gap less than at the best, and at none more than at the worst", () => {
    fc.assert(
      fc.property(frequencies, stack, (frequencyGHz, layers) => {
        const pair = sheetPair({ frequencyGHz, layers });
        if (pair === undefined) return;
        const at = (gapMm: number) => pairReturnLoss({ frequencyGHz, layers, gapMm });
        // Beyond 120 dB the stack's own rounding decides.
        expect(Math.min(120, at(pair.gapMm))).toBeCloseTo(Math.min(120, pair.returnLossDb), 3);
        expect(at(pair.worstGapMm)).toBeCloseTo(pair.worstReturnLossDb, 6);
        for (let i = 0; i < 60; i++) {
          const elsewhere = at((i / 60) * pair.periodMm);
          expect(elsewhere).toBeLessThanOrEqual(pair.returnLossDb + 1e-6);
          expect(elsewhere).toBeGreaterThanOrEqual(pair.worstReturnLossDb - 1e-6);
        }
      }),
    );
  });

  it("have nothing to cancel where a sheet is half a wave thick and without loss", () => {
    const thicknessMm = (1e3 * wavelengthM(10)) / 4;
    expect(
      sheetPair({ frequencyGHz: 10, layers: [{ permittivity: 4, lossTangent: 0, thicknessMm }] }),
    ).toBeUndefined();
    expect(sheetPair({ frequencyGHz: 10, layers: [] })).toBeUndefined();
  });

  it("refuse a gap below nothing", () => {
    expect(() => pairReturnLoss({ frequencyGHz: 10, layers: [], gapMm: -1 })).toThrow(/gapMm/);
  });
});

describe("the gap that matches a feed", () => {
  it("is beaten nowhere within its period, in return loss or in insertion loss", () => {
    const phases = fc.double({ min: -180, max: 180, noNaN: true });
    fc.assert(
      fc.property(frequencies, stack, phases, (frequencyGHz, layers, phaseDeg) => {
        const sheet = layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
        fc.pre(sheet.returnLossDb < 60);
        const at = (gapMm: number) =>
          coveredFeed({ feedReturnLossDb: 14, sheet, phaseDeg, gapMm, frequencyGHz });
        const { gapMm, periodMm } = matchingGap({ frequencyGHz, phaseDeg, reflection: sheet.reflection });
        expect(gapMm).toBeGreaterThan(0);
        expect(gapMm).toBeLessThanOrEqual(periodMm);
        const best = at(gapMm);
        for (let i = 0; i < 40; i++) {
          const elsewhere = at((i / 40) * periodMm);
          expect(elsewhere.returnLossDb.nominal).toBeLessThanOrEqual(best.returnLossDb.nominal + 1e-6);
          expect(elsewhere.insertionLossDb.nominal).toBeGreaterThanOrEqual(
            best.insertionLossDb.nominal - 1e-9,
          );
        }
      }),
    );
  });

  it("refuses a phase that is no number", () => {
    expect(() =>
      matchingGap({ frequencyGHz: 10, phaseDeg: Number.NaN, reflection: { re: 0.1, im: 0 } }),
    ).toThrow(/phaseDeg/);
  });
});
