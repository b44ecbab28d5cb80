import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare, withWeather } from "../../src/budget/prepare.ts";
import { wetModels } from "../../src/cover/wetModels.ts";
import type { Cover, Feed } from "../../src/scenario/types.ts";
import {
  anyScenario,
  budgetOf,
  caseOf,
  coverOf,
  entryOf,
  feedOf,
  layerOf,
  scenarioOf,
  weatherOf,
} from "./scenarios.ts";

const RATES = [0, 0.1, 0.3, 1, 2, 4, 7, 10, 16, 25, 40, 60, 100, 150];

/** Margins with covers ever wetter and no rain on the path, which would hide what water gives back. */
function marginsInRain(cover: Cover, { feed = feedOf(), frequencyGHz = 10.368 } = {}): number[] {
  const scenario = scenarioOf({ frequencyGHz, covers: { film: cover }, feeds: { stub: feed } });
  const link = prepare(scenario);
  return RATES.map((coversWetAsAtMmPerH) => {
    const wet = withWeather(link, "dry", weatherOf({ coversWetAsAtMmPerH }));
    return evaluate(wet, caseOf(scenario, "dry")).marginDb;
  });
}

/** Largest step upwards in a row of figures. */
function largestRise(figures: readonly number[]): number {
  return Math.max(...figures.slice(1).map((figure, i) => figure - figures[i]!));
}

const surfaces = (["beading", "mixed", "wetting"] as const).flatMap((surface) =>
  (["new", "weathered", "treated"] as const).flatMap((state) =>
    [undefined, ...wetModels].map((wetModel) => ({ surface, state, wetModel })),
  ),
);

const sheets = {
  film: [layerOf(0.127, 2.05, 0.0007)],
  plate: [layerOf(2, 2.8, 0.006)],
  window: [layerOf(8.5, 2.9, 0.01)],
  sandwich: [layerOf(0.5, 4.2, 0.02), layerOf(5, 1.1, 0.001), layerOf(0.5, 4.2, 0.02)],
};

describe("more rain", () => {
  it.each(surfaces)("never raises the margin: $surface, $state, model $wetModel", (kind) => {
    for (const layers of Object.values(sheets)) {
      for (const frequencyGHz of [10.368, 24.048]) {
        for (const facingDeg of [0, 45]) {
          const margins = marginsInRain(coverOf({ ...kind, layers }), {
            feed: feedOf({ facingDeg }),
            frequencyGHz,
          });
          expect(largestRise(margins)).toBeLessThan(1e-9);
        }
      }
    }
  });

  it("on the path never raises the margin, however warm or cold the beam", () => {
    fc.assert(
      fc.property(anyScenario, (scenario) => {
        const link = prepare(scenario);
        // Past the horizon rain may carry the path.
        fc.pre(link.ground === undefined);
        const margins = RATES.map((value) => {
          const weather = { ...scenario.weather["now"]!, rainMmPerH: { value }, wets: [] };
          return evaluate(withWeather(link, "now", weather), caseOf(scenario, "now")).marginDb;
        });
        expect(largestRise(margins)).toBeLessThan(1e-9);
      }),
      { numRuns: 60 },
    );
  });

  // A thin film makes up what a sheet of high permittivity lacks to half a wave, or tunes a feed of known phase:
  // the cascade's own answer. Two ends, each never more than its mismatch in the dry.
  it.each([
    ["a sheet short of half a wave", layerOf(10.74, 9.11, 0.0036), 3.554, undefined],
    ["a feed of known phase", layerOf(4.916, 6.7, 0.001), 8.319, 133],
  ])(
    "may tune %s, but gives back little and no more than was reflected",
    (_, layer, frequencyGHz, phaseDeg) => {
      const feed = feedOf({ returnLossDb: 9.8, phaseDeg, facingDeg: 48 });
      const cover = coverOf({ layers: [layer], gapMm: phaseDeg === undefined ? 0 : 8.861 });
      const scenario = scenarioOf({ frequencyGHz, covers: { film: cover }, feeds: { stub: feed } });
      const dry = budgetOf(scenario);
      const reflected = -entryOf(dry, "tx.feed_mismatch").db - entryOf(dry, "tx.cover_mismatch").db;
      const rise = largestRise(marginsInRain(cover, { feed, frequencyGHz }));
      expect(rise).toBeLessThan(Math.min(0.3, 2 * reflected));
    },
  );
});

describe("water by a published figure", () => {
  const tuned: { cover: Partial<Cover>; feed: Feed; frequencyGHz: number } = {
    cover: { layers: [layerOf(7.733, 9.68, 0.0006)], gapMm: 4.42 },
    feed: feedOf({ returnLossDb: 7.757, phaseDeg: 110.16, facingDeg: 48.5 }),
    frequencyGHz: 4.754,
  };

  it("is heat and never gives anything back, even where a film would tune the feed", () => {
    for (const surface of ["beading", "mixed"] as const) {
      const scenario = scenarioOf({
        frequencyGHz: tuned.frequencyGHz,
        covers: { film: coverOf({ ...tuned.cover, surface }) },
        feeds: { stub: tuned.feed },
        weather: { wet: weatherOf({ coversWetAsAtMmPerH: 5 }) },
      });
      const budget = budgetOf(scenario);
      expect(entryOf(budget, "tx.water_mismatch").db).toBe(0);
      expect(entryOf(budget, "tx.water_loss").db).toBeLessThanOrEqual(0);
    }
  });

  it("costs on a surface that beads no more than the film, and on a mixed one the mean of both", () => {
    const loss = (surface: Cover["surface"], rain: number) =>
      budgetOf(
        scenarioOf({
          covers: { film: coverOf({ layers: sheets.film, surface }) },
          weather: { wet: weatherOf({ coversWetAsAtMmPerH: rain }) },
        }),
      ).transmitterCover.waterCostDb.nominal;
    for (const rain of [0.5, 5, 50, 150]) {
      const [beading, mixed, wetting] = [loss("beading", rain), loss("mixed", rain), loss("wetting", rain)];
      expect(beading).toBeLessThan(wetting + 1e-9);
      expect(mixed).toBeCloseTo((beading + wetting) / 2, 9);
    }
    // Merceret and Ward 2000, water-repellent: 0.0575 R tanh^2(f/10).
    expect(loss("beading", 10)).toBeCloseTo(0.575 * Math.tanh(1.0368) ** 2, 9);
  });

  it("of both ends together is shared by the ends that are wet", () => {
    const lossOf = (wets: readonly ("transmitter" | "receiver")[]) => {
      const { entries } = budgetOf(
        scenarioOf({
          covers: { film: coverOf({ layers: sheets.film, wetModel: "constant" }) },
          weather: { wet: weatherOf({ coversWetAsAtMmPerH: 5, wets }) },
        }),
      );
      return -entries.filter(({ id }) => id.endsWith("water_loss")).reduce((sum, { db }) => sum + db, 0);
    };
    // Practice of rain measurement by links, 1.5 to 2.3 dB for two wet antennas (from memory).
    expect(lossOf(["transmitter", "receiver"])).toBeCloseTo(1.9, 9);
    expect(lossOf(["receiver"])).toBeCloseTo(0.95, 9);
  });
});

describe("drops", () => {
  it("asked for on a surface over which water spreads are the film", () => {
    const wetCost = (change: Partial<Cover>) =>
      budgetOf(
        scenarioOf({
          covers: { film: coverOf({ layers: sheets.film, ...change }) },
          weather: { wet: weatherOf({ coversWetAsAtMmPerH: 5 }) },
        }),
      ).transmitterCover;
    expect(wetCost({ surface: "wetting", wetModel: "beads" })).toEqual(
      wetCost({ surface: "wetting", wetModel: "film" }),
    );
    expect(wetCost({ surface: "beading", wetModel: "beads" }).filmMm).toBe(0);
  });
});

describe("an upright mouth", () => {
  it("stays dry in calm rain under the film and is wetted by wind", () => {
    const film = (windMPerS: number) =>
      budgetOf(scenarioOf({ weather: { wet: weatherOf({ coversWetAsAtMmPerH: 10, windMPerS }) } }))
        .transmitterCover;
    expect(film(0).filmMm).toBe(0);
    expect(film(0).waterCostDb.nominal).toBeCloseTo(0, 12);
    expect(film(4).filmMm).toBeGreaterThan(0.02);
    // Nusselt's film goes as the cube root of the catch.
    expect(film(8).filmMm / film(1).filmMm).toBeCloseTo(2, 9);
  });
});
