import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { apertureEfficiency, dishGain, nearFieldLoss } from "../../src/antenna/dishGain.ts";
import { describeReference, num } from "../reference.ts";

describe("dish gain", () => {
  it("is 59.16 dBi for 10 m at 10 GHz and efficiency 0.7507", () => {
    // C. A. Balanis, Antenna Theory, 3rd ed., example of section 15.4.1 (from memory; it rounds to 59.15)
    const { gainDbi } = dishGain({ diameterM: 10, frequencyGHz: 10, efficiency: 0.7507 });
    expect(Math.abs(gainDbi - 59.16)).toBeLessThan(0.01);
  });

  it("loses 685.8 (eps/lambda)^2 dB to the surface", () => {
    // J. Ruze, Proc. IEEE 54, 633-640, 1966; at 29.9792458 GHz the wavelength is 10 mm
    const { surfaceLossDb } = dishGain({
      diameterM: 1,
      frequencyGHz: 29.9792458,
      efficiency: 0.5,
      surfaceRmsMm: 0.4,
    });
    expect(surfaceLossDb / 0.04 ** 2).toBeCloseTo(685.8, 1);
  });

  it("loses 3 dB half a beamwidth off the axis", () => {
    const beamwidthDeg = dishGain({ diameterM: 0.6, frequencyGHz: 10, efficiency: 0.5 }).beamwidthDeg;
    const off = dishGain({
      diameterM: 0.6,
      frequencyGHz: 10,
      efficiency: 0.5,
      pointingErrorDeg: beamwidthDeg / 2,
    });
    expect(off.pointingLossDb).toBeCloseTo(3, 12);
    expect(off.netGainDbi).toBeCloseTo(off.gainDbi - 3, 12);
  });

  it("takes every listed loss off the net gain, and none off the gain", () => {
    const base = { diameterM: 0.9, frequencyGHz: 10.368, efficiency: 0.55 };
    const clean = dishGain(base);
    const flawed = dishGain({ ...base, surfaceRmsMm: 0.8, pointingErrorDeg: 0.7, blockageDiameterM: 0.1 });
    expect(clean.netGainDbi).toBe(clean.gainDbi);
    expect(flawed.gainDbi).toBe(clean.gainDbi);
    const losses = flawed.surfaceLossDb + flawed.pointingLossDb + flawed.blockageLossDb;
    expect(flawed.gainDbi - flawed.netGainDbi).toBeCloseTo(losses, 12);
  });

  it("gives back the efficiency that made the gain", () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 1, noNaN: true }), (efficiency) => {
        const dish = { diameterM: 0.6, frequencyGHz: 10.368 };
        const { gainDbi } = dishGain({ ...dish, efficiency });
        expect(apertureEfficiency({ ...dish, gainDbi }).efficiency).toBeCloseTo(efficiency, 12);
      }),
    );
  });

  it("refuses an efficiency of 0 or above 1, and a blockage as wide as the dish", () => {
    const dish = { diameterM: 0.6, frequencyGHz: 10.368, efficiency: 0.5 };
    expect(() => dishGain({ ...dish, efficiency: 0 })).toThrow("efficiency");
    expect(() => dishGain({ ...dish, efficiency: 55 })).toThrow("efficiency");
    expect(() => dishGain({ ...dish, blockageDiameterM: 0.6 })).toThrow("blockageDiameterM");
  });
});

describe("near field on the axis", () => {
  it("costs 0.056 dB at 2 D^2 / lambda", () => {
    // Textbook figure for an edge phase of 22.5 deg: x = pi/16, (sin x / x)^2
    const { farFieldM } = dishGain({ diameterM: 0.6, frequencyGHz: 10.368, efficiency: 0.5 });
    const { lossDb } = nearFieldLoss({ diameterM: 0.6, frequencyGHz: 10.368, distanceM: farFieldM });
    expect(lossDb).toBeCloseTo(0.056, 3);
  });
});

describeReference("terrain/dish-budget.csv", (row) => {
  const dish = { diameterM: num(row, "D_m"), frequencyGHz: num(row, "f_GHz") };
  const result = dishGain({
    ...dish,
    efficiency: num(row, "eff"),
    surfaceRmsMm: num(row, "surface_rms_mm"),
    pointingErrorDeg: num(row, "offset_deg"),
    blockageDiameterM: num(row, "block_diam_m"),
  });
  const pairs: [number, string][] = [
    [result.gainDbi, "G_dBi"],
    [result.beamwidthDeg, "hpbw_deg"],
    [result.surfaceLossDb, "ruze_dB"],
    [result.pointingLossDb, "pointing_dB"],
    [result.farFieldM, "R_far_m"],
    [nearFieldLoss({ ...dish, distanceM: num(row, "R_m") }).lossDb, "nearfield_loss_dB"],
    [result.blockageLossDb, "block_loss_dB"],
  ];
  for (const [ours, column] of pairs) expect(Math.abs(ours - num(row, column))).toBeLessThan(1e-6);
});
