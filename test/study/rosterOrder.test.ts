import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { comparing, inSector, keepBest, keeps } from "../../src/study/rosterOrder.ts";

describe("a sector of headings", () => {
  it.each([
    [60, 40, 90, true],
    [39.9, 40, 90, false],
    [350, 330, 20, true],
    [10, 330, 20, true],
    [180, 330, 20, false],
    [0, -30, 30, true],
    [200, 0, 360, true],
  ] as const)("%d in %d..%d: %s", (heading, from, to, wanted) => {
    expect(inSector(heading, [from, to])).toBe(wanted);
  });
});

describe("a filter", () => {
  const station = {
    distanceKm: 100,
    headingDeg: 60,
    best: [{ verdict: "closes" as const }, { verdict: "thin" as const }],
  };

  it.each([
    [{}, true],
    [{ withinKm: 99 }, false],
    [{ withinKm: 100, beyondKm: 100 }, true],
    [{ beyondKm: 101 }, false],
    [{ towardsDeg: [61, 59] as const }, false],
    [{ closesIn: 0 }, true],
    [{ closesIn: 1 }, false],
  ])("%j keeps it: %s", (filter, wanted) => {
    expect(keeps(filter, station)).toBe(wanted);
  });

  it("asks the dry weather where there is no wet one", () => {
    expect(keeps({ closesIn: 1 }, { ...station, best: [{ verdict: "closes" }] })).toBe(true);
    expect(keeps({ closesIn: 0 }, { ...station, best: [{ verdict: undefined }] })).toBe(false);
  });
});

describe("the order of a roster", () => {
  const a = { line: 3, name: "a", headingDeg: 300, distanceKm: 5, rankDb: 1 };
  const b = { line: 2, name: "b", headingDeg: 20, distanceKm: 50, rankDb: 9 };
  const twin = { ...a, line: 9 };

  it.each([
    ["heading", [b, a, twin]],
    ["distance", [a, twin, b]],
    ["margin", [b, a, twin]],
    ["name", [a, twin, b]],
    ["row", [b, a, twin]],
  ] as const)("by %s", (key, wanted) => {
    expect([twin, b, a].sort(comparing(key))).toEqual(wanted);
  });
});

describe("the best of many", () => {
  it("are those that sorting all of them would leave", () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 0, max: 50 })),
        fc.integer({ min: 1, max: 9 }),
        (numbers, most) => {
          const kept = keepBest<{ number: number; i: number }>(
            most,
            (x, y) => x.number - y.number || x.i - y.i,
          );
          const all = numbers.map((number, i) => ({ number, i }));
          for (const one of all) kept.add(one);
          expect(kept.best()).toEqual(
            all.toSorted((x, y) => x.number - y.number || x.i - y.i).slice(0, most),
          );
          expect(kept.seen()).toBe(numbers.length);
        },
      ),
    );
  });
});
