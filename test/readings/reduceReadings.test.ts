import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { reduceReadings } from "../../src/readings/reduceReadings.ts";
import { benchRows, fieldsOf, randomSource } from "./bench.ts";

const list = (text: string | undefined) => (text ?? "").split(";").map(Number);

describe("readings in turn", () => {
  // five pairs on a drifting source; figures by exact rational arithmetic
  const openDb = [-42.0, -42.05, -42.09, -42.12, -42.17, -42.19];
  const coveredDb = [-42.22, -42.3, -42.34, -42.31, -42.41];

  it("give the loss and its type A uncertainty", () => {
    const { lossDb, typeADb, degreesOfFreedom, outliers } = reduceReadings({ openDb, coveredDb });
    expect(lossDb).toBeCloseTo(0.211, 10);
    expect(typeADb).toBeCloseTo(0.0158, 4);
    expect(degreesOfFreedom).toBe(4);
    expect(outliers).toEqual([]);
  });

  it.runIf(benchRows("bracketed_loss").length > 0)("agree with the reference table", () => {
    for (const { input, expected, tolerance } of benchRows("bracketed_loss")) {
      const given = fieldsOf(input);
      const wanted = fieldsOf(expected);
      const result = reduceReadings({ openDb: list(given["open"]), coveredDb: list(given["covered"]) });
      expect(Math.abs(result.lossDb - Number(wanted["il_db"]))).toBeLessThanOrEqual(tolerance);
      expect(Math.abs(result.typeADb - Number(wanted["u_a_db"]))).toBeLessThanOrEqual(tolerance);
    }
  });

  it("add half of the repeatability's spread and k = 2", () => {
    const { typeADb, expandedDb, coverageFactor } = reduceReadings({ openDb, coveredDb });
    expect(coverageFactor).toBe(2);
    // U = k sqrt(u_A^2 + a^2/3), a = 0.05 dB
    expect(expandedDb).toBeCloseTo(2 * Math.sqrt(typeADb ** 2 + 0.05 ** 2 / 3), 12);
    expect(reduceReadings({ openDb, coveredDb, repeatabilityDb: 0, coverage: 3 }).expandedDb).toBeCloseTo(
      3 * typeADb,
      12,
    );
  });

  it("take Student's factor for a wanted confidence, and for two pairs in any case", () => {
    // t of 95 % at 4 degrees of freedom: 2.776 (JCGM 100:2008 table G.2: 2.78)
    const known = reduceReadings({ openDb, coveredDb, repeatabilityDb: 0, confidence: 0.95 });
    expect(known.coverageFactor).toBeCloseTo(2.776, 3);
    // 95.45 % at 1 degree: 13.97 (same table)
    const two = reduceReadings({ openDb: [0, 0, 0], coveredDb: [-0.3, -0.2], repeatabilityDb: 0 });
    expect(two.coverageFactor).toBeCloseTo(13.97, 2);
  });

  it("do not feel any straight drift", () => {
    const level = fc.double({ min: -1, max: 1, noNaN: true });
    fc.assert(
      fc.property(fc.array(level, { minLength: 7, maxLength: 7 }), level, level, (noise, start, slope) => {
        const reduce = (drift: (i: number) => number) =>
          reduceReadings({
            openDb: [0, 2, 4, 6].map((i) => noise[i]! + drift(i)),
            coveredDb: [1, 3, 5].map((i) => noise[i]! + drift(i)),
          });
        const still = reduce(() => 0);
        const drifting = reduce((i) => start + slope * i);
        expect(drifting.lossDb).toBeCloseTo(still.lossDb, 10);
        expect(drifting.typeADb).toBeCloseTo(still.typeADb, 6);
      }),
    );
  });

  it("name the reading that is far out, and keep it", () => {
    const { normal } = randomSource(3);
    const open = Array.from({ length: 11 }, () => 0.01 * normal());
    const covered = Array.from({ length: 10 }, () => -0.2 + 0.01 * normal());
    const badCovered = covered.map((level, i) => (i === 4 ? level - 0.5 : level));
    const byCovered = reduceReadings({ openDb: open, coveredDb: badCovered });
    expect(byCovered.outliers).toMatchObject([{ state: "covered", index: 4 }]);
    expect(byCovered.outliers[0]!.shiftDb).toBeCloseTo(-0.5, 1);
    expect(byCovered.lossDb).toBeCloseTo(0.25, 1); // a tenth of 0.5 dB high: it was not dropped
    const badOpen = open.map((level, i) => (i === 6 ? level + 0.5 : level));
    const byOpen = reduceReadings({ openDb: badOpen, coveredDb: covered });
    expect(byOpen.outliers).toMatchObject([{ state: "open", index: 6 }]);
    expect(byOpen.outliers[0]!.shiftDb).toBeCloseTo(0.5, 1);
    expect(reduceReadings({ openDb: open, coveredDb: covered }).outliers).toEqual([]);
  });

  it("refuse what leaves no scatter or does not alternate", () => {
    expect(() => reduceReadings({ openDb: [0, 0], coveredDb: [-1, -1] })).toThrow(/one reading more/);
    expect(() => reduceReadings({ openDb: [0, 0], coveredDb: [-1] })).toThrow(/at least two/);
    expect(() => reduceReadings({ openDb: [0, Number.NaN, 0], coveredDb: [-1, -1] })).toThrow(RangeError);
    const good = { openDb: [0, 0, 0], coveredDb: [-1, -1.1] };
    expect(() => reduceReadings({ ...good, repeatabilityDb: -1 })).toThrow(RangeError);
    expect(() => reduceReadings({ ...good, coverage: 0 })).toThrow(RangeError);
  });
});

describe("the 95 % interval", () => {
  const trials = 2000;

  /** Share of runs whose interval holds the true loss; levels drift by `drift` and scatter by 0.03 dB. */
  function coverage(start: number, drift: (random: ReturnType<typeof randomSource>) => number[]) {
    const random = randomSource(start);
    let held = 0;
    for (let trial = 0; trial < trials; trial++) {
      const trueLossDb = random.uniform();
      const bare = drift(random).map((level) => level + 0.03 * random.normal());
      const { lossDb, expandedDb } = reduceReadings({
        openDb: bare.filter((_, i) => i % 2 === 0),
        coveredDb: bare.filter((_, i) => i % 2 === 1).map((level) => level - trueLossDb),
        repeatabilityDb: 0,
        confidence: 0.95,
      });
      if (Math.abs(lossDb - trueLossDb) <= expandedDb) held++;
    }
    return held / trials;
  }

  /** Random error of a share of 0.95 in 2,000 runs is 0.5 %, so 93 to 97 % is four of it either way. */
  function expectNominal(share: number) {
    expect(share).toBeGreaterThanOrEqual(0.93);
    expect(share).toBeLessThanOrEqual(0.97);
  }

  it.each([3, 5, 10])("holds the truth with %d pairs and a straight drift", (pairs) => {
    expectNominal(
      coverage(pairs, ({ normal }) => {
        const slope = 0.1 * normal();
        return Array.from({ length: 2 * pairs + 1 }, (_, i) => slope * i);
      }),
    );
  });

  it.each([5, 10])("holds the truth with %d pairs and a level that steps at any time", (pairs) => {
    expectNominal(
      coverage(100 + pairs, ({ uniform }) => {
        const at = Math.floor(uniform() * (2 * pairs + 1));
        const height = 0.1 * (2 * uniform() - 1);
        return Array.from({ length: 2 * pairs + 1 }, (_, i) => (i < at ? 0 : height));
      }),
    );
  });

  it("holds the truth where the level steps a little before every reading", () => {
    expectNominal(
      coverage(7, ({ normal }) => {
        let level = 0;
        return Array.from({ length: 13 }, () => (level += 0.02 * normal()));
      }),
    );
  });

  it("would not hold it with the plain standard deviation of the mean", () => {
    // the reason for the correlation of neighbouring differences: the plain form is about 14 % too small
    const { normal } = randomSource(11);
    let plain = 0;
    let honest = 0;
    for (let trial = 0; trial < trials; trial++) {
      const openDb = Array.from({ length: 11 }, normal);
      const coveredDb = Array.from({ length: 10 }, normal);
      const { typeADb, differencesDb, lossDb } = reduceReadings({ openDb, coveredDb });
      honest += typeADb ** 2;
      plain += differencesDb.reduce((sum, d) => sum + (d - lossDb) ** 2, 0) / 90;
    }
    expect(Math.sqrt(plain / honest)).toBeCloseTo(0.86, 1);
  });
});
