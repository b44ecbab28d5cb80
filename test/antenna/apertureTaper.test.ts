import { describe, expect, it } from "vitest";
import { apertureTaper } from "../../src/antenna/apertureTaper.ts";
import { integrate } from "../../src/numeric/quadrature.ts";
import { describeReference, num } from "../reference.ts";

describe("aperture taper", () => {
  it.each([
    // W. L. Stutzman and G. A. Thiele, Antenna Theory and Design (from memory): factor of lambda/D in degrees,
    // first side lobe, taper efficiency
    [1, 1, 58.9, 17.6, 1],
    [0, 1, 72.7, 24.6, 0.75],
    [0, 2, 84.3, 30.6, 0.556],
  ])("edge field %d, power %d", (edgeField, power, degrees, sideLobeDb, taper) => {
    const result = apertureTaper({ edgeField, power });
    expect(Math.abs(result.beamwidthFactorDeg - degrees)).toBeLessThan(0.1);
    expect(Math.abs(result.firstSideLobeDb - sideLobeDb)).toBeLessThan(0.05);
    expect(result.taper).toBeCloseTo(taper, 3);
  });

  it("agrees with the aperture integrated", () => {
    // taper = |int E dA|^2 / (A int E^2 dA), over rho with dA ~ rho d rho
    const field = (rho: number) => 0.3 + 0.7 * (1 - rho * rho) ** 1.5;
    const first = integrate((rho) => field(rho) * rho, 0, 1, 64);
    const second = integrate((rho) => field(rho) ** 2 * rho, 0, 1, 64);
    const { taper } = apertureTaper({ edgeField: 0.3, power: 1.5 });
    expect(taper).toBeCloseTo((2 * first ** 2) / second, 6);
  });

  it("widens the beam and lowers the side lobe as the rim darkens", () => {
    const steps = [1, 0.7, 0.4, 0.2].map((edgeField) => apertureTaper({ edgeField, power: 2 }));
    for (let i = 1; i < steps.length; i++) {
      expect(steps[i]!.beamwidthFactorDeg).toBeGreaterThan(steps[i - 1]!.beamwidthFactorDeg);
      expect(steps[i]!.firstSideLobeDb).toBeGreaterThan(steps[i - 1]!.firstSideLobeDb);
      expect(steps[i]!.taper).toBeLessThan(steps[i - 1]!.taper);
    }
  });

  it("refuses an edge brighter than the centre", () => {
    expect(() => apertureTaper({ edgeField: 1.1, power: 1 })).toThrow("edgeField");
    expect(() => apertureTaper({ edgeField: 0.3, power: 0 })).toThrow("power");
  });
});

describeReference("terrain/aperture-taper.csv", (row) => {
  const result = apertureTaper({ edgeField: num(row, "C"), power: num(row, "p") });
  expect(Math.abs(result.taper - num(row, "eff_taper"))).toBeLessThan(1e-9);
  const kRad = (result.beamwidthFactorDeg * Math.PI) / 180;
  expect(Math.abs(kRad - num(row, "k_rad"))).toBeLessThan(1e-6);
  expect(Math.abs(result.beamwidthFactorDeg - num(row, "k_deg"))).toBeLessThan(6e-5);
  expect(Math.abs(result.firstSideLobeDb + num(row, "first_sidelobe_dB"))).toBeLessThan(0.01);
});
