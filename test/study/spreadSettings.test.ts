import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import type { EndCorrelation, Scenario, SpreadSettings, Uncertain } from "../../src/scenario/types.ts";
import { caseOf, dishOf, eastOnEquator, feedOf, scenarioOf, siteOf, weatherOf } from "../budget/scenarios.ts";
import {
  type Change,
  exact,
  layered,
  marginOf,
  matched,
  on,
  quiet,
  quietScenario,
  rain,
  varianceOf,
  wetting,
} from "./quietScenario.ts";

/** Key of `spread`, its value, and what the margin's deviation is to be by hand [dB]. */
const behind = (heightM: number): NonNullable<Change> => {
  const { path } = scenarioOf();
  const profile = { distancesKm: [0, 15, 30, 45, 60], heightsM: [500, 400, heightM, 400, 500] };
  return { path: { ...path, profile } };
};
const manyHills: NonNullable<Change> = {
  path: {
    from: siteOf({ groundM: 10 }),
    to: eastOnEquator(60, { groundM: 10 }),
    profile: { distancesKm: [0, 15, 30, 45, 60], heightsM: [10, 120, 150, 120, 10] },
  },
};
const lossOf = (scenario: Scenario, id: string) =>
  -evaluate(prepare(scenario), caseOf(scenario, "now")).entries.find((entry) => entry.id === id)!.db;
const foggy = { weather: { now: weatherOf({ fogGPerM3: 2 }) } };
const showery = { weather: rain(exact(20)) };
const wet = {
  ...on("film"),
  feeds: matched,
  covers: wetting,
  weather: { now: weatherOf({ coversWetAsAtMmPerH: 20 }) },
};
const woods = { path: { ...scenarioOf().path, foliageM: { from: 10, to: 0 } } };
const flat = (low: number, high: number): Uncertain => ({
  value: (low + high) / 2,
  sigma: (high - low) / Math.sqrt(12),
  scatter: { kind: "flat", low, high },
});

const settings: readonly (readonly [
  keyof SpreadSettings,
  SpreadSettings,
  NonNullable<Change>,
  (scenario: Scenario) => number,
])[] = [
  [
    "feedReturnLossDb",
    { feedReturnLossDb: 1 },
    { feeds: { stub: feedOf({ returnLossDb: 8 }) } },
    () => {
      const at = (end: "transmitter" | "receiver", returnLossDb: number) => {
        const feeds = { stub: feedOf({ returnLossDb: 8 }), own: feedOf({ returnLossDb }) };
        return marginOf(quietScenario({ feeds, [end]: { feed: "own" } }));
      };
      return Math.hypot(
        ...(["transmitter", "receiver"] as const).map((end) => (at(end, 9) - at(end, 7)) / 2),
      );
    },
  ],
  ["coverLossShare", { coverLossShare: 0.2 }, layered({}), (some) => 0.2 * lossOf(some, "tx.cover_loss")],
  [
    "waterShare",
    { waterShare: 0.2 },
    wet,
    (some) => 0.2 * (lossOf(some, "tx.water_mismatch") + lossOf(some, "tx.water_loss")),
  ],
  [
    "rainRateFactor",
    { rainRateFactor: 1.1 },
    { weather: rain({ value: 20 }) },
    () => {
      const at = (rate: number) => marginOf(quietScenario({ weather: rain(exact(rate)) }));
      return (at(20 / 1.1) - at(20 * 1.1)) / 2;
    },
  ],
  ["rainLengthShare", { rainLengthShare: 0.2 }, showery, (some) => 0.2 * lossOf(some, "path.rain")],
  ["gasShare", { gasShare: 0.5 }, {}, (some) => 0.5 * lossOf(some, "path.gas")],
  ["fogShare", { fogShare: 0.2 }, foggy, (some) => 0.2 * lossOf(some, "path.fog")],
  ["diffractionDb", { diffractionDb: 2, troposcatterDb: 0 }, behind(700), () => 2],
  ["troposcatterDb", { diffractionDb: 0, troposcatterDb: 2 }, manyHills, () => 2],
  [
    "rainScatterDb",
    { diffractionDb: 0, troposcatterDb: 0, rainScatterDb: 2 },
    { ...manyHills, ...showery },
    () => 2,
  ],
  ["foliageDb", { foliageDb: 2 }, woods, () => 2],
  ["tiltLossDb", { tiltLossDb: flat(0, 3) }, {}, () => 3 / Math.sqrt(12)],
  ["blunder", { blunder: { chance: 0.2, lossDb: exact(10) } }, {}, () => 10 * Math.sqrt(0.2 * 0.8)],
];

describe("what `spread` says in the place of the usual figures", () => {
  it.each(settings)("counts as it should: %s", (key, spread, change, byHand) => {
    const without = quietScenario({ ...change, spread: { ...spread, [key]: offOf(key) } });
    const expected = byHand(without);
    expect(expected).toBeGreaterThan(0.05);
    const drawn = varianceOf(quietScenario({ ...change, spread })) - varianceOf(without);
    expect(Math.sqrt(Math.max(0, drawn)) / expected).toBeGreaterThan(0.9);
    expect(Math.sqrt(Math.max(0, drawn)) / expected).toBeLessThan(1.15);
  });

  it("leaves the second best way its chance where the best is known", () => {
    const known = (troposcatterDb: number) =>
      varianceOf(quietScenario({ ...behind(700), spread: { diffractionDb: 0, troposcatterDb } }));
    expect(known(0)).toBeLessThan(1e-12);
    expect(known(20)).toBeGreaterThan(1);
  });

  const offOf = (key: keyof SpreadSettings) => (key in quiet ? quiet[key] : 0);

  const ties: readonly (readonly [keyof EndCorrelation, NonNullable<Change>])[] = [
    [
      "gain",
      {
        dish: {
          tripod: dishOf({
            diameterM: undefined,
            focalRatio: undefined,
            gainDbi: { value: 34, sigma: 1 },
            pointingErrorDeg: 0,
          }),
        },
      },
    ],
    [
      "line",
      {
        transmitter: { lineLossDb: { value: 5, sigma: 1 } },
        receiver: { lineLossDb: { value: 5, sigma: 1 } },
      },
    ],
    ["aim", { dish: { tripod: dishOf({ gainDbi: exact(34), focalRatio: undefined, pointingErrorDeg: 1 }) } }],
    ["returnLoss", { spread: { feedReturnLossDb: 2 }, feeds: { stub: feedOf({ returnLossDb: 8 }) } }],
    ["cover", { ...layered({}), receiver: { cover: "plate" }, spread: { coverLossShare: 0.4 } }],
    ["water", { ...wet, receiver: { cover: "film" }, spread: { waterShare: 0.4 } }],
  ];
  it.each(ties)(
    "ties both ends' %s: the sum of two alike is wider than of two apart, and of two opposed least",
    (key, change) => {
      const at = (r: number) =>
        Math.sqrt(
          varianceOf(quietScenario({ ...change, spread: { ...change.spread, correlation: { [key]: r } } })),
        );
      const [opposed, apart, alike] = [at(-1), at(0), at(1)];
      expect(alike / apart).toBeGreaterThan(1.2);
      expect(alike / apart).toBeLessThan(1.5);
      expect(opposed / apart).toBeLessThan(0.85);
    },
  );
});
