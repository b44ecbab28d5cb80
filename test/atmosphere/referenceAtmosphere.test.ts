import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { atmosphereValidity, referenceAtmosphere } from "../../src/atmosphere/referenceAtmosphere.ts";
import { outside } from "../../src/numeric/check.ts";
import { describeReference, num } from "../reference.ts";
import { expectRelative } from "./relative.ts";

describe("mean annual reference atmosphere", () => {
  // ITU-R P.835-6 (12/2017) Annex 1 section 1: its values at sea level.
  it("starts from 15 degC, 1013.25 hPa and 7.5 g/m3", () => {
    const air = referenceAtmosphere({ heightKm: 0 });
    expect(air.temperatureK).toBe(288.15);
    expect(air.pressureHPa).toBe(1013.25);
    expectRelative(air.vapourDensityGm3, 7.5, 1e-15);
  });

  // ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0 (02/12/2024), sheet P.676-13
  // A_Gas_A1_2.2.1a: one height in the weather, one with the vapour at its floor, one above 86 km.
  it.each([
    [1.057036232455, 281.280406801, 892.564335427, 4.42108395325],
    [26.165923928644, 222.708660435, 21.3383896302, 4.15253634396e-5],
    [99.956851559397, 194.99808538, 0.00032246990885, 7.16717080699e-10],
  ])("at %d km", (heightKm, temperatureK, pressureHPa, vapourDensityGm3) => {
    const air = referenceAtmosphere({ heightKm });
    expectRelative(air.temperatureK, temperatureK, 1e-10);
    expectRelative(air.pressureHPa, pressureHPa, 1e-10);
    expectRelative(air.vapourDensityGm3, vapourDensityGm3, 1e-10);
    expectRelative(air.dryPressureHPa + air.vapourPressureHPa, air.pressureHPa, 1e-15);
  });

  it("thins out upwards without steps, across every border of the layers", () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 99.9, noNaN: true }), (heightKm) => {
        const here = referenceAtmosphere({ heightKm });
        const above = referenceAtmosphere({ heightKm: heightKm + 0.1 });
        const ratio = above.pressureHPa / here.pressureHPa;
        expect(ratio).toBeLessThan(1);
        expect(ratio).toBeGreaterThan(0.97);
        expect(Math.abs(above.temperatureK - here.temperatureK)).toBeLessThan(1);
      }),
    );
  });

  // Geopotential borders 11, 20, 32, 47, 51, 71 km' and the change of formula at 86 km, where P.835-6 steps
  // from 186.946 K by the lapse to 186.8673 K.
  it.each([11.019, 20.063, 32.162, 47.35, 51.413, 71.802, 86, 91])("has no seam at %d km", (heightKm) => {
    const below = referenceAtmosphere({ heightKm: heightKm - 0.002 });
    const above = referenceAtmosphere({ heightKm: heightKm + 0.002 });
    expectRelative(above.pressureHPa, below.pressureHPa, 1.5e-3);
    expect(Math.abs(above.temperatureK - below.temperatureK)).toBeLessThan(0.09);
  });

  it("carries the lowest layer on for land below sea level", () => {
    const air = referenceAtmosphere({ heightKm: -0.43 });
    expect(air.temperatureK).toBeCloseTo(288.15 + 6.5 * 0.43, 3);
    expect(air.pressureHPa).toBeGreaterThan(1013.25);
    expect(outside(atmosphereValidity, { heightKm: -0.43 })).toHaveLength(1);
  });

  it("refuses heights it does not know", () => {
    expect(() => referenceAtmosphere({ heightKm: -1.1 })).toThrow(/heightKm/);
    expect(() => referenceAtmosphere({ heightKm: 100.1 })).toThrow(/heightKm/);
  });
});

describeReference("atmosphere/checks-p835.csv", (row) => {
  const air = referenceAtmosphere({ heightKm: num(row, "h_km") });
  expectRelative(air.temperatureK, num(row, "T_K"), 1e-8, row["id"]);
  expectRelative(air.pressureHPa, num(row, "P_hPa"), 1e-6, row["id"]);
  expectRelative(air.vapourDensityGm3, num(row, "rho_g_m3"), 1e-6, row["id"]);
  expectRelative(air.vapourPressureHPa, num(row, "e_hPa"), 1e-6, row["id"]);
});
