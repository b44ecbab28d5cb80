import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  interferenceTroposcatterLoss,
  type TroposcatterInput,
  troposcatterLoss,
} from "../../src/path/troposcatter.ts";
import { describeReference, num } from "../reference.ts";

const base: TroposcatterInput = {
  frequencyGHz: 10.368,
  distanceKm: 150,
  txHeightAmslM: 300,
  rxHeightAmslM: 200,
  effectiveRadiusKm: 8500,
  txHorizonMrad: 2,
  rxHorizonMrad: 3,
  txGainDbi: 35,
  rxGainDbi: 35,
  N0: 320,
  dN: 40,
  groundHeightKm: 0.2,
  percent: 50,
};

describe("troposcatter by P.617-5", () => {
  // Computed with the function of the P.617-5 type in an ITU working version of Rec. ITU-R P.452.
  it.each([
    [0.01, 198.6754926225],
    [10, 214.9722525548],
    [50, 222.9075542613],
    [90, 230.8428559678],
    [99.9, 242.5266470622],
  ])("150 km, %d %%: %d dB", (percent, lossDb) => {
    const result = troposcatterLoss({ ...base, percent });
    expect(result.lossDb).toBeCloseTo(lossDb, 5);
    expect(result.scatterAngleMrad).toBeCloseTo(22.6470588235, 9);
  });

  it("loses nothing by the order of the ends", () => {
    const horizon = fc.double({ min: 0, max: 20, noNaN: true });
    const height = fc.double({ min: 0, max: 1500, noNaN: true });
    fc.assert(
      fc.property(horizon, horizon, height, height, (txHorizonMrad, rxHorizonMrad, tx, rx) => {
        const there = troposcatterLoss({
          ...base,
          percent: 90,
          txHorizonMrad,
          rxHorizonMrad,
          txHeightAmslM: tx,
          rxHeightAmslM: rx,
        });
        const back = troposcatterLoss({
          ...base,
          percent: 90,
          txHorizonMrad: rxHorizonMrad,
          rxHorizonMrad: txHorizonMrad,
          txHeightAmslM: rx,
          rxHeightAmslM: tx,
        });
        // The crossing of the rays is found from one end with small angles: not exactly the same height.
        expect(Math.abs(back.lossDb - there.lossDb)).toBeLessThan(0.02);
      }),
    );
  });

  it("spreads evenly about the median and rises with distance, angle and gain", () => {
    const at = (change: Partial<TroposcatterInput>) => troposcatterLoss({ ...base, ...change }).lossDb;
    expect(at({ percent: 90 }) - at({})).toBeCloseTo(at({}) - at({ percent: 10 }), 10);
    expect(at({ distanceKm: 200 })).toBeGreaterThan(at({}));
    expect(at({ txHorizonMrad: 5 })).toBeGreaterThan(at({}));
    // Coupling 0.07 exp(0.055 x 70): 3.3 dB for two 35 dBi antennas, against 0.07 dB for isotropic ones.
    expect(at({}) - at({ txGainDbi: 0, rxGainDbi: 0 })).toBeCloseTo(3.29 - 0.07, 2);
  });

  it("refuses a path without a common volume, and certainty", () => {
    expect(() => troposcatterLoss({ ...base, txHorizonMrad: -30 })).toThrow("scatterAngleMrad");
    expect(() => troposcatterLoss({ ...base, percent: 100 })).toThrow("percent");
    expect(() => troposcatterLoss({ ...base, percent: 0 })).toThrow("percent");
    expect(() => troposcatterLoss({ ...base, rxGainDbi: Number.NaN })).toThrow("rxGainDbi");
  });
});

describe("troposcatter term of P.452", () => {
  const flat = {
    frequencyGHz: 2,
    distanceKm: 100,
    angularDistanceMrad: 8.420888358,
    N0: 326.521892,
    txGainDbi: 20,
    rxGainDbi: 5,
    gasDb: 0.6754022576917,
  };
  // ITU-R Study Group 3, validation results for Rec. ITU-R P.452-18, path "flat_land_100km".
  it.each([
    [50, 194.24974629],
    [10, 186.38938784],
  ])("2 GHz over 100 km, %d %%: %d dB", (percent, lossDb) => {
    expect(interferenceTroposcatterLoss({ ...flat, percent })).toBeCloseTo(lossDb, 6);
  });
  it("is for the better half of the time", () => {
    expect(() => interferenceTroposcatterLoss({ ...flat, percent: 60 })).toThrow("percent");
  });
});

describeReference("terrain/troposcatter-p617.csv", (row) => {
  const result = troposcatterLoss({
    frequencyGHz: num(row, "f_GHz"),
    distanceKm: num(row, "d_km"),
    txHeightAmslM: num(row, "hts_m"),
    rxHeightAmslM: num(row, "hrs_m"),
    effectiveRadiusKm: num(row, "ae_km"),
    txHorizonMrad: num(row, "theta_t_mrad"),
    rxHorizonMrad: num(row, "theta_r_mrad"),
    txGainDbi: num(row, "Gt_dBi"),
    rxGainDbi: num(row, "Gr_dBi"),
    N0: num(row, "N0"),
    dN: num(row, "dN"),
    groundHeightKm: num(row, "hs_km"),
    percent: num(row, "p_pct"),
  });
  expect(Math.abs(result.lossDb - num(row, "Lbs_dB"))).toBeLessThan(1e-8);
  expect(Math.abs(result.scatterAngleMrad - num(row, "theta_mrad"))).toBeLessThan(1e-9);
});
