import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { coveredFeed } from "../../src/cover/coveredFeed.ts";
import { energyCheck, energyFloor } from "../../src/cover/energyFloor.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";

describe("energy floor", () => {
  // Handbook table of return loss: mismatch loss 0.2830 dB at 12 dB, 0.5844 dB at 9 dB.
  it("from 12 to 9 dB of return loss costs at least 0.3014 dB", () => {
    const { floorDb, bestPossibleGainDb } = energyFloor({ bareReturnLossDb: 12, coveredReturnLossDb: 9 });
    expect(floorDb).toBeCloseTo(0.3014, 3);
    expect(bestPossibleGainDb).toBeCloseTo(0.283, 4);
  });

  it("a cover that matches the feed perfectly wins the bare mismatch loss", () => {
    const { floorDb, bestPossibleGainDb } = energyFloor({
      bareReturnLossDb: 12,
      coveredReturnLossDb: Infinity,
    });
    expect(floorDb).toBe(-bestPossibleGainDb);
  });

  it("no computed cover falls below it, and one without loss lies on it", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 40, noNaN: true }),
        fc.double({ min: -180, max: 180, noNaN: true }),
        fc.double({ min: 1, max: 12, noNaN: true }),
        fc.double({ min: 0, max: 0.3, noNaN: true }),
        fc.double({ min: 0, max: 10, noNaN: true }),
        (bareReturnLossDb, phaseDeg, permittivity, lossTangent, thicknessMm) => {
          const straightOn = { frequencyGHz: 10.4, incidenceDeg: 0, polarization: "te" } as const;
          const aboveFloor = (tangent: number) => {
            const sheet = layeredSheet({
              ...straightOn,
              layers: [{ permittivity, lossTangent: tangent, thicknessMm }],
            });
            const covered = coveredFeed({ feedReturnLossDb: bareReturnLossDb, sheet, phaseDeg });
            const coveredReturnLossDb = covered.returnLossDb.nominal;
            return (
              covered.insertionLossDb.nominal - energyFloor({ bareReturnLossDb, coveredReturnLossDb }).floorDb
            );
          };
          expect(aboveFloor(lossTangent)).toBeGreaterThan(-1e-9);
          expect(aboveFloor(0)).toBeCloseTo(0, 9);
        },
      ),
    );
  });
});

describe("a measured pair", () => {
  const pair = { bareReturnLossDb: 13, coveredReturnLossDb: 9, repeatabilityDb: 0.06 };

  // Floor from 13 to 9 dB: 0.5844 - 0.2233 = 0.3611 dB, from the handbook table of mismatch losses.
  it("is named a contradiction when it lies below the floor", () => {
    const check = energyCheck({ ...pair, insertionLossDb: 0.05 });
    expect(check.contradiction).toBe("below_energy_floor");
    expect(check.leastDb).toBeCloseTo(0.361, 3);
    expect(check.shortfallDb).toBeCloseTo(0.311, 3);
  });

  it("is let pass within the repeatability and above the floor", () => {
    expect(energyCheck({ ...pair, insertionLossDb: 0.32 }).contradiction).toBeUndefined();
    expect(energyCheck({ ...pair, insertionLossDb: 0.5 })).toMatchObject({
      shortfallDb: 0,
      contradiction: undefined,
    });
  });

  // Mismatch loss of 15 dB return loss is 0.1396 dB by the handbook table.
  it("without the covered return loss is held against the best possible gain", () => {
    const bare = { bareReturnLossDb: 15, repeatabilityDb: 0.05 };
    expect(energyCheck({ ...bare, insertionLossDb: -0.18 }).contradiction).toBeUndefined();
    expect(energyCheck({ ...bare, insertionLossDb: -0.2 }).contradiction).toBe("implausible_gain");
  });

  it.each([
    [{ bareReturnLossDb: 0 }, /bareReturnLossDb/],
    [{ coveredReturnLossDb: -1 }, /coveredReturnLossDb/],
    [{ insertionLossDb: Number.NaN }, /insertionLossDb/],
    [{ repeatabilityDb: -0.1 }, /repeatabilityDb/],
  ])("refuses %o", (change, named) => {
    expect(() => energyCheck({ ...pair, insertionLossDb: 0.2, ...change })).toThrow(named);
  });
});
