import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { enhancementNotExceeded } from "../../src/path/multipathEnhancement.ts";
import { mappedMultipathOccurrence } from "../../src/path/multipathOccurrence.ts";
import { describeReference, num } from "../reference.ts";

describe("multipath enhancement", () => {
  const occurrencePercent = mappedMultipathOccurrence({
    logK: -4.5,
    dN75: 50,
    distanceKm: 40,
    txHeightAmslM: 300,
    rxHeightAmslM: 250,
    terrainHeightM: 100,
    frequencyGHz: 10.368,
  });
  // An open implementation of Rec. ITU-R P.530-18, section 2.3.3.
  it.each([
    [1, 86.33394426752],
    [6, 99.48109149612],
    [10, 99.95017800947],
    [15, 99.99810607146],
  ])("stays below %d dB for %d %% of the worst month", (enhancementDb, percent) => {
    const result = enhancementNotExceeded({ occurrencePercent, enhancementDb });
    expect(result.worstMonthPercent).toBeCloseTo(percent, 9);
  });

  it("exceeds more for less time, without a step at 10 dB", () => {
    const at = (factor: number, enhancementDb: number) =>
      enhancementNotExceeded({ occurrencePercent: factor, enhancementDb }).worstMonthPercent;
    const factor = fc.double({ min: 0.01, max: 2000, noNaN: true });
    const height = fc.double({ min: 0.1, max: 20, noNaN: true });
    fc.assert(
      fc.property(factor, height, (p0, db) => {
        expect(at(p0, db + 0.5)).toBeGreaterThanOrEqual(at(p0, db));
        // The constants are printed rounded: curve and law meet within 5 % of what little time is left.
        expect(Math.abs((100 - at(p0, 10)) / (100 - at(p0, 10 + 1e-9)) - 1)).toBeLessThan(0.05);
      }),
    );
  });

  it("refuses a drop, and a factor beyond the method", () => {
    expect(() => enhancementNotExceeded({ occurrencePercent, enhancementDb: 0 })).toThrow("enhancementDb");
    expect(() => enhancementNotExceeded({ occurrencePercent: 1e8, enhancementDb: 3 })).toThrow("beyond");
  });
});

describeReference("terrain/p530-18-enhancement.csv", (row) => {
  const occurrencePercent = mappedMultipathOccurrence({
    logK: num(row, "logK"),
    dN75: num(row, "dN75"),
    distanceKm: num(row, "d_km"),
    txHeightAmslM: num(row, "he_m"),
    rxHeightAmslM: num(row, "hr_m"),
    terrainHeightM: num(row, "ht_m"),
    frequencyGHz: num(row, "f_GHz"),
  });
  const { worstMonthPercent } = enhancementNotExceeded({
    occurrencePercent,
    enhancementDb: num(row, "E_dB"),
  });
  expect(Math.abs(worstMonthPercent - num(row, "pw_not_exceeded_pct"))).toBeLessThan(1e-6);
});
