import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  fadeExceededFor,
  fadePercent,
  mappedMultipathFade,
  multipathFade,
} from "../../src/path/multipathFade.ts";
import type { MultipathPath } from "../../src/path/multipathOccurrence.ts";
import { describeReference, num, type Row } from "../reference.ts";

const hills: MultipathPath = {
  dN1: -200,
  terrainRoughnessM: 50,
  distanceKm: 40,
  lowerAntennaM: 250,
  pathInclinationMrad: 1.25,
  frequencyGHz: 10.368,
};
const { terrainRoughnessM: _, ...quick } = hills;

function expectRatio(actual: number, expected: number, tolerance: number): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThan(tolerance);
}

describe("multipath fading by P.530-17", () => {
  // An open implementation of Rec. ITU-R P.530-17, detailed method, with dN1 and roughness given.
  it.each([
    [0.001, 10.68470147001, 63.17128493035],
    [5, 3.379577363281, 3.293817326424],
    [15, 0.3379577363281, 0.252755940385],
    [25, 0.03379577363281, 0.03284690351658],
    [40, 0.001068716199672, 0.001068716199672],
  ])("%d dB over 40 km: %d %% by the deep law, %d %% in all", (fadeDb, deep, all) => {
    const fade = multipathFade({ ...hills, fadeDb });
    expectRatio(fade.deepFadePercent, deep, 1e-9);
    expectRatio(fade.worstMonthPercent, all, 1e-9);
    expect(fade.method).toBe("P.530-17 detailed");
  });

  it("takes the quick form without the roughness", () => {
    // Rec. ITU-R P.530-17, quick form, by hand: K = 10^(-4.6 + 0.54).
    const factor = 10 ** -4.06 * 40 ** 3.1 * 2.25 ** -1.29 * 10.368 ** 0.8 * 10 ** (-0.00089 * 250);
    const fade = multipathFade({ ...quick, fadeDb: 40 });
    expectRatio(fade.worstMonthPercent, factor * 1e-4, 1e-12);
    expectRatio(fade.occurrencePercent, factor, 1e-12);
    expect(fade.method).toBe("P.530-17 quick");
  });

  it("finds no fading below 5 km", () => {
    expect(multipathFade({ ...quick, distanceKm: 4.9, fadeDb: 0 }).worstMonthPercent).toBe(0);
    expect(multipathFade({ ...quick, distanceKm: 5.1, fadeDb: 0 }).worstMonthPercent).toBeGreaterThan(0);
  });

  it("refuses a fade below 0 dB and a path without length", () => {
    expect(() => multipathFade({ ...hills, fadeDb: -1 })).toThrow("fadeDb");
    expect(() => multipathFade({ ...hills, distanceKm: 0, fadeDb: 1 })).toThrow("distanceKm");
    expect(() => multipathFade({ ...hills, terrainRoughnessM: Number.NaN, fadeDb: 1 })).toThrow("Roughness");
  });
});

const anyFactor = fc.double({ min: -6, max: Math.log10(2000), noNaN: true }).map((log) => 10 ** log);
const anyDepth = fc.double({ min: 0, max: 60, noNaN: true });

describe("share of time of a fade", () => {
  it("is 63.2 % at 0 dB whatever the factor: 1 - 1/e", () => {
    fc.assert(
      fc.property(anyFactor, (factor) => {
        expect(fadePercent(factor, 0)).toBeCloseTo(100 * (1 - Math.exp(-1)), 9);
      }),
    );
  });

  it("falls as the fade deepens, without a step where the deep law begins", () => {
    fc.assert(
      fc.property(
        anyFactor,
        anyDepth,
        fc.double({ min: 0.001, max: 5, noNaN: true }),
        (factor, depth, more) => {
          expect(fadePercent(factor, depth + more)).toBeLessThan(fadePercent(factor, depth));
          const transition = 25 + 1.2 * Math.log10(factor);
          expectRatio(fadePercent(factor, transition - 1e-9), factor * 10 ** (-transition / 10), 1e-6);
        },
      ),
    );
  });

  it("is inverted by the fade that is exceeded for it", () => {
    fc.assert(
      fc.property(anyFactor, fc.double({ min: 0.01, max: 60, noNaN: true }), (factor, depth) => {
        expect(fadeExceededFor(factor, fadePercent(factor, depth))).toBeCloseTo(depth, 6);
      }),
    );
    expect(fadeExceededFor(100, 70)).toBe(0);
  });

  it("has no answer for a factor beyond the method", () => {
    expect(() => fadePercent(2e5, 3)).toThrow("beyond the method");
    expect(fadePercent(2e5, 60)).toBeCloseTo(0.2, 10);
  });
});

describe("multipath fading by P.530-18", () => {
  const mapped = {
    logK: -4.5,
    dN75: 50,
    distanceKm: 40,
    txHeightAmslM: 300,
    rxHeightAmslM: 250,
    terrainHeightM: 100,
    frequencyGHz: 10.368,
  };
  // An open implementation of Rec. ITU-R P.530-18 with logK and dN75 given.
  it.each([
    [0, 38.49340065538, 63.21205588286],
    [3, 19.29240098738, 12.44430964822],
    [20, 0.3849340065538, 0.3144932281022],
    [40, 0.003849340065538, 0.003849340065538],
  ])("%d dB over 40 km: %d %% by the deep law, %d %% in all", (fadeDb, deep, all) => {
    const fade = mappedMultipathFade({ ...mapped, fadeDb });
    expectRatio(fade.deepFadePercent, deep, 1e-9);
    expectRatio(fade.worstMonthPercent, all, 1e-9);
    expect(fade.method).toBe("P.530-18");
  });
  it("knows no first and second antenna", () => {
    const swapped = { ...mapped, txHeightAmslM: 250, rxHeightAmslM: 300, fadeDb: 10 };
    expect(mappedMultipathFade(swapped)).toEqual(mappedMultipathFade({ ...mapped, fadeDb: 10 }));
  });
  it("refuses a negative dN75 and finds no fading below 5 km", () => {
    expect(() => mappedMultipathFade({ ...mapped, dN75: -1, fadeDb: 1 })).toThrow("dN75");
    expect(mappedMultipathFade({ ...mapped, distanceKm: 3, fadeDb: 1 }).worstMonthPercent).toBe(0);
  });
});

function inclination(row: Row): { lowerAntennaM: number; pathInclinationMrad: number } {
  const [one, other] = [num(row, "he_m"), num(row, "hr_m")];
  return {
    lowerAntennaM: Math.min(one, other),
    pathInclinationMrad: Math.abs(one - other) / num(row, "d_km"),
  };
}

describeReference("terrain/p530-17-multipath.csv", (row) => {
  const fade = multipathFade({
    dN1: num(row, "dN1_N_km"),
    terrainRoughnessM: num(row, "sa_m"),
    distanceKm: num(row, "d_km"),
    ...inclination(row),
    frequencyGHz: num(row, "f_GHz"),
    fadeDb: num(row, "A_dB"),
  });
  expectRatio(fade.deepFadePercent, num(row, "pw_small_pct"), 1e-9);
  expectRatio(fade.worstMonthPercent, num(row, "pw_all_pct"), 1e-9);
});

describeReference("terrain/p530-18-multipath.csv", (row) => {
  const fade = mappedMultipathFade({
    logK: num(row, "logK"),
    dN75: num(row, "dN75"),
    distanceKm: num(row, "d_km"),
    txHeightAmslM: num(row, "he_m"),
    rxHeightAmslM: num(row, "hr_m"),
    terrainHeightM: num(row, "ht_m"),
    frequencyGHz: num(row, "f_GHz"),
    fadeDb: num(row, "A_dB"),
  });
  expectRatio(fade.deepFadePercent, num(row, "pw_small_pct"), 1e-9);
  expectRatio(fade.worstMonthPercent, num(row, "pw_all_pct"), 1e-9);
});
