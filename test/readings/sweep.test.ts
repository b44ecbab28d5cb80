import { describe, expect, it } from "vitest";
import { coveredFeed } from "../../src/cover/coveredFeed.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { polar } from "../../src/numeric/complex.ts";
import { reduceSweep, sweepAt } from "../../src/readings/sweep.ts";

const frequencies = Array.from({ length: 41 }, (_, i) => 10e9 + i * 20e6);
const bare = frequencies.map((frequencyHz) => ({
  frequencyHz,
  s11: polar(10 ** (-15 / 20), 1),
  s21: polar(0.02, 2),
}));

/** The covered sweep that the cover models foretell for a plate 60 mm before the mouth. */
const covered = frequencies.map((frequencyHz) => {
  const frequencyGHz = frequencyHz / 1e9;
  const layers = [{ permittivity: 2.6, lossTangent: 0.006, thicknessMm: 3 }];
  const sheet = layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
  const { returnLossDb, insertionLossDb } = coveredFeed({
    feedReturnLossDb: 15,
    sheet,
    phaseDeg: 40,
    gapMm: 60,
    frequencyGHz,
  });
  return {
    frequencyHz,
    s11: polar(10 ** (-returnLossDb.nominal / 20), 0),
    s21: polar(0.02 * 10 ** (-insertionLossDb.nominal / 20), 1),
    insertionLossDb: insertionLossDb.nominal,
    returnLossDb: returnLossDb.nominal,
  };
});

describe("a bare and a covered sweep", () => {
  it("give back the losses that made them", () => {
    const { points, contradictions, worstReturnLoss, worstInsertionLoss } = reduceSweep({ bare, covered });
    points.forEach((point, i) => {
      expect(point.insertionLossDb).toBeCloseTo(covered[i]!.insertionLossDb, 9);
      expect(point.coveredReturnLossDb).toBeCloseTo(covered[i]!.returnLossDb, 9);
      expect(point.returnLossChangeDb).toBeCloseTo(15 - covered[i]!.returnLossDb, 9);
      expect(point.insertionLossDb!).toBeGreaterThan(point.floorDb);
    });
    expect(contradictions).toEqual([]);
    expect(worstReturnLoss.coveredReturnLossDb).toBeCloseTo(
      Math.min(...covered.map((point) => point.returnLossDb)),
      9,
    );
    expect(worstInsertionLoss!.insertionLossDb).toBeCloseTo(
      Math.max(...covered.map((point) => point.insertionLossDb)),
      9,
    );
  });

  it("show a ripple at its height, whatever the slope", () => {
    const rippled = bare.map(({ frequencyHz, s11 }, i) => {
      const lossDb = 0.5 + 0.01 * i + 0.2 * Math.cos((2 * Math.PI * (i - 20)) / 5);
      return { frequencyHz, s11, s21: polar(0.02 * 10 ** (-lossDb / 20), 0) };
    });
    const { insertionLossRippleDb } = reduceSweep({ bare, covered: rippled });
    // five points a period, even about the middle of the band: from 1 down to cos 144 deg
    expect(insertionLossRippleDb).toBeCloseTo(0.2 * (1 - Math.cos((144 * Math.PI) / 180)), 9);
  });

  it("contradict each other where the loss is less than the match demands", () => {
    const lying = covered.map(({ frequencyHz, s11 }, i) => ({
      frequencyHz,
      s11,
      s21: polar(i === 20 ? 0.1 : 0.001, 0),
    }));
    const { contradictions } = reduceSweep({ bare, covered: lying });
    expect(contradictions.map((point) => point.frequencyHz)).toEqual([frequencies[20]]);
    const generous = reduceSweep({ bare, covered: lying, lossExpandedDb: 20 });
    expect(generous.contradictions).toEqual([]);
  });

  it("meet on the bare sweep's frequencies, within the band of both", () => {
    const sparse = covered.filter((_, i) => i % 2 === 0 && i >= 10 && i <= 30);
    const { points } = reduceSweep({ bare, covered: sparse });
    expect(points.map((point) => point.frequencyHz)).toEqual(frequencies.slice(10, 31));
    points.forEach((point, i) => {
      expect(point.insertionLossDb).toBeCloseTo(covered[10 + i]!.insertionLossDb, 1);
    });
  });

  it("need no transmission to compare return losses", () => {
    const reflections = covered.map(({ frequencyHz, s11 }) => ({ frequencyHz, s11 }));
    const reduced = reduceSweep({ bare, covered: reflections });
    expect(reduced.points[0]).not.toHaveProperty("insertionLossDb");
    expect(reduced).not.toHaveProperty("meanInsertionLossDb");
    expect(reduced.points[0]!.floorDb).toBeGreaterThan(0);
  });

  it("refuse frequencies that they do not share", () => {
    expect(() => reduceSweep({ bare, covered: [{ frequencyHz: 1, s11: polar(0.1, 0) }] })).toThrow(/common/);
    expect(() => sweepAt(covered, 9e9)).toThrow(/does not cover/);
    expect(
      sweepAt(
        [
          { frequencyHz: 1, s11: polar(0.2, 0) },
          { frequencyHz: 3, s11: polar(0.4, 2) },
        ],
        2,
      ),
    ).toEqual({
      s11: expect.closeTo(0.3, 12),
    });
    expect(() => reduceSweep({ bare, covered, lossExpandedDb: -1 })).toThrow(RangeError);
  });
});
