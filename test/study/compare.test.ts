import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import type { Scenario } from "../../src/scenario/types.ts";
import { commonMode, commonWeathers, compare } from "../../src/study/compare.ts";
import {
  anyScenario,
  caseOf,
  coverOf,
  eastOnEquator,
  layerOf,
  scenarioOf,
  siteOf,
  weatherOf,
} from "../budget/scenarios.ts";

/** Both in the first mode and weather of each. */
function compared(a: Scenario, b: Scenario) {
  const first = ({ weather }: Scenario) => Object.keys(weather)[0]!;
  const [linkA, linkB] = [prepare(a), prepare(b)];
  const mode = { a: a.receiver.modes[0]!, b: b.receiver.modes[0]! };
  return compare(linkA, linkB, { mode, weathers: [{ a: first(a), b: first(b) }] }).weathers[0]!;
}

function marginOf(scenario: Scenario): number {
  return evaluate(prepare(scenario), caseOf(scenario, Object.keys(scenario.weather)[0]!)).marginDb;
}

const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

describe("any two scenarios", () => {
  it("differ in the margin by what their entries differ, and by what the causes behind these do", () => {
    fc.assert(
      fc.property(anyScenario, anyScenario, (a, b) => {
        const { entries, causes, differenceDb } = compared(a, b);
        const expected = marginOf(b) - marginOf(a);
        expect(Math.abs(differenceDb - expected)).toBeLessThan(1e-9);
        expect(Math.abs(sum(entries.map((one) => one.differenceDb)) - expected)).toBeLessThan(1e-7);
        expect(Math.abs(sum(causes.map((one) => one.differenceDb)) - expected)).toBeLessThan(1e-7);
        for (const { db, differenceDb: change } of entries) {
          expect((db.b ?? 0) - (db.a ?? 0)).toBe(change);
        }
        expect(new Set(entries.map(({ id }) => id)).size).toBe(entries.length);
      }),
      { numRuns: 200 },
    );
  });

  it("differ the other way round where they change places", () => {
    fc.assert(
      fc.property(anyScenario, anyScenario, (a, b) => {
        const [there, back] = [compared(a, b), compared(b, a)];
        expect(back.differenceDb).toBeCloseTo(-there.differenceDb, 9);
        expect(back.differenceSigmaDb).toBeCloseTo(there.differenceSigmaDb, 9);
        expect(back.betterProbability).toBeCloseTo(1 - there.betterProbability, 9);
        expect(back.entries.map(({ id }) => id).toSorted()).toEqual(
          there.entries.map(({ id }) => id).toSorted(),
        );
        expect(back.distinguishable).toBe(there.distinguishable);
      }),
      { numRuns: 100 },
    );
  });

  it("differ in nothing where they are one", () => {
    fc.assert(
      fc.property(anyScenario, (one) => {
        expect(compared(one, structuredClone(one))).toMatchObject({
          entries: [],
          causes: [],
          differenceDb: 0,
          differenceSigmaDb: 0,
          betterProbability: 0.5,
          distinguishable: false,
        });
      }),
      { numRuns: 100 },
    );
  });
});

describe("what differs", () => {
  const plain = scenarioOf();
  const withPower = (value: number, sigma?: number) =>
    scenarioOf({ transmitter: { powerDbm: { value, sigma } } });

  it("is the power alone where only that differs, with the errors of both powers", () => {
    const { entries, causes, differenceDb, differenceSigmaDb, betterProbability } = compared(
      withPower(34.8, 0.3),
      withPower(40, 0.4),
    );
    expect(entries.map(({ id, db }) => ({ id, db }))).toEqual([{ id: "tx.power", db: { a: 34.8, b: 40 } }]);
    expect(causes.map(({ cause }) => cause)).toEqual(["power"]);
    expect(differenceDb).toBeCloseTo(5.2, 9);
    expect(differenceSigmaDb).toBeCloseTo(0.5, 9); // 3, 4, 5
    expect(betterProbability).toBeGreaterThan(0.9999);
  });

  it("is told apart at half a tenth of a dB, what a bench repeats to", () => {
    const change = (db: number) => compared(withPower(30, 0.7), withPower(30 + db, 0.7));
    expect(change(0.049)).toMatchObject({ distinguishable: false, differenceSigmaDb: 0 });
    expect(change(0.051).distinguishable).toBe(true);
    // 0.051 dB against errors of 0.7 dB in each is next to a toss: its normal probability is 0.5 + 0.4 x 0.0515.
    expect(change(0.051).betterProbability).toBeCloseTo(0.5206, 3);
  });

  it("is an entry that is surer in one, though its figure is the same", () => {
    const { entries, differenceSigmaDb } = compared(withPower(30, 0.3), withPower(30, 0.4));
    expect(entries.map(({ id, differenceDb }) => [id, differenceDb])).toEqual([["tx.power", 0]]);
    expect(differenceSigmaDb).toBeCloseTo(0.5, 9);
  });

  it("keeps entries that only one has, against nothing", () => {
    const rainy = scenarioOf({
      weather: { dry: weatherOf({ rainMmPerH: { value: 16 }, extentKm: 8, wets: [] }) },
    });
    const { entries, causes } = compared(plain, rainy);
    const rain = entries.find(({ id }) => id === "path.rain")!;
    expect(rain.db.a).toBeUndefined();
    expect(rain.label.a).toBeUndefined();
    // P.838-3, horizontal at 10.368 GHz: k 0.0132, alpha 1.244 give 0.416 dB/km at 16 mm/h; 8 km of it 3.3 dB.
    expect(rain.differenceDb).toBeCloseTo(-3.4, 0);
    expect(causes[0]!.cause).toBe("rain and fog");
  });

  it("stands in the order of the budget", () => {
    const other = scenarioOf({
      transmitter: { powerDbm: { value: 30 }, cover: "bare" },
      receiver: { noiseFigureDb: { value: 3 } },
      covers: { bare: coverOf(), film: coverOf({ layers: [layerOf(2, 3)] }) },
      path: { from: siteOf(), to: eastOnEquator(50) },
    });
    const stages = compared(plain, other).entries.map(({ stage }) => stage);
    const order = ["transmitter", "path", "receiver", "noise", "mode"];
    expect(stages).toEqual(stages.toSorted((a, b) => order.indexOf(a) - order.indexOf(b)));
    expect(new Set(stages)).toEqual(new Set(["transmitter", "path", "receiver", "noise"]));
  });
});

describe("what is compared", () => {
  const weathers = (...names: readonly string[]) =>
    Object.fromEntries(names.map((name) => [name, weatherOf()]));

  it("are the weathers of one name, in the order of A, those of one side told", () => {
    const a = prepare(scenarioOf({ weather: weathers("storm", "dry", "fog") }));
    const b = prepare(scenarioOf({ weather: weathers("dry", "hail", "storm") }));
    const common = commonWeathers(a, b);
    expect(common.map((pair) => pair.a)).toEqual(["storm", "dry"]);
    const { lonelyWeathers } = compare(a, b, { mode: { a: "cw", b: "cw" }, weathers: common });
    expect(lonelyWeathers).toEqual({ a: ["fog"], b: ["hail"] });
  });

  it("is the first mode of A that B asks for too, otherwise the first of each", () => {
    const inModes = (...modes: readonly string[]) => prepare(scenarioOf({ receiver: { modes } }));
    expect(commonMode(inModes("fm", "ssb"), inModes("cw", "ssb"))).toEqual({ a: "ssb", b: "ssb" });
    expect(commonMode(inModes("fm"), inModes("cw", "ssb"))).toEqual({ a: "fm", b: "cw" });
  });

  it("may be one scenario under two covers", () => {
    const link = prepare(scenarioOf());
    const chosen = { mode: { a: "cw", b: "cw" }, weathers: [{ a: "dry", b: "dry" }] };
    const { scenario, weathers: found } = compare(link, link, { ...chosen, cover: { a: "film", b: "bare" } });
    expect(scenario.b.cover).toEqual({ transmitter: "bare", receiver: "bare" });
    expect(new Set(found[0]!.causes.map(({ cause }) => cause))).toEqual(new Set(["covers", "noise"]));
  });

  it("warns once of what both share", () => {
    const far = scenarioOf({ path: { from: siteOf({ groundM: 0 }), to: eastOnEquator(60, { groundM: 0 }) } });
    const choice = { mode: { a: "cw", b: "cw" }, weathers: [{ a: "dry", b: "dry" }] };
    const sidesOf = (a: Scenario, b: Scenario) =>
      compare(prepare(a), prepare(b), choice).warnings.map(({ code, sides }) => [code, ...sides]);
    expect(sidesOf(far, far)).toEqual([["beyond_horizon", "a", "b"]]);
    expect(sidesOf(scenarioOf(), far)).toEqual([["beyond_horizon", "b"]]);
  });
});
