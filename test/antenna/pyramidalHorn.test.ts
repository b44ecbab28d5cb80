import { describe, expect, it } from "vitest";
import { optimumHorn, pyramidalHorn } from "../../src/antenna/pyramidalHorn.ts";
import { wavelengthM } from "../../src/numeric/constants.ts";
import { powerToDb } from "../../src/numeric/decibels.ts";
import { integrate } from "../../src/numeric/quadrature.ts";
import { describeReference, num } from "../reference.ts";

const handbookHorn = { guideA: 0.5, guideB: 0.25, apertureA1: 5.5, apertureB1: 2.75, rhoE: 6, rhoH: 6 };

describe("pyramidal horn", () => {
  it("has 18.8 dB with an aperture of 5.5 by 2.75 wavelengths", () => {
    // C. A. Balanis, Antenna Theory, 3rd ed., example of section 13.4 (from memory): 12.79, 7.52 and 18.78 dB,
    // with Fresnel integrals read from a table
    const horn = pyramidalHorn(handbookHorn);
    expect(Math.abs(horn.directivityE - 12.79)).toBeLessThan(0.1);
    expect(Math.abs(horn.directivityH - 7.52)).toBeLessThan(0.1);
    expect(Math.abs(horn.directivityDbi - 18.78)).toBeLessThan(0.1);
  });

  it("agrees with the aperture's field integrated", () => {
    // D = 4 pi |int E dA|^2 / int |E|^2 dA with cos(pi x/a1) and the quadratic phase of each plane
    const { apertureA1: a1, apertureB1: b1, rhoE, rhoH } = handbookHorn;
    const line = (amplitude: (x: number) => number, rho: number, width: number) => {
      const part = (f: (phase: number) => number) =>
        integrate((x) => amplitude(x) * f((Math.PI * x * x) / rho), -width / 2, width / 2, 64);
      return part(Math.cos) ** 2 + part(Math.sin) ** 2;
    };
    const acrossH = line((x) => Math.cos((Math.PI * x) / a1), rhoH, a1);
    const acrossE = line(() => 1, rhoE, b1);
    const directivity = (4 * Math.PI * acrossH * acrossE) / ((a1 / 2) * b1);
    expect(pyramidalHorn(handbookHorn).directivityDbi).toBeCloseTo(powerToDb(directivity), 9);
  });

  it("nears 10.2 a1 b1 as the flare grows long", () => {
    // An aperture without phase error, cosine in one plane: 4 pi x 8/pi^2 x area
    const horn = { ...handbookHorn, rhoE: 1e4, rhoH: 1e4 };
    const ideal = powerToDb(4 * Math.PI * (8 / Math.PI ** 2) * 5.5 * 2.75);
    expect(pyramidalHorn(horn).directivityDbi).toBeCloseTo(ideal, 3);
  });

  it("does not depend on the guide behind it", () => {
    const { directivityDbi } = pyramidalHorn(handbookHorn);
    const other = pyramidalHorn({ ...handbookHorn, guideA: 0.8, guideB: 0.4 });
    expect(other.directivityDbi).toBeCloseTo(directivityDbi, 12);
  });

  it("names the size that is missing", () => {
    expect(() => pyramidalHorn({ ...handbookHorn, rhoH: 0 })).toThrow("rhoH");
  });
});

describe("optimum horn", () => {
  it("of 22.6 dB at 11 GHz on a 22.86 x 10.16 mm guide is 16.37 by 12.86 cm, 27.29 cm long", () => {
    // C. A. Balanis, Antenna Theory, 3rd ed., example of section 13.4.2 (from memory), at c = 3e8 m/s
    const wavelengthCm = 30 / 11;
    const horn = optimumHorn({ gainDbi: 22.6, guideA: 2.286 / wavelengthCm, guideB: 1.016 / wavelengthCm });
    expect(Math.abs(horn.apertureA1 * wavelengthCm - 16.37)).toBeLessThan(0.01);
    expect(Math.abs(horn.apertureB1 * wavelengthCm - 12.86)).toBeLessThan(0.01);
    expect(Math.abs(horn.lengthE * wavelengthCm - 27.29)).toBeLessThan(0.02);
  });

  it("has about the gain asked for, at every gain", () => {
    const guideA = 0.02286 / wavelengthM(10.368);
    const guideB = 0.01016 / wavelengthM(10.368);
    for (const gainDbi of [12, 15, 17, 20, 23, 25]) {
      const horn = optimumHorn({ gainDbi, guideA, guideB });
      expect(Math.abs(pyramidalHorn(horn).directivityDbi - gainDbi)).toBeLessThan(0.15);
      // Both planes must flare over one length, or the horn cannot be built.
      const lengthH = (horn.apertureA1 - guideA) * Math.sqrt((horn.rhoH / horn.apertureA1) ** 2 - 0.25);
      expect(lengthH).toBeCloseTo(horn.lengthE, 9);
    }
  });

  it("refuses a gain below that of the open guide", () => {
    expect(() => optimumHorn({ gainDbi: 3, guideA: 0.79, guideB: 0.35 })).toThrow(RangeError);
  });
});

describeReference("terrain/horn-pyramidal.csv", (row) => {
  const horn = pyramidalHorn({
    guideA: num(row, "a"),
    guideB: num(row, "b"),
    apertureA1: num(row, "a1"),
    apertureB1: num(row, "b1"),
    rhoE: num(row, "rho1"),
    rhoH: num(row, "rho2"),
  });
  expect(Math.abs(horn.directivityE / num(row, "DE") - 1)).toBeLessThan(1e-6);
  expect(Math.abs(horn.directivityH / num(row, "DH") - 1)).toBeLessThan(1e-6);
  expect(Math.abs(horn.directivityDbi - num(row, "D_dBi"))).toBeLessThan(1e-5);
});

describeReference("terrain/horn-design.csv", (row) => {
  const horn = optimumHorn({ gainDbi: num(row, "G_dBi"), guideA: num(row, "a"), guideB: num(row, "b") });
  const pairs: [number, string][] = [
    [horn.rhoE, "chi"],
    [horn.rhoE, "rho_e"],
    [horn.rhoH, "rho_h"],
    [horn.apertureA1, "a1"],
    [horn.apertureB1, "b1"],
    [horn.lengthE, "length_pe"],
  ];
  for (const [ours, column] of pairs) expect(Math.abs(ours - num(row, column))).toBeLessThan(1e-6);
});
