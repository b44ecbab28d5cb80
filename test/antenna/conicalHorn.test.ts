import { describe, expect, it } from "vitest";
import { conicalHorn } from "../../src/antenna/conicalHorn.ts";
import { describeReference, num } from "../reference.ts";

describe("conical horn", () => {
  it("loses 2.9 dB at its optimum, d = sqrt(3 l)", () => {
    // C. A. Balanis, Antenna Theory, section 13.5: s = 3/8, L about 2.9 dB
    const horn = conicalHorn({ diameter: Math.sqrt(15), length: 5 });
    expect(horn.phaseDeviationWavelengths).toBeCloseTo(0.375, 12);
    expect(Math.abs(horn.lossDb - 2.9)).toBeLessThan(0.05);
  });

  it("gains most for its length near d = sqrt(3 l)", () => {
    const at = (share: number) => conicalHorn({ diameter: share * Math.sqrt(30), length: 10 }).directivityDbi;
    expect(at(1)).toBeGreaterThan(at(0.85));
    expect(at(1)).toBeGreaterThan(at(1.15));
  });

  it("nears the directivity of the TE11 mode as it grows long", () => {
    // Efficiency of a TE11 aperture 0.837, 0.77 dB (textbook); the fit leaves 0.8 dB
    const { directivityDbi } = conicalHorn({ diameter: 3, length: 1e6 });
    expect(Math.abs(directivityDbi - 10 * Math.log10(0.837 * (3 * Math.PI) ** 2))).toBeLessThan(0.05);
  });

  it("refuses a horn without length", () => {
    expect(() => conicalHorn({ diameter: 3, length: 0 })).toThrow("length");
  });
});

describeReference("terrain/horn-conical.csv", (row) => {
  const horn = conicalHorn({ diameter: num(row, "dm"), length: num(row, "l") });
  expect(Math.abs(horn.phaseDeviationWavelengths - num(row, "s"))).toBeLessThan(1e-6);
  expect(Math.abs(horn.lossDb - num(row, "L_dB"))).toBeLessThan(1e-6);
  expect(Math.abs(horn.directivityDbi - num(row, "D_dBi"))).toBeLessThan(1e-6);
});
