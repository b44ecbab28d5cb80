import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare, withWeather } from "../../src/budget/prepare.ts";
import { wetModels } from "../../src/cover/wetModels.ts";
import type { Cover, Feed, Snow, Weather } from "../../src/scenario/types.ts";
import { describeReference, num } from "../reference.ts";
import {
  budgetOf,
  caseOf,
  codesOf,
  coverOf,
  dishOf,
  entryOf,
  feedOf,
  layerOf,
  scenarioOf,
  weatherOf,
} from "./scenarios.ts";

/** A matched feed that meets its cover straight on, as the tables of free sheets have it. */
function straightOn(weather: Partial<Weather>, { frequencyGHz = 10.4, cover = {}, feed = {} } = {}) {
  return budgetOf(
    scenarioOf({
      frequencyGHz,
      feeds: { stub: feedOf({ returnLossDb: Number.POSITIVE_INFINITY, ...feed }) },
      covers: { film: coverOf({ layers: [layerOf(0, 1)], ...cover }) },
      dish: { tripod: dishOf({ focalRatio: undefined, efficiency: 0.55 }) },
      weather: { now: weatherOf(weather) },
    }),
  );
}

/** Loss at one end by what lies on a cover of nothing [dB]. */
const alone = (weather: Partial<Weather>) => straightOn(weather).transmitterCover.waterCostDb.nominal;

const snowOf = (depthMm: number, wetnessPercent: number): Snow => ({
  depthMm,
  dryDensityGcm3: 0.3,
  wetnessPercent,
});

// Free layers at 10.4 GHz, printed to 0.01 dB (13.8 to 0.1): ice Matzler & Wegmuller 1987, Hufford 1991; dry snow
// Ulaby & Long 2014; wet snow Hallikainen, Ulaby, Abdelrazik 1986; a plane wave straight on.
describe("ice and snow alone, in a whole budget", () => {
  it.each([
    [1, 0.23],
    [3, 1.2],
    [5, 1.22],
    [8, 0.01],
    [10, 0.7],
  ])("%d mm of ice at -5 degC loses %d dB", (iceMm, lossDb) => {
    expect(Math.abs(alone({ iceMm, temperatureC: -5 }) - lossDb)).toBeLessThanOrEqual(0.005);
  });

  it.each([
    [30, 0, 0.19, 0.005],
    [30, 1, 0.99, 0.005],
    [10, 5, 2.1, 0.005],
    [30, 5, 6.26, 0.005],
    [10, 10, 4.8, 0.005],
    [30, 10, 13.8, 0.05],
  ])("%d mm of snow with %d %% of water lose %d dB", (depthMm, wetnessPercent, lossDb, tolerance) => {
    const loss = alone({ snow: snowOf(depthMm, wetnessPercent), temperatureC: 0 });
    expect(Math.abs(loss - lossDb)).toBeLessThanOrEqual(tolerance);
  });

  it("says what lies there and by whom it is reckoned", () => {
    const entry = (weather: Partial<Weather>) => entryOf(straightOn(weather), "tx.water_loss");
    expect(entry({ iceMm: 1 })).toMatchObject({ label: expect.stringContaining("ice") });
    expect(entry({ snow: snowOf(5, 0) }).source).toContain("Ulaby & Long 2014");
    expect(entry({ snow: snowOf(5, 3) }).source).toContain("Hallikainen");
    expect(entry({ iceMm: 1, snow: snowOf(5, 3) }).label).toContain("snow");
  });

  it("warns of wet snow beyond its fit, 3-37 GHz and 1-12 % of water (from memory), and of no other", () => {
    const codes = (snow: Snow, frequencyGHz = 10.4) => codesOf(straightOn({ snow }, { frequencyGHz }));
    expect(codes(snowOf(10, 5))).not.toContain("model_range");
    expect(codes(snowOf(10, 0), 47)).not.toContain("model_range");
    expect(codes(snowOf(10, 20))).toContain("model_range");
    expect(codes(snowOf(10, 5), 47)).toContain("model_range");
    expect(codes({ ...snowOf(10, 5), dryDensityGcm3: 0.6 })).toContain("model_range");
  });
});

// Rows at 15 degC by an independent 4 x 4 matrix, water by Liebe, Hufford, Manabe 1991; tolerance 0.001 dB. A dew
// of the film's thickness puts it on the cover whatever the rain.
describe("a film of water in a whole budget", () => {
  const filmOf = (filmMm: number, frequencyGHz: number, cover: Partial<Cover> = {}) =>
    straightOn({ dewMm: { value: filmMm }, temperatureC: 15 }, { frequencyGHz, cover }).transmitterCover;
  const ptfe = { layers: [layerOf(1, 2.08, 0.0004)] };

  it.each([
    [5.76, 0.1, 1.8136, 1.9425, 0.4058],
    [10.368, 0.05, 1.8169, 1.9345, 0.3482],
    [10.368, 0.15, 5.1757, 5.2628, 0.6068],
  ])("at %d GHz, %d mm: %d dB alone, %d dB on 1 mm of PTFE", (frequencyGHz, filmMm, free, onCover, gamma) => {
    expect(Math.abs(filmOf(filmMm, frequencyGHz).waterCostDb.nominal - free)).toBeLessThan(0.001);
    const covered = filmOf(filmMm, frequencyGHz, ptfe);
    expect(Math.abs(covered.waterCostDb.nominal - onCover)).toBeLessThan(0.001);
    expect(Math.abs(10 ** (-covered.returnLossDb.nominal / 20) - gamma)).toBeLessThan(0.0002);
  });

  describeReference("covers/check-filmloss.csv", (row) => {
    const [frequencyGHz, filmMm] = [num(row, "f_ghz"), num(row, "film_mm")];
    expect(num(row, "t_c")).toBe(15);
    const free = filmOf(filmMm, frequencyGHz);
    const covered = filmOf(filmMm, frequencyGHz, ptfe);
    const gamma = ({ returnLossDb }: typeof free) => 10 ** (-returnLossDb.nominal / 20);
    expect(Math.abs(free.waterCostDb.nominal - num(row, "free_loss_db"))).toBeLessThan(0.001);
    expect(Math.abs(gamma(free) - num(row, "free_gamma"))).toBeLessThan(0.0002);
    expect(Math.abs(covered.waterCostDb.nominal - num(row, "on_cover_excess_db"))).toBeLessThan(0.001);
    expect(Math.abs(gamma(covered) - num(row, "on_cover_gamma"))).toBeLessThan(0.0002);
  });
});

/** Cost of the water at one end on half a millimetre of plastic. */
function waterCost(weather: Partial<Weather>, cover: Partial<Cover> = {}, feed: Partial<Feed> = {}) {
  return straightOn(weather, { cover: { layers: [layerOf(0.5, 2.3)], ...cover }, feed }).transmitterCover
    .waterCostDb;
}

const surfaces = (["beading", "mixed", "wetting"] as const).flatMap((surface) =>
  [undefined, ...wetModels].map((wetModel) => ({ surface, wetModel })),
);

function expectFalling(figures: readonly number[]): void {
  for (const [i, figure] of figures.entries()) {
    if (i > 0) expect(figure).toBeLessThanOrEqual(figures[i - 1]! + 1e-12);
  }
}

describe("after a shower", () => {
  it.each(surfaces)("a cover dries from the first minute on: $surface, model $wetModel", (kind) => {
    for (const rain of [1, 16, 60]) {
      // Rain on the path, from which some models start, is over too.
      const left = [0, 0.5, 2, 5, 15, 30, 60, 600].map(
        (driedForMin) => waterCost({ coversWetAsAtMmPerH: rain, driedForMin }, kind).nominal,
      );
      expectFalling(left);
      expect(left.at(-1)).toBeLessThan(0.01);
    }
  });

  it("keeps a film of 1/e after 15 min, 5 to 40 min at its bounds (common practice, no source)", () => {
    const budget = (driedForMin: number) =>
      straightOn({ coversWetAsAtMmPerH: 10, driedForMin }).transmitterCover;
    expect(budget(15).filmMm / budget(0).filmMm).toBeCloseTo(Math.exp(-1), 9);
    const { low, nominal, high } = budget(15).waterCostDb;
    expect(low).toBeLessThan(nominal / 2);
    expect(high).toBeGreaterThan(1.5 * nominal);
    expect(budget(0).waterCostDb.high).toBeCloseTo(budget(0).waterCostDb.nominal, 9);
  });
});

describe("dew", () => {
  it("wets a cover in no rain, bounded by the spread that the user typed", () => {
    const spread = waterCost({ dewMm: { value: 0.1, sigma: 0.05 } });
    expect(spread.nominal).toBe(waterCost({ dewMm: { value: 0.1 } }).nominal);
    expect(spread.low).toBeCloseTo(waterCost({ dewMm: { value: 0.05 } }).nominal, 9);
    expect(spread.high).toBeCloseTo(waterCost({ dewMm: { value: 0.15 } }).nominal, 9);
  });

  it("spread wider than itself still leaves no less than a dry cover", () => {
    expect(waterCost({ dewMm: { value: 0.05, sigma: 0.2 } }).low).toBeGreaterThanOrEqual(0);
  });

  it.each(surfaces)("costs the more the thicker, in rain or none: $surface, $wetModel", (kind) => {
    for (const coversWetAsAtMmPerH of [undefined, 0.2, 10]) {
      const costs = [0.3, 0.2, 0.1, 0.05, 0.01, 0].map(
        (value) => waterCost({ dewMm: { value }, coversWetAsAtMmPerH }, kind).nominal,
      );
      expectFalling(costs);
    }
  });

  it.each(surfaces)("is not swept away by a trace of rain: $surface, $wetModel", (kind) => {
    const dewMm = { value: 0.1 };
    expect(waterCost({ dewMm, coversWetAsAtMmPerH: 0.05 }, kind).nominal).toBeGreaterThanOrEqual(
      waterCost({ dewMm }, kind).nominal - 1e-12,
    );
  });

  // Merceret & Ward 2000: standard over hydrophobic, 0.165/0.0575 = 2.9.
  it("on a surface that sheds water is 2.9 times less than its film", () => {
    const dewMm = { value: 0.1 };
    const film = waterCost({ dewMm }, { surface: "wetting" }).nominal;
    expect(waterCost({ dewMm }, { surface: "beading" }).nominal).toBeCloseTo(film / 2.9, 9);
  });
});

describe("more of it", () => {
  const wetness = [0, 0.5, 1, 2, 4, 7, 12];
  it("costs more: wet snow the wetter it is", () => {
    for (const depthMm of [10, 30]) {
      const costs = wetness.map((wet) => alone({ snow: snowOf(depthMm, wet), temperatureC: 0 }));
      expectFalling(costs.toReversed());
    }
  });

  it("costs more: wet snow the deeper it is, once reflections have died away in it", () => {
    const costs = [20, 40, 80, 160].map((depthMm) => alone({ snow: snowOf(depthMm, 8), temperatureC: 0 }));
    expectFalling(costs.toReversed());
    // Far in, the loss is that of the medium alone and doubles with depth but for the face.
    const [, , at80, at160] = costs as [number, number, number, number];
    const [at40] = costs.slice(1) as [number];
    expect((at160 - at80) / (at80 - at40)).toBeCloseTo(2, 2);
  });

  it("costs more: rain on ice", () => {
    const costs = [0, 1, 5, 20, 80].map((rain) =>
      alone({ iceMm: 1, coversWetAsAtMmPerH: rain, temperatureC: 0 }),
    );
    expectFalling(costs.toReversed());
  });
});

describe("a wet-antenna model named in a scenario", () => {
  const costOf = (
    wetModel: Cover["wetModel"],
    surface: Cover["surface"],
    frequencyGHz: number,
    rain: number,
  ) =>
    straightOn(
      { rainMmPerH: { value: rain }, extentKm: 10 },
      { frequencyGHz, cover: { layers: [layerOf(0.5, 2.3)], wetModel, surface } },
    ).transmitterCover.waterCostDb.nominal;

  it.each(wetModels)("%s is taken, alone and finite", (wetModel) => {
    const cost = costOf(wetModel, "beading", 24, 10);
    expect(cost).toBeGreaterThan(0.05);
    expect(cost).toBeLessThan(14);
  });

  // Leijnse, Uijlenhoet, Stricker 2008, 10 GHz, 10 mm/h: 1.34234 dB for one antenna, whatever the cover.
  it("leijnse2008 gives its one antenna", () => {
    expect(costOf("leijnse2008", "beading", 10, 10)).toBeCloseTo(1.34234, 3);
  });

  // Pastorek et al. 2022: 14 (1 - exp(-0.1 R^0.55)) for both ends.
  it("pastorek2022 gives half of its two ends", () => {
    expect(costOf("pastorek2022", "wetting", 30, 25)).toBeCloseTo(7 * (1 - Math.exp(-0.1 * 25 ** 0.55)), 9);
  });

  // Schleiss, Rieckermann, Berne 2013: at most 2.3 dB for both ends.
  it("schleiss2013 stays below its bound for both ends", () => {
    expect(costOf("schleiss2013", "wetting", 38, 60)).toBeLessThanOrEqual(2.3 / 2);
    expect(costOf("schleiss2013", "wetting", 38, 60)).toBeGreaterThan(1.1);
  });

  // Merceret & Ward 2000: h R tanh^2(f/10), h = 0.165 standard and 0.0575 water-repellent.
  it("merceret2000 knows a repellent surface from another", () => {
    const shape = 10 * Math.tanh(0.576) ** 2;
    expect(costOf("merceret2000", "beading", 5.76, 10)).toBeCloseTo(0.0575 * shape, 9);
    expect(costOf("merceret2000", "wetting", 5.76, 10)).toBeCloseTo(0.165 * shape, 9);
  });

  it.each(["kharadly2001", "schleiss2013"] as const)(
    "%s warns where no rain on the path drives it",
    (wetModel) => {
      const codes = (weather: Partial<Weather>) =>
        codesOf(straightOn(weather, { cover: { layers: [layerOf(0.5, 2.3)], wetModel } }));
      expect(codes({ coversWetAsAtMmPerH: 10 })).toContain("wet_model_no_path_rain");
      expect(codes({ rainMmPerH: { value: 10 } })).not.toContain("wet_model_no_path_rain");
    },
  );
});

/** A budget with the beam of a real dish, before a feed of 14 dB. */
function mouth(cover: Partial<Cover>, feed: Partial<Feed> = {}, weather: Partial<Weather> = {}) {
  return budgetOf(
    scenarioOf({
      feeds: { stub: feedOf(feed) },
      covers: { film: coverOf({ layers: [layerOf(2, 2.77, 0.0055)], ...cover }) },
      weather: { now: weatherOf(weather) },
    }),
  );
}

describe("a cover before the mouth", () => {
  it("spoils the match the less the farther off it stands, and loses the rest sideways", () => {
    const at = (gapMm: number) => mouth({ gapMm });
    const mismatch = (gapMm: number) => -entryOf(at(gapMm), "tx.cover_mismatch").db;
    const stray = (gapMm: number) => -entryOf(at(gapMm), "tx.cover_loss").db;
    for (const [near, far] of [
      [0, 10],
      [10, 40],
      [40, 200],
    ] as const) {
      expect(mismatch(far)).toBeLessThan(mismatch(near));
      expect(stray(far)).toBeGreaterThan(stray(near));
    }
    // The sheet loses the same wherever it stands, on average over the phase.
    expect(mismatch(200) + stray(200)).toBeCloseTo(mismatch(0) + stray(0), 9);
    expect(mismatch(0)).toBeGreaterThan(0.2);
  });

  it("has one figure where the feed's phase is known, which the gap turns, and bounds where it is not", () => {
    const { low, nominal, high } = mouth({ gapMm: 3 }).transmitterCover.dryCostDb;
    expect(high - low).toBeGreaterThan(0.5);
    const known = [0, 45, 90, 135, 180, 225, 270, 315].map(
      (phaseDeg) => mouth({ gapMm: 3 }, { phaseDeg }).transmitterCover.dryCostDb,
    );
    for (const cost of known) {
      expect(cost.low).toBeCloseTo(cost.high, 12);
      expect(cost.nominal).toBeGreaterThan(low - 1e-9);
      expect(cost.nominal).toBeLessThan(high + 1e-9);
    }
    expect(Math.max(...known.map((cost) => cost.nominal))).toBeGreaterThan((nominal + high) / 2);
    // Half a wave of gap is a whole turn there and back.
    const halfWave = 299.792458 / 10.368 / 2;
    const wide = { phaseDeg: 70, apertureMm: 5000 };
    expect(mouth({ gapMm: 3 + halfWave }, wide).transmitterCover.dryCostDb.nominal).toBeCloseTo(
      mouth({ gapMm: 3 }, wide).transmitterCover.dryCostDb.nominal,
      4,
    );
  });

  it("as a dome around the mouth is met straight on, flat under its own apex", () => {
    const cost = (domeRadiusMm: number | undefined, gapMm: number) =>
      mouth({ domeRadiusMm, gapMm }).transmitterCover.dryCostDb.nominal;
    expect(cost(40, 0)).toBeCloseTo(cost(undefined, 0), 9);
    const straight = straightOn(
      {},
      {
        frequencyGHz: 10.368,
        cover: { layers: [layerOf(2, 2.77, 0.0055)], gapMm: 40 },
        feed: { returnLossDb: 14 },
      },
    );
    expect(cost(40, 40)).toBeCloseTo(straight.transmitterCover.dryCostDb.nominal, 9);
    expect(Math.abs(cost(40, 40) - cost(undefined, 40))).toBeGreaterThan(0.01);
  });

  it("carries the spread of its material into its bounds", () => {
    const spread = { ...layerOf(3, 2.7), permittivity: { low: 2.5, nominal: 2.7, high: 2.9 } };
    const phase = { phaseDeg: 40 };
    const at = (permittivity: number) =>
      mouth({ layers: [layerOf(3, permittivity)] }, phase).transmitterCover.dryCostDb.nominal;
    const { low, nominal, high } = mouth({ layers: [spread] }, phase).transmitterCover.dryCostDb;
    const ends = [at(2.5), at(2.7), at(2.9)];
    expect(nominal).toBe(at(2.7));
    expect(low).toBeCloseTo(Math.min(...ends), 9);
    expect(high).toBeCloseTo(Math.max(...ends), 9);
    expect(high - low).toBeGreaterThan(0.05);

    const lossy = { ...layerOf(3, 2.7), lossTangent: { low: 0.002, nominal: 0.01, high: 0.03 } };
    const heat = entryOf(mouth({ layers: [lossy] }), "tx.cover_loss");
    const heatOf = (loss: number) => entryOf(mouth({ layers: [layerOf(3, 2.7, loss)] }), "tx.cover_loss").db;
    expect(heat.low).toBeCloseTo(heatOf(0.03), 9);
    expect(heat.high).toBeCloseTo(heatOf(0.002), 9);
  });

  // 0.1 dB or 30 % of the loss, whichever is more: common practice, no source.
  it("carries the doubt of the plane wave, and warns of it before a small mouth", () => {
    const sheet = { layers: [layerOf(0.127, 2.05)] };
    expect(entryOf(mouth(sheet), "tx.cover_loss").sigma).toBeCloseTo(0.1, 3);
    const thick = entryOf(mouth({ layers: [layerOf(7, 4.3)] }), "tx.cover_loss").sigma;
    expect(thick).toBeGreaterThan(0.1);
    expect(codesOf(mouth(sheet))).toEqual([]);
    const small = mouth(sheet, { apertureMm: 25 });
    expect(codesOf(small)).toEqual(["plane_wave_weak", "plane_wave_weak"]);
    expect(small.warnings[0]!.message).toContain("0.9 wavelengths");
  });
});

describe("a cover beyond the model", () => {
  it("warns of layers that do nothing or are thicker than ten wavelengths, and of a gap as wide", () => {
    const codes = (cover: Partial<Cover>) => [...new Set(codesOf(mouth(cover)))];
    expect(codes({ layers: [layerOf(0, 2)] })).toEqual(["zero_thickness"]);
    // Ten wavelengths at 10.368 GHz are 289.15 mm.
    expect(codes({ layers: [layerOf(289, 1.05)] })).toEqual([]);
    expect(codes({ layers: [layerOf(289.5, 1.05)] })).toEqual(["thick_layer"]);
    expect(codes({ gapMm: 290 })).toEqual(["gap_beyond_model", "plane_wave_weak"]);
    expect(codes({ gapMm: 61 })).toEqual(["plane_wave_weak"]);
  });

  it("that lets nothing through fails with figures, not with an error", () => {
    for (const layers of [[layerOf(500, 100, 5)], [layerOf(1000, 200, 10), layerOf(1000, 200, 10)]]) {
      const budget = mouth({ layers }, {}, { coversWetAsAtMmPerH: 20 });
      expect(budget.verdict).toBe("fails");
      expect(Number.isFinite(budget.marginDb)).toBe(true);
      expect(Number.isFinite(budget.marginLowDb)).toBe(true);
      expect(budget.marginDb).toBeLessThan(-100);
      expect(budget.systemTemperatureK).toBeGreaterThan(0);
    }
  });
});

// Kept by `withWeather`: what a search of the rain rate walks on.
describe("one weather more", () => {
  it("is the same as a scenario that had it from the start", () => {
    const now = weatherOf({ iceMm: 2, coversWetAsAtMmPerH: 4, temperatureC: -1 });
    const scenario = scenarioOf();
    const late = evaluate(withWeather(prepare(scenario), "now", now), {
      ...caseOf(scenario, "dry"),
      weather: "now",
    });
    const early = budgetOf({ ...scenario, weather: { now } });
    expect(late.marginDb).toBe(early.marginDb);
    expect(late.receiverCover.waterCostDb.nominal).toBeGreaterThan(0);
  });
});
