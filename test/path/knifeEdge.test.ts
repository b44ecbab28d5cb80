import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { knifeEdgeLoss, knifeEdgeParameter } from "../../src/path/knifeEdge.ts";
import { describeReference, num } from "../reference.ts";

describe("knife-edge loss", () => {
  it("is 6.02 dB at grazing: half the field", () => {
    expect(knifeEdgeLoss(0, { exact: true })).toBeCloseTo(20 * Math.log10(2), 10);
    expect(knifeEdgeLoss(0)).toBeCloseTo(6.03, 2); // Rec. ITU-R P.526-15, equation 31
  });

  // Fresnel integrals of Abramowitz & Stegun, Table 7.7 (7 figures), put into P.526-15 equation 30.
  it.each([
    [1, 0.7798934, 0.4382591],
    [2, 0.4882534, 0.3434157],
  ])("at nu = %d follows the tabled integrals", (nu, c, s) => {
    const field = Math.sqrt((1 - c - s) ** 2 + (c - s) ** 2) / 2;
    expect(knifeEdgeLoss(nu, { exact: true })).toBeCloseTo(-20 * Math.log10(field), 5);
  });

  it("stays within 0.13 dB of the exact form from -0.7 to 15", () => {
    for (let nu = -0.7; nu <= 15; nu += 0.05) {
      expect(Math.abs(knifeEdgeLoss(nu) - knifeEdgeLoss(nu, { exact: true }))).toBeLessThan(0.13);
    }
  });

  it("rises with nu and is 0 where 0.55 of the first zone is clear", () => {
    expect(knifeEdgeLoss(-0.78)).toBe(0);
    expect(knifeEdgeLoss(-40)).toBe(0);
    fc.assert(
      fc.property(
        fc.double({ min: -3, max: 100, noNaN: true }),
        fc.double({ min: 0, max: 5, noNaN: true }),
        (nu, step) => {
          expect(knifeEdgeLoss(nu + step)).toBeGreaterThanOrEqual(knifeEdgeLoss(nu));
        },
      ),
    );
  });

  it("tends to 13 dB + 20 log nu far in the shadow", () => {
    // Asymptote 20 log(sqrt(2) pi nu) of the Fresnel integral, A&S 7.3.27.
    const asymptote = 20 * Math.log10(Math.SQRT2 * Math.PI * 300);
    expect(knifeEdgeLoss(300, { exact: true })).toBeCloseTo(asymptote, 4);
  });

  it("refuses a nu that is no number", () => {
    expect(() => knifeEdgeLoss(Number.NaN)).toThrow("nu");
  });
});

describe("diffraction parameter", () => {
  it("is sqrt(2) at one Fresnel radius", () => {
    // F1 = 17.3 sqrt(d1 d2 / (f d)) [m], Rec. ITU-R P.530-17, equation 3
    const heightM = 17.3 * Math.sqrt((20 * 30) / (10.368 * 50));
    const nu = knifeEdgeParameter({ heightM, d1Km: 20, d2Km: 30, frequencyGHz: 10.368 });
    expect(nu).toBeCloseTo(Math.SQRT2, 2);
  });
  it("refuses an edge at an antenna", () => {
    expect(() => knifeEdgeParameter({ heightM: 1, d1Km: 0, d2Km: 30, frequencyGHz: 10 })).toThrow("d1Km");
  });
});

describeReference("terrain/knife-edge.csv", (row) => {
  const nu = num(row, "nu");
  expect(Math.abs(knifeEdgeLoss(nu, { exact: true }) - num(row, "J_exact_dB"))).toBeLessThan(1e-6);
  expect(Math.abs(knifeEdgeLoss(nu) - num(row, "J_approx_dB"))).toBeLessThan(1e-6);
});
