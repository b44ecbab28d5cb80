import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { effectiveEarthRadius, refractivity } from "../../src/atmosphere/refractivity.ts";
import { describeReference, num } from "../reference.ts";
import { expectRelative } from "./relative.ts";

describe("refractivity", () => {
  // ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0 (02/12/2024), sheet P.676-13
  // A_Gas_A1_2.2.1a, column of the index of refraction.
  it.each([
    [1003.27136523, 9.97262821925, 288.149675, 317.717989],
    [632.320138709, 1.37142958928, 263.533373925, 193.972732],
    [137.044452003, 0.00614759306851, 216.65, 49.137932],
  ])("of %d hPa dry, %d hPa vapour, %d K", (dryPressureHPa, vapourPressureHPa, temperatureK, n) => {
    const air = refractivity({ dryPressureHPa, vapourPressureHPa, temperatureK });
    expect(air.nUnits).toBeCloseTo(n, 5);
  });

  // ITU-R P.453-14 Annex 1: the same equation in the total pressure.
  it("agrees with the form in total pressure", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 300, max: 1080, noNaN: true }),
        fc.double({ min: 0, max: 40, noNaN: true }),
        fc.double({ min: 220, max: 320, noNaN: true }),
        (p, e, t) => {
          const air = refractivity({ dryPressureHPa: p, vapourPressureHPa: e, temperatureK: t });
          expect(air.nUnits).toBeCloseTo((77.6 * (p + e) - 5.6 * e + (3.75e5 * e) / t) / t, 9);
          expect(air.dryUnits + air.wetUnits).toBe(air.nUnits);
          expect(air.dryUnits).toBeCloseTo((77.6 * p) / t, 9);
        },
      ),
    );
  });

  it("refuses impossible air and names the field", () => {
    const air = { dryPressureHPa: 1000, vapourPressureHPa: 5, temperatureK: 280 };
    expect(() => refractivity({ ...air, dryPressureHPa: -1 })).toThrow(/dryPressureHPa/);
    expect(() => refractivity({ ...air, vapourPressureHPa: -1 })).toThrow(/vapourPressureHPa/);
    expect(() => refractivity({ ...air, temperatureK: 0 })).toThrow(/temperatureK/);
  });
});

describe("effective Earth radius", () => {
  it("is the Earth itself in air without gradient, and four thirds of it near -39", () => {
    expect(effectiveEarthRadius({ gradientNPerKm: 0 })).toEqual({ k: 1, radiusKm: 6371, ducting: false });
    const usual = effectiveEarthRadius({ gradientNPerKm: -39.25 }); // a quarter of 157
    expectRelative(usual.k, 4 / 3, 1e-15);
    expectRelative(usual.radiusKm, 8494.6667, 1e-8);
  });

  it("grows beyond bound at -157, and turns negative as a duct below", () => {
    const along = effectiveEarthRadius({ gradientNPerKm: -157 });
    expect(along).toEqual({ k: Infinity, radiusKm: Infinity, ducting: true });
    const duct = effectiveEarthRadius({ gradientNPerKm: -314 });
    expect(duct).toEqual({ k: -1, radiusKm: -6371, ducting: true });
    expect(() => effectiveEarthRadius({ gradientNPerKm: NaN })).toThrow(/gradientNPerKm/);
  });
});

describeReference("atmosphere/checks-p453-n.csv", (row) => {
  const { nUnits } = refractivity({
    dryPressureHPa: num(row, "p_dry_hPa"),
    vapourPressureHPa: num(row, "e_hPa"),
    temperatureK: num(row, "T_K"),
  });
  expect(Math.abs(nUnits - num(row, "N")), row["id"]).toBeLessThan(1e-4);
});

describeReference("atmosphere/checks-p453-k.csv", (row) => {
  const { k } = effectiveEarthRadius({ gradientNPerKm: num(row, "dNdh_N_per_km") });
  expectRelative(k, num(row, "k"), 1e-6, row["id"]);
});
