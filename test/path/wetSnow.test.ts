import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bisect } from "../../src/numeric/roots.ts";
import { rainFade } from "../../src/path/rainFade.ts";
import {
  meanRainHeightM,
  rainHeightProbability,
  wetSnowFade,
  wetSnowMultiplier,
  wetSnowPercent,
} from "../../src/path/wetSnow.ts";
import { describeReference, num } from "../reference.ts";

describe("multiplier of the melting layer", () => {
  // An open implementation of Rec. ITU-R P.530-18, section 2.4.2.4.
  it.each([
    [-1300, 1],
    [-1100, 1.05389861843],
    [-700, 1.504340980045],
    [-300, 3.40855280588],
    [-100, 2.310246437638],
    [-10, 0.07088597938],
    [10, 0],
  ])("at %d m over the rain height is %d", (height, multiplier) => {
    expect(wetSnowMultiplier(height)).toBeCloseTo(multiplier, 10);
  });
  it("stays between 0 and 4", () => {
    fc.assert(
      fc.property(fc.double({ min: -3000, max: 3000, noNaN: true }), (height) => {
        expect(wetSnowMultiplier(height)).toBeGreaterThanOrEqual(0);
        expect(wetSnowMultiplier(height)).toBeLessThan(4);
      }),
    );
  });
});

describe("rain height", () => {
  it("spreads evenly about its mean, to all certainty", () => {
    let sum = 0;
    for (let offset = -2400; offset <= 2400; offset += 100) {
      expect(rainHeightProbability(offset)).toBe(rainHeightProbability(-offset));
      sum += rainHeightProbability(offset);
    }
    expect(Math.abs(sum - 1)).toBeLessThan(2e-5); // Rec. ITU-R P.2001-4, Table C.2.1
    expect(rainHeightProbability(2500)).toBe(0);
  });
  it("lies 360 m over the isotherm", () => {
    expect(meanRainHeightM(2.395)).toBeCloseTo(2755, 9); // Rec. ITU-R P.839-4; Berlin
  });
});

/** Share of the year in which rain alone is deeper, from the law of P.530 extended to 1e-5 and 100 %. */
const rain = { frequencyGHz: 18, rainRate001MmPerH: 35, distanceKm: 15, polarization: "vertical" } as const;
const rainDb = (log: number) => rainFade({ ...rain, percent: 10 ** log }).lossDb;
const rainPercent = (fadeDb: number) => {
  if (fadeDb >= rainDb(-5)) return 0;
  if (fadeDb <= rainDb(2)) return 100;
  return 10 ** (bisect((log) => rainDb(log) - fadeDb, -5, 2) ?? Number.NaN);
};
const valley = { lowerAntennaM: 100, upperAntennaM: 300, meanRainHeightM: 4500, rainPercent };

describe("rain with wet snow", () => {
  it("is rain alone 3600 m under the rain height", () => {
    expect(wetSnowPercent({ ...valley, fadeDb: 10 }).percent).toBe(rainPercent(10));
    expect(wetSnowFade({ ...valley, percent: 0.01 }).lossDb).toBeCloseTo(rainDb(-2), 6);
    // Just inside the range where the layer counts, the sum over all steps must come to the same.
    const edge = { ...valley, meanRainHeightM: 3899 };
    expect(wetSnowPercent({ ...edge, fadeDb: 10 }).percent / rainPercent(10)).toBeCloseTo(1, 3);
  });

  it("is nothing 2400 m above it", () => {
    const summit = { ...valley, lowerAntennaM: 3100, upperAntennaM: 3300, meanRainHeightM: 600 };
    expect(wetSnowPercent({ ...summit, fadeDb: 1 }).percent).toBe(0);
    expect(wetSnowFade({ ...summit, percent: 0.01 }).lossDb).toBe(0);
  });

  it("is worse than rain for a path in the melting layer", () => {
    const ridge = { ...valley, lowerAntennaM: 1000, upperAntennaM: 1100, meanRainHeightM: 1300 };
    expect(wetSnowFade({ ...ridge, percent: 0.01 }).lossDb).toBeGreaterThan(1.5 * rainDb(-2));
  });

  it("averages a level path at its own height and a slope over all of its heights", () => {
    // One rain height would give 1/g of the depth; here with a rain that fades for 1/A % of the time the
    // average over rain heights and path heights is linear and can be summed by hand.
    const inverse = (fadeDb: number) => 1 / fadeDb;
    const at = (lowerAntennaM: number, upperAntennaM: number) =>
      wetSnowPercent({
        lowerAntennaM,
        upperAntennaM,
        meanRainHeightM: 1500,
        rainPercent: inverse,
        fadeDb: 2,
      }).percent;
    let level = 0;
    for (let offset = -2400; offset <= 2400; offset += 100) {
      level += rainHeightProbability(offset) * wetSnowMultiplier(1200 - 1500 - offset) * 0.5;
    }
    expect(at(1200, 1200)).toBeCloseTo(level, 12);
    const halves = (at(900, 1100) + at(1100, 1300)) / 2;
    expect(at(900, 1300)).toBeCloseTo(halves, 12);
  });

  it("inverts its own share of time", () => {
    const steep = (fadeDb: number) => 0.01 * (fadeDb / 20) ** -3;
    const ridge = { lowerAntennaM: 900, upperAntennaM: 1500, meanRainHeightM: 1800, rainPercent: steep };
    for (const fadeDb of [2, 10, 40]) {
      const { percent } = wetSnowPercent({ ...ridge, fadeDb });
      expect(wetSnowFade({ ...ridge, percent }).lossDb).toBeCloseTo(fadeDb, 6);
    }
  });

  it("refuses antennas in the wrong order", () => {
    expect(() => wetSnowPercent({ ...valley, upperAntennaM: 50, fadeDb: 1 })).toThrow("upperAntennaM");
  });
});

describeReference("terrain/p530-wet-snow-multiplier.csv", (row) => {
  expect(Math.abs(wetSnowMultiplier(num(row, "dh_m")) - num(row, "Gamma"))).toBeLessThan(1e-9);
});

describeReference("terrain/rain-height-probability.csv", (row) => {
  expect(rainHeightProbability(num(row, "dh_m"))).toBe(num(row, "probability"));
});
