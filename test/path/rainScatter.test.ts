import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { rainCrossSection } from "../../src/path/rainCrossSection.ts";
import { type RainScatterInput, rainScatterLoss } from "../../src/path/rainScatter.ts";
import { describeReference, num } from "../reference.ts";
import { polarizationOf } from "./profiles.ts";

const base: RainScatterInput = {
  frequencyGHz: 10.368,
  rainRateMmPerH: 20,
  r1Km: 150,
  r2Km: 150,
  scatterDeg: 60,
  g1Dbi: 34,
  g2Dbi: 34,
  beamwidth1Deg: 3.4,
  beamwidth2Deg: 3.4,
  cellWidthKm: 10,
  cellHeightKm: 4,
  polarization: "vertical",
};
const change = (input: Partial<RainScatterInput>) =>
  rainScatterLoss({ ...base, ...input }).lossDb - rainScatterLoss(base).lossDb;

describe("rain scatter", () => {
  // Quadrature in three dimensions with true angles and ranges; half a tenth of a decibel.
  it.each<[Partial<RainScatterInput>, number]>([
    [{}, 140.1432405123],
    [{ polarization: "horizontal" }, 146.1638404256],
    [
      {
        rainRateMmPerH: 50,
        r1Km: 100,
        r2Km: 200,
        scatterDeg: 90,
        g1Dbi: 40,
        beamwidth1Deg: 1.7,
        cellWidthKm: 8,
      },
      132.3231459451,
    ],
  ])("with %o loses %d dB", (input, lossDb) => {
    expect(Math.abs(rainScatterLoss({ ...base, ...input }).lossDb - lossDb)).toBeLessThan(0.05);
  });

  it("reflects by Marshall and Palmer: 23 + 16 log R", () => {
    // J. Meteor. 5, 165 (1948): Z = 200 R^1.6.
    expect(rainScatterLoss({ ...base, rainRateMmPerH: 1 }).reflectivityDbz).toBeCloseTo(23.0103, 4);
    expect(rainScatterLoss({ ...base, rainRateMmPerH: 10 }).reflectivityDbz).toBeCloseTo(39.0103, 4);
    expect(rainScatterLoss({ ...base, heightOverRainKm: 1 }).reflectivityDbz).toBeCloseTo(
      rainScatterLoss(base).reflectivityDbz - 6.5,
      10,
    );
    expect(change({ heightOverRainKm: 2 })).toBeCloseTo(13, 10);
  });

  it("agrees with the older form 208 - 20 log f - 10 log Z - 10 log C", () => {
    // Older editions of Rec. ITU-R P.452; C = G1 G2 V / (r1 r2)^2 in 1/km, rounded constant.
    const { lossDb, commonVolumeKm3, reflectivityDbz } = rainScatterLoss(base);
    const transfer = 34 + 34 + 10 * Math.log10(commonVolumeKm3 / 150 ** 4);
    const older = 208 - 20 * Math.log10(10.368) - reflectivityDbz - transfer;
    expect(Math.abs(lossDb - older)).toBeLessThan(0.2);
  });

  it("fills the crossing of two beams where the cell is wide", () => {
    const { commonVolumeKm3 } = rainScatterLoss({ ...base, r2Km: 90, cellWidthKm: 1e5, cellHeightKm: 1e5 });
    const w1 = (150 * 3.4 * Math.PI) / 180;
    const w2 = (90 * 3.4 * Math.PI) / 180;
    const crossing =
      ((Math.PI / (4 * Math.LN2)) ** 1.5 * w1 ** 2 * w2 ** 2) / (Math.hypot(w1, w2) * Math.sin(Math.PI / 3));
    expect(commonVolumeKm3 / crossing).toBeCloseTo(1, 6);
  });

  it("fills the cell where the beams are wide", () => {
    const wide = { ...base, beamwidth1Deg: 1e5, beamwidth2Deg: 1e5 };
    const cell = (Math.PI / (4 * Math.LN2)) ** 1.5 * 10 * 10 * 4;
    expect(rainScatterLoss(wide).commonVolumeKm3 / cell).toBeCloseTo(1, 6);
  });

  it("agrees with a sum over the volume", () => {
    // Product of the two beams and the cell summed on a grid; the axes cross at 60 deg.
    const [w1, w2] = [(150 * 3.4 * Math.PI) / 180, (90 * 2 * Math.PI) / 180];
    const [cosine, sine] = [0.5, Math.sqrt(0.75)];
    const step = 1.2;
    let sum = 0;
    for (let x = -30; x <= 30; x += step) {
      for (let y = -30; y <= 30; y += step) {
        for (let z = -12; z <= 12; z += step) {
          const off1 = (y * y + z * z) / w1 ** 2;
          const off2 = ((x * sine - y * cosine) ** 2 + z * z) / w2 ** 2;
          const cell = (x * x + y * y) / 100 + (z * z) / 16;
          sum += Math.exp(-4 * Math.LN2 * (off1 + off2 + cell)) * step ** 3;
        }
      }
    }
    const { commonVolumeKm3 } = rainScatterLoss({ ...base, r2Km: 90, beamwidth2Deg: 2 });
    expect(commonVolumeKm3 / sum).toBeCloseTo(1, 4);
  });

  it("loses 3 dB at the edge of one beam", () => {
    expect(change({ offAxis1Deg: 1.7 })).toBeCloseTo(10 * Math.log10(2), 10);
    expect(change({ offAxis2Deg: -1.7 })).toBeCloseTo(10 * Math.log10(2), 10);
  });

  it("vanishes at a right angle for horizontal polarization only", () => {
    expect(change({ scatterDeg: 90, polarization: "horizontal" })).toBeGreaterThan(200);
    expect(Math.abs(change({ scatterDeg: 90 }))).toBeLessThan(3);
  });

  it("is the same from either end, and falls with rain and with gain", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 20, max: 400, noNaN: true }),
        fc.double({ min: 20, max: 400, noNaN: true }),
        fc.double({ min: 0, max: 180, noNaN: true }),
        fc.double({ min: 0.5, max: 6, noNaN: true }),
        (r1Km, r2Km, scatterDeg, beamwidth1Deg) => {
          const there = { ...base, r1Km, r2Km, scatterDeg, beamwidth1Deg, g1Dbi: 30 };
          const back = {
            ...base,
            r1Km: r2Km,
            r2Km: r1Km,
            scatterDeg,
            beamwidth2Deg: beamwidth1Deg,
            g2Dbi: 30,
          };
          const { lossDb } = rainScatterLoss(there);
          expect(Math.abs(rainScatterLoss(back).lossDb - lossDb)).toBeLessThan(1e-9);
          expect(lossDb - rainScatterLoss({ ...there, rainRateMmPerH: 200 }).lossDb).toBeCloseTo(16, 9);
          expect(lossDb - rainScatterLoss({ ...there, g1Dbi: 31 }).lossDb).toBeCloseTo(1, 9);
        },
      ),
    );
  });

  it("takes the polynomial when asked, close to small drops", () => {
    // Small drops against the fit of P.452-18: -2.6 to +2.4 dB from 1 to 50 mm/h, 5.76 to 24 GHz, 0 to 10 degC.
    for (const frequencyGHz of [5.76, 10.368, 24.048]) {
      for (const rainRateMmPerH of [1, 5, 20, 50]) {
        for (const scatterDeg of [0, 60, 120, 180]) {
          const path = { ...base, frequencyGHz, rainRateMmPerH, scatterDeg };
          const rayleigh = rainScatterLoss(path).lossDb;
          const fit = rainScatterLoss({ ...path, crossSection: "polynomial" }).lossDb;
          expect(fit - rayleigh).toBeGreaterThan(-2.65);
          expect(fit - rayleigh).toBeLessThan(2.45);
        }
      }
    }
  });

  it("refuses a dry cell and an angle beyond 180 deg", () => {
    expect(() => rainScatterLoss({ ...base, rainRateMmPerH: 0 })).toThrow("rainRateMmPerH");
    expect(() => rainScatterLoss({ ...base, scatterDeg: 181 })).toThrow("scatterDeg");
    expect(() => rainScatterLoss({ ...base, cellHeightKm: 0 })).toThrow("cellHeightKm");
  });
});

describe("cross-section of rain by P.452-18", () => {
  // Reference implementation of Rec. ITU-R P.452-18, hydrometeor scatter.
  it.each([
    [0, 0, 2.3801324771e-9],
    [0, 90, 2.360969566e-9],
    [0, 180, 2.3047881513e-9],
    [10, 30, 2.279796508e-9],
  ])("3.4 GHz, 1 mm/h, %d degC, %d deg", (temperatureC, scatterDeg, perM) => {
    const result = rainCrossSection({ frequencyGHz: 3.4, rainRateMmPerH: 1, temperatureC, scatterDeg });
    expect(Math.abs(result.perM / perM - 1)).toBeLessThan(1e-9);
  });
});

describeReference("terrain/rain-eta-p452-18.csv", (row) => {
  const { perM } = rainCrossSection({
    frequencyGHz: num(row, "f_GHz"),
    rainRateMmPerH: num(row, "R_mm_h"),
    temperatureC: num(row, "T_C"),
    scatterDeg: num(row, "phi_s_deg"),
  });
  expect(Math.abs(perM / num(row, "eta_per_m") - 1)).toBeLessThan(1e-9);
});

describeReference("terrain/rain-scatter.csv", (row) => {
  const result = rainScatterLoss({
    frequencyGHz: num(row, "f_GHz"),
    rainRateMmPerH: num(row, "R_mm_h"),
    r1Km: num(row, "r1_km"),
    r2Km: num(row, "r2_km"),
    scatterDeg: num(row, "psi_deg"),
    g1Dbi: num(row, "G1_dBi"),
    g2Dbi: num(row, "G2_dBi"),
    beamwidth1Deg: num(row, "hpbw1_deg"),
    beamwidth2Deg: num(row, "hpbw2_deg"),
    cellWidthKm: num(row, "wc_km"),
    cellHeightKm: num(row, "wz_km"),
    polarization: polarizationOf(row),
  });
  expect(Math.abs(result.reflectivityDbz - num(row, "Z_dBZ"))).toBeLessThan(1e-6);
  expect(Math.abs(result.crossSectionPerM / num(row, "eta_per_m") - 1)).toBeLessThan(1e-6);
  expect(Math.abs(result.commonVolumeKm3 / num(row, "V_km3") - 1)).toBeLessThan(1e-6);
  expect(Math.abs(result.lossDb - num(row, "L_dB"))).toBeLessThan(1e-3);
  expect(Math.abs(result.lossDb - num(row, "L_num_dB"))).toBeLessThan(0.05);
  // The quadrature of the volume itself stays within 0.1 %.
  expect(Math.abs(result.commonVolumeKm3 / num(row, "V_num_km3") - 1)).toBeLessThan(1e-3);
});
