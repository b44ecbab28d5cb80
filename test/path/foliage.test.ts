import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { foliageLoss, saturatingFoliageLoss } from "../../src/path/foliage.ts";

describe("loss through trees", () => {
  // Figures of both formulas at 10.368 GHz, printed to two digits: CCIR Report 236-2 as quoted in OET
  // Bulletin 70, and Weissberger (1982).
  it.each([
    [2, 4.9, 1.7],
    [5, 8.4, 4.4],
    [10, 12.8, 8.7],
    [20, 19, 15],
    [50, 34, 26],
  ])("%d m: %d dB and %d dB", (depthM, higher, lower) => {
    const loss = foliageLoss({ frequencyGHz: 10.368, depthM });
    // Half a unit of the last digit printed.
    expect(Math.abs(loss.highDb - higher)).toBeLessThan(higher < 15 ? 0.051 : 0.51);
    expect(Math.abs(loss.lowDb - lower)).toBeLessThan(lower < 15 ? 0.051 : 0.51);
    expect(loss.lossDb).toBeCloseTo((loss.lowDb + loss.highDb) / 2, 12);
  });

  it("is about 11 dB, 7 to 15, for 10 m at 10 GHz", () => {
    const { lossDb, sigmaDb } = foliageLoss({ frequencyGHz: 10.368, depthM: 10 });
    expect(Math.abs(lossDb - 11)).toBeLessThan(0.5);
    expect(Math.abs(lossDb - sigmaDb - 7)).toBeLessThan(0.6);
    expect(Math.abs(lossDb + sigmaDb - 15)).toBeLessThan(0.5);
  });

  it("is nothing without trees and grows with frequency and with depth", () => {
    expect(foliageLoss({ frequencyGHz: 10, depthM: 0 })).toEqual({
      lossDb: 0,
      lowDb: 0,
      highDb: 0,
      sigmaDb: 0,
    });
    fc.assert(
      fc.property(
        fc.double({ min: 0.3, max: 90, noNaN: true }),
        fc.double({ min: 0.1, max: 380, noNaN: true }),
        (frequencyGHz, depthM) => {
          const here = foliageLoss({ frequencyGHz, depthM });
          expect(foliageLoss({ frequencyGHz: 1.05 * frequencyGHz, depthM }).lossDb).toBeGreaterThan(
            here.lossDb,
          );
          // 5 % more depth outweighs the small step of the second formula at 14 m.
          expect(foliageLoss({ frequencyGHz, depthM: 1.05 * depthM }).lowDb).toBeGreaterThan(here.lowDb);
          expect(here.lowDb).toBeLessThanOrEqual(here.highDb);
        },
      ),
    );
  });

  it("refuses a negative depth", () => {
    expect(() => foliageLoss({ frequencyGHz: 10, depthM: -1 })).toThrow("depthM");
  });
});

describe("loss through a deep wood", () => {
  it("starts at the specific loss and ends at the maximum", () => {
    const at = (depthM: number) => saturatingFoliageLoss({ depthM, specificDbPerM: 2, maximumDb: 30 }).lossDb;
    expect(at(0)).toBeCloseTo(0, 12);
    expect(at(0.01)).toBeCloseTo(0.02, 4);
    expect(at(15)).toBeCloseTo(30 * (1 - Math.exp(-1)), 10); // Rec. ITU-R P.833-10, section 2.1
    expect(at(1e4)).toBeCloseTo(30, 10);
    expect(() => saturatingFoliageLoss({ depthM: 1, specificDbPerM: 2, maximumDb: 0 })).toThrow("maximumDb");
  });
});
