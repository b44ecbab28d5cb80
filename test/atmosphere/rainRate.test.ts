import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { monthlyRainPercent, monthlyRainRate } from "../../src/atmosphere/rainRate.ts";
import { describeReference, num } from "../reference.ts";
import { expectRelative } from "./relative.ts";

// ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0 (02/12/2024), sheet P.837-7 Rp: a mild,
// damp place. The published rates carry the 1e-5 of the search by which they were found.
const damp = {
  monthlyRainfallMm: [
    56.09048, 39.23571, 46.99091, 47.42768, 51.38205, 52.4694, 49.1301, 55.873, 59.6174, 62.3452, 64.58521,
    62.14263,
  ],
  monthlyTemperatureC: [
    4.76207556, 4.72777778, 6.63464889, 8.79631556, 11.9751733, 14.9459022, 17.1709467, 16.9950978,
    14.5910978, 11.3721067, 7.74769778, 5.43826667,
  ],
};

describe("rain rate from monthly climate figures", () => {
  it.each([
    [0.01, 26.48052],
    [0.15, 7.17369312],
    [0.35, 4.23258601],
  ])("exceeded for %d %% of the year", (percent, rate) => {
    const result = monthlyRainRate({ ...damp, percent });
    expectRelative(result.rainRateMmPerH, rate, 3e-5);
    expectRelative(result.rainRate001MmPerH, 26.48052, 3e-5);
    expectRelative(result.rainPercent, 5.36150960371, 1e-8);
  });

  it("rate and share of the year are inverses", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-4, max: 5.3, noNaN: true }), (percent) => {
        const { rainRateMmPerH } = monthlyRainRate({ ...damp, percent });
        expectRelative(monthlyRainPercent({ ...damp, rainRateMmPerH }).percent, percent, 1e-9);
      }),
    );
  });

  it("it rains no longer than it rains", () => {
    expect(monthlyRainRate({ ...damp, percent: 5.4 }).rainRateMmPerH).toBe(0);
    expectRelative(monthlyRainPercent({ ...damp, rainRateMmPerH: 0 }).percent, 5.36150960371, 1e-8);
  });

  it("a desert has no rain at any percentage", () => {
    const desert = { ...damp, monthlyRainfallMm: Array(12).fill(0) };
    expect(monthlyRainRate({ ...desert, percent: 0.01 })).toEqual({
      rainRateMmPerH: 0,
      rainRate001MmPerH: 0,
      rainPercent: 0,
    });
  });

  // P.837-7 Annex 1: no month counts as rainy for more than 70 % of its time.
  it("in the wettest frost it rains for 70 % of the year, and the water still comes down", () => {
    const drenched = { monthlyRainfallMm: Array(12).fill(2000), monthlyTemperatureC: Array(12).fill(-5) };
    expectRelative(monthlyRainRate({ ...drenched, percent: 0.01 }).rainPercent, 70, 1e-12);
    // With rates spread log-normally the mean is exp(spread^2 / 2) medians: 1.26^2 / 2 = 0.7938, which is the
    // shift of the median. So the rate times its time, summed over all rates, gives back the total.
    let totalMm = 0;
    for (let logRate = -12; logRate < 12; logRate += 0.01) {
      const percent = monthlyRainPercent({ ...drenched, rainRateMmPerH: Math.exp(logRate) }).percent;
      totalMm += (percent / 100) * 365.25 * 24 * Math.exp(logRate) * 0.01;
    }
    expectRelative(totalMm, 24_000, 1e-4);
  });

  it("refuses eleven months and impossible figures", () => {
    const eleven = damp.monthlyRainfallMm.slice(1);
    expect(() => monthlyRainRate({ ...damp, monthlyRainfallMm: eleven, percent: 0.01 })).toThrow(/length/);
    const kelvin = damp.monthlyTemperatureC.map((t) => t + 273.15);
    expect(() => monthlyRainRate({ ...damp, monthlyTemperatureC: kelvin, percent: 0.01 })).toThrow(
      /monthlyTemperatureC\[0\]/,
    );
    const negative = damp.monthlyRainfallMm.with(3, -1);
    expect(() => monthlyRainRate({ ...damp, monthlyRainfallMm: negative, percent: 0.01 })).toThrow(
      /monthlyRainfallMm\[3\]/,
    );
    expect(() => monthlyRainRate({ ...damp, percent: 0 })).toThrow(/percent/);
    expect(() => monthlyRainPercent({ ...damp, rainRateMmPerH: -1 })).toThrow(/rainRateMmPerH/);
  });
});

const months = Array.from({ length: 12 }, (_, i) => String(i + 1).padStart(2, "0"));

describeReference("atmosphere/checks-p837-monthly.csv", (row) => {
  const { rainPercent, rainRateMmPerH } = monthlyRainRate({
    monthlyRainfallMm: months.map((month) => num(row, `MT${month}_mm`)),
    monthlyTemperatureC: months.map((month) => num(row, `t${month}_C`)),
    percent: num(row, "p_percent"),
  });
  expectRelative(rainPercent, num(row, "P0_percent"), 1e-5, row["id"]);
  expectRelative(rainRateMmPerH, num(row, "R_mm_h"), 3e-5, row["id"]);
});
