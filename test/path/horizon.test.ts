import { describe, expect, it } from "vitest";
import { fresnelRadius } from "../../src/path/fresnelRadius.ts";
import {
  earthBulge,
  effectiveRadiusKm,
  horizonDistance,
  lineOfSightLimit,
  rayClearance,
  takeOffAngle,
} from "../../src/path/horizon.ts";
import { describeReference, num } from "../reference.ts";

const standard = { effectiveRadiusKm: effectiveRadiusKm(4 / 3) };

describe("smooth Earth", () => {
  it("puts the horizon at 4.12 sqrt(h) km", () => {
    // Handbook figure for k = 4/3
    expect(horizonDistance({ heightM: 100, ...standard }).distanceKm / 10).toBeCloseTo(4.12, 2);
  });

  it("lets the ray between two antennas graze at exactly the limit", () => {
    const { distanceKm } = lineOfSightLimit({ height1M: 30, height2M: 80, ...standard });
    const d1Km = horizonDistance({ heightM: 30, ...standard }).distanceKm;
    const { clearanceM } = rayClearance({
      d1Km,
      d2Km: distanceKm - d1Km,
      height1M: 30,
      height2M: 80,
      obstacleM: 0,
      ...standard,
    });
    expect(clearanceM).toBeCloseTo(0, 9);
  });

  it("sees an antenna of equal height half the Earth's angle below the horizontal", () => {
    // d / (2 ae) = 100 / (2 x 8494.67) rad
    const { angleMrad } = takeOffAngle({ fromHeightM: 50, toHeightM: 50, distanceKm: 100, ...standard });
    expect(angleMrad).toBeCloseTo(-5.886, 3);
  });

  it("has no bulge at the ends and the highest half-way", () => {
    const at = (d1Km: number) => earthBulge({ d1Km, d2Km: 50 - d1Km, ...standard }).bulgeM;
    expect(at(0)).toBe(0);
    expect(at(25)).toBeGreaterThan(at(24));
    expect(at(25)).toBeGreaterThan(at(26));
  });

  it("refuses a negative height and a k-factor of 0", () => {
    expect(() => horizonDistance({ heightM: -1, ...standard })).toThrow("heightM");
    expect(() => effectiveRadiusKm(0)).toThrow("kFactor");
  });
});

describe("first Fresnel zone", () => {
  it("is 17.3 sqrt(d1 d2 / (f d)) m", () => {
    // Rec. ITU-R P.530-17 equation 3, its factor rounded to three digits
    const { radiusM } = fresnelRadius({ frequencyGHz: 10, d1Km: 20, d2Km: 20 });
    expect(Math.abs(radiusM - 17.3)).toBeLessThan(0.05);
  });

  it("makes the way by its rim half a wavelength longer", () => {
    const { radiusM } = fresnelRadius({ frequencyGHz: 10, d1Km: 12, d2Km: 30 });
    const detourM = Math.hypot(12_000, radiusM) - 12_000 + Math.hypot(30_000, radiusM) - 30_000;
    expect(detourM).toBeCloseTo(0.0299792458 / 2, 6);
  });

  it("refuses a path without length", () => {
    expect(() => fresnelRadius({ frequencyGHz: 10, d1Km: 0, d2Km: 0 })).toThrow(RangeError);
  });
});

describeReference("terrain/path-geometry.csv", (row) => {
  const earth = { effectiveRadiusKm: effectiveRadiusKm(num(row, "k")) };
  const d1Km = num(row, "d1_km");
  const d2Km = num(row, "d2_km");
  const height1M = num(row, "h1_m");
  const height2M = num(row, "h2_m");
  const pairs: [number, string][] = [
    [earth.effectiveRadiusKm, "ae_km"],
    [earthBulge({ d1Km, d2Km, ...earth }).bulgeM, "bulge_m"],
    [fresnelRadius({ frequencyGHz: num(row, "f_GHz"), d1Km, d2Km }).radiusM, "F1_exact_m"],
    [horizonDistance({ heightM: height1M, ...earth }).distanceKm, "horizon1_km"],
    [lineOfSightLimit({ height1M, height2M, ...earth }).distanceKm, "radio_horizon_sum_km"],
    [
      takeOffAngle({ fromHeightM: height1M, toHeightM: height2M, distanceKm: d1Km + d2Km, ...earth })
        .angleMrad,
      "toa1_mrad",
    ],
  ];
  // k is printed to 13 digits, so effective radii carry its rounding
  for (const [ours, column] of pairs) expect(Math.abs(ours - num(row, column))).toBeLessThan(1e-6);
});
