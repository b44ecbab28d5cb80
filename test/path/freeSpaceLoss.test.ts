import { describe, expect, it } from "vitest";
import { freeSpaceLoss } from "../../src/path/freeSpaceLoss.ts";
import { describeReference, num } from "../reference.ts";

describe("free-space loss", () => {
  it("is 92.45 dB at 1 GHz over 1 km", () => {
    // Rec. ITU-R P.525-4, printed to 0.05 dB; 20 log(4 pi 1e12 / 299792458) = 92.4478
    expect(freeSpaceLoss({ frequencyGHz: 1, distanceKm: 1 }).lossDb).toBeCloseTo(92.4478, 4);
  });
  it("rises 20 dB a decade of distance and of frequency", () => {
    const at = (frequencyGHz: number, distanceKm: number) =>
      freeSpaceLoss({ frequencyGHz, distanceKm }).lossDb;
    expect(at(10.368, 100) - at(10.368, 10)).toBeCloseTo(20, 10);
    expect(at(100, 30) - at(10, 30)).toBeCloseTo(20, 10);
  });
  it("refuses a distance of 0", () => {
    expect(() => freeSpaceLoss({ frequencyGHz: 10, distanceKm: 0 })).toThrow("distanceKm");
  });
});

describeReference("terrain/free-space.csv", (row) => {
  const { lossDb } = freeSpaceLoss({ frequencyGHz: num(row, "f_GHz"), distanceKm: num(row, "d_km") });
  expect(Math.abs(lossDb - num(row, "L_exact_dB"))).toBeLessThan(1e-6);
});
