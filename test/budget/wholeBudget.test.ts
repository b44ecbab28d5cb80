/** Whole budgets worked out a second time from closed forms written here, with complex numbers of mathjs. */
import { all, type Complex, create, type Matrix } from "mathjs";
import { describe, expect, it } from "vitest";
import type { Budget } from "../../src/budget/types.ts";
import {
  budgetOf,
  codesOf,
  coverOf,
  dishOf,
  eastOnEquator,
  entryOf,
  feedOf,
  layerOf,
  scenarioOf,
  siteOf,
  weatherOf,
} from "./scenarios.ts";

const math = create(all!, {});

const LIGHT = 299792458;
const WAVELENGTH_M = LIGHT / 10e9;
const db = (power: number) => 10 * Math.log10(power);
const ratio = (decibels: number) => 10 ** (decibels / 10);

// 10 GHz, 60 km, level; air of 15 degC with 7.5 g/m3 and 1013.25 hPa of dry air.
const air = { temperatureC: 15, vapourDensityGPerM3: 7.5, pressureHPa: 1013.25 + 9.97288878634 };
const sheet = { thicknessMm: 2, permittivity: 2.6, lossTangent: 0.006 };
const scenario = scenarioOf({
  frequencyGHz: 10,
  transmitter: { powerDbm: { value: 34.8 }, lineLossDb: { value: 0.5 } },
  receiver: {
    noiseFigureDb: { value: 1.1 },
    lineLossDb: { value: 0.3 },
    antennaTemperatureK: { value: 180 },
    modes: ["cw"],
  },
  feeds: { stub: feedOf({ returnLossDb: 14, apertureMm: 46 }) },
  covers: {
    film: coverOf({ layers: [layerOf(sheet.thicknessMm, sheet.permittivity, sheet.lossTangent)] }),
  },
  dish: { tripod: dishOf({ diameterM: 0.6, focalRatio: undefined, efficiency: 0.55 }) },
  path: { from: siteOf(), to: eastOnEquator(60) },
  weather: {
    dry: weatherOf(air),
    soaked: weatherOf({ ...air, coversWetAsAtMmPerH: 16, windMPerS: 4 }),
  },
});

/** What a stack of layers in air does to a wave, by its characteristic matrix (Born & Wolf 1.6). */
function throughStack(layers: readonly { eps: Complex; thicknessMm: number }[]) {
  let product = math.matrix([
    [1, 0],
    [0, 1],
  ]) as Matrix;
  for (const { eps, thicknessMm } of layers) {
    const scope = { eps, k0: (2 * Math.PI) / WAVELENGTH_M, t: thicknessMm / 1000 };
    const layer = math.evaluate(
      "[cos(k0 t sqrt(eps)), i sin(k0 t sqrt(eps))/sqrt(eps); i sqrt(eps) sin(k0 t sqrt(eps)), cos(k0 t sqrt(eps))]",
      scope,
    ) as Matrix;
    product = math.multiply(product, layer) as Matrix;
  }
  const scope = { m: product };
  const sum = "(m[1,1] + m[1,2] + m[2,1] + m[2,2])";
  return {
    reflection: math.evaluate(`(m[1,1] + m[1,2] - m[2,1] - m[2,2])/${sum}`, scope) as Complex,
    transmission: math.evaluate(`2/${sum}`, scope) as Complex,
  };
}

/** Mean and least dB over a phase that goes once around. */
function overPhase(lossDb: (phase: Complex) => number) {
  const steps = 720;
  const losses = Array.from({ length: steps }, (_, i) =>
    lossDb(math.complex({ r: 1, phi: (2 * Math.PI * i) / steps })),
  );
  return { meanDb: losses.reduce((total, loss) => total + loss, 0) / steps, mostDb: Math.max(...losses) };
}

/** Feed of return loss 14 dB before a sheet, phase going round: mean mismatch and mean whole loss. */
function feedAndSheet(reflection: Complex, transmission: Complex) {
  const g = 10 ** (-14 / 20);
  const back = (phase: Complex) => math.multiply(reflection, phase) as Complex;
  const denominator = (phase: Complex) =>
    Number(math.abs(math.subtract(1, math.multiply(g, back(phase))) as Complex));
  const mismatch = overPhase((phase) => {
    const gamma = Number(math.abs(math.subtract(g, back(phase)) as Complex)) / denominator(phase);
    return -db(1 - gamma ** 2);
  });
  const pass = Number(math.abs(transmission)) ** 2;
  const whole = overPhase((phase) => -db(((1 - g * g) * pass) / denominator(phase) ** 2));
  return { mismatch, whole };
}

/** The margin from a mouth's mean mismatch and whole loss; water and cover at 15 degC, all else at 290 K. */
function marginByHand(mouth: { mismatchDb: number; wholeDb: number }): number {
  const dish =
    db((Math.PI * 0.6) / WAVELENGTH_M) * 2 +
    db(0.55) -
    db(Math.E) * ((4 * Math.PI * 0.4e-3) / WAVELENGTH_M) ** 2 + // Ruze 1966
    2 * db(1 - (0.06 / 0.6) ** 2) - // uniform aperture, central disc
    24 * (0.5 / ((70 * WAVELENGTH_M) / 0.6)) ** 2; // mean of a Gaussian beam's loss over a normal aim
  const freeSpace = 20 * Math.log10((4 * Math.PI * 60e3) / WAVELENGTH_M); // P.525
  // ITU-R Study Group 3 validation examples, CG-3M3J-13-ValEx Rev 8.3.0, P.676-13 at 10 GHz.
  const gas = 60 * (0.00822441670271 + 0.00597412524548);
  const receivedDbm = 34.8 - 0.5 + 2 * dish - 2 * mouth.wholeDb - freeSpace - gas - 0.3;

  const matched = ratio(-mouth.mismatchDb);
  const passed = ratio(-mouth.wholeDb);
  const atMouthK = passed * 180 + (matched - passed) * 288.15 + (1 - matched) * 290;
  const line = ratio(-0.3);
  const systemK = atMouthK * line + 290 * (1 - line) + 290 * (ratio(1.1) - 1);
  const noiseDbm = db(1.380649e-23 * systemK * 500) + 30;
  const requiredDb = -9 + db(2500 / 500);
  return receivedDbm - noiseDbm - requiredDb;
}

const sheetEps = math.complex(sheet.permittivity, -sheet.permittivity * sheet.lossTangent);

describe("a dry budget by hand", () => {
  // Airy's form of a single slab, Born & Wolf 7.6.
  const slab = (expression: string) =>
    math.evaluate(expression, {
      n: math.sqrt(sheetEps),
      r: math.evaluate("(1 - n)/(1 + n)", { n: math.sqrt(sheetEps) }),
      P: math.evaluate("exp(-i k0 t n)", {
        n: math.sqrt(sheetEps),
        k0: (2 * Math.PI) / WAVELENGTH_M,
        t: sheet.thicknessMm / 1000,
      }),
    }) as Complex;
  const reflection = slab("r * (1 - P^2)/(1 - r^2 P^2)");
  const transmission = slab("(1 - r^2) * P/(1 - r^2 P^2)");
  const { mismatch, whole } = feedAndSheet(reflection, transmission);
  const budget = budgetOf(scenario, "dry");

  it("agrees in the margin", () => {
    const byHand = marginByHand({ mismatchDb: mismatch.meanDb, wholeDb: whole.meanDb });
    expect(Math.abs(budget.marginDb - byHand)).toBeLessThan(1e-6);
  });

  it("charges the mean over the phase and bounds it by the worst", () => {
    const mouth = budget.entries.filter(({ id }) => /^tx\.(feed_mismatch|cover_)/.test(id));
    expect(-sumOf(mouth, "db")).toBeCloseTo(whole.meanDb, 9);
    expect(-sumOf(mouth, "low")).toBeCloseTo(whole.mostDb, 4); // the sweep steps over the peak
    expect(-entryOf(budget, "tx.feed_mismatch").db - entryOf(budget, "tx.cover_mismatch").db).toBeCloseTo(
      mismatch.meanDb,
      9,
    );
  });
});

describe("a budget with water on the covers by hand", () => {
  // Nusselt's film on an upright plate of 46 mm, wind of 4 m/s against drops of 6.5 m/s; viscosity of water
  // at 15 degC 1.139e-6 m2/s (handbook value, from memory). Mean over the plate 3/4 of the lower edge.
  const catchMPerS = (16 / 3.6e6) * (4 / 6.5);
  const filmMm = 750 * Math.cbrt((3 * 1.139e-6 * catchMPerS * 0.046) / 9.80665);

  // Double Debye of water, Liebe, Hufford, Manabe 1991, as in P.840.
  const theta = 300 / 288.15 - 1;
  const e0 = 77.66 + 103.3 * theta;
  const waterEps = math.evaluate("e2 + (e1 - e2)/(1 + i f/fs) + (e0 - e1)/(1 + i f/fp)", {
    f: 10,
    e0,
    e1: 0.0671 * e0,
    e2: 3.52,
    fp: 20.2 - 146 * theta + 316 * theta ** 2,
    fs: 39.8 * (20.2 - 146 * theta + 316 * theta ** 2),
  }) as Complex;
  const { reflection, transmission } = throughStack([
    { eps: sheetEps, thicknessMm: sheet.thicknessMm },
    { eps: waterEps, thicknessMm: filmMm },
  ]);
  const { mismatch, whole } = feedAndSheet(reflection, transmission);
  const budget = budgetOf(scenario, "soaked");

  it("agrees in the film and in the margin", () => {
    expect(budget.transmitterCover.filmMm).toBeCloseTo(filmMm, 9);
    const byHand = marginByHand({ mismatchDb: mismatch.meanDb, wholeDb: whole.meanDb });
    expect(Math.abs(budget.marginDb - byHand)).toBeLessThan(1e-6);
  });

  it("splits the mean over the phase into bare feed, dry cover and water", () => {
    const part = (kind: RegExp) =>
      -sumOf(
        budget.entries.filter(({ id }) => kind.test(id)),
        "db",
      );
    expect(part(/^rx\.(feed|cover|water)_mismatch$/)).toBeCloseTo(mismatch.meanDb, 9);
    expect(part(/^rx\.(cover|water)_loss$/)).toBeCloseTo(whole.meanDb - mismatch.meanDb, 9);
  });
});

// Typical figures for amateur stations at 10.368 GHz: common practice, no source.
describe("a usual station", () => {
  const usual = scenarioOf({
    transmitter: { powerDbm: { value: db(3) + 30 }, cover: "bare", lineLossDb: { value: 0 } },
    receiver: {
      cover: "bare",
      lineLossDb: { value: 0 },
      noiseFigureDb: { value: 1.5 },
      modes: ["narrow"],
    },
    modes: {
      narrow: {
        name: "narrow",
        label: "400 Hz",
        noiseBandwidthHz: 400,
        requiredSnrDb: 0,
        referenceBandwidthHz: 400,
        sigmaDb: 1,
        source: "invented",
      },
    },
    feeds: { stub: feedOf({ returnLossDb: 60 }) },
    dish: {
      tripod: dishOf({ focalRatio: undefined, efficiency: 0.55, surfaceRmsMm: 0, blockageM: 0 }),
    },
  });
  const budget = budgetOf(usual);

  it("of 0.6 m has 33.7 dBi, and loses 0.53 dB by an aim good to 0.5 deg", () => {
    expect(entryOf(budget, "tx.aperture").db + entryOf(budget, "tx.efficiency").db).toBeCloseTo(33.7, 1);
    expect(entryOf(budget, "tx.pointing").db).toBeCloseTo(-0.53, 2);
  });

  it("of 3 W and a noise figure of 1.5 dB bridges about 250 dB at 0 dB in 400 Hz", () => {
    const aimDb = -2 * entryOf(budget, "tx.pointing").db;
    const pathDb = sumOf(
      budget.entries.filter(({ stage }) => stage === "path"),
      "db",
    );
    expect(Math.abs(budget.marginDb - pathDb + aimDb - 250)).toBeLessThan(1);
    expect(codesOf(budget)).toEqual([]);
  });

  it("loses 1.2 dB at a noise figure of 1 dB where its beam sees 290 K instead of 200 K", () => {
    const noiseAt = (antennaK: number) =>
      budgetOf({
        ...usual,
        receiver: {
          ...usual.receiver,
          noiseFigureDb: { value: 1 },
          antennaTemperatureK: { value: antennaK },
        },
      }).noiseDbm;
    expect(noiseAt(290) - noiseAt(200)).toBeCloseTo(1.2, 1);
  });
});

function sumOf(entries: Budget["entries"], figure: "db" | "low"): number {
  return entries.reduce((total, entry) => total + entry[figure], 0);
}
