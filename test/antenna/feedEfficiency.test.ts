import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  feedEfficiency,
  feedExponentFromBeamwidth,
  feedExponentFromEdgeTaper,
} from "../../src/antenna/feedEfficiency.ts";
import { describeReference, num } from "../reference.ts";

const exponents = fc.double({ min: 0.5, max: 20, noNaN: true });
const ratios = fc.double({ min: 0.26, max: 2, noNaN: true });

describe("efficiency of feed and dish", () => {
  it("is 0.75 for n = 2 at f/D 0.5", () => {
    // C. A. Balanis, Antenna Theory, 3rd ed., example of section 15.4.1 (from memory): 0.75, 0.784, 0.957
    const { efficiency, spillover, taper } = feedEfficiency({ exponent: 2, focalRatio: 0.5 });
    expect(efficiency).toBeCloseTo(0.75, 2);
    expect(spillover).toBeCloseTo(0.784, 3);
    expect(Math.abs(taper - 0.957)).toBeLessThan(0.001);
  });

  it("agrees with the closed forms for n = 2, 4, 6 and 8", () => {
    // C. A. Balanis, Antenna Theory, 3rd ed., equations of section 15.4.1
    for (const focalRatio of [0.3, 0.4, 0.55, 0.8]) {
      const t = 2 * Math.atan(1 / (4 * focalRatio));
      const cot2 = 1 / Math.tan(t / 2) ** 2;
      const s2 = Math.sin(t / 2) ** 2;
      const ln = Math.log(Math.cos(t / 2));
      const c = Math.cos(t);
      const forms: Record<number, number> = {
        2: 24 * (s2 + ln) ** 2 * cot2,
        4: 40 * (s2 ** 2 + ln) ** 2 * cot2,
        6: 14 * (2 * ln + (1 - c) ** 3 / 3 + Math.sin(t) ** 2 / 2) ** 2 * cot2,
        8: 18 * ((1 - c ** 4) / 4 - 2 * ln - (1 - c) ** 3 / 3 - Math.sin(t) ** 2 / 2) ** 2 * cot2,
      };
      for (const [n, closed] of Object.entries(forms)) {
        expect(feedEfficiency({ exponent: Number(n), focalRatio }).efficiency).toBeCloseTo(closed, 11);
      }
    }
  });

  it("keeps both parts within 0 and 1, and tapers a deeper dish harder", () => {
    fc.assert(
      fc.property(exponents, ratios, (exponent, focalRatio) => {
        const dish = feedEfficiency({ exponent, focalRatio });
        for (const part of [dish.spillover, dish.taper]) {
          expect(part).toBeGreaterThan(0);
          expect(part).toBeLessThanOrEqual(1);
        }
        expect(dish.edgeTotalDb).toBeGreaterThan(dish.edgeTaperDb);
        const shallower = feedEfficiency({ exponent, focalRatio: focalRatio + 0.05 });
        expect(shallower.edgeTaperDb).toBeLessThan(dish.edgeTaperDb);
        expect(shallower.spillover).toBeLessThan(dish.spillover);
      }),
    );
  });

  it("refuses a dish of f/D 0.25 and a negative exponent", () => {
    expect(() => feedEfficiency({ exponent: 2, focalRatio: 0.25 })).toThrow("focalRatio");
    expect(() => feedEfficiency({ exponent: -1, focalRatio: 0.4 })).toThrow("exponent");
  });
});

describe("exponent of a feed", () => {
  it("comes back from the edge taper it makes", () => {
    fc.assert(
      fc.property(exponents, ratios, (exponent, focalRatio) => {
        const { edgeTaperDb } = feedEfficiency({ exponent, focalRatio });
        const back = feedExponentFromEdgeTaper({ edgeTaperDb, focalRatio });
        expect(Math.abs(back.exponent / exponent - 1)).toBeLessThan(1e-12);
      }),
    );
  });

  it("is 3.32 for a pattern 10 dB down 60 deg off its axis", () => {
    // cos 60 deg = 1/2, and 0.5^n = 0.1 gives n = 1/log10 2 = 3.3219
    expect(feedExponentFromBeamwidth({ tenDbFullWidthDeg: 120 }).exponent).toBeCloseTo(3.321928, 6);
  });

  it("refuses a width of 180 deg", () => {
    expect(() => feedExponentFromBeamwidth({ tenDbFullWidthDeg: 180 })).toThrow("tenDbFullWidthDeg");
  });
});

describeReference("terrain/dish-feed-efficiency.csv", (row) => {
  const dish = feedEfficiency({ exponent: num(row, "n"), focalRatio: num(row, "f_over_D") });
  const pairs: [number, number][] = [
    [dish.subtendedHalfAngleDeg, num(row, "theta0_deg")],
    [dish.edgeTaperDb, -num(row, "edge_feed_dB")],
    [dish.edgeTotalDb, -num(row, "edge_feed_dB") - num(row, "space_dB")],
    [dish.spillover, num(row, "eff_spill")],
    [dish.taper, num(row, "eff_taper")],
    [dish.efficiency, num(row, "eff")],
  ];
  for (const [ours, theirs] of pairs) expect(Math.abs(ours - theirs)).toBeLessThan(1e-8);
});

describeReference("terrain/dish-feed-optimum.csv", (row) => {
  const exponent = num(row, "n");
  const best = num(row, "f_over_D");
  const at = (focalRatio: number) => feedEfficiency({ exponent, focalRatio });
  expect(Math.abs(at(best).efficiency - num(row, "eff_max"))).toBeLessThan(1e-6);
  expect(Math.abs(at(best).subtendedHalfAngleDeg - num(row, "theta0_deg"))).toBeLessThan(0.01);
  expect(Math.abs(at(best).edgeTaperDb + num(row, "edge_feed_dB"))).toBeLessThan(1e-6);
  expect(Math.abs(at(best).edgeTotalDb + num(row, "edge_total_dB"))).toBeLessThan(1e-6);
  // The maximum lies within the table's 1e-4 of f/D: a step of 1e-4 beyond it, the efficiency falls away.
  const slope = (ratio: number) => at(ratio + 1e-5).efficiency - at(ratio - 1e-5).efficiency;
  expect(slope(best - 1e-4)).toBeGreaterThan(0);
  expect(slope(best + 1e-4)).toBeLessThan(0);
});
