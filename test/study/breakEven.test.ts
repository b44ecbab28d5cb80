import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare, withWeather } from "../../src/budget/prepare.ts";
import type { Budget } from "../../src/budget/types.ts";
import type { Scenario, Weather } from "../../src/scenario/types.ts";
import { breakEven, rainiest } from "../../src/study/breakEven.ts";
import {
  caseOf,
  coverOf,
  eastOnEquator,
  layerOf,
  scenarioOf,
  siteOf,
  weatherOf,
} from "../budget/scenarios.ts";

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

/** Budget in the weather "wet" with another rain, on path and covers. */
function budgetAt(scenario: Scenario, rate: number): Budget {
  const weather = {
    ...scenario.weather["wet"]!,
    rainMmPerH: { value: rate },
    coversWetAsAtMmPerH: undefined,
    driedForMin: 0,
  };
  return evaluate(withWeather(prepare(scenario), "wet", weather), caseOf(scenario, "wet"));
}

const marginAt = (scenario: Scenario, rate: number) => budgetAt(scenario, rate).marginDb;

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
    expect(ratesOf(rainyPath(-margin - 1))).toMatchObject({ zeroMmPerH: 0, reserveMmPerH: 0, zeroBack: [] });
    const between = ratesOf(rainyPath(-margin + 2));
    expect(between.reserveMmPerH).toBe(0);
    expect(between.zeroMmPerH).toBeGreaterThan(0);
  });

  it("is undefined where no rain up to 400 mm/h uses the margin up", () => {
    const short = rainyPath(20, { extentKm: 0.05 });
    expect(marginAt(short, 400)).toBeGreaterThan(3);
    expect(ratesOf(short)).toMatchObject({ zeroMmPerH: undefined, reserveMmPerH: undefined, zeroBack: [] });
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

describe("break-even rain by one standard deviation", () => {
  it("is where the margin less and plus its deviation is used up", () => {
    const scenario = rainyPath(0);
    const { zeroMmPerH, zeroSpread, reserveSpread } = ratesOf(scenario);
    const left = (rate: number, sigmas: number) => {
      const { marginDb, marginSigmaDb } = budgetAt(scenario, rate);
      return marginDb + sigmas * marginSigmaDb;
    };
    for (const [rate, sigmas, leftDb] of [
      [zeroSpread.lowMmPerH!, -1, 0],
      [zeroSpread.highMmPerH!, 1, 0],
      [reserveSpread.lowMmPerH!, -1, 3],
      [reserveSpread.highMmPerH!, 1, 3],
    ] as const) {
      expect(left(rate - STEP, sigmas)).toBeGreaterThan(leftDb);
      expect(left(rate + STEP, sigmas)).toBeLessThan(leftDb);
    }
    expect(zeroSpread.lowMmPerH).toBeLessThan(zeroMmPerH!);
    expect(zeroSpread.highMmPerH).toBeGreaterThan(zeroMmPerH!);
  });

  it("ends `closes` where the verdict turns, no later than the reserve is reached", () => {
    const scenario = rainyPath(0);
    const { closesMmPerH, reserveMmPerH } = ratesOf(scenario);
    expect(budgetAt(scenario, closesMmPerH! - STEP).verdict).toBe("closes");
    expect(budgetAt(scenario, closesMmPerH! + STEP).verdict).toBe("thin");
    expect(closesMmPerH).toBeLessThanOrEqual(reserveMmPerH! + STEP);
  });
});

describe("break-even rain where rain scatter may carry the path", () => {
  /** Two hills 60 km apart and a wall between them, which rain over it sees from both sides. */
  const distancesKm = Array.from({ length: 61 }, (_, km) => km);
  const walled = (powerDbm: number) =>
    rainyPath(
      powerDbm,
      { extentKm: 5 },
      {
        path: {
          from: siteOf(),
          to: eastOnEquator(60),
          profile: {
            distancesKm,
            heightsM: distancesKm.map((km) => (km % 60 === 0 ? 500 : km === 20 || km === 40 ? 1300 : 0)),
          },
        },
      },
    );

  /** Margin with 0 dBm at every half millimetre an hour; a decibel of power is one of margin. */
  const rates = Array.from({ length: 801 }, (_, i) => i / 2);
  const unpowered = (() => {
    const scenario = walled(0);
    const link = prepare(scenario);
    return rates.map((rate) => {
      const weather = { ...scenario.weather["wet"]!, rainMmPerH: { value: rate } };
      return evaluate(withWeather(link, "wet", weather), caseOf(scenario, "wet")).marginDb;
    });
  })();
  const dryDb = unpowered[0]!;

  it.each([-4, -2, -0.2, 0.2, 1, 2.9, 3.1, 4, 6, 10, 20])(
    "finds every rate at which the margin turns, dry at %f dB",
    (marginDb) => {
      const powerDbm = marginDb - dryDb;
      const found = ratesOf(walled(powerDbm));
      for (const [first, back, leftDb] of [
        [found.zeroMmPerH, found.zeroBack, 0],
        [found.reserveMmPerH, found.reserveBack, 3],
      ] as const) {
        const open = unpowered.map((db) => db + powerDbm > leftDb);
        const expected = rates.filter((_, i) => i > 0 && open[i] !== open[i - 1]);
        const told = [
          ...(open[0] ? [first] : []),
          ...back.flatMap(({ fromMmPerH, toMmPerH }) => [fromMmPerH, toMmPerH]),
        ].filter((rate) => rate !== undefined);
        expect(told).toHaveLength(expected.length);
        for (const [i, rate] of told.entries()) {
          expect(rate).toBeGreaterThan(expected[i]! - 0.5 - STEP);
          expect(rate).toBeLessThan(expected[i]! + STEP);
        }
        if (!open[0]) expect(first).toBe(0);
      }
    },
  );

  it("says that the margin comes back, and by what", () => {
    const dips = ratesOf(walled(-dryDb + 0.2));
    expect(dips.zeroMmPerH).toBeGreaterThan(0);
    expect(dips.zeroBack).toHaveLength(1);
    expect(dips.zeroBack[0]!.fromMmPerH).toBeGreaterThan(dips.zeroMmPerH!);
    expect(dips.zeroBack[0]!.toMmPerH).toBeGreaterThan(dips.zeroBack[0]!.fromMmPerH);
    expect(dips.zeroBack[0]!.mechanism).toBe("rain_scatter");
    const helped = ratesOf(walled(-dryDb - 1));
    expect(helped.zeroMmPerH).toBe(0);
    expect(helped.zeroBack).toHaveLength(1);
    expect(ratesOf(walled(-dryDb - 40)).zeroBack).toEqual([]);
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
