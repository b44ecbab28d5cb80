import { describe, expect, it } from "vitest";
import { icePermittivity } from "../../src/cover/icePermittivity.ts";
import { layeredSheet, layerOf } from "../../src/cover/layeredSheet.ts";
import { snowPermittivity } from "../../src/cover/snowPermittivity.ts";
import { describeReference, num } from "../reference.ts";

describe("snow", () => {
  // Ulaby & Long 2014, section 4-6, and Hallikainen, Ulaby, Abdelrazik 1986, evaluated apart from this program.
  it.each([
    [10.368, -5, 0.3, 0, 1.5303, 1.396e-4],
    [10.368, -5, 0.5, 0, 1.9983, 2.913e-4],
    [10.368, 0, 0.3, 3, 1.7435, 0.1526],
    [24.048, 0, 0.3, 8, 1.7709, 0.4048],
  ])(
    "%d GHz, %d degC, %d g/cm3, %d %%: %d - j %d",
    (frequencyGHz, temperatureC, density, wetness, real, imaginary) => {
      const snow = snowPermittivity({
        frequencyGHz,
        temperatureC,
        dryDensityGcm3: density,
        wetnessPercent: wetness,
      });
      expect(snow.real).toBeCloseTo(real, 3);
      expect(Math.abs(snow.imaginary / imaginary - 1)).toBeLessThan(2e-3);
    },
  );

  // Free layers at 10.4 GHz and 0.3 g/cm3, evaluated apart from this program with a 4x4 matrix.
  it.each([
    [0, 30, 0.19, 0.0051],
    [1, 30, 0.99, 0.0051],
    [5, 10, 2.1, 0.0051],
    [5, 30, 6.26, 0.0051],
    [10, 10, 4.8, 0.0051],
    [10, 30, 13.8, 0.051],
  ])("%d %% wet, %d mm alone lose %d dB", (wetnessPercent, thicknessMm, lossDb, tolerance) => {
    const snow = snowPermittivity({
      frequencyGHz: 10.4,
      temperatureC: -5,
      dryDensityGcm3: 0.3,
      wetnessPercent,
    });
    const layers = [layerOf(snow, thicknessMm)];
    const sheet = layeredSheet({ frequencyGHz: 10.4, incidenceDeg: 0, polarization: "te", layers });
    expect(Math.abs(sheet.transmissionLossDb - lossDb)).toBeLessThan(tolerance);
  });

  it("at the density of ice is nearly ice", () => {
    const snow = snowPermittivity({
      frequencyGHz: 10,
      temperatureC: -5,
      dryDensityGcm3: 0.9167,
      wetnessPercent: 0,
    });
    const ice = icePermittivity({ frequencyGHz: 10, temperatureC: -5 });
    expect(Math.abs(snow.real / ice.real - 1)).toBeLessThan(0.02);
    expect(Math.abs(snow.imaginary / ice.imaginary - 1)).toBeLessThan(0.02);
  });

  it("steps by less than a tenth where the dry and wet fits and the two bands meet", () => {
    const at = (frequencyGHz: number, wetnessPercent: number) =>
      snowPermittivity({ frequencyGHz, temperatureC: 0, dryDensityGcm3: 0.3, wetnessPercent }).real;
    expect(Math.abs(at(10, 1e-9) / at(10, 0) - 1)).toBeLessThan(0.02);
    expect(Math.abs(at(15, 5) / at(14.999, 5) - 1)).toBeLessThan(0.1);
  });

  it.each([
    [{ dryDensityGcm3: 0 }, /dryDensityGcm3/],
    [{ dryDensityGcm3: 1 }, /dryDensityGcm3/],
    [{ wetnessPercent: -1 }, /wetnessPercent/],
    [{ frequencyGHz: 0 }, /frequencyGHz/],
    [{ temperatureC: 3 }, /temperatureC/],
  ])("refuses %o", (change, named) => {
    const snow = { frequencyGHz: 10, temperatureC: -5, dryDensityGcm3: 0.3, wetnessPercent: 0 };
    expect(() => snowPermittivity({ ...snow, ...change })).toThrow(named);
  });
});

describeReference("covers/check-snowice.csv", (row) => {
  const climate = { frequencyGHz: num(row, "f_ghz"), temperatureC: num(row, "t_c") };
  const permittivity =
    row["kind"] === "ice"
      ? icePermittivity(climate)
      : snowPermittivity({
          ...climate,
          dryDensityGcm3: num(row, "dry_density_gcm3"),
          wetnessPercent: row["kind"] === "wet_snow" ? num(row, "wetness_vol_percent") : 0,
        });
  expect(row["tol"]).toBe("0.5 % / 2 %");
  expect(Math.abs(permittivity.real / num(row, "eps_real") - 1)).toBeLessThan(0.005);
  expect(Math.abs(permittivity.imaginary / num(row, "eps_imag") - 1)).toBeLessThan(0.02);
});
