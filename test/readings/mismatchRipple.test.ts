import { describe, expect, it } from "vitest";
import { mismatchRipple, rippleChangeLimitDb } from "../../src/readings/mismatchRipple.ts";
import { benchRows, fieldsOf } from "./bench.ts";

describe("mismatch ripple", () => {
  // 20 log10(1 +- 0.2 x 0.2): any text on mismatch uncertainty
  it("of two VSWRs of 1.5 is +0.341 and -0.355 dB", () => {
    const { maxDb, minDb, standardDb } = mismatchRipple({ first: { vswr: 1.5 }, second: { vswr: 1.5 } });
    expect(maxDb).toBeCloseTo(0.3407, 4);
    expect(minDb).toBeCloseTo(-0.3546, 4);
    expect(standardDb).toBeCloseTo(0.2457, 4);
  });

  it.runIf(benchRows("mismatch_ripple").length > 0)("agrees with the reference table", () => {
    for (const { input, expected, tolerance } of benchRows("mismatch_ripple")) {
      const given = fieldsOf(input);
      const wanted = fieldsOf(expected);
      const ripple = mismatchRipple({
        first: { vswr: Number(given["vswr1"]) },
        second: { vswr: Number(given["vswr2"]) },
      });
      expect(Math.abs(ripple.maxDb - Number(wanted["max_db"]))).toBeLessThanOrEqual(tolerance);
      expect(Math.abs(ripple.minDb - Number(wanted["min_db"]))).toBeLessThanOrEqual(tolerance);
      expect(Math.abs(ripple.standardDb - Number(wanted["u_db"]))).toBeLessThanOrEqual(tolerance);
    }
  });

  it("is a tenth behind a pad of 10 dB", () => {
    const pair = { first: { gamma: 0.3 }, second: { gamma: 0.2 } };
    const bare = mismatchRipple(pair).standardDb;
    expect(mismatchRipple({ ...pair, padDb: 10 }).standardDb).toBeCloseTo(bare / 10, 12);
  });

  it("changes between bare and covered by no more than its limit", () => {
    const source = 0.1;
    const limit = rippleChangeLimitDb({
      source: { gamma: source },
      bare: { gamma: 0.2 },
      covered: { gamma: 0.3 },
    });
    expect(limit).toBeCloseTo(8.686 * 0.1 * 0.5, 4);
    const opposite = 20 * Math.log10((1 + source * 0.3) / (1 - source * 0.2));
    expect(opposite).toBeCloseTo(limit, 2);
    expect(() => mismatchRipple({ first: { gamma: 0 }, second: { gamma: 0 }, padDb: -3 })).toThrow(
      RangeError,
    );
  });
});
