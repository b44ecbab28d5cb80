import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { apertureEfficiency, dishGain } from "../../src/antenna/dishGain.ts";
import { SPEED_OF_LIGHT_M_PER_S, wavelengthM } from "../../src/numeric/constants.ts";
import { averagePower, modeDuty } from "../../src/safety/averagePower.ts";
import {
  exposure,
  exposureByGain,
  fieldStrengthVPerM,
  type LimitDistance,
  nearFieldPowerLimit,
  surfaceDensity,
} from "../../src/safety/exposure.ts";
import { exposureLimits } from "../../src/safety/exposureLimits.ts";
import { describeReference, num, type Row } from "../reference.ts";
import { expectPrinted, inputsOf } from "../relations.ts";

const station = { powerW: 3, diameterM: 0.6, frequencyGHz: 10.368, efficiency: 0.55 };

/** The limit of 10 W/m2 that holds at every frequency used here. */
const publicFcc = (limits: readonly LimitDistance[]) =>
  limits.find(({ name, audience }) => name === "FCC 1.1310" && audience === "public")!;

describe("exposure on the axis of a dish", () => {
  it("reproduces a public filing: 1.5 m, 180.43 W, efficiency 0.65 at a wavelength of 21.1 mm", () => {
    // FCC filing SES-MOD-20110214-00152: 26.659 m, 63.981 m, 26.546 mW/cm2 (cut off, not rounded)
    const result = exposure({
      powerW: 180.43,
      diameterM: 1.5,
      frequencyGHz: SPEED_OF_LIGHT_M_PER_S / 0.0211 / 1e9,
      efficiency: 0.65,
    });
    expect(result.nearFieldLimitM).toBeCloseTo(26.659, 3);
    expect(result.farFieldStartM).toBeCloseTo(63.981, 3);
    expect(Math.abs(result.nearFieldWPerM2 / 10 - 26.546)).toBeLessThan(0.001);
  });

  it("never falls below the limit short of the distance it gives", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.1, max: 50, noNaN: true }),
        fc.double({ min: 0.3, max: 3, noNaN: true }),
        fc.double({ min: 6, max: 47, noNaN: true }),
        (powerW, diameterM, frequencyGHz) => {
          const input = { powerW, diameterM, frequencyGHz, efficiency: 0.6 };
          const at = (distanceM: number) => exposure({ ...input, distanceM }).atDistanceWPerM2!;
          for (const { distanceM, limitWPerM2 } of exposure(input).limits) {
            if (distanceM === 0) {
              expect(at(0.01)).toBeLessThanOrEqual(limitWPerM2);
            } else {
              expect(at(distanceM * 1.0001)).toBeLessThan(limitWPerM2);
              // 3 % of slack: within the step at the start of the far field either value may hold
              expect(at(distanceM * 0.9999)).toBeGreaterThan(limitWPerM2 * 0.97);
            }
          }
        },
      ),
    );
  });

  it("takes the larger distance where a limit falls into the step at the start of the far field", () => {
    // The far field begins pi^2 / (64 x 0.36) / (0.25 / 0.6) = 1.028 times above the stretch before it.
    const { farFieldStartM } = exposure(station);
    // A power that puts the far field's start 1 % above 10 W/m2, with the gain of 33.6871 dBi:
    const powerW = (4 * Math.PI * farFieldStartM ** 2 * 10 * 1.01) / 10 ** 3.36871;
    const { distanceM } = publicFcc(exposure({ ...station, powerW }).limits);
    expect(distanceM).toBeGreaterThan(farFieldStartM);
    expect(distanceM / farFieldStartM).toBeCloseTo(Math.sqrt(1.01), 4);
  });

  it("is cautious to the far field where the strictest bound passes a limit that OET 65 keeps", () => {
    // 1 W on 0.6 m: 7.8 W/m2 by OET 65, 9.45/0.36 = 26 W/m2 by the strictest bound; limit 10 W/m2
    const { limits, farFieldStartM } = exposure({ ...station, powerW: 1 });
    expect(publicFcc(limits).distanceM).toBe(0);
    expect(publicFcc(limits).cautiousDistanceM).toBe(farFieldStartM);
  });

  it("is never less cautious than OET 65, and keeps its near field as the lower bound", () => {
    for (const efficiency of [0.3, 0.55, 1]) {
      const result = exposure({ ...station, powerW: 10, efficiency });
      expect(result.strictestNearFieldWPerM2).toBeGreaterThanOrEqual(result.nearFieldWPerM2);
      for (const limit of result.limits) {
        expect(limit.cautiousDistanceM).toBeGreaterThanOrEqual(limit.distanceM);
      }
    }
  });

  it("says nothing of a distance that was not asked, and refuses the dish's own face", () => {
    expect(exposure(station)).not.toHaveProperty("atDistanceWPerM2");
    expect(() => exposure({ ...station, distanceM: 0 })).toThrow("distanceM");
    expect(() => exposure({ ...station, efficiency: 55 })).toThrow("efficiency");
  });
});

describe("a horn or feed by itself", () => {
  it("makes 17 kW/m2 of 1 W in the open end of a 22.86 x 10.16 mm guide", () => {
    // 4 P / A by hand
    const { surfaceWPerM2 } = surfaceDensity({ powerW: 1, areaM2: 0.02286 * 0.01016 });
    expect(Math.round(surfaceWPerM2 / 1000)).toBe(17);
  });
});

describe("limits", () => {
  it("are 10 and 50 W/m2 by the FCC from 1.5 to 100 GHz, and none of it beyond", () => {
    // 47 CFR 1.1310 Table 1: 1.0 and 5 mW/cm2
    const fcc = (frequencyGHz: number) =>
      exposureLimits({ frequencyGHz })
        .filter(({ name }) => name === "FCC 1.1310")
        .map(({ limitWPerM2, averagingMinutes }) => [limitWPerM2, averagingMinutes]);
    expect(fcc(1.5)).toEqual([
      [10, 30],
      [50, 6],
    ]);
    expect(fcc(101)).toEqual([]);
  });

  it("never let the public have more than a worker", () => {
    for (const frequencyGHz of [3.4, 10.368, 24.048, 47.088]) {
      const limits = exposureLimits({ frequencyGHz });
      expect(limits.length).toBeGreaterThan(3);
      for (const { name, limitWPerM2 } of limits.filter(({ audience }) => audience === "public")) {
        const worker = limits.find((other) => other.name === name && other.audience === "occupational")!;
        expect(limitWPerM2).toBeLessThan(worker.limitWPerM2);
      }
    }
  });
});

const limitOf = (frequencyGHz: number, name: string, audience: string) =>
  exposureLimits({ frequencyGHz }).find((limit) => limit.name === name && limit.audience === audience)!;

/** A dish of the right size and power for a row that is given a wavelength and the like. */
function dishOf(row: Row) {
  const { D_m = 1, lambda_m = 0.03, f_ghz, P_w = 1, eta = 0.55 } = inputsOf(row);
  const frequencyGHz = f_ghz ?? SPEED_OF_LIGHT_M_PER_S / lambda_m / 1e9;
  return { powerW: P_w, diameterM: D_m, efficiency: eta, frequencyGHz };
}

const relations: Record<string, (row: Row) => number> = {
  wavelength_m: (row) => wavelengthM(inputsOf(row)["f_ghz"]!),
  near_extent_m: (row) => exposure(dishOf(row)).nearFieldLimitM,
  far_start_m: (row) => exposure(dishOf(row)).farFieldStartM,
  near_density_wm2: (row) => exposure(dishOf(row)).nearFieldWPerM2,
  aperture_surface_wm2: (row) => exposure(dishOf(row)).surfaceWPerM2,
  rayleigh_2D2_m: (row) => dishGain(dishOf(row)).farFieldM,
  aperture_surface_area_wm2: (row) => {
    const { P_w, A_m2 } = inputsOf(row);
    return surfaceDensity({ powerW: P_w!, areaM2: A_m2! }).surfaceWPerM2;
  },
  aperture_eta: (row) => apertureEfficiency({ ...dishOf(row), gainDbi: inputsOf(row)["G_dbi"]! }).efficiency,
  transition_density_wm2: (row) => {
    // A dish of 1 m whose near field ends at Rnf and holds Snf
    const { Snf_wm2, Rnf_m, R_m } = inputsOf(row);
    return exposure({
      diameterM: 1,
      efficiency: 0.5,
      powerW: (Snf_wm2! * Math.PI) / 8,
      frequencyGHz: (SPEED_OF_LIGHT_M_PER_S * 4 * Rnf_m!) / 1e9,
      distanceM: R_m,
    }).atDistanceWPerM2!;
  },
  onaxis_piecewise_wm2: (row) =>
    exposure({ ...dishOf(row), distanceM: inputsOf(row)["R_m"] }).atDistanceWPerM2!,
  onaxis_limit_distance_m: (row) => {
    // The table's own limit stands for the one of 10 W/m2; the density grows in proportion to the power.
    const dish = dishOf(row);
    const powerW = (dish.powerW * 10) / inputsOf(row)["limit_wm2"]!;
    const { limits } = exposure({ ...dish, powerW });
    return publicFcc(limits).distanceM;
  },
  far_density_wm2: (row) => {
    const { P_w, G_dbi, R_m } = inputsOf(row);
    return exposureByGain({ powerW: P_w!, gainDbi: G_dbi!, distanceM: R_m! }).atDistanceWPerM2;
  },
  far_density_numeric_gain_wm2: (row) => {
    const { P_w, G_num, R_m } = inputsOf(row);
    return exposureByGain({ powerW: P_w!, gainDbi: 10 * Math.log10(G_num!), distanceM: R_m! })
      .atDistanceWPerM2;
  },
  reflected_density_wm2: (row) => {
    const { eirp_w, factor, R_m } = inputsOf(row);
    return exposureByGain({ powerW: eirp_w!, gainDbi: 0, distanceM: R_m!, reflectionFactor: factor! })
      .atDistanceWPerM2;
  },
  near_power_limit_w: (row) => {
    // k = 9.45 is the strictest bound, any other k that of OET 65 with eta = k pi / 16
    const { D_m, limit_wm2, k } = inputsOf(row);
    const efficiency = k === 9.45 ? 0.55 : (k! * Math.PI) / 16;
    const { oet65W, strictestW } = nearFieldPowerLimit({
      limitWPerM2: limit_wm2!,
      diameterM: D_m!,
      efficiency,
    });
    return k === 9.45 ? strictestW : oet65W;
  },
  icnirp2020_local_public_wm2: (row) =>
    limitOf(inputsOf(row)["f_ghz"]!, "ICNIRP 2020 local", "public").limitWPerM2,
  icnirp2020_local_occup_wm2: (row) =>
    limitOf(inputsOf(row)["f_ghz"]!, "ICNIRP 2020 local", "occupational").limitWPerM2,
  mwcm2_to_wm2: (row) =>
    limitOf(10, "FCC 1.1310", inputsOf(row)["S_mwcm2"] === 1 ? "public" : "occupational").limitWPerM2,
  eu_avg_time_min: (row) =>
    limitOf(inputsOf(row)["f_ghz"]!, "Directive 2013/35/EU", "occupational").averagingMinutes,
  efield_vpm: (row) => fieldStrengthVPerM(inputsOf(row)["S_wm2"]!),
  morse_paris_duty: () => modeDuty.cw,
  average_power_w: (row) => {
    const { P_w, tx_fraction, mode_duty } = inputsOf(row);
    return averagePower({ powerW: P_w!, transmitFraction: tx_fraction!, modeDuty: mode_duty! }).averageW;
  },
};

describeReference("practice/checks-safety.csv", (row) => {
  const compute = relations[row["relation"]!];
  if (compute === undefined) throw new Error(`relation ${row["relation"]} is not covered`);
  expectPrinted(row, compute(row), num(row, "expected"));
});
