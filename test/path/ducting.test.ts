import { describe, expect, it } from "vitest";
import { type DuctingInput, ductClimate, ductingLoss } from "../../src/path/ducting.ts";

describe("climate of ducting", () => {
  // ITU-R Study Group 3, validation results for Rec. ITU-R P.452-18: beta0 of four paths; latitudes of
  // the middle as printed there to 3 decimals.
  it.each([
    [40.432, 4.5, 4.5, 10.470175],
    [51.35, 100, 100, 1.192048],
    [-51.35, 100, 100, 1.192048],
  ])(
    "at %d deg, %d km of land, %d km inland: beta0 %d %%",
    (latitudeDeg, longestLandKm, longestInlandKm, beta0) => {
      const { beta0Percent } = ductClimate({ latitudeDeg, longestLandKm, longestInlandKm });
      expect(Math.abs(beta0Percent / beta0 - 1)).toBeLessThan(3e-5);
    },
  );

  it("is 10^1.67 % on the equator and 4.17 % at the poles over the sea, with no step at 70 deg", () => {
    const overSea = (latitudeDeg: number) =>
      ductClimate({ latitudeDeg, longestLandKm: 0, longestInlandKm: 0 }).beta0Percent;
    expect(overSea(0)).toBeCloseTo(10 ** 1.67, 10);
    expect(overSea(90)).toBeCloseTo(4.17, 10);
    expect(overSea(70) / overSea(70.001)).toBeCloseTo(1, 3);
  });
});

const overSea: DuctingInput = {
  frequencyGHz: 10.368,
  distanceKm: 200,
  percent: 1,
  effectiveRadiusKm: 8500,
  txHeightAmslM: 50,
  rxHeightAmslM: 20,
  txHorizonMrad: -2,
  rxHorizonMrad: -1.5,
  txHorizonKm: 25,
  rxHorizonKm: 18,
  txEffectiveHeightM: 40,
  rxEffectiveHeightM: 18,
  roughnessM: 5,
  txCoastKm: 500,
  rxCoastKm: 500,
  seaFraction: 0.9,
  climate: ductClimate({ latitudeDeg: 52, longestLandKm: 8, longestInlandKm: 2 }),
  gasDb: 3,
};
const change = (input: Partial<DuctingInput>) => ductingLoss({ ...overSea, ...input }) - ductingLoss(overSea);

describe("ducting loss", () => {
  it("gains 3 dB from an antenna at the shore, 50 m above the sea", () => {
    // P.452-18 equation 49: -3 exp(0) (1 + tanh 0) dB.
    expect(change({ txCoastKm: 0 })).toBeCloseTo(-3, 10);
    expect(change({ txCoastKm: 2 })).toBeCloseTo(-3 * Math.exp(-1), 10);
    expect(change({ txCoastKm: 5.1 })).toBe(0);
    expect(change({ rxCoastKm: 4, rxHorizonKm: 18 })).toBeLessThan(0);
    expect(ductingLoss({ ...overSea, seaFraction: 0.7, txCoastKm: 0 })).toBe(
      ductingLoss({ ...overSea, seaFraction: 0.7 }),
    );
  });

  it("loses by a high near horizon", () => {
    // Equation 48 with 8 mrad over 0.1 x 20 km and f d = 207.36: 20 log(1 + 0.361 x 6 x 14.4) + 0.264 x 6 f^(1/3);
    // the angular distance grows by no more than 0.1 mrad per km of the horizon, here 2 mrad.
    const level = ductingLoss({ ...overSea, txHorizonKm: 20, txHorizonMrad: 2 });
    const shielded = ductingLoss({ ...overSea, txHorizonKm: 20, txHorizonMrad: 8 });
    const expected = 20 * Math.log10(1 + 0.361 * 6 * 14.4) + 0.264 * 6 * Math.cbrt(10.368);
    expect(shielded - level).toBeCloseTo(expected, 9);
  });

  it("has no step at 500 MHz, below which the coupling needs a correction", () => {
    const above = ductingLoss({ ...overSea, frequencyGHz: 0.5 });
    expect(ductingLoss({ ...overSea, frequencyGHz: 0.5 - 1e-9 })).toBeCloseTo(above, 6);
    // At 0.3 GHz 45.375 - 137 f + 92.5 f^2 = 12.6 dB; 5e-5 a f^(1/3) dB for each of 20 mrad along the duct.
    const angleMrad = 200 / 8.5 - 2 - 1.5;
    const along = 0.425 * (Math.cbrt(0.3) - Math.cbrt(0.5)) * angleMrad;
    expect(change({ frequencyGHz: 0.3 }) - change({ frequencyGHz: 0.5 })).toBeCloseTo(
      12.6 + 20 * Math.log10(0.3 / 0.5) + along,
      9,
    );
  });

  it("suffers from rough ground only above 10 m", () => {
    expect(change({ roughnessM: 10 })).toBe(0);
    expect(change({ roughnessM: 60 })).toBeGreaterThan(1);
  });

  it("rises with the percentage of time and adds the gas as it is", () => {
    expect(change({ percent: 10 })).toBeGreaterThan(0);
    expect(change({ percent: 0.1 })).toBeLessThan(0);
    expect(change({ gasDb: 5 })).toBeCloseTo(2, 10);
  });
});
