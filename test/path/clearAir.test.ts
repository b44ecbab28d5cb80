import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type ClearAirInput, type ClearAirLoss, clearAirLoss } from "../../src/path/clearAir.ts";
import { describeReference, num, type Row } from "../reference.ts";
import { polarizationOf, referenceProfile } from "./profiles.ts";

const columns: Readonly<Record<string, Exclude<keyof ClearAirLoss, "pathType">>> = {
  d_km: "distanceKm",
  omega: "seaFraction",
  dtm_km: "longestLandKm",
  dlm_km: "longestInlandKm",
  beta0_pct: "beta0Percent",
  gamma_gas_dB_km: "gasDbPerKm",
  gamma_gas_rho3_dB_km: "troposcatterGasDbPerKm",
  ae_km: "effectiveRadiusKm",
  hts_m: "txHeightAmslM",
  hrs_m: "rxHeightAmslM",
  theta_t_mrad: "txHorizonMrad",
  theta_r_mrad: "rxHorizonMrad",
  theta_mrad: "angularDistanceMrad",
  dlt_km: "txHorizonKm",
  dlr_km: "rxHorizonKm",
  hm_m: "roughnessM",
  hte_m: "txEffectiveHeightM",
  hre_m: "rxEffectiveHeightM",
  hstd_m: "txSmoothSurfaceM",
  hsrd_m: "rxSmoothSurfaceM",
  Lbulla50_dB: "bullingtonActualMedianDb",
  Lbulls50_dB: "bullingtonSmoothMedianDb",
  Ldsph50_dB: "sphericalMedianDb",
  Ld50_dB: "diffractionMedianDb",
  Ldbeta_dB: "diffractionBeta0Db",
  Ldp_dB: "diffractionDb",
  Lbfsg_dB: "freeSpaceDb",
  Lb0p_dB: "lineOfSightDb",
  Lb0beta_dB: "lineOfSightBeta0Db",
  Lbs_dB: "troposcatterDb",
  Lba_dB: "ductingDb",
  Lb_dB: "lossDb",
};

function inputOf(row: Row): ClearAirInput {
  return {
    profile: referenceProfile(row["profile"]!),
    frequencyGHz: num(row, "f_GHz"),
    percent: num(row, "p_pct"),
    polarization: polarizationOf(row),
    txHeightM: num(row, "htg_m"),
    rxHeightM: num(row, "hrg_m"),
    txGainDbi: num(row, "Gt_dBi"),
    rxGainDbi: num(row, "Gr_dBi"),
    txCoastKm: num(row, "dct_km"),
    rxCoastKm: num(row, "dcr_km"),
    pressureHPa: num(row, "press_hPa"),
    temperatureC: num(row, "temp_C"),
    from: { latitude: num(row, "tx_lat"), longitude: num(row, "tx_lon") },
    to: { latitude: num(row, "rx_lat"), longitude: num(row, "rx_lon") },
    dN: num(row, "dN"),
    N0: num(row, "N0"),
  };
}

/** 100 km of flat inland at sea level in steps of 1 km, as ITU-R SG3 validates with. */
const flat: ClearAirInput = {
  profile: {
    distancesKm: Array.from({ length: 101 }, (_, i) => i),
    heightsM: new Array(101).fill(0),
  },
  frequencyGHz: 2,
  percent: 50,
  polarization: "vertical",
  txHeightM: 10,
  rxHeightM: 10,
  txGainDbi: 20,
  rxGainDbi: 5,
  txCoastKm: 500,
  rxCoastKm: 500,
  pressureHPa: 1013,
  temperatureC: 15,
  from: { latitude: 51.8, longitude: 0 },
  to: { latitude: 50.9007, longitude: 0 },
  dN: 42.496465,
  N0: 326.521892,
};

describe("clear-air loss over 100 km of flat land", () => {
  // ITU-R Study Group 3, validation results for Rec. ITU-R P.452-18, path "flat_land_100km".
  it.each([
    [2, 50, 99.60559847, 139.11233419, 194.24974629, 237.61574595, 194.24974628],
    [2, 10, 77.29593407, 139.11233419, 186.38938784, 186.89565652, 185.1227268],
    [30, 50, 215.55247517, 171.32245315, 224.3495789, 276.62034766, 224.3495789],
  ])("%d GHz, %d %%", (frequencyGHz, percent, diffraction, freeSpace, troposcatter, ducting, loss) => {
    const result = clearAirLoss({ ...flat, frequencyGHz, percent });
    expect(result.pathType).toBe("trans-horizon");
    expect(result.diffractionDb).toBeCloseTo(diffraction, 5);
    expect(result.freeSpaceDb).toBeCloseTo(freeSpace, 5);
    expect(result.troposcatterDb).toBeCloseTo(troposcatter, 5);
    expect(result.ductingDb).toBeCloseTo(ducting, 5);
    expect(result.lossDb).toBeCloseTo(loss, 5);
  });

  it("finds the horizons and heights of the same data", () => {
    const result = clearAirLoss(flat);
    expect(result.effectiveRadiusKm).toBeCloseTo(8735.511968, 3);
    expect(result.beta0Percent).toBeCloseTo(1.192048, 6);
    expect(result.txHorizonMrad).toBeCloseTo(-1.513319, 6);
    expect(result.rxHorizonMrad).toBeCloseTo(-1.513319, 6);
    expect(result.angularDistanceMrad).toBeCloseTo(8.420888, 6);
    expect([result.txHorizonKm, result.rxHorizonKm]).toEqual([13, 13]);
    expect([result.roughnessM, result.txEffectiveHeightM, result.rxEffectiveHeightM]).toEqual([0, 10, 10]);
  });
});

/** Rolling land with a ridge; lengths and heights drawn. */
const anyPath = fc
  .record({
    steps: fc.integer({ min: 20, max: 80 }),
    stepKm: fc.double({ min: 0.2, max: 3, noNaN: true }),
    ridgeM: fc.double({ min: 0, max: 800, noNaN: true }),
    swellM: fc.double({ min: 0, max: 60, noNaN: true }),
    frequencyGHz: fc.double({ min: 1, max: 47, noNaN: true }),
    seaFrom: fc.integer({ min: 0, max: 80 }),
  })
  .map(({ steps, stepKm, ridgeM, swellM, frequencyGHz, seaFrom }): ClearAirInput => {
    const index = Array.from({ length: steps + 1 }, (_, i) => i);
    const ridge = (i: number) => ridgeM * Math.exp(-((i - 0.4 * steps) ** 2) / 30);
    return {
      ...flat,
      frequencyGHz,
      profile: {
        distancesKm: index.map((i) => i * stepKm),
        heightsM: index.map((i) => (i >= seaFrom ? 0 : 60 + swellM * Math.sin(i) + ridge(i))),
        zones: index.map((i) => (i >= seaFrom ? "sea" : i >= seaFrom - 5 ? "coastal" : "inland")),
      },
    };
  });

describe("clear-air loss on any path", () => {
  it("is not below the lowest mechanism by more than the two combinations round off", () => {
    fc.assert(
      fc.property(anyPath, fc.double({ min: 0.001, max: 50, noNaN: true }), (path, percent) => {
        const result = clearAirLoss({ ...path, percent });
        const lowest = Math.min(result.lineOfSightDb, result.troposcatterDb);
        expect(result.lossDb).toBeGreaterThan(lowest - 5 * Math.log10(2) - 1e-9);
        expect(result.lossDb).toBeLessThanOrEqual(result.troposcatterDb);
      }),
    );
  });

  it("does not fall as the percentage of time rises", () => {
    fc.assert(
      fc.property(anyPath, (path) => {
        const losses = [0.001, 0.01, 0.1, 0.5, 1, 2, 5, 10, 20, 35, 50].map(
          (percent) => clearAirLoss({ ...path, percent }).lossDb,
        );
        for (let i = 1; i < losses.length; i++) expect(losses[i]! - losses[i - 1]!).toBeGreaterThan(-1e-9);
      }),
    );
  });

  it("does not depend on an east longitude written as a west one", () => {
    const west = { latitude: 51, longitude: -1 };
    const inside = clearAirLoss({ ...flat, from: west, to: { latitude: 51.3, longitude: 0.3 } });
    const around = clearAirLoss({ ...flat, from: west, to: { latitude: 51.3, longitude: -359.7 } });
    expect(around.lossDb).toBeCloseTo(inside.lossDb, 9);
  });
});

describe("clear-air loss refuses", () => {
  it.each([
    ["percent", { percent: 0 }],
    ["percent", { percent: 51 }],
    ["dN", { dN: 157 }],
    ["txHeightM", { txHeightM: 0 }],
    ["polarization", { polarization: "slanted" as "vertical" }],
    ["from.latitude", { from: { latitude: 91, longitude: 0 } }],
    ["temperatureK", { temperatureC: -300 }],
    ["N0", { N0: Number.NaN }],
  ] as const)("a broken %s", (name, change) => {
    expect(() => clearAirLoss({ ...flat, ...change })).toThrow(name);
  });
});

// ITU-R SG3 validation results for P.452-18, and its reference implementation at the amateur bands.
for (const table of ["terrain/p452-published.csv", "terrain/p452-10GHz.csv"]) {
  describeReference(table, (row) => {
    const result = clearAirLoss(inputOf(row));
    expect(result.pathType).toBe(row["path_type"]);
    for (const [column, field] of Object.entries(columns)) {
      const error = Math.abs(result[field] - num(row, column));
      // Largest seen 4e-5, in the effective radius; the losses agree within 3e-6 dB.
      if (!(error < 0.0002)) {
        throw new Error(
          `${row["profile"]} ${row["f_GHz"]} GHz ${row["p_pct"]} %: ${column} is off by ${error}`,
        );
      }
    }
  });
}
