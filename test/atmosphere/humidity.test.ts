import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  saturationPressure,
  saturationValidity,
  vapourDensity,
  vapourPressureFromDensity,
  vapourPressureFromDewPoint,
  vapourPressureFromHumidity,
} from "../../src/atmosphere/humidity.ts";
import { outside } from "../../src/numeric/check.ts";
import { describeReference, num } from "../reference.ts";
import { expectRelative } from "./relative.ts";

const pressureHPa = 1013.25;

describe("humidity", () => {
  // ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0 (02/12/2024), sheet A_Gas_A2_INST.
  it.each([
    [1007.4, 22, 71.8, 19.0657139188, 13.9981033583],
    [1008.3, 30.9, 42.2, 18.9462209191, 13.5031937943],
  ])("%d hPa, %d degC, %d %%", (pressureHPa, temperatureC, relativeHumidityPercent, e, rho) => {
    const vapour = vapourPressureFromHumidity({ pressureHPa, temperatureC, relativeHumidityPercent });
    expectRelative(vapour.vapourPressureHPa, e, 1e-10);
    const { vapourDensityGm3 } = vapourDensity({ ...vapour, temperatureK: temperatureC + 273.15 });
    expectRelative(vapourDensityGm3, rho, 1e-10);
  });

  // Goff and Gratch, Smithsonian Meteorological Tables (1951), pure vapour without air (from memory).
  it.each([
    [0, 6.1078],
    [20, 23.373],
    [-10, 2.8627],
  ])("agrees with the Goff-Gratch tables at %d degC within 0.2 %%", (temperatureC, tabled) => {
    const { saturationPressureHPa } = saturationPressure({ temperatureC, pressureHPa: 0 });
    expectRelative(saturationPressureHPa, tabled, 2e-3);
  });

  it("over ice lies below over water in frost, and meets it at 0 degC", () => {
    const over = (temperatureC: number, phase: "water" | "ice") =>
      saturationPressure({ temperatureC, pressureHPa, phase }).saturationPressureHPa;
    for (const t of [-40, -20, -10, -1]) expect(over(t, "ice")).toBeLessThan(over(t, "water"));
    expectRelative(over(0, "ice"), over(0, "water"), 2e-4);
  });

  it("air at its dew point is saturated, and a higher dew point means more vapour", () => {
    fc.assert(
      fc.property(fc.double({ min: -40, max: 49, noNaN: true }), (dewPointC) => {
        const { vapourPressureHPa } = vapourPressureFromDewPoint({ dewPointC, pressureHPa });
        const saturated = vapourPressureFromHumidity({
          relativeHumidityPercent: 100,
          temperatureC: dewPointC,
          pressureHPa,
        });
        expect(vapourPressureHPa).toBe(saturated.vapourPressureHPa);
        const damper = vapourPressureFromDewPoint({ dewPointC: dewPointC + 1, pressureHPa });
        expect(damper.vapourPressureHPa).toBeGreaterThan(vapourPressureHPa);
      }),
    );
  });

  // ITU-R P.676-13 validation examples: 7.5 g/m3 at 288.15 K are 9.97288878634 hPa.
  it("turns density into pressure and back", () => {
    const vapour = vapourPressureFromDensity({ vapourDensityGm3: 7.5, temperatureK: 288.15 });
    expectRelative(vapour.vapourPressureHPa, 9.97288878634, 1e-11);
    expectRelative(vapourDensity({ ...vapour, temperatureK: 288.15 }).vapourDensityGm3, 7.5, 1e-15);
  });

  it("refuses the impossible and names the field", () => {
    const air = { temperatureC: 10, pressureHPa };
    expect(() => vapourPressureFromHumidity({ ...air, relativeHumidityPercent: 101 })).toThrow(
      /relativeHumidityPercent/,
    );
    expect(() => saturationPressure({ ...air, temperatureC: 283 })).toThrow(/temperatureC/);
    expect(() => saturationPressure({ ...air, pressureHPa: -1 })).toThrow(/pressureHPa/);
    expect(() => vapourPressureFromDewPoint({ dewPointC: NaN, pressureHPa })).toThrow(/dewPointC/);
    expect(() => vapourDensity({ vapourPressureHPa: 5, temperatureK: 0 })).toThrow(/temperatureK/);
    expect(() => vapourPressureFromDensity({ vapourDensityGm3: -1, temperatureK: 280 })).toThrow(
      /vapourDensityGm3/,
    );
    expect(outside(saturationValidity.ice, { temperatureC: 1 })).toHaveLength(1);
  });
});

describeReference("atmosphere/checks-p453-es.csv", (row) => {
  const phase = row["phase"];
  if (phase !== "water" && phase !== "ice") throw new Error(`${row["id"]}: phase ${phase}`);
  const temperatureC = num(row, "t_C");
  const vapour = vapourPressureFromHumidity({
    relativeHumidityPercent: num(row, "RH_percent"),
    temperatureC,
    pressureHPa: num(row, "P_hPa"),
    phase,
  });
  expectRelative(vapour.vapourPressureHPa, num(row, "e_hPa"), 1e-6, row["id"]);
  const { vapourDensityGm3 } = vapourDensity({ ...vapour, temperatureK: temperatureC + 273.15 });
  expectRelative(vapourDensityGm3, num(row, "rho_g_m3"), 1e-6, row["id"]);
});
