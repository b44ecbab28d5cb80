import { describe, expect, it } from "vitest";
import { prepare } from "../../src/budget/prepare.ts";
import { exactly } from "../../src/cover/bounded.ts";
import type { Uncertain } from "../../src/scenario/types.ts";
import { spreadOf } from "../../src/study/spread.ts";
import { caseOf, coverOf, dishOf, feedOf, layerOf, weatherOf } from "../budget/scenarios.ts";
import {
  type Change,
  exact,
  layered,
  marginOf,
  matched,
  on,
  quietScenario,
  rain,
  still,
  varianceOf,
  wetting,
} from "./quietScenario.ts";

/** A feed lit by no dish, for gains of its own. */
const cup = feedOf({ gainDbi: exact(15) });
/** Field, its value and deviation, and a scenario with the field as it is given. */
const fields: readonly (readonly [string, number, number, (field: Uncertain) => NonNullable<Change>])[] = [
  ["transmitter.power", 30, 1.5, (powerDbm) => ({ transmitter: { powerDbm } })],
  ["transmitter.line_loss", 3, 0.6, (lineLossDb) => ({ transmitter: { lineLossDb } })],
  ["receiver.line_loss", 3, 0.6, (lineLossDb) => ({ receiver: { lineLossDb } })],
  ["receiver.noise_figure", 3, 0.6, (noiseFigureDb) => ({ receiver: { noiseFigureDb } })],
  ["receiver.antenna_temperature", 150, 30, (antennaTemperatureK) => ({ receiver: { antennaTemperatureK } })],
  [
    "dish.gain",
    34,
    0.8,
    (gainDbi) => ({
      transmitter: { dish: "own" },
      dish: {
        tripod: dishOf({
          diameterM: undefined,
          focalRatio: undefined,
          gainDbi: exact(34),
          pointingErrorDeg: 0,
        }),
        own: dishOf({ diameterM: undefined, focalRatio: undefined, gainDbi, pointingErrorDeg: 0 }),
      },
    }),
  ],
  [
    "dish.other_losses",
    1.5,
    0.4,
    (otherLossesDb) => ({
      transmitter: { dish: "own" },
      dish: {
        tripod: dishOf({
          diameterM: undefined,
          focalRatio: undefined,
          gainDbi: exact(34),
          pointingErrorDeg: 0,
        }),
        own: dishOf({ otherLossesDb, pointingErrorDeg: 0 }),
      },
    }),
  ],
  [
    "feeds.gain",
    15,
    0.8,
    (gainDbi) => ({
      transmitter: { dish: undefined, feed: "cup" },
      feeds: { stub: feedOf(), cup: { ...cup, gainDbi } },
    }),
  ],
  [
    "feeds.return_loss",
    10,
    1,
    (returnLossSpread) => ({
      transmitter: { feed: "own" },
      feeds: { stub: feedOf(), own: feedOf({ returnLossDb: returnLossSpread.value, returnLossSpread }) },
    }),
  ],
  ["weather.rain, on the path", 20, 3, (rainMmPerH) => ({ weather: rain(rainMmPerH) })],
  [
    "weather.rain, on a cover",
    20,
    5,
    (rainMmPerH) => ({
      ...on("film"),
      feeds: matched,
      covers: wetting,
      weather: { now: weatherOf({ rainMmPerH, extentKm: 1e-3 }) },
    }),
  ],
  [
    "weather.dew",
    0.1,
    0.02,
    (dewMm) => ({ ...on("film"), feeds: matched, covers: wetting, weather: { now: weatherOf({ dewMm }) } }),
  ],
  [
    "covers.measured.insertion_loss",
    1,
    0.3,
    (insertionLossDb) => ({
      ...on("sheet"),
      covers: { bare: coverOf(), sheet: coverOf({ measured: { insertionLossDb } }) },
    }),
  ],
  [
    "covers.layers.permittivity",
    2.8,
    0.4,
    ({ value, sigma = 0 }) =>
      layered({
        thicknessMm: 3,
        permittivity: { low: value - sigma, nominal: value, high: value + sigma },
        lossTangent: exactly(0),
        statedSpread: true,
      }),
  ],
  [
    "covers.layers.thickness",
    3,
    0.5,
    ({ value, sigma = 0 }) =>
      layered({ thicknessMm: value, thicknessSigmaMm: sigma, lossTangent: exactly(0), statedSpread: true }),
  ],
  [
    "covers.layers.loss_tangent",
    0.04,
    0.008,
    ({ value, sigma = 0 }) =>
      layered({
        lossTangent: { low: value - sigma, nominal: value, high: value + sigma },
        statedSpread: true,
        statedLossTangent: true,
      }),
  ],
];

const cloth = (change: object) => ({
  transmitter: { dishCover: "cloth" },
  covers: { bare: coverOf(), cloth: coverOf({ layers: [{ ...layerOf(6, 2.8), ...change }] }) },
});
const overDish: typeof fields = [
  [
    "permittivity of a cover over the dish",
    2.8,
    0.4,
    ({ value, sigma = 0 }) =>
      cloth({
        thicknessMm: 3,
        permittivity: { low: value - sigma, nominal: value, high: value + sigma },
        statedSpread: true,
      }),
  ],
  [
    "thickness of a cover over the dish",
    3,
    0.5,
    ({ value, sigma = 0 }) => cloth({ thicknessMm: value, thicknessSigmaMm: sigma, statedSpread: true }),
  ],
  [
    "loss tangent of a cover over the dish",
    0.04,
    0.008,
    ({ value, sigma = 0 }) =>
      cloth({
        lossTangent: { low: value - sigma, nominal: value, high: value + sigma },
        statedSpread: true,
        statedLossTangent: true,
      }),
  ],
  [
    "reading of a cover over the dish",
    1,
    0.3,
    (insertionLossDb) => ({
      transmitter: { dishCover: "cloth" },
      covers: { bare: coverOf(), cloth: coverOf({ measured: { insertionLossDb } }) },
    }),
  ],
];

describe("other losses of a dish that may well be none", () => {
  it("are drawn, above 0 alone: of a normal spread about 0 half is none", () => {
    const dish = (otherLossesDb: Uncertain) => ({ tripod: dishOf({ otherLossesDb, pointingErrorDeg: 0 }) });
    const none = varianceOf(quietScenario({ dish: dish({ value: 0 }) }));
    const some = varianceOf(quietScenario({ dish: dish({ value: 0, sigma: 1 }) }));
    // Half of a normal distribution and nought for the rest: variance (1 - 1/pi)/2; both ends have the dish.
    expect(some - none).toBeCloseTo(1 - 1 / Math.PI, 1);
  });
});

describe("a reading that scatters otherwise", () => {
  const sheet = (insertionLossDb: Uncertain) => coverOf({ measured: { insertionLossDb } });
  const flat = {
    value: 1,
    sigma: 0.6 / Math.sqrt(3),
    scatter: { kind: "flat", low: 0.4, high: 1.6 },
  } as const;
  const rangeOf = (change: Change) => {
    const link = prepare(quietScenario(change));
    const chosen = [caseOf(link.scenario, "now")];
    const { lowDb, highDb } = spreadOf(link, chosen, { draws: 16_384, seed: 5, precision: 1e-9 }).rows[0]!
      .marginDb;
    return highDb - lowDb;
  };

  it("is drawn so, before a feed and over a dish: nine tenths of a flat range, where a normal one spans 3.3 sigma", () => {
    expect(rangeOf({ ...on("sheet"), covers: { bare: coverOf(), sheet: sheet(flat) } })).toBeCloseTo(
      0.9 * 1.2,
      1,
    );
    const over = { transmitter: { dishCover: "sheet" }, covers: { bare: coverOf(), sheet: sheet(flat) } };
    expect(rangeOf(over)).toBeCloseTo(0.9 * 1.2, 1);
    const normal = { value: 1, sigma: 0.6 / Math.sqrt(3) };
    expect(rangeOf({ ...over, covers: { bare: coverOf(), sheet: sheet(normal) } })).toBeCloseTo(
      3.29 * normal.sigma,
      1,
    );
  });
});

describe("the spread of a field, stated as value +/- sigma", () => {
  it.each([...fields, ...overDish])(
    "widens the margin as the engine moves with it: %s",
    (_, value, sigma, with_) => {
      const [low, high] = [-sigma, sigma].map((by) => marginOf(quietScenario(with_(still(value + by)))));
      const expected = Math.abs(high! - low!) / 2;
      expect(expected).toBeGreaterThan(0.05);
      const known = varianceOf(quietScenario(with_(still(value))));
      const drawn = varianceOf(quietScenario(with_({ value, sigma })));
      expect(Math.sqrt(Math.max(0, drawn - known)) / expected).toBeGreaterThan(0.9);
      expect(Math.sqrt(Math.max(0, drawn - known)) / expected).toBeLessThan(1.1);
      const twice = varianceOf(quietScenario(with_({ value, sigma: sigma / 2 })));
      expect(Math.sqrt(Math.max(0, twice - known)) / expected).toBeGreaterThan(0.4);
      expect(Math.sqrt(Math.max(0, twice - known)) / expected).toBeLessThan(0.6);
    },
  );
});
