import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare, withWeather } from "../../src/budget/prepare.ts";
import type { Budget } from "../../src/budget/types.ts";
import type { Scenario, Weather } from "../../src/scenario/types.ts";
import {
  anyFeed,
  anyLayeredCover,
  anyScenario,
  anyWeather,
  BOTH,
  budgetOf,
  caseOf,
  coverOf,
  entryOf,
  layerOf,
  scenarioOf,
  siteOf,
  weatherOf,
} from "./scenarios.ts";

const runs = { numRuns: 200 };

function sum(entries: Budget["entries"], figure: "db" | "low" | "high" = "db"): number {
  return entries.reduce((total, entry) => total + entry[figure], 0);
}

function atPath({ entries }: Budget): Budget["entries"] {
  return entries.filter(({ stage }) => stage === "path");
}

/** All that a budget says in numbers, entries of 0 dB left out: they may stand or be absent. */
function figuresOf({ entries, noiseEntries, case: _, warnings: __, ...rest }: Budget) {
  const told = [...entries, ...noiseEntries].filter(
    ({ db, low, high }) => db !== 0 || low !== 0 || high !== 0,
  );
  return { ...rest, told: told.map(({ id, db, low, high, sigma }) => ({ id, db, low, high, sigma })) };
}

describe("any budget", () => {
  it("adds up: entries to the received level, noise entries to the noise, all of them to the margin", () => {
    fc.assert(
      fc.property(anyScenario, (scenario) => {
        const budget = budgetOf(scenario);
        const { entries, noiseEntries, requirement, receivedDbm, noiseDbm, marginDb } = budget;
        expect(Math.abs(sum(entries) - receivedDbm)).toBeLessThan(1e-9);
        expect(Math.abs(sum(noiseEntries) + noiseDbm)).toBeLessThan(1e-9);
        expect(Math.abs(budget.snrDb - (receivedDbm - noiseDbm))).toBeLessThan(1e-9);
        expect(Math.abs(budget.snrDb - budget.requiredSnrDb - marginDb)).toBeLessThan(1e-9);
        expect(Math.abs(sum([...entries, ...noiseEntries, requirement]) - marginDb)).toBeLessThan(1e-9);
      }),
      runs,
    );
  });

  it("keeps every figure finite and between its bounds", () => {
    fc.assert(
      fc.property(anyScenario, (scenario) => {
        const budget = budgetOf(scenario);
        for (const { db, low, high, sigma } of [...budget.entries, ...budget.noiseEntries]) {
          expect([low, db, high, sigma].every(Number.isFinite)).toBe(true);
          expect(low).toBeLessThanOrEqual(db);
          expect(db).toBeLessThanOrEqual(high);
          expect(sigma).toBeGreaterThanOrEqual(0);
        }
        expect(budget.marginLowDb).toBeLessThanOrEqual(budget.marginDb + 1e-9);
        expect(budget.marginDb).toBeLessThanOrEqual(budget.marginHighDb + 1e-9);
      }),
      runs,
    );
  });

  it("lets neither gas, rain, fog, heat in a cover nor a line give anything back", () => {
    const passive = /^(path\.|(tx|rx)\.(line|cover_loss|spillover|illumination|blockage|surface|pointing)$)/;
    fc.assert(
      fc.property(anyScenario, (scenario) => {
        const budget = budgetOf(scenario);
        for (const { id, db } of budget.entries) if (passive.test(id)) expect(db, id).toBeLessThan(1e-9);
        // The room around the receiver's line and what the mouth reflects are both at 290 K.
        expect(budget.systemTemperatureK).toBeGreaterThan(0);
      }),
      runs,
    );
  });

  it("holds the received level of any known phase within the bounds of the unknown one", () => {
    fc.assert(
      fc.property(
        anyScenario,
        anyLayeredCover,
        fc.tuple(fc.integer({ min: 0, max: 359 }), fc.integer({ min: 0, max: 359 })),
        (scenario, cover, [nearDeg, farDeg]) => {
          const withPhases = (near: number | undefined, far: number | undefined): Scenario => ({
            ...scenario,
            covers: { near: { ...cover, wetModel: "film" }, far: { ...cover, wetModel: "film" } },
            feeds: {
              near: { ...scenario.feeds["near"]!, phaseDeg: near },
              far: { ...scenario.feeds["far"]!, phaseDeg: far },
            },
          });
          const { receivedDbm } = budgetOf(withPhases(nearDeg, farDeg));
          const { entries } = budgetOf(withPhases(undefined, undefined));
          expect(receivedDbm).toBeGreaterThan(sum(entries, "low") - 1e-9);
          expect(receivedDbm).toBeLessThan(sum(entries, "high") + 1e-9);
        },
      ),
      runs,
    );
  });
});

describe("the two directions of a path", () => {
  it("give the same level, whatever stands at either end", () => {
    fc.assert(
      fc.property(anyScenario, (scenario) => {
        const { transmitter, receiver, path, weather } = scenario;
        const { feed, cover, lineLossDb, dish } = transmitter;
        const others: Record<string, readonly (typeof BOTH)[number][]> = {
          transmitter: ["receiver"],
          receiver: ["transmitter"],
        };
        const now = weather["now"]!;
        const turned: Scenario = {
          ...scenario,
          transmitter: {
            ...transmitter,
            feed: receiver.feed,
            cover: receiver.cover,
            dish: receiver.dish,
            lineLossDb: receiver.lineLossDb,
          },
          receiver: { ...receiver, feed, cover, lineLossDb, dish },
          path: { from: path.to, to: path.from },
          weather: { now: { ...now, wets: now.wets.flatMap((end) => others[end]!) } },
        };
        expect(Math.abs(budgetOf(turned).receivedDbm - budgetOf(scenario).receivedDbm)).toBeLessThan(1e-9);
      }),
      runs,
    );
  });
});

describe("a cover", () => {
  it("of no thickness is no cover in dry weather", () => {
    fc.assert(
      fc.property(anyScenario, anyFeed, (scenario, feed) => {
        const nothing = coverOf({ layers: [layerOf(0, 3, 0.02)], gapMm: 2 });
        const under = (cover: Scenario["covers"][string]) =>
          figuresOf(
            budgetOf({
              ...scenario,
              feeds: { near: feed, far: feed },
              covers: { near: cover, far: cover },
              weather: { now: weatherOf() },
            }),
          );
        const [thin, bare] = [under(nothing), under(coverOf())];
        expect(thin.told.map(({ id }) => id)).toEqual(bare.told.map(({ id }) => id));
        expectClose(thin, bare);
      }),
      runs,
    );
  });

  it("that the rain does not wet is as it is in the dry, and water on it leaves the path as it is", () => {
    fc.assert(
      fc.property(anyScenario, anyWeather, (scenario, weather) => {
        const clear: Weather = {
          ...weather,
          rainMmPerH: { value: 0 },
          fogGPerM3: 0,
          dewMm: { value: 0 },
          iceMm: 0,
          snow: undefined,
        };
        const link = prepare({
          ...scenario,
          weather: {
            dry: { ...clear, coversWetAsAtMmPerH: undefined },
            sheltered: { ...weather, wets: [] },
            after: { ...clear, wets: BOTH, coversWetAsAtMmPerH: 20 },
          },
        });
        const [dry, sheltered, after] = (["dry", "sheltered", "after"] as const).map((name) =>
          evaluate(link, caseOf(scenario, name)),
        ) as [Budget, Budget, Budget];
        expect(sheltered.transmitterCover).toEqual(dry.transmitterCover);
        expect(sheltered.receiverCover).toEqual(dry.receiverCover);
        const ofEnds = ({ entries }: Budget) => entries.filter(({ stage }) => stage !== "path");
        expect(ofEnds(sheltered)).toEqual(ofEnds(dry));
        expect(atPath(after)).toEqual(atPath(dry));
      }),
      runs,
    );
  });
});

describe("a link with another weather", () => {
  it("is the link of the changed scenario, figure by figure", () => {
    fc.assert(
      fc.property(anyScenario, anyWeather, fc.constantFrom("now", "later"), (scenario, weather, name) => {
        const changed = { ...scenario, weather: { ...scenario.weather, [name]: weather } };
        const quick = withWeather(prepare(scenario), name, weather);
        const whole = prepare(changed);
        // The functions that make a mouth ready for later weathers are not the same, though they do the same.
        expect(JSON.stringify(quick)).toBe(JSON.stringify(whole));
        for (const known of Object.keys(changed.weather)) {
          const choice = caseOf(changed, known);
          expect(evaluate(quick, choice)).toEqual(evaluate(whole, choice));
        }
      }),
      { numRuns: 50 },
    );
  });

  it("leaves the link that it came from alone", () => {
    const scenario = scenarioOf();
    const link = prepare(scenario);
    const before = evaluate(link, caseOf(scenario, "dry"));
    withWeather(link, "dry", weatherOf({ rainMmPerH: { value: 30 } }));
    expect(evaluate(link, caseOf(scenario, "dry"))).toEqual(before);
  });
});

describe("a steep path", () => {
  // ITU-R P.452-18 counts free space over the slant: 3 km along and 4 km up are 5 km.
  it("is as long as its slant, in free space and in even air", () => {
    const evenAir = weatherOf({ temperatureC: 10, pressureHPa: 900, vapourDensityGPerM3: 5 });
    const at = (groundM: number, longitude: number) => {
      const path = { from: siteOf({ groundM: 0 }), to: siteOf({ groundM, longitude }) };
      return atPath(budgetOf(scenarioOf({ path, weather: { dry: evenAir } }))).map(({ db }) => db);
    };
    const degPerKm = 180 / Math.PI / 6378.137;
    const [steep, level] = [at(4000, 3 * degPerKm), at(0, 5 * degPerKm)];
    expect(steep).toHaveLength(2);
    for (const [i, db] of steep.entries()) expect(db).toBeCloseTo(level[i]!, 9);
  });
});

describe("cold air", () => {
  it("holds no more of the reference atmosphere's vapour than saturates it", () => {
    const gas = (humidityPercent?: number) =>
      entryOf(
        budgetOf(scenarioOf({ weather: { dry: weatherOf({ temperatureC: -20, humidityPercent }) } })),
        "path.gas",
      ).db;
    expect(gas()).toBeCloseTo(gas(100), 12);
  });
});

/** Numbers equal to rounding, all the way down. */
function expectClose(actual: unknown, expected: unknown): void {
  if (typeof actual === "number" && typeof expected === "number") {
    expect(actual === expected || Math.abs(actual - expected) < 1e-9, `${actual} against ${expected}`).toBe(
      true,
    );
  } else if (typeof actual === "object" && actual !== null && expected !== null) {
    for (const [key, value] of Object.entries(actual)) {
      expectClose(value, (expected as Record<string, unknown>)[key]);
    }
  } else expect(actual).toEqual(expected);
}
