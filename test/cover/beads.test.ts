import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { BEAD_HEIGHT_MM, beadedSheet } from "../../src/cover/beads.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { waterLayer } from "../../src/cover/waterFilm.ts";
import { abs, polar } from "../../src/numeric/complex.ts";

const cover = { permittivity: 2.08, lossTangent: 0.0004, thicknessMm: 1 };
const sheetOf = (...layers: (typeof cover)[]) =>
  layeredSheet({ frequencyGHz: 10.368, incidenceDeg: 0, polarization: "te", layers });
const dry = sheetOf(cover);
const wet = sheetOf(
  cover,
  waterLayer({ thicknessMm: BEAD_HEIGHT_MM, frequencyGHz: 10.368, temperatureC: 10 }),
);
const share = (low: number, nominal: number, high: number) => ({ low, nominal, high });

describe("drops on a cover", () => {
  it("none leave it dry, everywhere they are a film", () => {
    const none = beadedSheet({ dry, wet, coveredShare: share(0, 0, 0) });
    expect(none.excessDb).toEqual({ low: 0, nominal: 0, high: 0 });
    expect(none.reflection).toEqual(dry.reflection);
    const whole = beadedSheet({ dry, wet, coveredShare: share(1, 1, 1) });
    expect(whole.excessDb.nominal).toBeCloseTo(wet.transmissionLossDb - dry.transmissionLossDb, 9);
    expect(abs(whole.transmission)).toBeCloseTo(abs(wet.transmission), 12);
  });

  // Opaque drops over a share C of a coherent aperture leave 1 - C of the field: -20 log10 0.85 = 1.4116 dB.
  it("opaque drops on 15 % cost 1.41 dB", () => {
    const opaque = { reflection: polar(0.9, 2), transmission: polar(0, 0) };
    const { excessDb } = beadedSheet({ dry, wet: opaque, coveredShare: share(0.05, 0.15, 0.3) });
    expect(excessDb.nominal).toBeCloseTo(1.4116, 4);
    expect(excessDb.low).toBeCloseTo(0.4455, 4);
    expect(excessDb.high).toBeCloseTo(3.098, 4);
  });

  it("a fresh repellent surface loses far less than the film", () => {
    const { excessDb } = beadedSheet({ dry, wet, coveredShare: share(0.05, 0.15, 0.3) });
    expect(excessDb.high).toBeLessThan((wet.transmissionLossDb - dry.transmissionLossDb) / 2);
  });

  it("bounds hold for every share between, also where both parts cancel", () => {
    const shares = fc
      .tuple(...Array.from({ length: 3 }, () => fc.double({ min: 0, max: 1, noNaN: true })))
      .map((values) => values.sort((a, b) => a - b) as [number, number, number]);
    fc.assert(
      fc.property(
        shares,
        fc.double({ min: 0, max: 0.99, noNaN: true }),
        fc.double({ min: -Math.PI, max: Math.PI, noNaN: true }),
        (limits, magnitude, phase) => {
          const parts = { dry, wet: { reflection: polar(0.1, 0), transmission: polar(magnitude, phase) } };
          const { excessDb } = beadedSheet({ ...parts, coveredShare: share(...limits) });
          expect(excessDb.low).toBeLessThanOrEqual(excessDb.nominal);
          expect(excessDb.nominal).toBeLessThanOrEqual(excessDb.high);
          for (let step = 0; step <= 20; step++) {
            const at = limits[0] + ((limits[2] - limits[0]) * step) / 20;
            const there = beadedSheet({ ...parts, coveredShare: share(at, at, at) }).excessDb.nominal;
            // As amplitudes: decibels have no digits left where both parts cancel.
            expect(10 ** (-there / 20)).toBeLessThanOrEqual(10 ** (-excessDb.low / 20) + 1e-12);
            expect(10 ** (-there / 20)).toBeGreaterThanOrEqual(10 ** (-excessDb.high / 20) - 1e-12);
          }
        },
      ),
    );
  });

  it("refuses shares out of order or range", () => {
    for (const coveredShare of [share(-0.1, 0, 1), share(0.5, 0.2, 1), share(0, 0.5, 1.1)]) {
      expect(() => beadedSheet({ dry, wet, coveredShare })).toThrow(/coveredShare/);
    }
  });
});
