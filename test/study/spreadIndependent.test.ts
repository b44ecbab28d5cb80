import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import type { Budget, Case } from "../../src/budget/types.ts";
import type { Cover, EndName, Scenario, Weather } from "../../src/scenario/types.ts";
import { type SpreadRow, spreadOf } from "../../src/study/spread.ts";
import { caseOf, coverOf, layerOf, scenarioOf, weatherOf } from "../budget/scenarios.ts";

/**
 * The spread against a second model of it: every draw rewrites the scenario, asks the whole engine anew, with the
 * phase between feed and cover stated so that the cascade is exact, and adds by hand what a budget leaves out. It
 * shares the engine's physics, and neither random numbers, grids, linear steps nor order of work.
 */

/** Mulberry32 (public domain, from memory): another generator than the study's. */
function randomNumbers(seed: number) {
  let state = seed >>> 0;
  const uniform = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return (((t ^ (t >>> 14)) >>> 0) + 0.5) / 2 ** 32;
  };
  /** Box & Muller 1958. */
  const normal = () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
  return { uniform, normal };
}
type Random = ReturnType<typeof randomNumbers>;

const db = (loss: number) => 10 ** (-loss / 10);
/** Logarithm of a log-normal whose standard deviation is a share of its median, to first order. */
const logSigma = (share: number) => Math.sqrt(Math.log(1 + share ** 2));

/** What one draw holds beside the rewritten scenario; the same for every cover. */
interface Draw {
  /** Of the whole level [dB]. */
  readonly byHandDb: number;
  readonly gas: number;
  /** Deviations of the wave before a mouth from a plane one; one sheet, so that both ends share them. */
  readonly near: number;
  readonly water: Readonly<Record<EndName, number>>;
  readonly ways: Readonly<Record<string, number>>;
}

interface Setting {
  readonly scenario: Scenario;
  /** Ends of a flat range of the covers' permittivity. */
  readonly permittivity?: readonly [number, number];
  readonly readingSigmaDb?: number;
  readonly rainFactor?: number;
}

/** One draw: inputs moved, the rest kept for later. */
function drawn(random: Random, setting: Setting, weather: string): { scenario: Scenario; draw: Draw } {
  const { scenario, permittivity, readingSigmaDb = 0, rainFactor = 1.15 } = setting;
  const { uniform, normal } = random;
  const { rainMmPerH, extentKm, ...air } = scenario.weather[weather]!;
  const rate = rainMmPerH.value * rainFactor ** normal();
  const length = Math.max(0, 1 + 0.25 * normal());
  const there: Weather = {
    ...air,
    rainMmPerH: { value: rate },
    extentKm: extentKm === undefined ? undefined : Math.max(1e-9, extentKm * length),
  };
  const heat = Math.exp(logSigma(0.4) * normal()); // of one sheet on both ends
  const place = uniform();
  const reading = readingSigmaDb * normal();
  const cover = (one: Cover): Cover => ({
    ...one,
    layers: one.layers.map((layer) => {
      const [low, high] = permittivity ?? [layer.permittivity.nominal, layer.permittivity.nominal];
      const loss = layer.lossTangent.nominal * heat;
      return {
        ...layer,
        permittivity: { low: 1, nominal: low + place * (high - low), high: 10 },
        lossTangent: { low: loss, nominal: loss, high: loss },
      };
    }),
    measured: one.measured && {
      ...one.measured,
      insertionLossDb: { value: one.measured.insertionLossDb.value + reading },
    },
  });
  const feedAt = (end: EndName) => ({
    ...scenario.feeds[scenario[end].feed]!,
    returnLossDb: Math.max(0.1, scenario.feeds[scenario[end].feed]!.returnLossDb + 2 * normal()),
    phaseDeg: 360 * uniform(),
  });
  const dishAt = (end: EndName) => {
    const dish = scenario.dish[scenario[end].dish!]!;
    const aimDeg = dish.pointingErrorDeg * Math.hypot(normal(), normal());
    return { ...dish, pointingErrorDeg: 0, pointingOffsetDeg: aimDeg };
  };
  const lineAt = (end: EndName) => {
    const { value } = scenario[end].lineLossDb;
    return { value: Math.max(0, value + Math.min(0.3, value / 2) * normal()) };
  };
  const wet = normal();
  const wetToo = 0.8 * wet + 0.6 * normal();
  const blunderDb = uniform() < 0.035 ? 10 + 10 * uniform() : 0;
  const after: Scenario = {
    ...scenario,
    transmitter: {
      ...scenario.transmitter,
      powerDbm: { value: scenario.transmitter.powerDbm.value + 0.7 * normal() },
      lineLossDb: lineAt("transmitter"),
      feed: "near",
      dish: "near",
    },
    receiver: {
      ...scenario.receiver,
      lineLossDb: lineAt("receiver"),
      noiseFigureDb: { value: Math.max(0, scenario.receiver.noiseFigureDb.value + 0.5 * normal()) },
      antennaTemperatureK: { value: Math.max(2.7, 200 + 40 * normal()) },
      feed: "far",
      dish: "far",
    },
    feeds: { near: feedAt("transmitter"), far: feedAt("receiver") },
    dish: { near: dishAt("transmitter"), far: dishAt("receiver") },
    covers: Object.fromEntries(Object.entries(scenario.covers).map(([name, one]) => [name, cover(one)])),
    weather: { [weather]: there },
  };
  return {
    scenario: after,
    draw: {
      // Gains of both ends out of their size, CW's threshold, tilt, blunder.
      byHandDb: 0.6 * (normal() + normal()) - 3 * normal() - 0.3 * uniform() - blunderDb,
      gas: 0.05 * normal(),
      near: normal(),
      water: {
        transmitter: Math.exp(logSigma(0.5) * wet),
        receiver: Math.exp(logSigma(0.5) * wetToo),
      },
      ways: { diffraction: normal(), troposcatter: normal(), rain_scatter: normal() },
    },
  };
}

const lossOf = ({ entries }: Budget, ...ids: readonly string[]) =>
  0 - entries.filter(({ id }) => ids.includes(id)).reduce((sum, entry) => sum + entry.db, 0);

/** System temperature at the receiver's input [K], its mouth and dish cover wetter than the engine has them. */
function systemK(
  scenario: Scenario,
  budget: Budget,
  ambientK: number,
  times: number,
  nearDb: number,
): number {
  const { receiver } = scenario;
  const rainDb = lossOf(budget, "path.rain", "path.fog");
  const skyK = receiver.antennaTemperatureK!.value * db(rainDb) + 275 * (1 - db(rainDb));
  const overReflected = db(lossOf(budget, "rx.dish_cover_reflected"));
  const overPassed =
    overReflected * db(lossOf(budget, "rx.dish_cover_heat") + times * lossOf(budget, "rx.dish_cover_water"));
  const apertureK = overPassed * skyK + (overReflected - overPassed) * ambientK + (1 - overReflected) * 290;
  const matched = Math.min(
    1,
    db(
      lossOf(budget, "rx.feed_mismatch", "rx.cover_mismatch") +
        nearDb +
        times * lossOf(budget, "rx.water_mismatch"),
    ),
  );
  const passed = matched * db(lossOf(budget, "rx.cover_loss") + times * lossOf(budget, "rx.water_loss"));
  const mouthK = passed * apertureK + (matched - passed) * ambientK + (1 - matched) * 290;
  const line = db(receiver.lineLossDb.value);
  return mouthK * line + 290 * (1 - line) + 290 * (10 ** (receiver.noiseFigureDb.value / 10) - 1);
}

/** Margin of one cover in one draw. */
function marginOf(
  scenario: Scenario,
  { budget, ambientK }: { budget: Budget; ambientK: number },
  { byHandDb, gas, near, water, ways }: Draw,
  sigmas: Sigmas,
): number {
  const waterDb = (prefix: string) =>
    lossOf(budget, `${prefix}.water_mismatch`, `${prefix}.water_loss`, `${prefix}.dish_cover_water`);
  const nearDb = budget.case.transmitter.cover === "bare" ? 0 : near * (sigmas["plane_wave"] ?? 0);
  const noise = (times: number, nearDb: number) =>
    10 * Math.log10(systemK(scenario, budget, ambientK, times, nearDb));
  const [best] = budget.mechanisms;
  const carried = budget.mechanisms.map(({ name, excessDb }) => {
    const there = excessDb + (sigmas[name] ?? 0) * (ways[name] ?? 0);
    return name === "diffraction" ? Math.max(0, there) : there;
  });
  return (
    budget.marginDb +
    byHandDb -
    gas * lossOf(budget, "path.gas") -
    (water.transmitter - 1) * waterDb("tx") -
    (water.receiver - 1) * waterDb("rx") -
    2 * nearDb -
    (noise(water.receiver, nearDb) - noise(1, 0)) +
    best!.excessDb -
    Math.min(...carried)
  );
}

/** Standard deviations of the ways over the ground, and of a plane wave that is none [dB]. */
type Sigmas = Readonly<Record<string, number>>;

/** 0.1 dB or 30 % of the dry sheet's loss, as the model of a sheet before a mouth has it: common practice, no source. */
function planeWaveSigma(scenario: Scenario): number {
  const link = prepare(scenario);
  const { transmitterCover } = evaluate(link, caseOf(scenario, Object.keys(scenario.weather)[0]!));
  return Math.max(0.1, 0.3 * transmitterCover.dryCostDb.nominal);
}

interface Found {
  readonly margins: number[];
  readonly costs: number[];
}

/** The second model: margins of the scenario's covers, and what they take in the same draws. */
function secondModel(setting: Setting, draws: number, sigmas: Sigmas): Found {
  const random = randomNumbers(20260);
  const weather = Object.keys(setting.scenario.weather)[0]!;
  const found: Found = { margins: [], costs: [] };
  for (let i = 0; i < draws; i++) {
    const { scenario, draw } = drawn(random, setting, weather);
    const link = prepare(scenario);
    const chosen = caseOf(scenario, weather);
    const { ambientK } = link.weathers[weather]!;
    const margin = (one: Case) => marginOf(scenario, { budget: evaluate(link, one), ambientK }, draw, sigmas);
    const covered = margin(chosen);
    const bare = margin({
      ...chosen,
      transmitter: { ...chosen.transmitter, cover: "bare" },
      receiver: { ...chosen.receiver, cover: "bare" },
    });
    found.margins.push(covered);
    found.costs.push(bare - covered);
  }
  return found;
}

function quantile(sample: readonly number[], p: number): number {
  const sorted = sample.toSorted((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(p * sorted.length))]!;
}

/** Standard error of a sample's quantile, by the slope of the sample about it. */
function quantileError(sample: readonly number[], p: number): number {
  const step = 0.04;
  const slope =
    (quantile(sample, Math.min(0.999, p + step)) - quantile(sample, Math.max(0.001, p - step))) / (2 * step);
  return slope * Math.sqrt((p * (1 - p)) / sample.length);
}

const ROUNDING_DB = 0.05;

function studied(scenario: Scenario): SpreadRow {
  const link = prepare(scenario);
  const weather = Object.keys(scenario.weather)[0]!;
  const study = spreadOf(link, [caseOf(scenario, weather)], { draws: 60_000, seed: 4, precision: 1e-9 });
  return study.rows[0]!;
}

/** Both agree to four standard errors of the smaller sample, and to a twentieth of a dB beside. */
function expectAgreement(row: SpreadRow, { margins, costs }: Found) {
  const { marginDb, costDb, closes } = row;
  const told = {
    low: [marginDb.lowDb, quantile(margins, 0.05), quantileError(margins, 0.05)],
    median: [marginDb.medianDb, quantile(margins, 0.5), quantileError(margins, 0.5)],
    high: [marginDb.highDb, quantile(margins, 0.95), quantileError(margins, 0.95)],
    costLow: [costDb!.lowDb, quantile(costs, 0.05), quantileError(costs, 0.05)],
    cost: [costDb!.medianDb, quantile(costs, 0.5), quantileError(costs, 0.5)],
    costHigh: [costDb!.highDb, quantile(costs, 0.95), quantileError(costs, 0.95)],
  } as const;
  for (const [what, [ours, theirs, error]] of Object.entries(told)) {
    expect(Math.abs(ours - theirs), `${what}: ${ours} against ${theirs}`).toBeLessThan(
      4 * error + ROUNDING_DB,
    );
  }
  const share = margins.filter((margin) => margin > 0).length / margins.length;
  expect(share).toBeGreaterThan(0.05); // the level was chosen for a chance that tells something
  expect(share).toBeLessThan(0.95);
  expect(Math.abs(closes.share - share)).toBeLessThan(
    4 * Math.sqrt((share * (1 - share)) / margins.length) + 0.005,
  );
}

const DRAWS = 1000;
const ends = (powerDbm: number, cover: string) => ({
  transmitter: { powerDbm: { value: powerDbm }, cover },
  receiver: { cover },
});

describe("the spread against the engine asked anew in every draw", () => {
  it("dry, a lossy sheet of unknown phase before both feeds", () => {
    const scenario = scenarioOf({
      ...ends(-66, "plate"),
      covers: { bare: coverOf(), plate: coverOf({ layers: [layerOf(2, 2.8, 0.01)] }) },
    });
    const sigmas = { plane_wave: planeWaveSigma(scenario) };
    expectAgreement(studied(scenario), secondModel({ scenario }, DRAWS, sigmas));
  });

  it("dry, a sheet whose permittivity is known as a range, near half a wave", () => {
    const plate = { ...layerOf(7.5, 2.8, 0.005), permittivity: { low: 2.5, nominal: 2.8, high: 3.1 } };
    const scenario = scenarioOf({
      ...ends(-66, "plate"),
      covers: { bare: coverOf(), plate: coverOf({ layers: [plate] }) },
    });
    const sigmas = { plane_wave: planeWaveSigma(scenario) };
    expectAgreement(studied(scenario), secondModel({ scenario, permittivity: [2.5, 3.1] }, DRAWS, sigmas));
  });

  it("rain by a gauge, covers at both ends that bead", () => {
    const scenario = scenarioOf({
      ...ends(-56, "film"),
      covers: { bare: coverOf(), film: coverOf({ layers: [layerOf(0.127, 2.05)], surface: "beading" }) },
      weather: { rain: weatherOf({ rainMmPerH: { value: 20 }, extentKm: 10 }) },
    });
    const sigmas = { plane_wave: planeWaveSigma(scenario) };
    expectAgreement(studied(scenario), secondModel({ scenario }, DRAWS, sigmas));
  });

  it("rain by a word, a factor of two, covers that wet", () => {
    const factor = { kind: "lognormal", factor: 2 } as const;
    const scenario = scenarioOf({
      ...ends(-56, "film"),
      covers: {
        bare: coverOf(),
        film: coverOf({ layers: [layerOf(0.5, 2.5, 0.002)], surface: "wetting" }),
      },
      weather: { rain: weatherOf({ rainMmPerH: { value: 12, scatter: factor }, extentKm: 10 }) },
    });
    const sigmas = { plane_wave: planeWaveSigma(scenario) };
    expectAgreement(studied(scenario), secondModel({ scenario, rainFactor: 2 }, DRAWS, sigmas));
  });

  it("an obstructed path: diffraction against troposcatter, the better one in each draw", () => {
    const plain = scenarioOf(ends(-10, "film"));
    const scenario: Scenario = {
      ...plain,
      path: {
        ...plain.path,
        profile: { distancesKm: [0, 15, 30, 45, 60], heightsM: [500, 400, 900, 400, 500] },
      },
      spread: { diffractionDb: 4, troposcatterDb: 7 },
    };
    const sigmas = { plane_wave: planeWaveSigma(scenario), diffraction: 4, troposcatter: 7 };
    expectAgreement(studied(scenario), secondModel({ scenario }, DRAWS, sigmas));
  });

  it("a cover by its reading", () => {
    const scenario = scenarioOf({
      ...ends(-66, "sheet"),
      covers: {
        bare: coverOf(),
        sheet: coverOf({
          measured: { insertionLossDb: { value: 0.5, sigma: 0.15 }, returnLossChangeDb: { value: 2 } },
        }),
      },
    });
    expectAgreement(studied(scenario), secondModel({ scenario, readingSigmaDb: 0.15 }, DRAWS, {}));
  });

  it("cloth over both dishes, wet, before feeds with a film", () => {
    const scenario = scenarioOf({
      transmitter: { powerDbm: { value: -56 }, cover: "film", dishCover: "cloth" },
      receiver: { cover: "film", dishCover: "cloth" },
      covers: {
        bare: coverOf(),
        film: coverOf({ layers: [layerOf(0.127, 2.05)] }),
        cloth: coverOf({ layers: [layerOf(0.5, 2.6, 0.05)], surface: "wetting" }),
      },
      weather: { rain: weatherOf({ rainMmPerH: { value: 10 }, extentKm: 10 }) },
    });
    const sigmas = { plane_wave: planeWaveSigma(scenario) };
    expectAgreement(studied(scenario), secondModel({ scenario }, DRAWS, sigmas));
  });
});
