import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { rainCrossPolar, rainCrossPolarOutage } from "../../src/path/crossPolar.ts";
import { describeReference, num } from "../reference.ts";

describe("cross-polar discrimination in rain", () => {
  it("is U - V log A", () => {
    // Rec. ITU-R P.530-17, section 4.2.1, by hand: at 10 GHz U = 45 dB, V = 12.8 x 10^0.19 = 19.825.
    const at = (coPolarLossDb: number) =>
      rainCrossPolar({ frequencyGHz: 10, coPolarLossDb }).discriminationDb;
    expect(at(1)).toBeCloseTo(45, 10);
    expect(at(10)).toBeCloseTo(45 - 19.825, 3);
    // 22.6 above 20 GHz, where the two laws meet within 0.05 dB.
    const high = { frequencyGHz: 30, coPolarLossDb: 10, u0Db: 9 };
    expect(rainCrossPolar(high).discriminationDb).toBeCloseTo(9 + 44.314 - 22.6, 3);
    const nearBorder = (frequencyGHz: number) => rainCrossPolar({ ...high, frequencyGHz }).discriminationDb;
    expect(Math.abs(nearBorder(20) - nearBorder(20.0001))).toBeLessThan(0.05);
  });
});

describe("cross-polar outage in rain", () => {
  // An open implementation of Rec. ITU-R P.530-18, section 4.2.2.
  it.each([
    [10.368, 25, 0, 14.1891869275, 0.0002100297401521],
    [18, 20, 20, 35.707888072, 1.601499566047e-8],
    [24.048, 22, 10, 54.8562470161, 2.1861262248e-5],
  ])(
    "at %d GHz for C/I %d dB, %d dB of cancelling",
    (frequencyGHz, ratio, improvementDb, rainLoss001Db, outage) => {
      const { percent } = rainCrossPolarOutage({
        frequencyGHz,
        carrierToInterferenceDb: ratio,
        improvementDb,
        rainLoss001Db,
      });
      expect(Math.abs(percent / outage - 1)).toBeLessThan(1e-9);
    },
  );

  it("grows with the rain and with what the receiver needs, up to all the time", () => {
    const rainLoss = fc.double({ min: 0.1, max: 100, noNaN: true });
    fc.assert(
      fc.property(rainLoss, fc.double({ min: 0, max: 60, noNaN: true }), (rainLoss001Db, ratio) => {
        const at = (loss: number, carrierToInterferenceDb: number) =>
          rainCrossPolarOutage({ frequencyGHz: 12, carrierToInterferenceDb, rainLoss001Db: loss }).percent;
        const here = at(rainLoss001Db, ratio);
        expect(at(rainLoss001Db * 1.2, ratio)).toBeGreaterThanOrEqual(here);
        expect(at(rainLoss001Db, ratio + 1)).toBeGreaterThanOrEqual(here);
        expect(here).toBeLessThanOrEqual(100);
      }),
    );
  });

  it("refuses a path without rain", () => {
    const path = { frequencyGHz: 12, carrierToInterferenceDb: 20, rainLoss001Db: 0 };
    expect(() => rainCrossPolarOutage(path)).toThrow("rainLoss001Db");
  });
});

describeReference("terrain/p530-xpd-rain.csv", (row) => {
  const { percent } = rainCrossPolarOutage({
    frequencyGHz: num(row, "f_GHz"),
    carrierToInterferenceDb: num(row, "C0_over_I_dB"),
    u0Db: num(row, "U0_dB"),
    improvementDb: num(row, "XPIF_dB"),
    rainLoss001Db: num(row, "A001_dB"),
  });
  expect(Math.abs(percent / num(row, "P_xpr_pct") - 1)).toBeLessThan(1e-9);
});
