import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { gasValidity, specificGasAttenuation } from "../../src/atmosphere/gasAttenuation.ts";
import { oxygenLines, VALUES_PER_LINE, vapourLines } from "../../src/atmosphere/gasLines.ts";
import { outside } from "../../src/numeric/check.ts";
import { describeReference, num, type Row } from "../reference.ts";
import { expectRelative } from "./relative.ts";

describe("specific attenuation by gases", () => {
  // ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0 (02/12/2024), sheet P.676-13 SpAtt.
  // The pressure of 1013.25 hPa in that sheet is the dry one.
  it.each([
    [1, 0.00538865816791, 5.0904617325e-5],
    [10, 0.00822441670271, 0.00597412524548],
    [22, 0.0131302229654, 0.174207033337],
    [60, 14.6234747965, 0.154841840636],
    [118, 1.13486620187, 0.605921952594],
    [183, 0.0127339088359, 27.6650083142],
  ])("at %d GHz, 15 degC, 7.5 g/m3", (frequencyGHz, oxygen, vapour) => {
    const result = specificGasAttenuation({
      frequencyGHz,
      dryPressureHPa: 1013.25,
      vapourPressureHPa: 9.97288878634,
      temperatureK: 288.15,
    });
    expectRelative(result.oxygenDbPerKm, oxygen, 1e-10);
    expectRelative(result.vapourDbPerKm, vapour, 1e-10);
    expectRelative(result.totalDbPerKm, oxygen + vapour, 1e-10);
  });

  it("dry air has no vapour loss, and vapour adds some at every frequency", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 1000, noNaN: true }),
        fc.double({ min: 230, max: 320, noNaN: true }),
        fc.double({ min: 0.1, max: 40, noNaN: true }),
        (frequencyGHz, temperatureK, vapourPressureHPa) => {
          const air = { frequencyGHz, temperatureK, dryPressureHPa: 900 };
          expect(specificGasAttenuation({ ...air, vapourPressureHPa: 0 }).vapourDbPerKm).toBe(0);
          const damp = specificGasAttenuation({ ...air, vapourPressureHPa });
          const damper = specificGasAttenuation({ ...air, vapourPressureHPa: 1.1 * vapourPressureHPa });
          expect(damper.vapourDbPerKm).toBeGreaterThan(damp.vapourDbPerKm);
          expect(damp.oxygenDbPerKm).toBeGreaterThan(0);
        },
      ),
    );
  });

  it("refuses impossible air and names the field", () => {
    const air = { frequencyGHz: 10, dryPressureHPa: 1000, vapourPressureHPa: 5, temperatureK: 280 };
    expect(() => specificGasAttenuation({ ...air, frequencyGHz: 0 })).toThrow(/frequencyGHz/);
    expect(() => specificGasAttenuation({ ...air, dryPressureHPa: 0 })).toThrow(/dryPressureHPa/);
    expect(() => specificGasAttenuation({ ...air, vapourPressureHPa: -1 })).toThrow(/vapourPressureHPa/);
    expect(() => specificGasAttenuation({ ...air, temperatureK: NaN })).toThrow(/temperatureK/);
  });

  it("is vouched for from 1 to 1000 GHz", () => {
    expect(outside(gasValidity, { frequencyGHz: 0.43 })).toHaveLength(1);
    expect(outside(gasValidity, { frequencyGHz: 10.368 })).toEqual([]);
  });

  it("sums 44 lines of oxygen and 35 of water vapour", () => {
    expect(oxygenLines).toHaveLength(44 * VALUES_PER_LINE);
    expect(vapourLines).toHaveLength(35 * VALUES_PER_LINE);
  });
});

describeReference("atmosphere/checks-p676.csv", (row) => {
  const result = specificGasAttenuation({
    frequencyGHz: num(row, "f_GHz"),
    dryPressureHPa: num(row, "p_dry_hPa"),
    vapourPressureHPa: num(row, "e_hPa"),
    temperatureK: num(row, "T_K"),
  });
  expectRelative(result.oxygenDbPerKm, num(row, "gamma_o_dB_km"), 1e-6, row["id"]);
  if (row["gamma_w_dB_km"] === "") return; // the source row gives oxygen alone
  expectRelative(result.vapourDbPerKm, num(row, "gamma_w_dB_km"), 1e-6, row["id"]);
});

/** The values of the line at the frequency of a row of the published table. */
function lineOf(lines: Float64Array, row: Row): number[] {
  for (let i = 0; i < lines.length; i += VALUES_PER_LINE) {
    if (lines[i] === num(row, "f0_GHz")) return [...lines.subarray(i, i + VALUES_PER_LINE)];
  }
  throw new Error(`no line at ${row["f0_GHz"]} GHz`);
}

describeReference("atmosphere/p676-oxygen-lines.csv", (row) => {
  const published = ["f0_GHz", "a1", "a2", "a3", "a4", "a5", "a6"].map((name) => num(row, name));
  expect(lineOf(oxygenLines, row)).toEqual(published);
});

describeReference("atmosphere/p676-water-lines.csv", (row) => {
  const published = ["f0_GHz", "b1", "b2", "b3", "b4", "b5", "b6"].map((name) => num(row, name));
  expect(lineOf(vapourLines, row)).toEqual(published);
});
