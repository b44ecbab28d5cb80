import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { rainValidity, specificRainAttenuation } from "../../src/atmosphere/rainAttenuation.ts";
import { outside } from "../../src/numeric/check.ts";
import { describeReference, num, type Row } from "../reference.ts";
import { expectRelative } from "./relative.ts";

const level = { elevationDeg: 0, rainRateMmPerH: 10 };

describe("specific attenuation by rain", () => {
  // ITU-R P.838-3 (03/2005) Table 5, k as printed and alpha to four decimals.
  it.each([
    [1, 7, 0.0000259, 0.9691, 0.0000308, 0.8592],
    [10, 5, 0.01217, 1.2571, 0.01129, 1.2156],
    [24, 4, 0.1425, 1.0101, 0.1404, 0.9561],
    [1000, 4, 1.3795, 0.6396, 1.3822, 0.6365],
  ])("k and alpha at %d GHz (k to %d decimals)", (frequencyGHz, decimals, kH, alphaH, kV, alphaV) => {
    const h = specificRainAttenuation({ ...level, frequencyGHz, tiltDeg: 0 });
    const v = specificRainAttenuation({ ...level, frequencyGHz, tiltDeg: 90 });
    expect(h.k).toBeCloseTo(kH, decimals);
    expect(h.alpha).toBeCloseTo(alphaH, 4);
    expect(v.k).toBeCloseTo(kV, decimals);
    expect(v.alpha).toBeCloseTo(alphaV, 4);
  });

  // ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0 (02/12/2024), sheet P.838-3 Sp.Att.
  it("slant path at 14.25 GHz, vertical", () => {
    const result = specificRainAttenuation({
      frequencyGHz: 14.25,
      elevationDeg: 20.1433580863,
      tiltDeg: 90,
      rainRateMmPerH: 42.91007183,
    });
    expectRelative(result.k, 0.0431983515593, 1e-10);
    expectRelative(result.alpha, 1.06315310032, 1e-10);
    expectRelative(result.dbPerKm, 2.35032323308, 1e-10);
  });

  it("no rain, no loss; more rain, more loss; circular between horizontal and vertical", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 1000, noNaN: true }),
        fc.double({ min: 0.1, max: 150, noNaN: true }),
        (frequencyGHz, rainRateMmPerH) => {
          const rain = { frequencyGHz, rainRateMmPerH, elevationDeg: 0 };
          const [h, c, v] = [0, 45, 90].map((tiltDeg) => specificRainAttenuation({ ...rain, tiltDeg }));
          expect(c!.k).toBeCloseTo((h!.k + v!.k) / 2, 12);
          const more = { ...rain, tiltDeg: 0, rainRateMmPerH: 1.01 * rainRateMmPerH };
          expect(specificRainAttenuation(more).dbPerKm).toBeGreaterThan(h!.dbPerKm);
          expect(specificRainAttenuation({ ...more, rainRateMmPerH: 0 }).dbPerKm).toBe(0);
        },
      ),
    );
  });

  it("seen from straight below, the tilt does not matter", () => {
    const overhead = { frequencyGHz: 12, rainRateMmPerH: 30, elevationDeg: 90 };
    const h = specificRainAttenuation({ ...overhead, tiltDeg: 0 });
    const v = specificRainAttenuation({ ...overhead, tiltDeg: 90 });
    expectRelative(v.dbPerKm, h.dbPerKm, 1e-12);
  });

  it("refuses impossible rain and names the field", () => {
    const rain = { ...level, frequencyGHz: 10, tiltDeg: 0 };
    expect(() => specificRainAttenuation({ ...rain, rainRateMmPerH: -1 })).toThrow(/rainRateMmPerH/);
    expect(() => specificRainAttenuation({ ...rain, frequencyGHz: -1 })).toThrow(/frequencyGHz/);
    expect(() => specificRainAttenuation({ ...rain, tiltDeg: Infinity })).toThrow(/tiltDeg/);
    expect(() => specificRainAttenuation({ ...rain, elevationDeg: 91 })).toThrow(/elevationDeg/);
    expect(outside(rainValidity, { frequencyGHz: 0.9 })).toHaveLength(1);
  });
});

describeReference("atmosphere/checks-p838.csv", (row) => {
  const result = specificRainAttenuation({
    frequencyGHz: num(row, "f_GHz"),
    rainRateMmPerH: num(row, "R_mm_h"),
    tiltDeg: num(row, "tau_deg"),
    elevationDeg: num(row, "el_deg"),
  });
  expectRelative(result.k, num(row, "k"), 1e-6, row["id"]);
  expectRelative(result.alpha, num(row, "alpha"), 1e-6, row["id"]);
  expectRelative(result.dbPerKm, num(row, "gamma_R_dB_km"), 1e-6, row["id"]);
});

/** 0.51 unit of the last printed digit: three near-ties of the printed table are rounded the other way. */
function expectPrinted(actual: number, row: Row, column: string): void {
  const decimals = row[column]!.split(".")[1]!.length;
  const units = Math.abs(actual - num(row, column)) * 10 ** decimals;
  expect(units, `${row["id"]} ${column}: ${actual}`).toBeLessThan(0.51);
}

describeReference("atmosphere/checks-p838-table5.csv", (row) => {
  const frequencyGHz = num(row, "f_GHz");
  const h = specificRainAttenuation({ ...level, frequencyGHz, tiltDeg: 0 });
  const v = specificRainAttenuation({ ...level, frequencyGHz, tiltDeg: 90 });
  expectPrinted(h.k, row, "kH");
  expectPrinted(h.alpha, row, "alphaH");
  expectPrinted(v.k, row, "kV");
  expectPrinted(v.alpha, row, "alphaV");
});
