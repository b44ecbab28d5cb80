import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { diameterFromGain, offAxisEnvelope } from "../../src/antenna/envelope.ts";
import { describeReference, num } from "../reference.ts";

describe("off-axis envelope", () => {
  it.each([
    // Rec. ITU-R F.699-8 and F.1245-3, D/lambda above 100: 32 and 29 less 25 log phi; -10 and -13 dBi
    ["peak", 10, 7],
    ["average", 10, 4],
    ["peak", 47, -9.802],
    ["peak", 49, -10],
    ["average", 49, -13],
  ] as const)("of a large dish, %s, at %d deg", (kind, offAxisDeg, gainDbi) => {
    const dish = { kind, maximumGainDbi: 45, diameterWavelengths: 120 };
    expect(offAxisEnvelope({ ...dish, offAxisDeg }).gainDbi).toBeCloseTo(gainDbi, 3);
  });

  it("never rises by more than the 2 dB of its steps, and never exceeds the gain on the axis", () => {
    fc.assert(
      fc.property(
        fc.constantFrom("peak" as const, "average" as const),
        fc.double({ min: 20, max: 50, noNaN: true }),
        fc.double({ min: 0, max: 170, noNaN: true }),
        (kind, maximumGainDbi, offAxisDeg) => {
          const dish = { kind, maximumGainDbi, diameterWavelengths: diameterFromGain(maximumGainDbi) };
          const { gainDbi } = offAxisEnvelope({ ...dish, offAxisDeg });
          expect(gainDbi).toBeLessThanOrEqual(maximumGainDbi);
          const farther = offAxisEnvelope({ ...dish, offAxisDeg: offAxisDeg + 1 }).gainDbi;
          expect(farther).toBeLessThanOrEqual(gainDbi + 2);
        },
      ),
    );
  });

  it("keeps the mean of the side lobes under their peaks", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 20, max: 50, noNaN: true }),
        fc.double({ min: 0, max: 180, noNaN: true }),
        (maximumGainDbi, offAxisDeg) => {
          const dish = { maximumGainDbi, diameterWavelengths: diameterFromGain(maximumGainDbi), offAxisDeg };
          const average = offAxisEnvelope({ ...dish, kind: "average" }).gainDbi;
          expect(average).toBeLessThanOrEqual(offAxisEnvelope({ ...dish, kind: "peak" }).gainDbi + 1e-9);
        },
      ),
    );
  });

  it("takes 10 wavelengths for 27.7 dBi", () => {
    // 20 log 10 = 27.7 - 7.7
    expect(diameterFromGain(27.7)).toBeCloseTo(10, 10);
  });

  it("refuses an angle beyond the back", () => {
    expect(() =>
      offAxisEnvelope({ kind: "peak", maximumGainDbi: 34, diameterWavelengths: 20, offAxisDeg: 181 }),
    ).toThrow("offAxisDeg");
  });
});

describeReference("terrain/antenna-envelope.csv", (row) => {
  const dish = {
    maximumGainDbi: num(row, "Gmax_dBi"),
    diameterWavelengths: num(row, "D_over_lambda"),
    offAxisDeg: num(row, "phi_deg"),
  };
  const peak = offAxisEnvelope({ ...dish, kind: "peak" }).gainDbi;
  const average = offAxisEnvelope({ ...dish, kind: "average" }).gainDbi;
  expect(Math.abs(peak - num(row, "G_F699_dBi"))).toBeLessThan(1e-6);
  expect(Math.abs(average - num(row, "G_F1245_dBi"))).toBeLessThan(1e-6);
});
