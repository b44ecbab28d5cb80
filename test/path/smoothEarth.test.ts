import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type SmoothEarthInput, smoothEarthLoss } from "../../src/path/smoothEarth.ts";
import { describeReference, num } from "../reference.ts";

const base: SmoothEarthInput = {
  frequencyGHz: 10.368,
  distanceKm: 50,
  h1M: 15,
  h2M: 25,
  effectiveRadiusKm: 8500,
  seaFraction: 0,
  polarization: "horizontal",
};
const loss = (change: Partial<SmoothEarthInput>) => smoothEarthLoss({ ...base, ...change }).lossDb;

describe("diffraction over a smooth Earth", () => {
  // Reference implementation of Rec. ITU-R P.452-18, section 4.2.2.
  it.each([
    [2.32, 60, 20, 20, 0, 43.43627679101, 43.43396056404],
    [10.368, 100, 10, 10, 0, 159.1225094382, 159.1163743899],
    [10.368, 200, 50, 100, 1, 269.4059432186, 269.3655856079],
    [10.368, 25, 10, 20, 0.5, 4.138986145805, 4.139194118412],
    [10.368, 60, 5, 300, 1, 0, 0],
  ])("%d GHz, %d km, %d and %d m, sea %d", (frequencyGHz, distanceKm, h1M, h2M, seaFraction, h, v) => {
    const path = { frequencyGHz, distanceKm, h1M, h2M, seaFraction };
    expect(loss({ ...path, polarization: "horizontal" })).toBeCloseTo(h, 8);
    expect(loss({ ...path, polarization: "vertical" })).toBeCloseTo(v, 8);
  });

  const height = fc.double({ min: 0.5, max: 500, noNaN: true });
  const path = fc.record({
    frequencyGHz: fc.double({ min: 0.1, max: 50, noNaN: true }),
    distanceKm: fc.double({ min: 1, max: 400, noNaN: true }),
    h1M: height,
    h2M: height,
    seaFraction: fc.double({ min: 0, max: 1, noNaN: true }),
    polarization: fc.constantFrom("horizontal" as const, "vertical" as const),
  });

  it("is the same from either end", () => {
    fc.assert(
      fc.property(path, (p) => {
        expect(Math.abs(loss({ ...p, h1M: p.h2M, h2M: p.h1M }) - loss(p))).toBeLessThan(1e-8);
      }),
    );
  });

  it("is no gain within the horizon, and none where the path is clear", () => {
    fc.assert(
      fc.property(path, (p) => {
        const horizonKm = Math.sqrt(17) * (Math.sqrt(p.h1M) + Math.sqrt(p.h2M));
        if (p.distanceKm < horizonKm) expect(loss(p)).toBeGreaterThanOrEqual(0);
      }),
    );
    expect(loss({ distanceKm: 5, h1M: 60, h2M: 60 })).toBe(0);
  });

  it("rises with distance, falls with height and with the Earth's radius beyond the horizon", () => {
    fc.assert(
      fc.property(path, fc.double({ min: 1.001, max: 1.5, noNaN: true }), (p, factor) => {
        const horizonKm = Math.sqrt(17) * (Math.sqrt(p.h1M * 1.5) + Math.sqrt(p.h2M));
        const beyond = { ...p, distanceKm: 1.3 * horizonKm + p.distanceKm };
        const here = loss(beyond);
        expect(loss({ ...beyond, distanceKm: beyond.distanceKm * factor })).toBeGreaterThan(here);
        expect(loss({ ...beyond, h1M: p.h1M * factor })).toBeLessThan(here + 1e-9);
        expect(loss({ ...beyond, effectiveRadiusKm: 8500 * factor })).toBeLessThan(here);
      }),
    );
  });

  it("has no step at the smooth horizon", () => {
    const horizonKm = Math.sqrt(17) * (Math.sqrt(15) + Math.sqrt(25));
    const step = loss({ distanceKm: horizonKm * (1 + 1e-9) }) - loss({ distanceKm: horizonKm * (1 - 1e-9) });
    expect(Math.abs(step)).toBeLessThan(1e-5);
  });

  it("answers for an antenna on the ground", () => {
    expect(loss({ h1M: 0 })).toBeGreaterThan(loss({ h1M: 15 }));
    expect(loss({ h1M: 0, h2M: 0, distanceKm: 1 })).toBeGreaterThan(0);
    // Within the horizon it is the limit of ever lower antennas.
    const low = { h1M: 0, h2M: 100, distanceKm: 20 };
    expect(loss({ ...low, h1M: 1e-10 })).toBeCloseTo(loss(low), 2);
  });

  it("refuses what is not a path", () => {
    expect(() => loss({ h1M: -1 })).toThrow("h1M");
    expect(() => loss({ distanceKm: 0 })).toThrow("distanceKm");
    expect(() => loss({ seaFraction: 1.1 })).toThrow("seaFraction");
    expect(() => loss({ polarization: "H" as "horizontal" })).toThrow("polarization");
  });
});

describeReference("terrain/smooth-earth.csv", (row) => {
  const path = {
    frequencyGHz: num(row, "f_GHz"),
    distanceKm: num(row, "d_km"),
    h1M: num(row, "h1_m"),
    h2M: num(row, "h2_m"),
    effectiveRadiusKm: num(row, "ae_km"),
    seaFraction: num(row, "omega"),
  };
  const horizontal = loss({ ...path, polarization: "horizontal" });
  const vertical = loss({ ...path, polarization: "vertical" });
  expect(Math.abs(horizontal - num(row, "Ldsph_H_dB"))).toBeLessThan(1e-6);
  expect(Math.abs(vertical - num(row, "Ldsph_V_dB"))).toBeLessThan(1e-6);
});
