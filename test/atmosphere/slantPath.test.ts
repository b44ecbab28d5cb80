import { describe, expect, it } from "vitest";
import { specificGasAttenuation } from "../../src/atmosphere/gasAttenuation.ts";
import { referenceAtmosphere } from "../../src/atmosphere/referenceAtmosphere.ts";
import { clearSkyAbove, clearSkyTemperature, slantGasAttenuation } from "../../src/atmosphere/slantPath.ts";
import { integrate } from "../../src/numeric/quadrature.ts";
import { describeReference, num } from "../reference.ts";
import { expectRelative } from "./relative.ts";

describe("slant path through the clear atmosphere", () => {
  // ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0 (02/12/2024), sheet P.676-13
  // A_Gas_A1_2.2.1a.
  it("28 GHz, 30 deg, sea level", () => {
    const { attenuationDb } = slantGasAttenuation({ frequencyGHz: 28, elevationDeg: 30 });
    expectRelative(attenuationDb, 0.470811734729, 1e-11);
  });

  it("straight up, from sea level and from a mountain, is the integral over the height", () => {
    const frequencyGHz = 24.048;
    const dbPerKm = (heightKm: number) =>
      specificGasAttenuation({ frequencyGHz, ...referenceAtmosphere({ heightKm }) }).totalDbPerKm;
    for (const stationHeightKm of [0, 2.5]) {
      const pieces = [stationHeightKm, 4, 8, 11.02, 16, 25, 40, 100];
      const integral = pieces
        .slice(1)
        .reduce((sum, top, i) => sum + integrate(dbPerKm, pieces[i]!, top, 24), 0);
      const path = slantGasAttenuation({ frequencyGHz, elevationDeg: 90, stationHeightKm });
      expectRelative(path.attenuationDb, integral, 1e-4);
    }
  });

  it("grows towards the horizon, a little less than over a flat Earth", () => {
    const at = (elevationDeg: number) => clearSkyTemperature({ frequencyGHz: 10.368, elevationDeg });
    const zenith = at(90);
    expect(at(30).attenuationDb / zenith.attenuationDb).toBeGreaterThan(1.98);
    expect(at(30).attenuationDb / zenith.attenuationDb).toBeLessThan(2);
    expect(at(0).skyK).toBeGreaterThan(at(0.5).skyK);
  });

  it("gives the same sky for one direction as for many, and the same loss as without the sky", () => {
    const input = { frequencyGHz: 47.088, elevationDeg: 7, stationHeightKm: 0.6 };
    const sky = clearSkyTemperature(input);
    expect(clearSkyAbove(input)(7)).toEqual(sky);
    expectRelative(slantGasAttenuation(input).attenuationDb, sky.attenuationDb, 1e-13);
  });

  it("an opaque sky is as bright as the air near the ground", () => {
    const { skyK, attenuationDb } = clearSkyTemperature({ frequencyGHz: 60, elevationDeg: 1 });
    expect(attenuationDb).toBeGreaterThan(500);
    expect(skyK).toBeGreaterThan(285);
    expect(skyK).toBeLessThan(288.15);
  });

  it("refuses impossible stations and names the field", () => {
    const input = { frequencyGHz: 10, elevationDeg: 10 };
    expect(() => slantGasAttenuation({ ...input, elevationDeg: -1 })).toThrow(/elevationDeg/);
    expect(() => slantGasAttenuation({ ...input, stationHeightKm: 412 })).toThrow(/stationHeightKm/);
    expect(() => clearSkyTemperature({ ...input, frequencyGHz: 0 })).toThrow(/frequencyGHz/);
  });
});

describeReference("atmosphere/checks-noise-sky.csv", (row) => {
  const sky = clearSkyTemperature({ frequencyGHz: num(row, "f_GHz"), elevationDeg: num(row, "el_deg") });
  expectRelative(sky.attenuationDb, num(row, "A_dB"), 1e-6, row["id"]);
  if (row["T_sky_K"] === "") {
    expect(row["origin"]).toBe("ITU-VE"); // the one published row gives no brightness
    return;
  }
  expect(Math.abs(sky.skyK - num(row, "T_sky_K")), row["id"]).toBeLessThan(0.05);
});
