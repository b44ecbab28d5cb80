import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  gammaOfReturnLoss,
  mismatchLossDb,
  type ReflectionInput,
  reflectionFigures,
  returnLossOfGamma,
} from "../../src/cover/reflectionFigures.ts";
import { describeReference, num, type Row } from "../reference.ts";

/** One unit of the last digit printed in a cell. */
function lastDigit(row: Row, column: string): number {
  return 10 ** -(row[column]!.split(".")[1]?.length ?? 0);
}

describe("one reflection", () => {
  // The table of VSWR and return loss printed in any microwave handbook: VSWR 1.5 is 13.979 dB, 0.1773 dB, 4 %.
  it("VSWR 1.5 is a return loss of 13.979 dB, a mismatch loss of 0.1773 dB, 4 %", () => {
    const figures = reflectionFigures({ vswr: 1.5 });
    expect(figures.gamma).toBeCloseTo(0.2, 14);
    expect(figures.returnLossDb).toBeCloseTo(13.979, 3);
    expect(figures.mismatchLossDb).toBeCloseTo(0.1773, 4);
    expect(figures.reflectedPercent).toBeCloseTo(4, 12);
  });

  // The same table: return loss 6 dB is VSWR 3.0095.
  it("a return loss of 6 dB is a VSWR of 3.0095", () => {
    expect(reflectionFigures({ returnLossDb: 6 }).vswr).toBeCloseTo(3.0095, 4);
  });

  it("takes a perfect match and a total reflection", () => {
    const none = { returnLossDb: Infinity, vswr: 1, gamma: 0, mismatchLossDb: 0, reflectedPercent: 0 };
    const total = {
      returnLossDb: 0,
      vswr: Infinity,
      gamma: 1,
      mismatchLossDb: Infinity,
      reflectedPercent: 100,
    };
    for (const input of [{ returnLossDb: Infinity }, { vswr: 1 }, { gamma: 0 }]) {
      expect(reflectionFigures(input)).toEqual(none);
    }
    for (const input of [{ returnLossDb: 0 }, { vswr: Infinity }, { gamma: 1 }]) {
      expect(reflectionFigures(input)).toEqual(total);
    }
  });

  it("comes back from each of its figures", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 0.999, noNaN: true }), (gamma) => {
        const { returnLossDb, vswr } = reflectionFigures({ gamma });
        expect(reflectionFigures({ returnLossDb }).gamma / gamma).toBeCloseTo(1, 12);
        expect(reflectionFigures({ vswr }).gamma / gamma).toBeCloseTo(1, 9);
        expect(gammaOfReturnLoss("x", returnLossOfGamma(gamma)) / gamma).toBeCloseTo(1, 12);
      }),
    );
  });

  it("keeps the digits of a very small mismatch loss", () => {
    // -10 log10(1 - x) = 4.342944819 x (1 + x/2 + ...), x = 1e-20
    expect(mismatchLossDb(1e-10) / 4.342944819032518e-20).toBeCloseTo(1, 12);
  });

  it.each([
    { returnLossDb: -3 },
    { returnLossDb: Number.NaN },
    { vswr: 0.99 },
    { gamma: 1.01 },
    { gamma: -0.1 },
  ])("refuses %o", (input) =>
    expect(() => reflectionFigures(input as ReflectionInput)).toThrow(Object.keys(input)[0]),
  );

  it("refuses two figures and none", () => {
    expect(() => reflectionFigures({ vswr: 1.5, gamma: 0.2 })).toThrow(/exactly one/);
    expect(() => reflectionFigures({} as ReflectionInput)).toThrow(/exactly one/);
  });
});

describeReference("covers/check-vswr.csv", (row) => {
  const given =
    row["given"] === "vswr" ? { vswr: num(row, "vswr") } : { returnLossDb: num(row, "return_loss_db") };
  const figures = reflectionFigures(given);
  const columns = {
    vswr: figures.vswr,
    gamma: figures.gamma,
    return_loss_db: figures.returnLossDb,
    mismatch_loss_db: figures.mismatchLossDb,
    reflected_percent: figures.reflectedPercent,
  };
  for (const [column, value] of Object.entries(columns)) {
    const tolerance = lastDigit(row, column);
    expect(Math.abs(value - num(row, column)), column).toBeLessThanOrEqual(tolerance);
  }
});
