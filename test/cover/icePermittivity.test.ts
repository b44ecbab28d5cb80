import { describe, expect, it } from "vitest";
import { icePermittivity } from "../../src/cover/icePermittivity.ts";
import { layeredSheet, layerOf } from "../../src/cover/layeredSheet.ts";

describe("ice", () => {
  // Matzler & Wegmuller 1987: 3.1884 at 0 degC, 0.00091 a degree. Hufford's loss evaluated apart from this program.
  it.each([
    [5.76, -1, 3.1875, 6.736e-4],
    [10.368, -1, 3.1875, 1.085e-3],
    [24.048, -1, 3.1875, 2.408e-3],
    [47.088, -1, 3.1875, 4.68e-3],
  ])("at %d GHz, %d degC: %d - j %d", (frequencyGHz, temperatureC, real, imaginary) => {
    const ice = icePermittivity({ frequencyGHz, temperatureC });
    expect(ice.real).toBeCloseTo(real, 4);
    expect(Math.abs(ice.imaginary / imaginary - 1)).toBeLessThan(1e-3);
  });

  it("loses more near melting than in hard frost", () => {
    const at = (temperatureC: number) => icePermittivity({ frequencyGHz: 10, temperatureC }).imaginary;
    expect(at(0)).toBeGreaterThan(at(-5));
    expect(at(-5)).toBeGreaterThan(at(-30));
  });

  // Free layers at 10.4 GHz and -5 degC, evaluated apart from this program with a 4x4 matrix; 8 mm is half a wave.
  it.each([
    [1, 0.23],
    [3, 1.2],
    [5, 1.22],
    [8, 0.01],
    [10, 0.7],
  ])("%d mm alone lose %d dB", (thicknessMm, lossDb) => {
    const layers = [layerOf(icePermittivity({ frequencyGHz: 10.4, temperatureC: -5 }), thicknessMm)];
    const sheet = layeredSheet({ frequencyGHz: 10.4, incidenceDeg: 0, polarization: "te", layers });
    expect(Math.abs(sheet.transmissionLossDb - lossDb)).toBeLessThan(0.0051);
  });

  it("refuses ice above 0 degC and a frequency of 0", () => {
    expect(() => icePermittivity({ frequencyGHz: 10, temperatureC: 1 })).toThrow(/temperatureC/);
    expect(() => icePermittivity({ frequencyGHz: 0, temperatureC: -1 })).toThrow(/frequencyGHz/);
  });
});
