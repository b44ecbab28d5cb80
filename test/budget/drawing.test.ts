import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type Drawing, drawingOf } from "../../src/budget/drawing.ts";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import type { Case } from "../../src/budget/types.ts";
import { exactly } from "../../src/cover/bounded.ts";
import { normalQuantile } from "../../src/numeric/normal.ts";
import type { Scenario, Weather } from "../../src/scenario/types.ts";
import { anyScenario, caseOf, coverOf, dishOf, feedOf, layerOf, scenarioOf, weatherOf } from "./scenarios.ts";

/** Two draws: all still, and all still but the one cause, which lies at `probability`. */
function marginsAt(scenario: Scenario, chosen: readonly Case[], id: string, probability: number) {
  const drawing = drawingOf(prepare(scenario), chosen, 2);
  const at = drawing.causes.findIndex((cause) => cause.id === id);
  if (at < 0) throw new Error(`no cause ${id} among ${drawing.causes.map((cause) => cause.id).join(" ")}`);
  drawing.uniforms[at]![1] = probability;
  drawing.work();
  return drawing.margins.map((some) => ({ still: some[0]!, moved: some[1]! }));
}

/** What a drawn cause moves the margin by, against what the engine says of a scenario with that input changed. */
function expectMoves(
  before: Scenario,
  after: Scenario,
  id: string,
  probability: number,
  toleranceDb = 1e-9,
  chosen = caseOf(before, Object.keys(before.weather)[0]!),
) {
  const [{ still, moved }] = marginsAt(before, [chosen], id, probability) as [
    { still: number; moved: number },
  ];
  const [from, to] = [before, after].map((one) => evaluate(prepare(one), chosen).marginDb) as [
    number,
    number,
  ];
  expect(Math.abs(to - from)).toBeGreaterThan(1e-4); // the change must show at all
  expect(Math.abs(moved - still - (to - from))).toBeLessThan(toleranceDb);
}

const P = 0.9;
const Z = normalQuantile(P);
const bare = { transmitter: { cover: "bare" }, receiver: { cover: "bare" } };
const plain = scenarioOf(bare);

describe("with every cause still", () => {
  it("a draw is the budget, but for what a phase straight across adds", () => {
    fc.assert(
      fc.property(anyScenario, (scenario) => {
        const link = prepare(scenario);
        const chosen = caseOf(scenario, Object.keys(scenario.weather)[0]!);
        const drawing = drawingOf(link, [chosen], 1);
        drawing.work();
        const phases = (["transmitter", "receiver"] as const).map((end) => {
          const mouth = link.ends[end][chosen[end].feed]!.mouth[chosen[end].cover]![chosen.weather]!;
          return 10 * Math.log10(1 + mouth.parts.beat ** 2);
        });
        const off = evaluate(link, chosen).marginDb - drawing.margins[0]![0]!;
        expect(off).toBeGreaterThan(-1e-6);
        // What the receiver's mouth throws back comes in as warmth beside: up to 290 K over a system of some 70 K.
        expect(off).toBeLessThan(5 * (phases[0]! + phases[1]!) + 1e-6);
      }),
      { numRuns: 60 },
    );
  });
});

describe("one cause moved is the engine with that input changed", () => {
  it("power", () => {
    const { transmitter } = plain;
    const stated = { ...transmitter, powerDbm: { value: 34.8, sigma: 1.3 } };
    const more = { ...transmitter, powerDbm: { value: 34.8 + 1.3 * Z } };
    expectMoves({ ...plain, transmitter: stated }, { ...plain, transmitter: more }, "tx.power", P);
  });

  it("the receiver's line, by its loss and by its noise", () => {
    const { receiver } = plain;
    expectMoves(
      { ...plain, receiver: { ...receiver, lineLossDb: { value: 1, sigma: 0.2 } } },
      { ...plain, receiver: { ...receiver, lineLossDb: { value: 1 + 0.2 * Z } } },
      "rx.line",
      P,
      1e-7,
    );
  });

  it("noise figure", () => {
    const { receiver } = plain;
    expectMoves(
      { ...plain, receiver: { ...receiver, noiseFigureDb: { value: 1.1, sigma: 0.4 } } },
      { ...plain, receiver: { ...receiver, noiseFigureDb: { value: 1.1 + 0.4 * Z } } },
      "noise.receiver",
      P,
    );
  });

  it("what the antenna sees, in rain too", () => {
    const scenario = { ...plain, weather: { now: weatherOf({ rainMmPerH: { value: 20, sigma: 0 } }) } };
    const sky = (value: number, sigma?: number) => ({
      ...scenario,
      receiver: { ...scenario.receiver, antennaTemperatureK: { value, sigma } },
    });
    expectMoves(sky(150, 30), sky(150 + 30 * Z), "noise.antenna", P);
  });

  it("return loss of the feeds", () => {
    for (const [id, end] of [
      ["tx.return_loss", "transmitter"],
      ["rx.return_loss", "receiver"],
    ] as const) {
      const feed = (returnLossDb: number, sigma?: number) => ({
        ...plain,
        feeds: {
          stub: feedOf(),
          own: feedOf({ returnLossDb, returnLossSpread: { value: returnLossDb, sigma } }),
        },
        [end]: { ...plain[end], feed: "own" },
      });
      expectMoves(feed(10, 1.5), feed(10 + 1.5 * Z), id, P, 1e-7);
    }
  });

  it("return loss of a feed whose phase to its cover is known, in and out of tune", () => {
    for (const phaseDeg of [0, 70, 180, 250]) {
      const feed = (returnLossDb: number, sigma?: number) => ({
        ...plain,
        covers: { bare: coverOf(), plate: coverOf({ layers: [layerOf(3, 3, 0.01)] }) },
        feeds: {
          stub: feedOf(),
          own: feedOf({ returnLossDb, phaseDeg, returnLossSpread: { value: returnLossDb, sigma } }),
        },
        receiver: { ...plain.receiver, feed: "own", cover: "plate" },
      });
      expectMoves(feed(10, 1.5), feed(10 + 1.5 * Z), "rx.return_loss", P, 1e-7);
    }
  });

  it("rain rate: path rain, wet covers and sky together, the models asked at other rates", () => {
    const film = {
      bare: coverOf(),
      film: coverOf({ layers: [layerOf(0.5, 2.5, 0.002)], surface: "wetting" }),
    };
    const raining = (value: number, sigma?: number) =>
      scenarioOf({
        covers: film,
        weather: { now: weatherOf({ rainMmPerH: { value, sigma } }) },
      });
    for (const p of [0.02, 0.3, 0.7, 0.98]) {
      expectMoves(raining(20, 5), raining(20 + 5 * normalQuantile(p)), "rain.rate", p, 0.02);
    }
  });

  it("rain rate by the usual factor, and that of covers which are wet without rain on the path", () => {
    const wet = (rate: number): Record<string, Weather> => ({
      now: weatherOf({ coversWetAsAtMmPerH: rate }),
    });
    const cover = {
      bare: coverOf(),
      film: coverOf({ layers: [layerOf(0.5, 2.5, 0.002)], surface: "wetting" }),
    };
    const at = (rate: number) => scenarioOf({ covers: cover, weather: wet(rate) });
    expectMoves(at(8), at(8 * 1.15 ** Z), "rain.rate", P, 0.005);
  });

  it("rain rate of a mixture: none at all, and the rarest part though others stand about it", () => {
    const covers = {
      bare: coverOf(),
      film: coverOf({ layers: [layerOf(0.5, 2.5, 0.002)], surface: "wetting" }),
    };
    const rain = (value: number, rates: readonly number[]) => {
      const scatter = {
        kind: "mixture",
        parts: rates.map((rate) => ({ share: 1 / rates.length, value: rate })),
      } as const;
      return scenarioOf({ covers, weather: { now: weatherOf({ rainMmPerH: { value, scatter } }) } });
    };
    const only = (value: number) =>
      scenarioOf({ covers, weather: { now: weatherOf({ rainMmPerH: { value } }) } });
    expectMoves(rain(12, [0, 12, 24]), only(0), "rain.rate", 0.2, 0.005, caseOf(only(0), "now"));
    expectMoves(rain(36, [10, 88, 10]), only(88), "rain.rate", 0.5, 0.05, caseOf(only(0), "now"));
  });

  it("length of path in the rain", () => {
    const over = (extentKm: number) => ({
      ...plain,
      weather: { now: weatherOf({ rainMmPerH: { value: 20, sigma: 0 }, extentKm }) },
    });
    expectMoves(over(8), over(8 * (1 + 0.25 * Z)), "rain.length", P, 1e-6);
  });

  it("heat in a cover, log-normally about its nominal", () => {
    const scenario = {
      ...plain,
      covers: { bare: coverOf(), film: coverOf({ layers: [layerOf(3, 2.6, 0.01)] }) },
      transmitter: { ...plain.transmitter, cover: "film" },
    };
    const chosen = caseOf(scenario, "dry");
    const heat = -evaluate(prepare(scenario), chosen).entries.find(({ id }) => id === "tx.cover_loss")!.db;
    expect(heat).toBeGreaterThan(0.1);
    const factor = Math.exp(Math.sqrt(Math.log(1 + 0.4 ** 2)) * Z);
    const { still, moved } = marginsAt(scenario, [chosen], "tx.cover_heat", P)[0]!;
    expect(still - moved).toBeCloseTo(heat * (factor - 1), 9);
  });

  it("permittivity within its published range", () => {
    const range = (low: number, high: number, nominal: number) => ({
      ...plain,
      covers: {
        bare: coverOf(),
        film: coverOf({
          layers: [{ ...layerOf(2, nominal), permittivity: { low, nominal, high } }],
        }),
      },
      transmitter: { ...plain.transmitter, cover: "film" },
      feeds: { stub: feedOf({ returnLossDb: 80 }) },
    });
    expectMoves(range(2.2, 3, 2.6), range(3, 3, 3), "tx.cover_stack", 1 - 1e-12, 1e-4);
    expectMoves(range(2.2, 3, 2.6), range(2.2, 2.2, 2.2), "tx.cover_stack", 1e-12, 1e-4);
  });

  it("the phase between feed and cover runs over all that its bounds hold", () => {
    const scenario = {
      ...plain,
      covers: { bare: coverOf(), film: coverOf({ layers: [layerOf(4, 3)] }) },
      transmitter: { ...plain.transmitter, cover: "film" },
    };
    const chosen = caseOf(scenario, "dry");
    const { marginDb, marginLowDb, marginHighDb } = evaluate(prepare(scenario), chosen);
    const drawn = (p: number) => marginsAt(scenario, [chosen], "tx.phase", p)[0]!.moved;
    expect(marginHighDb - marginLowDb).toBeGreaterThan(0.5);
    expect(drawn(1e-9)).toBeCloseTo(marginHighDb, 6);
    expect(drawn(0.5)).toBeCloseTo(marginLowDb, 6);
    // The mean over the phase is the nominal: 64 phases, evenly spaced.
    const all = Array.from({ length: 64 }, (_, i) => drawn((i + 0.5) / 64));
    expect(all.reduce((sum, db) => sum + db, 0) / 64).toBeCloseTo(marginDb, 4);
  });

  it("a phase drawn is a phase known, at either end: the same margins in order, level and noise together", () => {
    for (const [id, end] of [["tx.phase", "transmitter"] as const, ["rx.phase", "receiver"] as const]) {
      const plate = { bare: coverOf(), plate: coverOf({ layers: [layerOf(4, 3, 0.02)] }) };
      const at = (phaseDeg?: number) => ({
        ...scenarioOf({ ...bare, covers: plate, [end]: { cover: "plate", feed: "own" } }),
        feeds: { stub: feedOf(), own: feedOf({ returnLossDb: 10, phaseDeg }) },
      });
      const chosen = caseOf(at(), "dry");
      const turns = Array.from({ length: 180 }, (_, i) => (i + 0.5) / 180);
      const rising = (some: readonly number[]) => some.toSorted((a, b) => a - b);
      const drawn = rising(turns.map((turn) => marginsAt(at(), [chosen], id, turn)[0]!.moved));
      const known = rising(turns.map((turn) => evaluate(prepare(at(360 * turn)), chosen).marginDb));
      expect(known.at(-1)! - known[0]!).toBeGreaterThan(1);
      for (const [i, margin] of drawn.entries()) expect(Math.abs(margin - known[i]!)).toBeLessThan(0.02);
    }
  });

  it("water on the covers by a factor that both ends share where they are tied wholly", () => {
    const scenario = {
      ...scenarioOf({
        covers: { bare: coverOf(), film: coverOf({ layers: [layerOf(0.13, 2.05)], surface: "beading" }) },
        weather: { now: weatherOf({ rainMmPerH: { value: 30, sigma: 0 } }) },
        feeds: { stub: feedOf({ returnLossDb: 60 }) },
      }),
      spread: { correlation: { water: 1 } },
    };
    const chosen = caseOf(scenario, "now");
    const budget = evaluate(prepare(scenario), chosen);
    const [{ still, moved }] = marginsAt(scenario, [chosen], "tx.water", P) as [
      { still: number; moved: number },
    ];
    const factor = Math.exp(Math.sqrt(Math.log(1.25)) * Z);
    const signal = -budget.entries
      .filter(({ id }) => id.includes("water"))
      .reduce((sum, { db }) => sum + db, 0);
    expect(signal).toBeGreaterThan(1);
    // What the warmer receiver side adds in noise is a small part of it.
    expect(still - moved).toBeGreaterThan((factor - 1) * signal);
    expect(still - moved).toBeLessThan((factor - 1) * signal * 1.15);
  });

  it("water on one cover alone by the whole of its doubt, tied to nothing", () => {
    const scenario = scenarioOf({
      covers: { bare: coverOf(), film: coverOf({ layers: [layerOf(0.13, 2.05)], surface: "beading" }) },
      weather: { now: weatherOf({ rainMmPerH: { value: 30, sigma: 0 }, wets: ["receiver"] }) },
      feeds: { stub: feedOf({ returnLossDb: 60 }) },
    });
    const chosen = caseOf(scenario, "now");
    const budget = evaluate(prepare(scenario), chosen);
    const factor = Math.exp(Math.sqrt(Math.log(1.25)) * Z);
    const signal = -budget.entries
      .filter(({ id }) => id.includes("water"))
      .reduce((sum, { db }) => sum + db, 0);
    const { still, moved } = marginsAt(scenario, [chosen], "rx.water", P)[0]!;
    expect(still - moved).toBeGreaterThan((factor - 1) * signal);
    expect(still - moved).toBeLessThan((factor - 1) * signal * 1.3);
  });

  it("heat and water of a cover over the dish", () => {
    const scenario = scenarioOf({
      covers: { bare: coverOf(), cloth: coverOf({ layers: [layerOf(0.5, 2.6, 0.05)], surface: "wetting" }) },
      transmitter: { cover: "bare", dishCover: "cloth" },
      receiver: { cover: "bare" },
      weather: { now: weatherOf({ rainMmPerH: { value: 10, sigma: 0 } }) },
    });
    const chosen = caseOf(scenario, "now");
    const budget = evaluate(prepare(scenario), chosen);
    const loss = (id: string) => -budget.entries.find((entry) => entry.id === `tx.${id}`)!.db;
    const factorOf = (share: number) => Math.exp(Math.sqrt(Math.log(1 + share ** 2)) * Z);
    const heat = marginsAt(scenario, [chosen], "tx.cover_heat", P)[0]!;
    expect(heat.still - heat.moved).toBeCloseTo(loss("dish_cover_heat") * (factorOf(0.4) - 1), 9);
    const water = marginsAt(scenario, [chosen], "tx.water", P)[0]!;
    expect(water.still - water.moved).toBeCloseTo(loss("dish_cover_water") * (factorOf(0.5) - 1), 9);
  });

  it("aim: 12 theta^2/b^2 about a standing offset", () => {
    const scenario = {
      ...plain,
      dish: { tripod: dishOf({ pointingErrorDeg: 0.4, pointingOffsetDeg: 0.7 }) },
    };
    const chosen = caseOf(scenario, "dry");
    const beam = prepare(scenario).ends.transmitter["stub"]!.beamwidthDeg!;
    const drawing = drawingOf(prepare(scenario), [chosen], 2);
    const cause = (id: string) => drawing.uniforms[drawing.causes.findIndex((one) => one.id === id)]!;
    // A radius of two deviations, first to the side of the offset, then against it.
    cause("tx.pointing").fill(1 - Math.exp(-2));
    cause("tx.pointing_side").set([1e-12, 0.5]);
    drawing.work();
    const [towards, against] = drawing.margins[0]! as unknown as [number, number];
    const loss = (deg: number) => (12 * deg ** 2) / beam ** 2;
    expect(against - towards).toBeCloseTo(loss(0.7 + 0.8) - loss(0.7 - 0.8), 6);
  });
});

describe("ways over the ground", () => {
  const behind = (heightM: number, spread = {}): Scenario => ({
    ...plain,
    path: {
      ...plain.path,
      profile: { distancesKm: [0, 15, 30, 45, 60], heightsM: [500, 400, heightM, 400, 500] },
    },
    spread,
  });

  it("each scatter by themselves, and the best of them carries the draw", () => {
    const scenario = behind(900, { diffractionDb: 4, troposcatterDb: 6 });
    const chosen = caseOf(scenario, "dry");
    const [first, second] = evaluate(prepare(scenario), chosen).mechanisms as unknown as [
      { name: string; excessDb: number },
      { name: string; excessDb: number },
    ];
    expect([first.name, second.name].sort()).toEqual(["diffraction", "troposcatter"]);
    // The best way made hopeless: the second one takes over as it stands.
    const lost = marginsAt(scenario, [chosen], `path.${first.name}`, 1 - 1e-15)[0]!;
    const gap = second.excessDb - first.excessDb;
    const worse = (first.name === "diffraction" ? 4 : 6) * normalQuantile(1 - 1e-15);
    expect(lost.still - lost.moved).toBeCloseTo(Math.min(gap, worse), 6);
  });

  it("an obstacle brings no gain, however the draw falls", () => {
    const scenario = behind(445, { diffractionDb: 20 });
    const chosen = caseOf(scenario, "dry");
    const { mechanisms } = evaluate(prepare(scenario), chosen);
    expect(mechanisms[0]!.name).toBe("diffraction");
    const { still, moved } = marginsAt(scenario, [chosen], "path.diffraction", 1e-12)[0]!;
    expect(moved - still).toBeCloseTo(mechanisms[0]!.excessDb, 6);
  });
});

describe("covers drawn together", () => {
  const scenario = scenarioOf({
    covers: {
      bare: coverOf(),
      film: coverOf({ layers: [{ ...layerOf(0.127, 2.05, 0.0007), permittivity: exactly(2.05) }] }),
      plate: coverOf({ layers: [layerOf(2, 2.8, 0.006)] }),
    },
  });
  const both = (cover: string) => ({
    ...caseOf(scenario, "dry"),
    transmitter: { feed: "stub", cover },
    receiver: { feed: "stub", cover },
  });
  const drawn = (some: Drawing) => {
    for (const [k, uniforms] of some.uniforms.entries())
      for (let i = 0; i < uniforms.length; i++) uniforms[i] = (((i + 1) * (k + 3) * 0.618034) % 0.98) + 0.01;
    some.work();
    return some.margins.map((margins) => margins.slice());
  };

  it("differ by themselves alone: what a film takes varies far less than the margin it is taken from", () => {
    const drawing = drawingOf(prepare(scenario), [both("bare"), both("film")], 256);
    const [bareMargins, film] = drawn(drawing) as [Float64Array, Float64Array];
    const spread = (some: Float64Array) => Math.max(...some) - Math.min(...some);
    expect(spread(bareMargins)).toBeGreaterThan(10);
    expect(spread(bareMargins.map((db, i) => db - film[i]!))).toBeLessThan(2);
  });

  it("refuse to mix modes, for a threshold is drawn once", () => {
    const link = prepare(scenario);
    expect(() => drawingOf(link, [both("bare"), { ...both("film"), mode: "ssb" }])).toThrow(RangeError);
  });
});
