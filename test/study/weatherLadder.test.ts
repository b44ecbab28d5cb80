import { readFileSync } from "node:fs";
import { join } from "node:path";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import type { Budget } from "../../src/budget/types.ts";
import { powerToDb } from "../../src/numeric/decibels.ts";
import { loadScenario } from "../../src/scenario/load.ts";
import type { Scenario, Weather } from "../../src/scenario/types.ts";
import { type RainOn, rainOns } from "../../src/study/rainOn.ts";
import {
  type CoverLadder,
  type LadderChoices,
  type ModeLadder,
  weatherLadder,
} from "../../src/study/weatherLadder.ts";
import {
  budgetOf,
  caseOf,
  coverOf,
  dishOf,
  eastOnEquator,
  layerOf,
  scenarioOf,
  siteOf,
  weatherOf,
} from "../budget/scenarios.ts";

const film = coverOf({ layers: [layerOf(0.127, 2.05, 0.0007)] });

/** Sixty kilometres in clear sight, a film on both feeds. */
function scenarioIn(weather: Partial<Weather>, change: Parameters<typeof scenarioOf>[0] = {}): Scenario {
  return scenarioOf({
    transmitter: { powerDbm: { value: 5 } },
    covers: { bare: coverOf(), film },
    weather: { dry: weatherOf(), wet: weatherOf({ rainMmPerH: { value: 16 }, extentKm: 20, ...weather }) },
    ...change,
  });
}

const laddersOf = (scenario: Scenario, choices: LadderChoices = {}) =>
  weatherLadder(prepare(scenario), { extentsKm: [], ...choices });
const firstOf = (scenario: Scenario, choices: LadderChoices = {}): ModeLadder =>
  laddersOf(scenario, choices).modes[0]!;
const under = ({ covers }: ModeLadder, name: string): CoverLadder =>
  covers.find(({ transmitter, receiver }) => transmitter.cover === name && receiver.cover === name)!;
const rungAt = (ladder: CoverLadder, on: RainOn, rate: number) =>
  ladder.rungs[on].find(({ rateMmPerH }) => rateMmPerH === rate)!;

/** Budget of the scenario's own covers in a weather of its own. */
function budgetWith(scenario: Scenario, weather: Weather): Budget {
  return budgetOf({ ...scenario, weather: { now: weather } }, "now");
}

describe("doubts of a ladder", () => {
  const idle = (scenario: Scenario) =>
    laddersOf(scenario)
      .warnings.filter(({ code }) => code === "idle_input")
      .map(({ where }) => where);

  it("name nothing that only the ladder made idle: its rungs without rain have an extent as well", () => {
    expect(idle(scenarioIn({}))).toEqual([]);
    expect(idle(scenarioIn({ wets: [] }))).toEqual([]);
    expect(idle(scenarioIn({ driedForMin: 20, coversWetAsAtMmPerH: 5 }))).toEqual([]);
  });

  it("still name what the scenario states without effect", () => {
    expect(idle(scenarioIn({ fogExtentKm: 4 }))).toEqual(["weather.wet.fog_extent"]);
  });
});

describe("a rung", () => {
  const scenario = scenarioIn({ windMPerS: 7, temperatureC: 6 });
  const own = firstOf(scenario).covers[0]!;
  const kept = { windMPerS: 7, temperatureC: 6, extentKm: 20 };

  it.each([2.5, 16, 50])("at %f mm/h is the budget of a weather written out", (rate) => {
    const written: Readonly<Record<RainOn, Weather>> = {
      path: weatherOf({ ...kept, rainMmPerH: { value: rate }, wets: [] }),
      covers: weatherOf({ ...kept, coversWetAsAtMmPerH: rate }),
      both: weatherOf({ ...kept, rainMmPerH: { value: rate } }),
    };
    for (const on of rainOns) {
      const { marginDb, marginSigmaDb, verdict } = budgetWith(scenario, written[on]);
      const rung = rungAt(own, on, rate);
      expect(rung.marginDb).toBeCloseTo(marginDb, 9);
      expect(rung.marginSigmaDb).toBeCloseTo(marginSigmaDb, 9);
      expect(rung.verdict).toBe(verdict);
    }
  });

  it("without rain is the dry weather, whatever the rain falls on", () => {
    const dry = budgetWith(scenario, weatherOf(kept));
    for (const on of rainOns) expect(rungAt(own, on, 0).marginDb).toBeCloseTo(dry.marginDb, 9);
  });

  // The signal loses the sum; only the noise of the warm rain and that of the wet cover mix.
  it("on both takes what path and covers take apart, but for the noise that they share", () => {
    for (const rate of [2.5, 16, 50, 150]) {
      const [dry, path, covers, both] = [
        weatherOf(kept),
        weatherOf({ ...kept, rainMmPerH: { value: rate }, wets: [] }),
        weatherOf({ ...kept, coversWetAsAtMmPerH: rate }),
        weatherOf({ ...kept, rainMmPerH: { value: rate } }),
      ].map((weather) => budgetWith(scenario, weather)) as [Budget, Budget, Budget, Budget];
      const shared = powerToDb(
        (covers.systemTemperatureK * path.systemTemperatureK) /
          (both.systemTemperatureK * dry.systemTemperatureK),
      );
      const took = (on: RainOn) => rungAt(own, on, 0).marginDb - rungAt(own, on, rate).marginDb;
      expect(took("path") + took("covers") - took("both")).toBeCloseTo(shared, 9);
      // Cover and rain warm the same antenna: together no more than each by itself, and by less than 2 dB less here.
      expect(shared).toBeGreaterThan(0);
      expect(shared).toBeLessThan(2);
      expect(took("both")).toBeGreaterThan(Math.max(took("path"), took("covers")));
    }
  });

  it("never gains by harder rain on a path in clear sight under a cover that water only spoils", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 60 }),
        fc.integer({ min: 0, max: 15 }),
        fc.array(fc.integer({ min: 1, max: 400 }), { minLength: 2, maxLength: 6 }),
        (extentKm, windMPerS, ratesMmPerH) => {
          const { covers } = firstOf(scenarioIn({ extentKm, windMPerS }), { ratesMmPerH, extentsKm: [] });
          for (const { rungs } of covers) {
            for (const on of rainOns) {
              const margins = rungs[on].map(({ marginDb }) => marginDb);
              for (const [i, marginDb] of margins.entries()) {
                if (i > 0) expect(marginDb).toBeLessThanOrEqual(margins[i - 1]! + 1e-9);
              }
            }
          }
        },
      ),
      { numRuns: 12 },
    );
  });
});

describe("what the rain leaves alone", () => {
  const flat = ({ rungs }: CoverLadder, on: RainOn) =>
    expect(new Set(rungs[on].map(({ marginDb }) => marginDb.toFixed(9))).size).toBe(1);

  it("is a bare mouth, and covers that no rain wets", () => {
    const open = firstOf(scenarioIn({}));
    flat(under(open, "bare"), "covers");
    expect(rungAt(under(open, "bare"), "both", 50)).toEqual(rungAt(under(open, "bare"), "path", 50));
    const kept = firstOf(scenarioIn({ wets: [] }));
    flat(under(kept, "film"), "covers");
    expect(rungAt(under(kept, "film"), "both", 50)).toEqual(rungAt(under(kept, "film"), "path", 50));
  });

  it("is the cover of the end that stays dry", () => {
    const took = (wets: Weather["wets"]) => {
      const ladder = under(firstOf(scenarioIn({ wets })), "film");
      return rungAt(ladder, "covers", 0).marginDb - rungAt(ladder, "covers", 50).marginDb;
    };
    expect(took(["transmitter"])).toBeGreaterThan(0.2);
    expect(took(["receiver"])).toBeGreaterThan(took(["transmitter"])); // noise besides
    expect(took(["transmitter", "receiver"])).toBeCloseTo(took(["transmitter"]) + took(["receiver"]), 6);
  });

  it("is the feed behind a cover over the dish, which is itself wetted, bare feed or not", () => {
    const scenario = scenarioIn({}, { receiver: { dishCover: "shell" } });
    const shelled = { ...scenario, covers: { ...scenario.covers, shell: film } };
    const written = weatherOf({ extentKm: 20, coversWetAsAtMmPerH: 50 });
    const bare = under(firstOf(shelled), "bare");
    const asBare = {
      ...shelled,
      transmitter: { ...shelled.transmitter, cover: "bare" },
      receiver: { ...shelled.receiver, cover: "bare" },
    };
    expect(rungAt(bare, "covers", 50).marginDb).toBeCloseTo(budgetWith(asBare, written).marginDb, 9);
    expect(rungAt(bare, "covers", 50).marginDb).toBeLessThan(rungAt(bare, "covers", 0).marginDb - 0.2);
  });

  it("is ice, snow, dew and fog, on every rung", () => {
    const snow = { depthMm: 10, dryDensityGcm3: 0.3, wetnessPercent: 5 };
    for (const lies of [
      { iceMm: 2, temperatureC: -3 },
      { snow, temperatureC: 0 },
      { dewMm: { value: 0.1 } },
      { fogGPerM3: 0.3 },
    ]) {
      const scenario = scenarioIn(lies);
      const own = under(firstOf(scenario), "film");
      const dry = budgetWith(scenario, weatherOf({ extentKm: 20, ...lies }));
      expect(dry.marginDb).toBeLessThan(budgetWith(scenario, weatherOf()).marginDb - 0.05);
      for (const on of rainOns) expect(rungAt(own, on, 0).marginDb).toBeCloseTo(dry.marginDb, 9);
      const rained = budgetWith(scenario, weatherOf({ extentKm: 20, ...lies, rainMmPerH: { value: 16 } }));
      expect(rungAt(own, "both", 16).marginDb).toBeCloseTo(rained.marginDb, 9);
    }
  });

  it("is nothing of an older rain: its water and its drying give way to the rung's", () => {
    const plain = firstOf(scenarioIn({}));
    expect(firstOf(scenarioIn({ coversWetAsAtMmPerH: 90, driedForMin: 20 }))).toEqual(plain);
    expect(firstOf(scenarioIn({ rainMmPerH: { value: 16, sigma: 8 } }))).toEqual(plain);
  });
});

describe("covers, weather and modes", () => {
  it("are the scenario's pair first, then each cover on both ends, none twice", () => {
    const names = (scenario: Scenario) =>
      firstOf(scenario).covers.map(({ transmitter, receiver }) => `${transmitter.cover} ${receiver.cover}`);
    expect(names(scenarioIn({}))).toEqual(["film film", "bare bare"]);
    const mixed = scenarioIn({}, { receiver: { cover: "bare" } });
    expect(names(mixed)).toEqual(["film bare", "bare bare", "film film"]);
  });

  it("are the rainiest weather where none is named, the first where all are dry", () => {
    expect(laddersOf(scenarioIn({})).weather).toBe("wet");
    expect(laddersOf(scenarioIn({ rainMmPerH: { value: 0 } })).weather).toBe("dry");
    expect(laddersOf(scenarioIn({}), { weather: "dry" }).weather).toBe("dry");
    expect(() => laddersOf(scenarioIn({}), { weather: "hail" })).toThrow(RangeError);
  });

  it("are told mode by mode, the costs alike", () => {
    const { modes } = laddersOf(scenarioIn({}), { modes: ["ssb", "cw"] });
    expect(modes.map(({ mode }) => mode)).toEqual(["ssb", "cw"]);
    const took = ({ covers }: ModeLadder) =>
      rungAt(covers[0]!, "both", 0).marginDb - rungAt(covers[0]!, "both", 50).marginDb;
    expect(took(modes[0]!)).toBeCloseTo(took(modes[1]!), 9);
    expect(under(modes[1]!, "film").breakEven.both.zeroMmPerH).toBeGreaterThan(
      under(modes[0]!, "film").breakEven.both.zeroMmPerH!,
    );
  });

  it("have the rungs asked for, rising, once each and no rain below them", () => {
    const rates = (choices: LadderChoices) =>
      laddersOf(scenarioIn({ rainMmPerH: { value: 33 } }), choices).rates.map(({ rateMmPerH }) => rateMmPerH);
    expect(rates({ ratesMmPerH: [20, 5, 20, 0] })).toEqual([0, 5, 20]);
    expect(rates({})).toContain(33);
    expect(rates({})).toEqual(rates({}).toSorted((a, b) => a - b));
  });
});

describe("words", () => {
  it("stand beside every rung with their authority, and none where no rain falls", () => {
    const { rates } = laddersOf(scenarioIn({}), { ratesMmPerH: [5, 60] });
    const said = rates.map(({ words }) => words.map(({ authority, word }) => `${authority} ${word}`));
    // AMS Glossary: heavy above 7.6 mm/h; newspaper wording of 1998: heavy above 4; WMO-No. 8 (from memory): 10 and 50
    expect(said).toEqual([
      [],
      ["AMS moderate", "UK, rain heavy", "UK, showers moderate", "WMO moderate"],
      ["AMS heavy", "UK, rain heavy", "UK, showers violent", "WMO violent"],
    ]);
  });
});

describe("extents", () => {
  const scenario = scenarioIn({});
  const { columns } = firstOf(scenario, { extentsKm: [50, 5, 20, 70, 60.5] }).extents;

  it("are those below the length of the path, the whole path and P.530's", () => {
    expect(columns.map(({ kind, extentKm }) => [kind, extentKm && Math.round(extentKm)])).toEqual([
      ["stated", 5],
      ["stated", 20],
      ["stated", 50],
      ["whole", 60],
      ["effective", undefined],
    ]);
    expect(columns.map(({ isOwn }) => isOwn)).toEqual([false, true, false, false, false]);
    expect(firstOf(scenario, { extentsKm: [5, 70, 60.5] }).extents.beyondKm).toEqual([60.5, 70]);
  });

  it("give the margins of weathers that state them, the whole path that of its own length", () => {
    const { distanceKm } = prepare(scenario).path;
    for (const [i, extentKm] of [5, 20, 50, distanceKm, undefined].entries()) {
      const written = weatherOf({ rainMmPerH: { value: 16 }, extentKm });
      const rung = columns[i]!.rungs.find(({ rateMmPerH }) => rateMmPerH === 16)!;
      expect(rung.marginDb).toBeCloseTo(budgetWith(scenario, written).marginDb, 9);
    }
  });

  it("leave less the longer they are, and are used up earlier", () => {
    const stated = columns.slice(0, 4);
    const at = (rate: number) =>
      stated.map(({ rungs }) => rungs.find(({ rateMmPerH }) => rateMmPerH === rate)!.marginDb);
    for (const rate of [2.5, 16, 50]) expect(at(rate)).toEqual(at(rate).toSorted((a, b) => b - a));
    const even = stated.map(({ breakEven }) => breakEven.zeroMmPerH!);
    expect(even).toEqual(even.toSorted((a, b) => b - a));
    expect(even[3]).toBeLessThan(even[0]! / 2);
  });

  it("mark the column of the weather itself, the whole path where it reaches past that", () => {
    const long = laddersOf(scenarioIn({ extentKm: 100 }));
    const own = long.modes[0]!.extents.columns.filter(({ isOwn }) => isOwn);
    expect(own.map(({ kind }) => kind)).toEqual(["whole"]);
    const effective = laddersOf(scenarioIn({ extentKm: undefined })).modes[0]!.extents.columns;
    expect(effective.filter(({ isOwn }) => isOwn).map(({ kind }) => kind)).toEqual(["effective"]);
  });

  it("are for the cover asked for, else for the scenario's own", () => {
    const of = (cover?: string) => firstOf(scenario, { cover, extentsKm: [20] });
    for (const [cover, name] of [
      ["bare", "bare"],
      [undefined, "film"],
    ] as const) {
      const ladder = of(cover);
      expect(ladder.extents.receiver.cover).toBe(name);
      expect(ladder.extents.columns[0]!.rungs).toEqual(under(ladder, name).rungs.both);
      expect(ladder.extents.columns[0]!.breakEven).toEqual(under(ladder, name).breakEven.both);
    }
  });
});

describe("a path that rain may carry", () => {
  const distancesKm = Array.from({ length: 61 }, (_, km) => km);
  const walls = distancesKm.map((km) => (km % 60 === 0 ? 500 : km === 20 || km === 40 ? 1300 : 0));
  const scenario = scenarioIn(
    { extentKm: 5 },
    { path: { from: siteOf(), to: eastOnEquator(60), profile: { distancesKm, heightsM: walls } } },
  );

  it("shows which way carries it, and that the margin rises with the rain", () => {
    const { rungs } = under(firstOf(scenario), "bare");
    expect(rungs.both[0]!.mechanism).not.toBe("rain_scatter");
    const [light, heavy] = [5, 16].map((rate) => rungs.both.find(({ rateMmPerH }) => rateMmPerH === rate)!);
    expect(heavy!.mechanism).toBe("rain_scatter");
    expect(heavy!.marginDb).toBeGreaterThan(light!.marginDb);
    // Water on the covers scatters nothing.
    for (const { mechanism } of rungs.covers) expect(mechanism).toBe(rungs.both[0]!.mechanism);
  });

  it("draws its curve past the last rate at which the margin turns", () => {
    const { covers, curveMmPerH } = firstOf(scenario);
    const turns = covers.flatMap(({ breakEven: { both } }) => [
      both.zeroMmPerH ?? 0,
      ...both.zeroBack.map(({ toMmPerH }) => toMmPerH ?? 0),
    ]);
    expect(curveMmPerH[0]).toBe(0);
    expect(curveMmPerH.at(-1)).toBeGreaterThan(Math.max(...turns));
    for (const { curveDb, rungs } of covers) {
      expect(curveDb).toHaveLength(curveMmPerH.length);
      expect(curveDb[0]).toBe(rungs.both[0]!.marginDb);
    }
  });
});

describe("doubts", () => {
  it("are told once, whatever the figures in them and however many rungs raise them", () => {
    const level = scenarioIn(
      {},
      {
        feeds: { stub: { returnLossDb: 14, edgeTaperDb: 10, apertureMm: 60, facingDeg: 88 } },
        dish: { tripod: dishOf() },
        covers: { bare: coverOf(), film: coverOf({ ...film, surface: "beading" }) },
      },
    );
    const { warnings } = laddersOf(level);
    const codes = warnings.map(({ code, where }) => `${code} ${where}`);
    expect(codes.length).toBeGreaterThan(1);
    expect(new Set(codes).size).toBe(codes.length);
    expect(codes).toContain("bare_in_rain covers.bare");
    expect(codes.some((code) => code.startsWith("wet_model_range"))).toBe(true);
  });
});

describe("break-even rates by a scenario file", () => {
  const text = readFileSync(join(import.meta.dirname, "../../scenarios/hilltop-contest.yaml"), "utf8");
  const read = async (written: string): Promise<Scenario> => {
    const { scenario } = await loadScenario(written);
    if (scenario === undefined) throw new Error("the rewritten file is not sound");
    return scenario;
  };
  const storm = "thunderstorm: { rain: 50 mm/h, extent: 10 km, wind: 8 m/s }";

  it("leave nothing, and the reserve, when the file asks for that rain", async () => {
    expect(text).toContain(storm);
    const own = firstOf(await read(text), { weather: "thunderstorm" }).covers[0]!;
    const marginIn = async (weather: string) => {
      const scenario = await read(text.replace(storm, `thunderstorm: ${weather}`));
      return evaluate(prepare(scenario), caseOf(scenario, "thunderstorm")).marginDb;
    };
    const { path, both } = own.breakEven;
    const common = "extent: 10 km, wind: 8 m/s";
    // The slope there is some 0.5 dB for 1 mm/h, and rates are told to a hundredth of that.
    expect(await marginIn(`{ rain: ${both.zeroMmPerH} mm/h, ${common} }`)).toBeCloseTo(0, 2);
    expect(await marginIn(`{ rain: ${both.reserveMmPerH} mm/h, ${common} }`)).toBeCloseTo(3, 2);
    expect(await marginIn(`{ rain: ${path.zeroMmPerH} mm/h, ${common}, wets: [] }`)).toBeCloseTo(0, 2);
    expect(own.breakEven.covers.zeroMmPerH).toBeUndefined();
    expect(await marginIn(`{ covers_wet_as_at: 400 mm/h, ${common} }`)).toBeGreaterThan(3);
  });
});
