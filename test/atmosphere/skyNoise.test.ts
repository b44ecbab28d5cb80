import { describe, expect, it } from "vitest";
import {
  groundTemperature,
  levelBeamTemperature,
  mediumTemperature,
  skyTemperature,
} from "../../src/atmosphere/skyNoise.ts";
import { clearSkyAbove, clearSkyTemperature } from "../../src/atmosphere/slantPath.ts";
import { describeReference, num } from "../reference.ts";

describe("sky from attenuation", () => {
  // ITU-R P.618-14 section 3, evaluated by hand: half of the power passes at 3.0103 dB.
  it.each([
    [0, 275, 2.7],
    [3.010299957, 275, 138.85],
    [200, 260, 260],
  ])("%d dB at %d K", (attenuationDb, mediumK, skyK) => {
    expect(skyTemperature({ attenuationDb, mediumK }).skyK).toBeCloseTo(skyK, 6);
  });

  // ITU-R P.618-14 section 3: 37.34 + 0.81 * 288.15 = 270.7415, and 275 K for an unknown surface.
  it("medium temperature", () => {
    expect(mediumTemperature({ surfaceK: 288.15 }).mediumK).toBeCloseTo(270.7415, 10);
    expect(mediumTemperature({}).mediumK).toBe(275);
  });

  it("comes near the sky that the layers give, away from the horizon", () => {
    for (const frequencyGHz of [10.368, 24.048]) {
      const { skyK, attenuationDb } = clearSkyTemperature({ frequencyGHz, elevationDeg: 10 });
      const simple = skyTemperature({ attenuationDb, mediumK: 270.7 }).skyK;
      expect(Math.abs(simple - skyK) / skyK).toBeLessThan(0.05);
    }
  });

  it("refuses gain and cold below nothing", () => {
    expect(() => skyTemperature({ attenuationDb: -1, mediumK: 275 })).toThrow(/attenuationDb/);
    expect(() => skyTemperature({ attenuationDb: 1, mediumK: 0 })).toThrow(/mediumK/);
    expect(() => mediumTemperature({ surfaceK: -3 })).toThrow(/surfaceK/);
  });
});

describe("ground", () => {
  it("a black ground shows its own warmth, a mirror the sky", () => {
    expect(groundTemperature({ skyK: 100, groundK: 290, emissivity: 1 }).brightnessK).toBe(290);
    expect(groundTemperature({ skyK: 100, groundK: 290, emissivity: 0 }).brightnessK).toBe(100);
    // 0.95 * 288 + 0.05 * 100
    expect(groundTemperature({ skyK: 100 }).brightnessK).toBeCloseTo(278.6, 10);
    expect(() => groundTemperature({ skyK: 100, emissivity: 95 })).toThrow(/emissivity/);
  });
});

describe("level beam over an open horizon", () => {
  const beam = (beamwidthDeg: number) => levelBeamTemperature({ frequencyGHz: 10.368, beamwidthDeg });

  // Independent computation: a plain sum over steps that widen upwards, for the sky changes fastest at the
  // horizon, and that reach to 75 dB down.
  it.each([1, 3, 8, 20])("mean of the sky over a beam of %d deg", (beamwidthDeg) => {
    let weighted = 0;
    let weights = 0;
    const skyAt = clearSkyAbove({ frequencyGHz: 10.368 });
    const steps = 400;
    for (let i = 0; i < steps; i++) {
      const low = 2.5 * beamwidthDeg * (i / steps) ** 2;
      const high = 2.5 * beamwidthDeg * ((i + 1) / steps) ** 2;
      const elevationDeg = (low + high) / 2;
      const weight = Math.exp(-4 * Math.LN2 * (elevationDeg / beamwidthDeg) ** 2) * (high - low);
      weighted += weight * skyAt(elevationDeg).skyK;
      weights += weight;
    }
    expect(Math.abs(beam(beamwidthDeg).skyHalfK - weighted / weights)).toBeLessThan(0.3);
  });

  // Means of the sky half from an independent derivation out of P.835-6 and P.676-13, in whole kelvin. The
  // entire beam by hand: two equal halves, the lower one 0.95 * 288 K + 0.05 * sky.
  it.each([
    [1, 124],
    [2, 109],
    [3, 98],
    [5, 83],
    [8, 68],
    [12, 56],
    [20, 43],
  ])("a beam of %d deg sees a sky of %d K", (beamwidthDeg, skyK) => {
    const { skyHalfK, groundHalfK, antennaK } = beam(beamwidthDeg);
    expect(Math.abs(skyHalfK - skyK)).toBeLessThan(0.8);
    expect(groundHalfK).toBeCloseTo(273.6 + 0.05 * skyHalfK, 9);
    expect(Math.abs(antennaK - (136.8 + 0.525 * skyK))).toBeLessThan(0.5);
  });

  it("refuses beams that are none", () => {
    expect(() => beam(0)).toThrow(/beamwidthDeg/);
    expect(() => beam(90)).toThrow(/beamwidthDeg/);
  });
});

describeReference("atmosphere/checks-noise-simple.csv", (row) => {
  const { skyK } = skyTemperature({ attenuationDb: num(row, "A_dB"), mediumK: num(row, "Tm_K") });
  expect(Math.abs(skyK - num(row, "T_K")), row["id"]).toBeLessThan(1e-4);
});
