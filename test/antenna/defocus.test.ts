import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { defocus } from "../../src/antenna/defocus.ts";
import { integrate } from "../../src/numeric/quadrature.ts";
import { describeReference, num } from "../reference.ts";

describe("axial defocus", () => {
  it("costs nothing in focus, and the same on either side of it", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 12, noNaN: true }),
        fc.double({ min: 0.3, max: 1, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (exponent, focalRatio, defocusWavelengths) => {
          const dish = { exponent, focalRatio };
          expect(defocus({ ...dish, defocusWavelengths: 0 }).lossDb).toBeCloseTo(0, 12);
          const { lossDb } = defocus({ ...dish, defocusWavelengths });
          expect(lossDb).toBeGreaterThanOrEqual(-1e-12);
          const other = defocus({ ...dish, defocusWavelengths: -defocusWavelengths });
          expect(other.lossDb).toBeCloseTo(lossDb, 12);
        },
      ),
    );
  });

  it("starts as the variance of the phase over the aperture", () => {
    // Small errors: efficiency = 1 - variance of the phase, weighted with the field (J. Ruze, Proc. IEEE 54, 1966)
    const rim = 2 * Math.atan(1 / 1.6);
    const mean = (f: (t: number) => number) =>
      integrate((t) => Math.cos(t) * Math.tan(t / 2) * f(t), 0, rim) /
      integrate((t) => Math.cos(t) * Math.tan(t / 2), 0, rim);
    const phase = (t: number) => 2 * Math.PI * 0.01 * (1 - Math.cos(t));
    const variance = mean((t) => phase(t) ** 2) - mean(phase) ** 2;
    const { phaseEfficiency } = defocus({ exponent: 2, focalRatio: 0.4, defocusWavelengths: 0.01 });
    expect((1 - phaseEfficiency) / variance).toBeCloseTo(1, 3);
  });

  it("hurts a deep dish more than a shallow one", () => {
    const at = (focalRatio: number) => defocus({ exponent: 2, focalRatio, defocusWavelengths: 0.25 }).lossDb;
    expect(at(0.3)).toBeGreaterThan(at(0.4));
    expect(at(0.4)).toBeGreaterThan(at(0.6));
  });

  it("refuses a displacement that is no number", () => {
    expect(() => defocus({ exponent: 2, focalRatio: 0.4, defocusWavelengths: Number.NaN })).toThrow(
      RangeError,
    );
  });
});

describeReference("terrain/dish-axial-defocus.csv", (row) => {
  const { phaseEfficiency, lossDb } = defocus({
    exponent: num(row, "n"),
    focalRatio: num(row, "f_over_D"),
    defocusWavelengths: num(row, "delta_wl"),
  });
  expect(Math.abs(phaseEfficiency - num(row, "eff_phase"))).toBeLessThan(1e-7);
  expect(Math.abs(lossDb + num(row, "loss_dB"))).toBeLessThan(1e-6);
});
