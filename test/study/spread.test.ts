import { describe, expect, it } from "vitest";
import { cases } from "../../src/budget/cases.ts";
import { drawingOf } from "../../src/budget/drawing.ts";
import { prepare } from "../../src/budget/prepare.ts";
import { normalCdf } from "../../src/numeric/normal.ts";
import { proportionInterval } from "../../src/numeric/proportion.ts";
import { rankCorrelation, variance } from "../../src/numeric/ranking.ts";
import type { Scenario, SpreadSettings } from "../../src/scenario/types.ts";
import { spreadOf } from "../../src/study/spread.ts";
import { sampleOf } from "../../src/study/spreadSampling.ts";
import { coverOf, dishOf, feedOf, layerOf, scenarioOf, siteOf, weatherOf } from "../budget/scenarios.ts";

/** Everything that scatters switched off but for what a test switches on. */
const quiet: SpreadSettings = {
  tiltLossDb: { value: 0, sigma: 0 },
  blunder: { chance: 0, lossDb: { value: 0 } },
  feedReturnLossDb: 0,
  coverLossShare: 0,
  gasShare: 0,
  rainRateFactor: 1,
  rainLengthShare: 0,
};
const exact = { value: 0, sigma: 0 };

function quietScenario(change: Parameters<typeof scenarioOf>[0] = {}): Scenario {
  const { transmitter, receiver, spread, ...rest } = change;
  return scenarioOf({
    covers: { bare: coverOf() },
    dish: {
      tripod: dishOf({
        diameterM: undefined,
        focalRatio: undefined,
        gainDbi: { value: 34, sigma: 0 },
        pointingErrorDeg: 0,
      }),
    },
    modes: {
      cw: {
        name: "cw",
        label: "CW",
        noiseBandwidthHz: 500,
        requiredSnrDb: 0,
        referenceBandwidthHz: 500,
        sigmaDb: 0,
        source: "scenario",
      },
    },
    ...rest,
    transmitter: { cover: "bare", lineLossDb: exact, powerDbm: { value: 30, sigma: 0 }, ...transmitter },
    receiver: {
      cover: "bare",
      lineLossDb: exact,
      noiseFigureDb: { value: 1, sigma: 0 },
      antennaTemperatureK: { value: 200, sigma: 0 },
      ...receiver,
    },
    spread: { ...quiet, ...spread },
  });
}

const DRAWS = 60_000;
const sampling = { draws: DRAWS, seed: 7, precision: 1e-9 };

function rowOf(scenario: Scenario, seed = 7) {
  const link = prepare(scenario);
  return spreadOf(link, cases(link).slice(0, 1), { ...sampling, seed }).rows[0]!;
}

/** Four standard errors of a mean: one honest run in 16,000 fails. */
const meanError = (sigma: number) => (4 * sigma) / Math.sqrt(DRAWS);

describe("draws against closed forms", () => {
  it("nothing scatters where all is exact", () => {
    const { sigmaDb, meanDb, budget } = rowOf(quietScenario());
    expect(sigmaDb).toBeLessThan(1e-9);
    expect(meanDb).toBeCloseTo(budget.marginDb, 9);
  });

  it("a sum of normals: mean, deviation, quantiles, and the budget's own probability", () => {
    const scenario = quietScenario({
      transmitter: {
        powerDbm: { value: -62, sigma: 1.2 },
        lineLossDb: { value: 5, sigma: 0.5 },
      },
      dish: {
        tripod: dishOf({
          diameterM: undefined,
          focalRatio: undefined,
          gainDbi: { value: 34, sigma: 0.8 },
          pointingErrorDeg: 0,
        }),
      },
    });
    const row = rowOf(scenario);
    const sigma = Math.hypot(1.2, 0.5, 0.8, 0.8); // both ends have the dish
    expect(row.budget.marginSigmaDb).toBeCloseTo(sigma, 9);
    expect(Math.abs(row.meanDb - row.budget.marginDb)).toBeLessThan(meanError(sigma));
    expect(Math.abs(row.sigmaDb / sigma - 1)).toBeLessThan(4 / Math.sqrt(2 * DRAWS));
    expect(row.marginDb.lowDb).toBeCloseTo(row.budget.marginDb - 1.6449 * sigma, 1);
    expect(row.marginDb.highDb).toBeCloseTo(row.budget.marginDb + 1.6449 * sigma, 1);
    expect(row.closes.share).toBeGreaterThan(0.05); // the level was chosen for a probability that is told
    expect(row.closes.share).toBeLessThan(0.95);
    expect(Math.abs(row.closes.share - row.budget.holdProbability)).toBeLessThan(4 * Math.sqrt(0.25 / DRAWS));
    expect(row.verdict).toBe(row.budget.verdict);
  });

  it("a log-normal line loss: exp(s^2/2) in the mean, and its deviation", () => {
    const factor = 1.8;
    const s = Math.log(factor);
    const { meanDb, sigmaDb, marginDb, budget } = rowOf(
      quietScenario({
        transmitter: { lineLossDb: { value: 2, sigma: 1.5, scatter: { kind: "lognormal", factor } } },
      }),
    );
    const mean = 2 * Math.exp(s ** 2 / 2);
    const sigma = mean * Math.sqrt(Math.exp(s ** 2) - 1);
    expect(Math.abs(budget.marginDb - meanDb - (mean - 2))).toBeLessThan(meanError(sigma));
    expect(sigmaDb / sigma).toBeGreaterThan(0.95);
    expect(sigmaDb / sigma).toBeLessThan(1.05);
    expect(marginDb.medianDb).toBeCloseTo(budget.marginDb, 1); // the value is the median
  });

  it("aim: an exponential loss of mean and deviation 24 (s/b)^2, both ends apart", () => {
    const scenario = quietScenario({
      dish: {
        tripod: dishOf({ gainDbi: { value: 34, sigma: 0 }, pointingErrorDeg: 0.6, focalRatio: undefined }),
      },
    });
    const beam = prepare(scenario).ends.receiver["stub"]!.beamwidthDeg!;
    const mean = 24 * (0.6 / beam) ** 2;
    const { meanDb, sigmaDb, marginDb, budget } = rowOf(scenario);
    expect(mean).toBeGreaterThan(0.5);
    expect(Math.abs(meanDb - budget.marginDb)).toBeLessThan(meanError(mean * Math.SQRT2)); // a budget takes the mean
    expect(sigmaDb / (mean * Math.SQRT2)).toBeCloseTo(1, 1);
    // Sum of two equal exponentials: gamma of order 2, whose 95 % quantile is 4.7439 means (from memory).
    expect(marginDb.lowDb).toBeCloseTo(budget.marginDb + 2 * mean - 4.7439 * mean, 1);
  });

  it("aim about a standing offset: the moments of the noncentral chi-square", () => {
    const scenario = quietScenario({
      dish: {
        tripod: dishOf({
          gainDbi: { value: 34, sigma: 0 },
          focalRatio: undefined,
          pointingErrorDeg: 0.4,
          pointingOffsetDeg: 0.8,
        }),
      },
    });
    const beam = prepare(scenario).ends.receiver["stub"]!.beamwidthDeg!;
    const sigma = (24 * 0.4 * Math.hypot(0.4, 0.8)) / beam ** 2;
    const { meanDb, sigmaDb, budget } = rowOf(scenario);
    expect(Math.abs(meanDb - budget.marginDb)).toBeLessThan(meanError(sigma * Math.SQRT2));
    expect(sigmaDb / (sigma * Math.SQRT2)).toBeCloseTo(1, 1);
  });

  it("a flat loss, and a mixture by its shares", () => {
    const flat = rowOf(
      quietScenario({
        transmitter: {
          lineLossDb: { value: 3, sigma: 1, scatter: { kind: "flat", low: 1, high: 5 } },
        },
      }),
    );
    expect(flat.sigmaDb).toBeCloseTo(4 / Math.sqrt(12), 1);
    expect(flat.marginDb.highDb - flat.marginDb.lowDb).toBeCloseTo(0.9 * 4, 1);
    const blundering = rowOf(
      quietScenario({
        spread: {
          blunder: {
            chance: 0.3,
            lossDb: { value: 200, sigma: 1, scatter: { kind: "flat", low: 199, high: 201 } },
          },
        },
      }),
    );
    expect(Math.abs(blundering.closes.share - 0.7)).toBeLessThan(4 * Math.sqrt(0.21 / DRAWS));
  });

  it("place by a short locator: flat, so that no draw lies farther than the cell", () => {
    const far = quietScenario();
    const { marginDb, sigmaDb } = rowOf({
      ...far,
      path: { ...far.path, from: siteOf({ positionErrorKm: 3 }) },
    });
    const reach = 20 * Math.log10((60 + 3 / Math.sqrt(3)) / 60) * Math.sqrt(3);
    expect(sigmaDb).toBeCloseTo(reach / Math.sqrt(3), 2);
    expect(marginDb.highDb - marginDb.lowDb).toBeCloseTo(0.9 * 2 * reach, 2);
  });
});

describe("ends that hang together", () => {
  const gains = (correlation: number) =>
    rowOf(
      quietScenario({
        dish: {
          tripod: dishOf({
            diameterM: undefined,
            focalRatio: undefined,
            gainDbi: { value: 34, sigma: 1 },
            pointingErrorDeg: 0,
          }),
        },
        spread: { correlation: { gain: correlation } },
      }),
    ).sigmaDb;

  it("add as they are tied: sqrt(2 + 2 r) of one of them", () => {
    for (const r of [-1, -0.5, 0, 0.5, 1]) expect(gains(r)).toBeCloseTo(Math.sqrt(2 + 2 * r), 1);
  });

  it("water of one rain on both covers: wider than two independent ones", () => {
    const wet = (water: number) =>
      rowOf(
        quietScenario({
          transmitter: { cover: "film" },
          receiver: { cover: "film" },
          covers: {
            bare: coverOf(),
            film: coverOf({ layers: [layerOf(0.127, 2.05)], surface: "beading" }),
          },
          feeds: { stub: feedOf({ returnLossDb: 60 }) },
          weather: { now: weatherOf({ rainMmPerH: { value: 30, sigma: 0 } }) },
          spread: { correlation: { water } },
        }),
      ).sigmaDb;
    const [tied, apart] = [wet(1), wet(0)];
    expect(tied / apart).toBeGreaterThan(1.25);
    expect(tied / apart).toBeLessThan(Math.SQRT2);
  });
});

describe("the study", () => {
  const scenario = scenarioOf({
    transmitter: { powerDbm: { value: -42 } },
    covers: {
      bare: coverOf(),
      film: coverOf({ layers: [layerOf(0.127, 2.05, 0.0007)], surface: "beading" }),
      plate: coverOf({ layers: [layerOf(2, 2.8, 0.006)], surface: "wetting" }),
    },
    weather: { dry: weatherOf(), shower: weatherOf({ rainMmPerH: { value: 10 }, extentKm: 5 }) },
  });
  const link = prepare(scenario);
  const all = cases(link);

  it("gives the same numbers for the same seed, and others that agree for another one", () => {
    const some = (seed: number) => spreadOf(link, all, { draws: 20_000, seed, precision: 1e-9 });
    const [one, again, other] = [some(1), some(1), some(2)];
    expect(again).toEqual(one);
    for (const [i, row] of one.rows.entries()) {
      const twin = other.rows[i]!;
      expect(twin.meanDb).not.toBe(row.meanDb);
      expect(Math.abs(twin.meanDb - row.meanDb)).toBeLessThan((6 * row.sigmaDb) / Math.sqrt(20_000));
    }
  });

  it("leaves a case's draws as they are, whatever else is drawn beside it", () => {
    const own = all.filter(({ transmitter: { cover } }) => cover === "film");
    const draws = { draws: 5000, seed: 3, precision: 1e-9 };
    const [alone, among] = [spreadOf(link, own, draws), spreadOf(link, all, draws)];
    for (const row of alone.rows) {
      const same = among.rows.find(({ case: one }) => JSON.stringify(one) === JSON.stringify(row.case))!;
      expect(same.marginDb).toEqual(row.marginDb);
      expect(same.costDb).toEqual(row.costDb);
    }
  });

  it("lets the rain of two weathers rise and fall together, each by its own distribution", () => {
    const rain = (factor: number) =>
      weatherOf({ rainMmPerH: { value: 20, scatter: { kind: "lognormal", factor } }, extentKm: 10 });
    const two = prepare(quietScenario({ weather: { now: rain(1.2), later: rain(2) } }));
    const drawing = drawingOf(two, cases(two));
    const labels = drawing.causes.filter(({ id }) => id === "rain.rate").map(({ label }) => label);
    expect(labels).toEqual(["rain rate, now", "rain rate, later"]);
    const sample = sampleOf(drawing, { draws: 1000, seed: 1, precision: 0.1 });
    expect(rankCorrelation(...(sample.margins as [Float64Array, Float64Array]))).toBeGreaterThan(0.999);
    const [now, later] = sample.margins.map((margins) => Math.sqrt(variance(margins)));
    expect(later! / now!).toBeGreaterThan(3);
  });

  it("stops as soon as every chance is known well enough, and says how well", () => {
    const study = spreadOf(link, all, { draws: 200_000, seed: 1, precision: 0.01 });
    expect(study.draws).toBeLessThan(200_000);
    expect(study.halfWidth).toBeLessThanOrEqual(0.01);
    for (const { closes } of study.rows) expect(closes.high - closes.low).toBeLessThanOrEqual(0.0201);
    const short = spreadOf(link, all, { draws: 500, seed: 1, precision: 0.001 });
    expect(short.draws).toBe(500);
    expect(short.halfWidth).toBeGreaterThan(0.001);
  });

  it("tells intervals that hold the true chance in about 95 of 100 runs", () => {
    const known = quietScenario({ transmitter: { powerDbm: { value: -64, sigma: 2 } } });
    const ready = prepare(known);
    const drawing = drawingOf(ready, cases(ready).slice(0, 1));
    const truth = normalCdf(drawing.budgets[0]!.marginDb / 2);
    let held = 0;
    for (let seed = 0; seed < 200; seed++) {
      const [margins] = sampleOf(drawing, { draws: 400, seed, precision: 1e-9 }).margins;
      const hits = margins!.filter((db) => db > 0).length;
      const { low, high } = proportionInterval({ hits, trials: 400 });
      if (low <= truth && truth <= high) held++;
    }
    expect(truth).toBeGreaterThan(0.1);
    expect(truth).toBeLessThan(0.9);
    expect(held).toBeGreaterThan(180); // binomial: 190 expected, 3.1 the deviation
    expect(held).toBeLessThanOrEqual(199);
  });

  it("ranks by variance: two normals of 3 and 1 dB share it 9 to 1", () => {
    const two = quietScenario({
      transmitter: { powerDbm: { value: 30, sigma: 3 } },
      modes: {
        cw: {
          name: "cw",
          label: "CW",
          noiseBandwidthHz: 500,
          requiredSnrDb: 0,
          referenceBandwidthHz: 500,
          sigmaDb: 1,
          source: "scenario",
        },
      },
    });
    const ready = prepare(two);
    const { rankings } = spreadOf(ready, cases(ready).slice(0, 1), { draws: 1000, seed: 5, precision: 1e-9 });
    const [first, second, ...more] = rankings[0]!.matters;
    expect([first!.matter, second!.matter]).toEqual(["power", "operator"]);
    expect(more).toEqual([]);
    expect(first!.varianceShare).toBeCloseTo(0.9, 1);
    expect(Math.abs(second!.varianceShare - 0.1)).toBeLessThan(0.03);
    // Ranks of a sum of normals: (6/pi) asin(r/2) of the plain correlation r = 3/sqrt(10) (Pearson 1907, from memory).
    expect(first!.rankCorrelation).toBeCloseTo((6 / Math.PI) * Math.asin(3 / Math.sqrt(10) / 2), 1);
    // Power known: the threshold's deviation of 1 dB is left.
    expect(first!.knownLowDb).toBeCloseTo(rankings[0]!.lowDb + 1.645 * (Math.sqrt(10) - 1), 0);
  });

  it("counts what a cover loses in the same draws, not between two samples", () => {
    const { rows } = spreadOf(link, all, { draws: 20_000, seed: 1, precision: 1e-9 });
    for (const row of rows.filter(({ costDb }) => costDb !== undefined)) {
      const bare = rows.find(
        ({ case: one }) => one.weather === row.case.weather && one.transmitter.cover === "bare",
      )!;
      expect(row.lost - row.won).toBeCloseTo(bare.closes.share - row.closes.share, 9);
      // What the cover takes spreads far less than either margin does.
      expect(row.costDb!.highDb - row.costDb!.lowDb).toBeLessThan(
        0.6 * (bare.marginDb.highDb - bare.marginDb.lowDb),
      );
    }
  });
});

describe("what a matter does to the mean", () => {
  const shiftsOf = (scenario: Scenario) => {
    const link = prepare(scenario);
    const { rankings } = spreadOf(link, cases(link).slice(0, 1), { draws: 1000, seed: 7, precision: 0.1 });
    return new Map(rankings[0]!.matters.map(({ matter, shiftDb }) => [matter, shiftDb]));
  };
  const wavering = {
    receiver: { noiseFigureDb: { value: 1, sigma: 0 }, lineLossDb: { value: 1, sigma: 0.1 } },
  };

  it("is its own doing: a mixture whose mean the budget takes moves nothing, least of all by another matter", () => {
    const mixture = {
      kind: "mixture",
      parts: [
        { share: 0.75, value: 30 },
        { share: 0.25, value: 10 },
      ],
    } as const;
    const shifts = shiftsOf(
      quietScenario({ ...wavering, transmitter: { powerDbm: { value: 25, scatter: mixture } } }),
    );
    expect(shifts.get("line")).toBeCloseTo(0, 1);
    expect(Math.abs(shifts.get("power")!)).toBeLessThan(0.6); // four standard errors of 4096 draws of 8.7 dB
  });

  it("is its own doing where the ends' aims are tied", () => {
    const tripod = dishOf({
      diameterM: undefined,
      focalRatio: undefined,
      gainDbi: { value: 34, sigma: 0 },
      pointingErrorDeg: 1,
    });
    const shifts = shiftsOf(
      quietScenario({ ...wavering, dish: { tripod }, spread: { correlation: { aim: 0.5 } } }),
    );
    expect(shifts.get("line")).toBeCloseTo(0, 1);
    expect(Math.abs(shifts.get("aim")!)).toBeLessThan(0.4); // four standard errors of 4096 draws
  });
});
