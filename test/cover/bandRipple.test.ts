import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bandRipple } from "../../src/cover/bandRipple.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { wavelengthM } from "../../src/numeric/constants.ts";

const FREQUENCY_GHZ = 10.368;

const sheetOf =
  (thicknessMm: number, permittivity: number, lossTangent = 0) =>
  (frequencyGHz: number) =>
    layeredSheet({
      frequencyGHz,
      incidenceDeg: 0,
      polarization: "te",
      layers: [{ thicknessMm, permittivity, lossTangent }],
    });

const plain = {
  frequencyGHz: FREQUENCY_GHZ,
  bandGHz: 0.2,
  sheetAt: sheetOf(2, 2.77, 0.0055),
  feedReturnLossDb: 14,
  gapMm: 10,
  collectedShare: 1,
};

/** A sheet of one reflection and transmission at every frequency. */
const steady = (reflection: number) => () => ({
  reflection: { re: reflection, im: 0 },
  transmission: { re: Math.sqrt(1 - reflection * reflection), im: 0 },
});

describe("ripple over a band", () => {
  it("is none without a band, and none before a matched feed but the sheet's own slope", () => {
    expect(bandRipple({ ...plain, bandGHz: 0 }).rippleDb).toBeCloseTo(0, 12);
    const { sheetAt } = plain;
    const at = (offGHz: number) => sheetAt(FREQUENCY_GHZ + offGHz).transmissionLossDb;
    const matched = bandRipple({ ...plain, feedReturnLossDb: Number.POSITIVE_INFINITY });
    expect(matched.rippleDb).toBeCloseTo(at(0.1) - at(-0.1), 9);
  });

  // Two reflections apart by half a wave and more beat between 1 - g a and 1 + g a: 20 log10((1 + g a)/(1 - g a)).
  it("of a long gap is the beat of the two reflections", () => {
    const [g, a] = [0.2, 0.3];
    const longGap = {
      ...plain,
      feedReturnLossDb: -20 * Math.log10(g),
      sheetAt: steady(a),
      gapMm: 1500, // 2 s B/c = 2 turns over 0.2 GHz
    };
    const beat = 20 * Math.log10((1 + g * a) / (1 - g * a));
    expect(bandRipple({ ...longGap, phaseDeg: 25 }).rippleDb / beat).toBeCloseTo(1, 1);
    expect(bandRipple(longGap).rippleDb / beat).toBeCloseTo(1, 2);
  });

  // A slow turn: d(20 log10|1 - x e^(j psi)|) is at most 8.686 x dpsi for small x, dpsi = 4 pi s B/c.
  it("of a short gap is the greatest slope times the turn", () => {
    const x = 0.2 * 0.3;
    const turn = (4 * Math.PI * 0.01 * 0.2e9) / 299_792_458;
    const { rippleDb } = bandRipple({
      ...plain,
      feedReturnLossDb: -20 * Math.log10(0.2),
      sheetAt: steady(0.3),
    });
    expect(rippleDb).toBeCloseTo((20 / Math.LN10) * 2 * x * Math.sin(turn / 2), 2);
  });

  it("of a sheet on the mouth that does not change with frequency is none", () => {
    expect(bandRipple({ ...plain, sheetAt: steady(0.3), gapMm: 0 }).rippleDb).toBeCloseTo(0, 12);
  });

  it("is none where the feed gathers nothing of a sheet without slope", () => {
    expect(bandRipple({ ...plain, sheetAt: steady(0.3), collectedShare: 0 }).rippleDb).toBeCloseTo(0, 12);
  });

  it("of an unknown phase is that of the worst, within the step of the phases tried", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -180, max: 180 }),
        fc.integer({ min: 0, max: 40 }),
        fc.integer({ min: 5, max: 60 }),
        (phaseDeg, gapMm, tenthsMm) => {
          const some = { ...plain, gapMm, sheetAt: sheetOf(tenthsMm / 10, 2.77, 0.0055) };
          const known = bandRipple({ ...some, phaseDeg }).rippleDb;
          const worst = bandRipple(some).rippleDb;
          expect(known).toBeLessThanOrEqual(worst * 1.02 + 1e-9);
          expect(known).toBeGreaterThanOrEqual(0);
        },
      ),
    );
  });

  it("grows with a band about a matched half wave as its square", () => {
    // Off a half wave the reflected power grows as the square of the detuning.
    const half = (1e3 * wavelengthM(FREQUENCY_GHZ)) / 2 / Math.sqrt(4);
    const over = (bandGHz: number) =>
      bandRipple({
        ...plain,
        feedReturnLossDb: Number.POSITIVE_INFINITY,
        sheetAt: sheetOf(half, 4),
        bandGHz,
      }).rippleDb;
    expect(over(0.2) / over(0.1)).toBeCloseTo(4, 2);
  });

  it("refuses a band wider than its middle and a frequency of nothing", () => {
    expect(() => bandRipple({ ...plain, bandGHz: 11 })).toThrow(/bandGHz/);
    expect(() => bandRipple({ ...plain, bandGHz: -1 })).toThrow(/bandGHz/);
    expect(() => bandRipple({ ...plain, frequencyGHz: 0 })).toThrow(/frequencyGHz/);
  });
});
