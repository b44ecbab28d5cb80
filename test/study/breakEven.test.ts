import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare, withWeather } from "../../src/budget/prepare.ts";
import type { Scenario, Weather } from "../../src/scenario/types.ts";
import { breakEven, rainiest } from "../../src/study/breakEven.ts";
import { caseOf, coverOf, layerOf, scenarioOf, weatherOf } from "../budget/scenarios.ts";

/** A path that rain of an extent can use up. */
function rainyPath(
  powerDbm: number,
  weather: Partial<Weather> = {},
  change: Partial<Scenario> = {},
): Scenario {
  return scenarioOf({
    transmitter: { powerDbm: { value: powerDbm } },
    weather: {
      dry: weatherOf(),
      wet: weatherOf({ rainMmPerH: { value: 16 }, extentKm: 20, ...weather }),
    },
    ...change,
  });
}

/** Margin in the weather "wet" with another rain, on path and covers. */
function marginAt(scenario: Scenario, rate: number): number {
  const weather = {
    ...scenario.weather["wet"]!,
    rainMmPerH: { value: rate },
    coversWetAsAtMmPerH: undefined,
    driedForMin: 0,
  };
  return evaluate(withWeather(prepare(scenario), "wet", weather), caseOf(scenario, "wet")).marginDb;
}

const ratesOf = (scenario: Scenario) => breakEven(prepare(scenario), caseOf(scenario, "wet"));

/** How far the rate may lie from the one sought [mm/h]. */
const STEP = 0.05;

describe("break-even rain", () => {
  it.each([
    ["plenty of power", 10, {}],
    ["little of it", -10, {}],
    ["one wet end", 0, { wets: ["receiver"] as const }],
    ["wind", 0, { windMPerS: 12, temperatureC: 3 }],
  ])("leaves 0 and the reserve at the rates found: %s", (_, powerDbm, weather) => {
    const scenario = rainyPath(powerDbm, weather);
    const { zeroMmPerH, reserveMmPerH } = ratesOf(scenario);
    for (const [rate, leftDb] of [
      [zeroMmPerH!, 0],
      [reserveMmPerH!, 3],
    ] as const) {
      expect(rate).toBeGreaterThan(STEP);
      expect(marginAt(scenario, rate - STEP)).toBeGreaterThan(leftDb);
      expect(marginAt(scenario, rate + STEP)).toBeLessThan(leftDb);
    }
    expect(reserveMmPerH).toBeLessThan(zeroMmPerH!);
  });

  it("is 0 where the dry path has no more than that", () => {
    const margin = marginAt(rainyPath(0), 0);
    expect(ratesOf(rainyPath(-margin - 1))).toEqual({ zeroMmPerH: 0, reserveMmPerH: 0 });
    const between = ratesOf(rainyPath(-margin + 2));
    expect(between.reserveMmPerH).toBe(0);
    expect(between.zeroMmPerH).toBeGreaterThan(0);
  });

  it("is undefined where no rain up to 400 mm/h uses the margin up", () => {
    const short = rainyPath(20, { extentKm: 0.05 });
    expect(marginAt(short, 400)).toBeGreaterThan(3);
    expect(ratesOf(short)).toEqual({ zeroMmPerH: undefined, reserveMmPerH: undefined });
  });

  it("comes earlier under a cover that water lies upon, and later where it does not wet", () => {
    const under = (cover: string, weather: Partial<Weather> = {}) => {
      const scenario = rainyPath(5, weather, {
        covers: { bare: coverOf(), film: coverOf({ layers: [layerOf(0.127, 2.05)] }) },
      });
      const chosen = { feed: "stub", cover };
      const { weather: asked, mode } = caseOf(scenario, "wet");
      return breakEven(prepare(scenario), { weather: asked, mode, transmitter: chosen, receiver: chosen })
        .zeroMmPerH!;
    };
    expect(under("film")).toBeLessThan(under("bare") - 1);
    expect(under("film", { wets: [] })).toBeGreaterThan(under("film") + 1);
    expect(under("film", { wets: [] })).toBeCloseTo(under("bare"), 0);
  });

  it("wets the covers by its own rate, whatever wetted them in the weather it starts from", () => {
    const plain = ratesOf(rainyPath(5));
    expect(ratesOf(rainyPath(5, { coversWetAsAtMmPerH: 90, driedForMin: 20 }))).toEqual(plain);
  });

  it("keeps what else lies on the covers", () => {
    expect(ratesOf(rainyPath(5, { iceMm: 3, temperatureC: 0 })).zeroMmPerH).toBeLessThan(
      ratesOf(rainyPath(5, { temperatureC: 0 })).zeroMmPerH!,
    );
  });
});

describe("the rainiest weather", () => {
  const link = prepare(
    scenarioOf({
      weather: {
        fair: weatherOf(),
        drizzle: weatherOf({ rainMmPerH: { value: 1 } }),
        storm: weatherOf({ rainMmPerH: { value: 40 } }),
        grey: weatherOf({ coversWetAsAtMmPerH: 90 }),
      },
    }),
  );

  it("is the one of most rain on the path, among those asked", () => {
    expect(rainiest(link, ["fair", "drizzle", "storm", "grey"])).toBe("storm");
    expect(rainiest(link, ["fair", "drizzle"])).toBe("drizzle");
    expect(rainiest(link, ["grey", "fair"])).toBe("grey");
  });
});
