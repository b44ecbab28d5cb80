import { describe, expect, it } from "vitest";
import {
  cloudLiquidCoefficient,
  cloudSlantAttenuation,
  cloudValidity,
} from "../../src/atmosphere/cloudLiquid.ts";
import { waterPermittivity } from "../../src/atmosphere/waterPermittivity.ts";
import { outside } from "../../src/numeric/check.ts";
import { SPEED_OF_LIGHT_M_PER_S } from "../../src/numeric/constants.ts";
import { describeReference, num } from "../reference.ts";
import { expectRelative } from "./relative.ts";

describe("fog and cloud", () => {
  // Textbook Rayleigh absorption of droplets: 6 pi / wavelength * Im(-(eps-1)/(eps+2)) per unit of volume share.
  it("absorbs as small spheres of water do", () => {
    for (const frequencyGHz of [3.4, 10.368, 47.088]) {
      const { real, imaginary } = waterPermittivity({ frequencyGHz, temperatureK: 283.15 });
      const polarizability = (3 * imaginary) / ((real + 2) ** 2 + imaginary ** 2);
      const perMetre = ((6 * Math.PI * frequencyGHz * 1e9) / SPEED_OF_LIGHT_M_PER_S) * polarizability;
      const decibels = (10 / Math.LN10) * perMetre * 1e3 * 1e-6; // 1 g/m3 fills 1e-6 of the space
      const { dbPerKmPerGm3 } = cloudLiquidCoefficient({ frequencyGHz, temperatureK: 283.15 });
      expectRelative(dbPerKmPerGm3, decibels, 1e-3);
    }
  });

  // ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0 (02/12/2024), sheet P.840-9 A_Clouds.
  it.each([
    [6, 15, 0.823592462356, 0.0311277818545, 0.0990522412874],
    [30, 75, 0.087767417104, 0.707853958387, 0.064318099717],
  ])("slant path at %d GHz, %d deg", (frequencyGHz, elevationDeg, liquidWaterKgM2, perKg, loss) => {
    const result = cloudSlantAttenuation({ frequencyGHz, elevationDeg, liquidWaterKgM2 });
    expectRelative(result.dbPerKgM2, perKg, 1e-10);
    expectRelative(result.attenuationDb, loss, 1e-10);
  });

  it("refuses the horizon, where a level cloud has no end", () => {
    const cloud = { frequencyGHz: 10, elevationDeg: 30, liquidWaterKgM2: 0.5 };
    expect(() => cloudSlantAttenuation({ ...cloud, elevationDeg: 0 })).toThrow(/elevationDeg/);
    expect(() => cloudSlantAttenuation({ ...cloud, elevationDeg: 90.1 })).toThrow(/elevationDeg/);
    expect(() => cloudSlantAttenuation({ ...cloud, liquidWaterKgM2: -1 })).toThrow(/liquidWaterKgM2/);
    expect(outside(cloudValidity, { frequencyGHz: 241 })).toHaveLength(1);
  });
});

describeReference("atmosphere/checks-p840.csv", (row) => {
  const frequencyGHz = num(row, "f_GHz");
  if (row["Kl"] === "" && row["KL"] === "") throw new Error(`${row["id"]} checks no coefficient`);
  if (row["Kl"] !== "") {
    const { dbPerKmPerGm3 } = cloudLiquidCoefficient({ frequencyGHz, temperatureK: num(row, "T_K") });
    expectRelative(dbPerKmPerGm3, num(row, "Kl"), 1e-6, row["id"]);
  }
  if (row["KL"] !== "") {
    const { dbPerKgM2 } = cloudSlantAttenuation({ frequencyGHz, elevationDeg: 90, liquidWaterKgM2: 1 });
    expectRelative(dbPerKgM2, num(row, "KL"), 1e-6, row["id"]);
  }
});

describeReference("atmosphere/checks-p840-slant.csv", (row) => {
  const { attenuationDb } = cloudSlantAttenuation({
    frequencyGHz: num(row, "f_GHz"),
    elevationDeg: num(row, "el_deg"),
    liquidWaterKgM2: num(row, "L_kg_m2"),
  });
  expectRelative(attenuationDb, num(row, "A_dB"), 1e-6, row["id"]);
});
