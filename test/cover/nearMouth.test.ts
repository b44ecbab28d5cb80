import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { collectedShare, nearMouth } from "../../src/cover/nearMouth.ts";
import { wavelengthM } from "../../src/numeric/constants.ts";

const mouth = { frequencyGHz: 10.368, apertureMm: 80, gapMm: 5 };

describe("trust in the plane wave", () => {
  // Common practice, no source: 0.1 dB or 30 %, whichever is larger, and 2 dB of return loss.
  it("is 0.1 dB of a small loss, 30 % of a large one, 2 dB of return loss", () => {
    expect(nearMouth({ ...mouth, sheetLossDb: 0.05 })).toEqual({
      sigmaLossDb: 0.1,
      sigmaReturnLossDb: 2,
      weak: false,
    });
    expect(nearMouth({ ...mouth, sheetLossDb: 4 }).sigmaLossDb).toBeCloseTo(1.2, 12);
  });

  it("is weak below two wavelengths of mouth and beyond a gap of one mouth, and says why", () => {
    const at = (change: object) => nearMouth({ ...mouth, sheetLossDb: 0.2, ...change });
    expect(at({ apertureMm: 57 })).toMatchObject({
      weak: true,
      reason: expect.stringMatching(/2\.0 wavelengths/),
    });
    expect(at({ apertureMm: 58 }).weak).toBe(false);
    expect(at({ gapMm: 81 })).toMatchObject({ weak: true, reason: expect.stringMatching(/gap/) });
  });

  it("refuses a negative loss", () => {
    expect(() => nearMouth({ ...mouth, sheetLossDb: -1 })).toThrow(/sheetLossDb/);
  });
});

describe("share collected again", () => {
  it("is all of it with the sheet on the mouth", () => {
    expect(collectedShare({ ...mouth, gapMm: 0 }).collectedShare).toBe(1);
  });

  it("falls with the gap and rises with the mouth", () => {
    const gaps = fc.double({ min: 0, max: 500, noNaN: true });
    fc.assert(
      fc.property(gaps, gaps, (one, other) => {
        const [near, far] = [Math.min(one, other), Math.max(one, other)];
        const at = (gapMm: number, apertureMm = 80) =>
          collectedShare({ ...mouth, gapMm, apertureMm }).collectedShare;
        expect(at(far)).toBeLessThanOrEqual(at(near));
        expect(at(far, 100)).toBeGreaterThanOrEqual(at(far));
        expect(at(far)).toBeGreaterThan(0);
      }),
    );
  });

  it("is the overlap of the mouth's Gaussian field with itself after the way to the sheet and back", () => {
    const { frequencyGHz, apertureMm } = mouth;
    const waist = 0.35 * apertureMm;
    for (const gapMm of [10, 60, 150, 400]) {
      // Field at 2 s: amplitude w0/w exp(-r^2/w^2), phase of the curved front k r^2/(2 R); overlap 2 pi r dr.
      const wavelength = 1e3 * wavelengthM(frequencyGHz);
      const way = 2 * gapMm;
      const rayleigh = (Math.PI * waist ** 2) / wavelength;
      const width = waist * Math.sqrt(1 + (way / rayleigh) ** 2);
      const curvature = way / (way ** 2 + rayleigh ** 2);
      let [re, im, norm] = [0, 0, 0];
      const step = waist / 400;
      for (let r = step / 2; r < 8 * waist; r += step) {
        const own = Math.exp(-((r / waist) ** 2));
        const back = (waist / width) * Math.exp(-((r / width) ** 2));
        const phase = (Math.PI * r * r * curvature) / wavelength;
        re += own * back * Math.cos(phase) * r;
        im += own * back * Math.sin(phase) * r;
        norm += own * own * r;
      }
      const share = collectedShare({ frequencyGHz, apertureMm, gapMm }).collectedShare;
      expect(share).toBeCloseTo(Math.hypot(re, im) / norm, 5);
    }
  });

  it("refuses a mouth of no width", () => {
    expect(() => collectedShare({ ...mouth, apertureMm: 0 })).toThrow(/apertureMm/);
  });
});
