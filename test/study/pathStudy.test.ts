import { describe, expect, it } from "vitest";
import { prepare } from "../../src/budget/prepare.ts";
import type { Profile } from "../../src/path/profile.ts";
import type { ScenarioPath } from "../../src/scenario/types.ts";
import { pathStudy } from "../../src/study/pathStudy.ts";
import { eastOnEquator, scenarioOf, siteOf, weatherOf } from "../budget/scenarios.ts";

const date = new Date("2025-01-01T00:00:00Z");

/** A ridge of 479 m in the middle of 60 km of low ground between hills of 500 m. */
const distancesKm = Array.from({ length: 61 }, (_, km) => km);
const ridge: Profile = {
  distancesKm,
  heightsM: distancesKm.map((km) => (km % 60 === 0 ? 500 : km === 30 ? 479 : 0)),
};

function studyOf(change: Partial<ScenarioPath> = {}) {
  const scenario = scenarioOf({
    path: { from: siteOf(), to: eastOnEquator(60), ...change },
    weather: { dry: weatherOf(), pouring: weatherOf({ rainMmPerH: { value: 30 }, extentKm: 5 }) },
  });
  return pathStudy(prepare(scenario), "cw", ["dry", "pouring"], date);
}

describe("headings", () => {
  // World Magnetic Model 2025, test values of NOAA NCEI and BGS: at 18 km over 0 N 21 E the needle points 1.29 deg
  // east on 2025.0. Sites at that place and height, so that its figure must come back.
  it("are true less the declination of the place", async () => {
    const from = siteOf({ longitude: 21, groundM: 17_998 });
    const to = siteOf({ longitude: 21.5, groundM: 17_998 });
    const { transmitter, magneticModel } = await studyOf({ from, to });
    expect(transmitter.declinationDeg).toBeGreaterThan(1.28);
    expect(transmitter.declinationDeg).toBeLessThan(1.3);
    expect(transmitter.trueDeg).toBeCloseTo(90, 6);
    expect(transmitter.magneticDeg).toBeCloseTo(90 - transmitter.declinationDeg!, 9);
    expect(magneticModel).toBe("WMM-2025");
  });

  it("are true ones alone, and a warning says so, on a day that no model covers", async () => {
    const link = prepare(scenarioOf());
    const { transmitter, warnings } = await pathStudy(link, "cw", ["dry"], new Date("2045-06-01"));
    expect(transmitter.magneticDeg).toBeUndefined();
    expect(warnings.map(({ code }) => code)).toContain("no_magnetic_model");
  });
});

describe("what stands in the way", () => {
  // By hand: half-way the ray is at 502 m, the Earth rises 52.97 m at k = 4/3 and 500 * 900 / 4247.3 = 105.95 m at
  // k = 2/3; the zone is sqrt(0.028916 * 30000 / 2) = 20.826 m wide.
  it("is told in metres and zones for both bendings", async () => {
    const { obstacles, inSight } = await studyOf({ profile: ridge });
    expect(inSight).toBe(false);
    expect(obstacles).toHaveLength(1);
    expect(obstacles[0]!.clearanceM).toBeCloseTo(502 - 479 - 52.97, 2);
    expect(obstacles[0]!.low.clearanceM).toBeCloseTo(502 - 479 - 105.95, 2);
    expect(obstacles[0]!.zones).toBeCloseTo(-29.97 / 20.826, 2);
  });

  it("needs antennas so much higher, at one end twice as much as at both", async () => {
    const { raise } = await studyOf({ profile: ridge });
    expect(raise.median.bothM).toBeCloseTo(29.97 + 0.6 * 20.826, 2);
    expect(raise.median.txM).toBeCloseTo(2 * raise.median.bothM, 6);
    expect(raise.low.bothM - raise.median.bothM).toBeCloseTo(52.97, 1);
  });

  it("is the horizon of both ends", async () => {
    const { transmitter, receiver } = await studyOf({ profile: ridge });
    // atan((479 - 502) / 30000 - 30 / (2 * 8494.7)) = -2.532 mrad.
    expect(transmitter.horizon?.distanceKm).toBe(30);
    expect(transmitter.horizon?.elevationDeg).toBeCloseTo((-2.532e-3 * 180) / Math.PI, 3);
    expect(receiver.horizon?.distanceKm).toBe(30);
    expect((await studyOf()).transmitter.horizon).toBeUndefined();
  });
});

describe("ways and days", () => {
  it("leave margins that differ as their losses do", async () => {
    const { weathers, days } = await studyOf({ profile: ridge });
    for (const { ways } of weathers) {
      expect(ways[0]!.carries).toBe(true);
      for (const way of ways)
        expect(way.marginDb + way.lossDb).toBeCloseTo(ways[0]!.marginDb + ways[0]!.lossDb, 9);
    }
    for (const day of days)
      expect(day.marginDb + day.lossDb).toBeCloseTo(days[0]!.marginDb + days[0]!.lossDb, 9);
  });

  it("begin with a normal day that agrees with the budget, and lift it ever more", async () => {
    const { weathers, days, dayWeather } = await studyOf({ profile: ridge });
    expect(dayWeather).toBe("dry");
    expect(days.map(({ percent }) => percent)).toEqual([50, 10, 1, 0.1]);
    // P.452 and the budget take the same diffraction; its wet air and rounded free space are all that differs.
    expect(Math.abs(days[0]!.marginDb - weathers[0]!.ways[0]!.marginDb)).toBeLessThan(1);
    const losses = days.map(({ lossDb }) => lossDb);
    expect(losses).toEqual([...losses].sort((a, b) => b - a));
    expect(losses[0]! - losses[3]!).toBeGreaterThan(5);
  });
});
