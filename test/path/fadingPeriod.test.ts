import { describe, expect, it } from "vitest";
import {
  type FadingTerrain,
  multipathYear,
  rainWorstMonth,
  rainYear,
  shorterPeriodFactor,
} from "../../src/path/fadingPeriod.ts";
import { multipathOccurrence } from "../../src/path/multipathOccurrence.ts";
import { describeReference, num } from "../reference.ts";

describe("a year of multipath fading", () => {
  // ITU-R reference implementation of Rec. ITU-R P.2001, Attachment B.3: quick form, share of 0 dB in a year.
  it.each([
    [-200, 40, 1.2, 250, 10.368, 47, 2.31892421697],
    [-500, 65, 0.23, 45, 5.76, 35, 227.2689827484],
  ])(
    "dN1 %d over %d km",
    (dN1, distanceKm, pathInclinationMrad, lowerAntennaM, frequencyGHz, latitudeDeg, q0) => {
      const path = { dN1, distanceKm, pathInclinationMrad, lowerAntennaM, frequencyGHz };
      const year = multipathYear({
        worstMonthPercent: multipathOccurrence(path),
        latitudeDeg,
        distanceKm,
        pathInclinationMrad,
      });
      expect(Math.abs(year.yearPercent / q0 - 1)).toBeLessThan(1e-9);
    },
  );

  it("is never less than a twelfth of the worst month", () => {
    // Rec. ITU-R P.530-17, equation 26: at most 10.8 dB; 10 log 12 = 10.79.
    const year = multipathYear({
      worstMonthPercent: 12,
      latitudeDeg: 60,
      distanceKm: 5,
      pathInclinationMrad: 30,
    });
    expect(year.conversionDb).toBe(10.8);
    expect(year.yearPercent).toBeCloseTo(1, 2);
  });

  it("is the same north and south of the equator, and has no step at 45 deg", () => {
    const at = (latitudeDeg: number) =>
      multipathYear({ worstMonthPercent: 1, latitudeDeg, distanceKm: 50, pathInclinationMrad: 1 })
        .yearPercent;
    expect(at(-52)).toBe(at(52));
    expect(at(45.0001) / at(44.9999)).toBeCloseTo(1, 2);
    expect(() => at(91)).toThrow("latitudeDeg");
  });
});

describe("a year of rain", () => {
  it("undoes the worst month of P.841", () => {
    // Rec. ITU-R P.841, from memory: worst month = 2.85 year^0.87, percent.
    for (const year of [0.001, 0.01, 0.1]) {
      const { yearPercent } = rainYear({ worstMonthPercent: 2.85 * year ** 0.87 });
      expect(yearPercent / year).toBeCloseTo(1, 1);
    }
  });
});

describe("the worst hours of the worst month", () => {
  // Rec. ITU-R P.530-17, section 2.3.5.
  it.each<[FadingTerrain, number, number]>([
    ["flat", 1, 90.016],
    ["hilly", 24, 10.271591565],
    ["hilly-land", 700, 1.0220175077],
  ])("%s, %d h: %d times the share", (terrain, periodHours, factor) => {
    expect(shorterPeriodFactor({ terrain, periodHours }).factor).toBeCloseTo(factor, 8);
  });
  it("tend to the month itself", () => {
    // 720 h are 30 days; the printed constants come out within 2 %.
    for (const terrain of ["flat", "hilly", "hilly-land"] as const) {
      expect(Math.abs(shorterPeriodFactor({ terrain, periodHours: 720 }).factor - 1)).toBeLessThan(0.02);
    }
  });
  it("refuse a year and an unknown terrain", () => {
    expect(() => shorterPeriodFactor({ terrain: "flat", periodHours: 8760 })).toThrow("periodHours");
    expect(() => shorterPeriodFactor({ terrain: "sea" as "flat", periodHours: 5 })).toThrow("terrain");
  });
});

describe("the worst month of rain", () => {
  it("has 0.0519 % where the year has 0.01 %", () => {
    // ITU-R P.841, Q1 = 2.85 and beta = 0.13 (from memory): 2.85 x 0.01^0.87
    expect(rainWorstMonth({ yearPercent: 0.01 }).worstMonthPercent).toBeCloseTo(0.0519, 4);
  });
  it("is the inverse of the year's", () => {
    for (const worstMonthPercent of [0.001, 0.3, 5, 100]) {
      const { yearPercent } = rainYear({ worstMonthPercent });
      expect(rainWorstMonth({ yearPercent }).worstMonthPercent).toBeCloseTo(worstMonthPercent, 9);
    }
    expect(rainWorstMonth({ yearPercent: 100 }).worstMonthPercent).toBe(100);
    expect(rainWorstMonth({ yearPercent: 0 }).worstMonthPercent).toBe(0);
  });
});

describeReference("terrain/p530-17-quick-annual.csv", (row) => {
  const distanceKm = num(row, "d_km");
  const pathInclinationMrad = num(row, "eps_p_mrad");
  const lowerAntennaM = num(row, "hL_m");
  const frequencyGHz = num(row, "f_GHz");
  const worstMonthPercent = multipathOccurrence({
    dN1: num(row, "dN1_N_km"),
    distanceKm,
    pathInclinationMrad,
    lowerAntennaM,
    frequencyGHz,
  });
  const withoutK =
    distanceKm ** 3.1 *
    (1 + pathInclinationMrad) ** -1.29 *
    frequencyGHz ** 0.8 *
    10 ** (-0.00089 * lowerAntennaM);
  expect(Math.abs(worstMonthPercent / withoutK / num(row, "K_quick") - 1)).toBeLessThan(1e-9);
  const latitudeDeg = num(row, "lat_deg");
  const { yearPercent } = multipathYear({ worstMonthPercent, latitudeDeg, distanceKm, pathInclinationMrad });
  expect(Math.abs(yearPercent / num(row, "Q0_annual_pct") - 1)).toBeLessThan(1e-9);
});

describeReference("terrain/p530-short-period.csv", (row) => {
  const terrain = row["terrain"] as FadingTerrain;
  const { factor } = shorterPeriodFactor({ terrain, periodHours: num(row, "T_h") });
  expect(Math.abs(factor - num(row, "factor"))).toBeLessThan(1e-8);
});
