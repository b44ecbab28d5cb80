import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { MeasuredCover } from "../../src/scenario/types.ts";
import { budgetOf, codesOf, coverOf, entryOf, feedOf, layerOf, scenarioOf, weatherOf } from "./scenarios.ts";

const mismatchOf = (returnLossDb: number) => -10 * Math.log10(1 - 10 ** (-returnLossDb / 10));

function under(
  measured: MeasuredCover,
  { returnLossDb = 13, layers = [] as ReturnType<typeof layerOf>[], rain = 0 } = {},
) {
  return budgetOf(
    scenarioOf({
      feeds: { stub: feedOf({ returnLossDb }) },
      covers: { film: coverOf({ measured, layers }) },
      weather: { dry: weatherOf({ coversWetAsAtMmPerH: rain }) },
    }),
  );
}

const read = (insertionLossDb: number, returnLossChangeDb?: number): MeasuredCover => ({
  insertionLossDb: { value: insertionLossDb },
  ...(returnLossChangeDb !== undefined && { returnLossChangeDb: { value: returnLossChangeDb } }),
});

describe("a measured cover", () => {
  it("charges what was read, no more and no less, whatever the return loss did", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1, max: 5, noNaN: true }),
        fc.option(fc.double({ min: -10, max: 20, noNaN: true }), { nil: undefined }),
        (lossDb, changeDb) => {
          const budget = under(read(lossDb, changeDb));
          const charged = entryOf(budget, "tx.cover_mismatch").db + entryOf(budget, "tx.cover_loss").db;
          expect(charged).toBeCloseTo(-lossDb, 12);
          expect(budget.transmitterCover.dryCostDb.nominal).toBeCloseTo(lossDb, 12);
        },
      ),
    );
  });

  // Conservation of energy: the change of mismatch loss belongs to reflection, the rest is heat.
  it("is split by energy: of 0.5 dB with 14 dB going to 11.3 dB, 0.155 dB are reflection", () => {
    const budget = under(read(0.5, 2.7), { returnLossDb: 14 });
    const reflected = mismatchOf(11.3) - mismatchOf(14);
    expect(reflected).toBeCloseTo(0.155, 2);
    expect(entryOf(budget, "rx.cover_mismatch").db).toBeCloseTo(-reflected, 9);
    expect(entryOf(budget, "rx.cover_loss").db).toBeCloseTo(reflected - 0.5, 9);
    expect(budget.receiverCover.returnLossDb.nominal).toBeCloseTo(11.3, 9);
    expect(codesOf(budget)).toEqual([]);
  });

  it("is all heat where no change of return loss was read", () => {
    const budget = under(read(0.3));
    expect(entryOf(budget, "tx.cover_mismatch").db).toBeCloseTo(0, 12);
    expect(entryOf(budget, "tx.cover_loss").db).toBeCloseTo(-0.3, 12);
  });

  it("may improve the link by tuning the feed, up to the feed's own mismatch", () => {
    // 13 dB improved to 16 dB gives 0.113 dB back.
    const gain = mismatchOf(13) - mismatchOf(16);
    const budget = under(read(-gain, -3));
    expect(codesOf(budget)).toEqual([]);
    expect(entryOf(budget, "tx.cover_mismatch").db).toBeCloseTo(0.113, 3);
    expect(entryOf(budget, "tx.cover_loss").db).toBeCloseTo(0, 9);
    expect(budget.transmitterCover.dryCostDb.nominal).toBeLessThan(0);
  });

  it("is named a contradiction below the energy floor: 0.05 dB with 13 dB going to 9 dB", () => {
    const budget = under(read(0.05, 4));
    expect(codesOf(budget)).toContain("below_energy_floor");
    // Energy asks for 0.36 dB.
    expect(mismatchOf(9) - mismatchOf(13)).toBeCloseTo(0.361, 2);
    const { message } = budget.warnings.find(({ code }) => code === "below_energy_floor")!;
    expect(message).toContain("0.36 dB");
    // 12.15 dB covered would do, 5.4 standard uncertainties of 0.58 dB away; 9.37 dB bare is 6.3 away, 0.36 dB of loss
    // 6.2 of 0.05 dB: mismatch losses added and taken away by hand.
    expect(message).toContain("the likelier culprit is the covered return loss");
    expect(entryOf(budget, "tx.cover_loss").db).toBeCloseTo(0, 12);
  });

  it("is no contradiction within twice the bench's repeatability", () => {
    const floorDb = mismatchOf(9) - mismatchOf(13);
    expect(codesOf(under(read(floorDb - 0.09, 4)))).toEqual([]);
    expect(codesOf(under(read(floorDb - 0.11, 4)))).toContain("below_energy_floor");
    const unsure = { ...read(floorDb - 0.3, 4), insertionLossDb: { value: floorDb - 0.3, sigma: 0.2 } };
    expect(codesOf(under(unsure))).toEqual([]);
  });

  it("is implausible where it gives more than the feed's mismatch", () => {
    expect(codesOf(under(read(-0.3)))).toEqual([]); // 0.223 dB and 2 x 0.05 dB of repeatability
    expect(codesOf(under(read(-0.4)))).toContain("implausible_gain");
  });

  it("makes no cold out of an impossible gain: the noise is that of no cover at best", () => {
    const { systemTemperatureK } = under(read(-10));
    // Level beam 200 K, receiver 290 (10^0.11 - 1) = 83.6 K; the line only warms towards 290 K.
    expect(systemTemperatureK).toBeGreaterThan(200 + 83);
  });

  it("is held against the layers beside it", () => {
    const layers = [layerOf(0.127, 2.05, 0.0007)]; // a thin film: some hundredths of a dB
    expect(codesOf(under(read(0.05), { layers }))).toEqual([]);
    expect(codesOf(under(read(0.9), { layers }))).toContain("measured_outside_model");
  });

  it("read on a better feed does not stop a budget with a worse one", () => {
    const budget = under(read(1, 9), { returnLossDb: 8, rain: 10 });
    expect(Number.isFinite(budget.marginDb)).toBe(true);
    expect(codesOf(budget)).toContain("below_energy_floor");
  });

  it("adds water upon the reading", () => {
    const [dry, wet] = [under(read(0.22, 2.7)), under(read(0.22, 2.7), { rain: 16 })];
    expect(wet.transmitterCover.dryCostDb).toEqual(dry.transmitterCover.dryCostDb);
    expect(wet.transmitterCover.waterCostDb.nominal).toBeGreaterThan(1);
    const phased = budgetOf(
      scenarioOf({
        feeds: { stub: feedOf({ returnLossDb: 13, phaseDeg: 120 }) },
        covers: { film: coverOf({ measured: read(0.22, 2.7) }) },
        weather: { dry: weatherOf({ coversWetAsAtMmPerH: 16 }) },
      }),
    );
    // The sheet that stands in for a reading has no phase to know.
    expect(phased.transmitterCover.waterCostDb).toEqual(wet.transmitterCover.waterCostDb);
  });
});
