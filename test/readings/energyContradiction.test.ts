import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { energyFloor } from "../../src/cover/energyFloor.ts";
import { energyContradiction } from "../../src/readings/energyContradiction.ts";

const returnLoss = fc.double({ min: 3, max: 30, noNaN: true });
const loss = fc.double({ min: -1, max: 3, noNaN: true });

describe("readings that contradict each other", () => {
  it("come back into balance at the value needed of each suspect", () => {
    fc.assert(
      fc.property(loss, returnLoss, returnLoss, (lossDb, bareReturnLossDb, coveredReturnLossDb) => {
        const readings = { bareReturnLossDb, coveredReturnLossDb };
        const { shortfallDb, suspects } = energyContradiction({ lossDb, lossStandardDb: 0.03, ...readings });
        if (shortfallDb === 0) expect(suspects).toEqual([]);
        for (const { reading, neededDb } of suspects) {
          if (reading === "insertion_loss") expect(neededDb).toBeCloseTo(lossDb + shortfallDb, 9);
          if (Number.isNaN(neededDb) || reading === "insertion_loss") continue;
          const field = reading === "bare_return_loss" ? "bareReturnLossDb" : "coveredReturnLossDb";
          expect(energyFloor({ ...readings, [field]: neededDb }).floorDb).toBeCloseTo(lossDb, 6);
        }
      }),
    );
  });

  it("point at the reading that need move least for its uncertainty", () => {
    // 0.05 dB read where 13 to 9 dB of return loss demands 0.36 dB
    const readings = { lossDb: 0.05, bareReturnLossDb: 13, coveredReturnLossDb: 9 };
    const sharp = energyContradiction({ ...readings, lossStandardDb: 0.03 });
    expect(sharp.floorDb).toBeCloseTo(0.36, 2);
    expect(sharp.shortfallDb).toBeCloseTo(0.31, 2);
    expect(sharp.suspects[0]!.reading).toBe("covered_return_loss");
    const blunt = energyContradiction({ ...readings, lossStandardDb: 0.5, returnLossStandardDb: 0.1 });
    expect(blunt.suspects[0]!.reading).toBe("insertion_loss");
  });

  it("leave no match that explains a gain beyond the bare feed's mismatch", () => {
    const { suspects } = energyContradiction({
      lossDb: -2,
      lossStandardDb: 0.03,
      bareReturnLossDb: 15,
      coveredReturnLossDb: 15,
    });
    const covered = suspects.find(({ reading }) => reading === "covered_return_loss")!;
    expect(covered.standardUncertainties).toBe(Infinity);
    expect(() =>
      energyContradiction({ lossDb: 0, lossStandardDb: 0, bareReturnLossDb: 15, coveredReturnLossDb: 15 }),
    ).toThrow(RangeError);
  });
});
