import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { levelBeamTemperature } from "../../src/atmosphere/skyNoise.ts";
import {
  antennaTemperatureInRain,
  filledBeamK,
  levelBeam,
  levelBeamDefault,
} from "../../src/receiver/antennaTemperature.ts";
import { describeReference, num } from "../reference.ts";

describe("antenna temperature in rain", () => {
  it("is half-way to the rain's temperature behind 3.01 dB", () => {
    const { temperatureK } = antennaTemperatureInRain({
      clearK: 200,
      attenuationDb: 10 * Math.log10(2),
      mediumK: 280,
    });
    expect(temperatureK).toBeCloseTo(240, 9);
  });

  it("warms a level beam, without passing the rain's own temperature", () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 60, noNaN: true }), (attenuationDb) => {
        const { temperatureK } = antennaTemperatureInRain({ clearK: levelBeam.temperatureK, attenuationDb });
        expect(temperatureK).toBeGreaterThanOrEqual(levelBeam.temperatureK);
        expect(temperatureK).toBeLessThanOrEqual(275);
        expect(temperatureK).toBeLessThan(filledBeamK);
      }),
    );
  });

  it("does not care into how many parts the rain is cut", () => {
    const clear = { clearK: 150, mediumK: 270 };
    const once = antennaTemperatureInRain({ ...clear, attenuationDb: 5 });
    const half = antennaTemperatureInRain({ ...clear, attenuationDb: 2 });
    const twice = antennaTemperatureInRain({ clearK: half.temperatureK, attenuationDb: 3, mediumK: 270 });
    expect(twice.temperatureK).toBeCloseTo(once.temperatureK, 9);
  });

  it("refuses a negative attenuation", () => {
    expect(() => antennaTemperatureInRain({ clearK: 200, attenuationDb: -1 })).toThrow("attenuationDb");
  });
});

// The same balance, with the cosmic background of 2.7 K behind the rain
describeReference("atmosphere/checks-noise-simple.csv", (row) => {
  const { temperatureK } = antennaTemperatureInRain({
    clearK: 2.7,
    attenuationDb: num(row, "A_dB"),
    mediumK: num(row, "Tm_K"),
  });
  expect(Math.abs(temperatureK - num(row, "T_K"))).toBeLessThan(1e-4);
});

describe("the default of a level beam", () => {
  // Independent of the table: the sky integrated through the whole atmosphere, beam of 3 deg.
  it.each([14, 20, 22.2, 24.048, 30, 40, 47.088])("follows the air at %d GHz", (frequencyGHz) => {
    const { antennaK } = levelBeamTemperature({ frequencyGHz, beamwidthDeg: 3 });
    expect(levelBeamDefault(frequencyGHz).temperatureK).toBeCloseTo(antennaK, 0);
  });

  it("is the usual 200 K, spread by 40 K, where the air is clear", () => {
    expect(levelBeamDefault(10.368)).toEqual({ temperatureK: 200, sigmaK: 40 });
  });

  it("is known better where sky and ground are equally warm", () => {
    expect(levelBeamDefault(47.088).sigmaK).toBe(10);
  });
});
