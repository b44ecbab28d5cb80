import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { carrier, margins } from "../../src/budget/margins.ts";
import { prepare } from "../../src/budget/prepare.ts";
import { bothWays, type FarEnd, fromSite, towards, turned, withFarDish } from "../../src/budget/towards.ts";
import type { Case, Link } from "../../src/budget/types.ts";
import type { Scenario } from "../../src/scenario/types.ts";
import {
  anyCover,
  anyLayeredCover,
  anyScenario,
  anyWeather,
  budgetOf,
  coverOf,
  dishOf,
  eastOnEquator,
  entryOf,
  layerOf,
  scenarioOf,
  siteOf,
  weatherOf,
} from "./scenarios.ts";

const tenth = (min: number, max: number) =>
  fc.integer({ min: 10 * min, max: 10 * max }).map((part) => part / 10);
const maybe = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: undefined });

/** A hump of ground between two places some way apart. */
const anyGround = fc.array(fc.integer({ min: 0, max: 900 }), { minLength: 3, maxLength: 30 });

const anyFarEnd: fc.Arbitrary<{ far: Omit<FarEnd, "profile">; heightsM: readonly number[] | undefined }> =
  fc.record({
    far: fc.record({
      site: fc
        .tuple(tenth(-3, 3), tenth(-3, 3), fc.integer({ min: -300, max: 3000 }), tenth(0, 50), tenth(0, 9))
        .filter(([latitude, longitude]) => Math.hypot(latitude, longitude) > 0.05)
        .map(([latitude, longitude, groundM, heightM, positionErrorKm]) =>
          siteOf({ latitude, longitude, groundM, heightM, positionErrorKm }),
        ),
      powerDbm: maybe(tenth(0, 40).map((value) => ({ value, sigma: 0.3 }))),
      noiseFigureDb: maybe(tenth(1, 9).map((value) => ({ value }))),
    }),
    heightsM: maybe(anyGround),
  });

/** Scenarios whose covers may take their water from the rain on the path, over the feed or over the dish. */
const anyOriginal = fc
  .record({
    scenario: anyScenario,
    kharadly: anyLayeredCover.map((cover) => ({ ...cover, wetModel: "kharadly2001" as const })),
    schleiss: anyCover.map((cover) => ({ ...cover, wetModel: "schleiss2013" as const })),
    later: anyWeather,
    overDish: fc.constantFrom(undefined, "kharadly", "near"),
    foliageM: maybe(fc.record({ from: tenth(0, 30), to: tenth(0, 30) })),
  })
  .map(({ scenario, kharadly, schleiss, later, overDish, foliageM }) => ({
    ...scenario,
    covers: { ...scenario.covers, kharadly, schleiss },
    receiver: { ...scenario.receiver, dishCover: overDish },
    weather: { ...scenario.weather, later },
    path: { ...scenario.path, foliageM },
  }));

/** The scenario written anew with that station at its far end. */
function rewritten(scenario: Scenario, far: FarEnd): Scenario {
  return {
    ...scenario,
    path: { ...scenario.path, to: far.site, profile: far.profile },
    receiver: { ...scenario.receiver, noiseFigureDb: far.noiseFigureDb ?? scenario.receiver.noiseFigureDb },
  };
}

/** Every cover at either end in every weather. */
function everyCase({ scenario }: Link): Case[] {
  const { transmitter, receiver } = scenario;
  return Object.keys(scenario.weather).flatMap((weather) =>
    Object.keys(scenario.covers).map((cover) => ({
      weather,
      mode: receiver.modes[0]!,
      transmitter: { feed: transmitter.feed, cover },
      receiver: { feed: receiver.feed, cover },
    })),
  );
}

function withProfile(
  { far, heightsM }: { far: Omit<FarEnd, "profile">; heightsM: readonly number[] | undefined },
  scenario: Scenario,
): FarEnd {
  if (heightsM === undefined) return far;
  const { distanceKm } = prepare(rewritten(scenario, far)).path;
  const step = distanceKm / (heightsM.length - 1);
  return { ...far, profile: { distancesKm: heightsM.map((_, i) => i * step), heightsM } };
}

describe("another station at the far end", () => {
  it("gives on the way out every budget of the scenario rewritten with it, to the last digit", () => {
    fc.assert(
      fc.property(anyOriginal, anyFarEnd, (scenario, any) => {
        const far = withProfile(any, scenario);
        const anew = prepare(rewritten(scenario, far));
        const { out } = towards(bothWays(scenario), far);
        for (const one of everyCase(anew)) expect(evaluate(out, one)).toEqual(evaluate(anew, one));
      }),
      { numRuns: 60 },
    );
  });

  it("gives on the way back the margins of the scenario turned round, but for what rounding leaves", () => {
    fc.assert(
      fc.property(anyOriginal, anyFarEnd, (scenario, any) => {
        const far = withProfile(any, scenario);
        const reversed = turned(rewritten(scenario, far));
        const powerDbm = far.powerDbm ?? scenario.transmitter.powerDbm;
        const noiseFigureDb = scenario.receiver.noiseFigureDb;
        const anew = prepare({
          ...reversed,
          transmitter: { ...reversed.transmitter, powerDbm },
          receiver: { ...reversed.receiver, noiseFigureDb },
        });
        const { back } = towards(bothWays(scenario), far);
        for (const one of everyCase(anew)) {
          const [found, wanted] = [evaluate(back, one), evaluate(anew, one)];
          // Half-way over an even number of points lies another point from either end; troposcatter asks it for its ground.
          const decimals = far.profile && wanted.mechanisms[0]!.name === "troposcatter" ? -1 : 6;
          expect(found.marginDb).toBeCloseTo(wanted.marginDb, decimals);
          expect(found.marginSigmaDb).toBeCloseTo(wanted.marginSigmaDb, 6);
        }
      }),
      { numRuns: 60 },
    );
  });

  it.each([
    ["kharadly2001", "cover"],
    ["kharadly2001", "dishCover"],
    ["schleiss2013", "cover"],
    ["schleiss2013", "dishCover"],
  ] as const)("takes the water by %s on its %s from the rain of its own path", (wetModel, place) => {
    const odd = coverOf({ layers: [layerOf(0.5, 2.5, 0.01)], wetModel });
    const scenario = scenarioOf({
      covers: { bare: coverOf(), odd },
      transmitter: { cover: "bare" },
      receiver: { cover: "bare", [place]: "odd" },
      weather: { drizzle: weatherOf({ rainMmPerH: { value: 4 } }) },
      path: { from: siteOf(), to: eastOnEquator(5) },
    });
    const far = { site: eastOnEquator(70) };
    const before = budgetOf(scenario);
    const anew = budgetOf(rewritten(scenario, far));
    const { out } = towards(bothWays(scenario), far);
    expect(evaluate(out, before.case)).toEqual(anew);
    const water = place === "cover" ? "rx.water_loss" : "rx.dish_cover_water";
    expect(entryOf(anew, water).db).toBeLessThan(entryOf(before, water).db - 0.05);
  });

  it("may be worked from another site, and is then the scenario that starts there", () => {
    const scenario = scenarioOf();
    const far = { site: eastOnEquator(90, { groundM: 40 }) };
    const site = siteOf({ latitude: 0.4, groundM: 220, positionErrorKm: 0.3 });
    const anew = rewritten({ ...scenario, path: { ...scenario.path, from: site } }, far);
    const ways = towards(fromSite(bothWays(scenario), site), far);
    for (const one of everyCase(ways.out)) {
      expect(evaluate(ways.out, one)).toEqual(evaluate(prepare(anew), one));
      expect(evaluate(ways.back, one).marginDb).toBeCloseTo(evaluate(prepare(turned(anew)), one).marginDb, 9);
    }
  });

  it("may have another dish, and is then the scenario that has it", () => {
    const film = coverOf({ layers: [layerOf(0.5, 2.5, 0.01)] });
    const scenario = scenarioOf({
      covers: { bare: coverOf(), film },
      weather: { dry: weatherOf(), rain: weatherOf({ rainMmPerH: { value: 20 } }) },
    });
    const far = { site: eastOnEquator(150, { groundM: 40 }) };
    const dish = dishOf({ diameterM: 1.2, focalRatio: 0.6 });
    const ways = towards(withFarDish(bothWays(scenario), dish), far);
    const fitted = {
      ...rewritten(scenario, far),
      dish: { ...scenario.dish, big: dish },
      receiver: { ...scenario.receiver, dish: "big" },
    };
    const [anew, turnedRound] = [prepare(fitted), prepare(turned(fitted))];
    for (const one of everyCase(anew)) {
      const { case: _, ...found } = evaluate(ways.out, one);
      expect(found).toEqual({ ...evaluate(anew, one), case: undefined });
      expect(evaluate(ways.back, one).marginDb).toBeCloseTo(evaluate(turnedRound, one).marginDb, 9);
    }
  });
});

describe("the way back", () => {
  it("of two alike stations is the way out", () => {
    const ways = bothWays(scenarioOf());
    const chosen = everyCase(ways.out)[0]!;
    expect(evaluate(ways.back, chosen).marginDb).toBeCloseTo(evaluate(ways.out, chosen).marginDb, 9);
  });

  it("wets the cover of the station that the weather wets", () => {
    const scenario = scenarioOf({
      weather: { near: weatherOf({ rainMmPerH: { value: 30 }, wets: ["transmitter"] }) },
    });
    const { transmitter, receiver } = scenario;
    const { ends } = bothWays(scenario).back;
    const waterOn = (end: "transmitter" | "receiver", feed: string) =>
      ends[end][feed]!.mouth["film"]!["near"]!.waterCostDb.nominal;
    expect(waterOn("receiver", transmitter.feed)).toBeGreaterThan(0.1);
    expect(waterOn("transmitter", receiver.feed)).toBe(0);
  });

  it("starts from the power that the far station states", () => {
    const { back } = towards(bothWays(scenarioOf()), {
      site: eastOnEquator(80),
      powerDbm: { value: 20, sigma: 0.2 },
    });
    expect(entryOf(evaluate(back, everyCase(back)[0]!), "tx.power")).toMatchObject({ db: 20, sigma: 0.2 });
  });

  it("turns round twice to the scenario itself", () => {
    fc.assert(
      fc.property(anyOriginal, (scenario) => {
        expect(turned(turned(scenario))).toEqual(scenario);
      }),
    );
  });
});

describe("margins of many modes", () => {
  it("are those of the whole budgets", () => {
    fc.assert(
      fc.property(anyOriginal, anyFarEnd, (scenario, any) => {
        const modes = ["wfm", "cw", "ssb", "fm"];
        const { out } = towards(bothWays(scenario), withProfile(any, scenario));
        for (const { mode: _, ...chosen } of everyCase(out)) {
          const found = margins(out, chosen, modes, carrier(out, chosen));
          for (const [i, mode] of modes.entries()) {
            const { marginDb, marginSigmaDb, verdict } = evaluate(out, { ...chosen, mode });
            expect(found[i]!.marginDb).toBeCloseTo(marginDb, 9);
            expect(found[i]!.marginSigmaDb).toBeCloseTo(marginSigmaDb, 9);
            if (Math.abs(marginDb) > 1e-6) expect(found[i]!.verdict).toBe(verdict);
          }
        }
      }),
      { numRuns: 60 },
    );
  });

  it("are told by the way that carries the path", () => {
    const scenario = scenarioOf({
      path: { from: siteOf({ groundM: 10 }), to: eastOnEquator(200, { groundM: 10 }) },
    });
    const { out } = bothWays(scenario);
    const { mode: _, ...chosen } = everyCase(out)[0]!;
    expect(carrier(out, chosen).name).toBe(budgetOf(scenario).mechanisms[0]!.name);
  });
});
