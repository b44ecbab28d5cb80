import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { waterPermittivity, waterValidity } from "../../src/atmosphere/waterPermittivity.ts";
import { outside } from "../../src/numeric/check.ts";
import { describeReference, num } from "../reference.ts";
import { expectRelative } from "./relative.ts";

describe("permittivity of liquid water", () => {
  // ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0 (02/12/2024), sheet P.840-9 A_Clouds.
  it.each([
    [6, 62.8336846556, 37.5710263758],
    [30, 12.7504403875, 22.8966960654],
  ])("at %d GHz and 0.6 degC", (frequencyGHz, real, imaginary) => {
    const result = waterPermittivity({ frequencyGHz, temperatureK: 273.75 });
    expectRelative(result.real, real, 1e-10);
    expectRelative(result.imaginary, imaginary, 1e-10);
  });

  // U. Kaatze, J. Chem. Eng. Data 34 (1989) 371: one relaxation fitted to measurements at 25 degC
  // (78.36, 5.2, 8.27 ps; constants from memory). The two models stand 0.3 % apart.
  it("agrees with an independent fit at 25 degC up to 20 GHz", () => {
    for (const frequencyGHz of [1, 5, 10, 20]) {
      const x = 2 * Math.PI * frequencyGHz * 8.27e-3;
      const { real, imaginary } = waterPermittivity({ frequencyGHz, temperatureK: 298.15 });
      expectRelative(real, 5.2 + 73.16 / (1 + x * x), 0.02);
      expectRelative(imaginary, (73.16 * x) / (1 + x * x), 0.02);
    }
  });

  it("is lossy, and never below its high-frequency limit of 3.52", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.1, max: 1000, noNaN: true }),
        fc.double({ min: 200, max: 400, noNaN: true }),
        (frequencyGHz, temperatureK) => {
          const { real, imaginary } = waterPermittivity({ frequencyGHz, temperatureK });
          expect(real).toBeGreaterThan(3.52);
          expect(imaginary).toBeGreaterThan(0);
        },
      ),
    );
  });

  it("refuses what is no water", () => {
    expect(() => waterPermittivity({ frequencyGHz: 10, temperatureK: 20 })).toThrow(/temperatureK/);
    expect(() => waterPermittivity({ frequencyGHz: 0, temperatureK: 293 })).toThrow(/frequencyGHz/);
    expect(outside(waterValidity, { frequencyGHz: 10, temperatureK: 313 })).toHaveLength(1);
  });
});

describeReference("atmosphere/checks-p840.csv", (row) => {
  const water = waterPermittivity({ frequencyGHz: num(row, "f_GHz"), temperatureK: num(row, "T_K") });
  expectRelative(water.real, num(row, "eps_re"), 1e-6, row["id"]);
  expectRelative(water.imaginary, num(row, "eps_im"), 1e-6, row["id"]);
});
