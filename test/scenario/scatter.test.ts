import { describe, expect, it } from "vitest";
import type { Uncertain } from "../../src/scenario/types.ts";
import { scenarioOf, spoiled } from "./sample.ts";

/** The sample with the transmitter's power, or its line loss, or the rain, written otherwise. */
const power = async (written: string) =>
  (await scenarioOf(spoiled(["power: 3 W", `power: ${written}`]))).transmitter.powerDbm;
const line = async (written: string) =>
  (await scenarioOf(spoiled(["line_loss: 0.5 dB", `line_loss: ${written}`]))).transmitter.lineLossDb;
const rain = async (written: string) =>
  (await scenarioOf(spoiled(["rain: 16 mm/h", `rain: ${written}`]))).weather["shower"]!.rainMmPerH;

function expectNear({ value, sigma }: Uncertain, wanted: { value: number; sigma: number }): void {
  expect(value).toBeCloseTo(wanted.value, 9);
  expect(sigma).toBeCloseTo(wanted.sigma, 9);
}

const THREE_WATTS_DBM = 30 + 10 * Math.log10(3);

describe("a field that says how it scatters", () => {
  it("is normal by +/-, without a word on the distribution", async () => {
    const read = await power("3 W +/- 0.5 dB");
    expectNear(read, { value: THREE_WATTS_DBM, sigma: 0.5 });
    expect(read.scatter).toBeUndefined();
    expect(await power("3 W")).toMatchObject({ sigma: undefined });
  });

  it("is normal by name", async () => {
    const read = await power("{ normal: 3 W, sigma: 0.5 dB }");
    expectNear(read, { value: THREE_WATTS_DBM, sigma: 0.5 });
    expect(read.scatter).toEqual({ kind: "normal", sigma: 0.5 });
    expectNear(await line("{ normal: 0.5 dB, sigma: 0 dB }"), { value: 0.5, sigma: 0 });
  });

  it("is flat between two ends: the middle, and the width over the root of 12", async () => {
    const read = await line("{ flat: [0.2 dB, 0.8 dB] }");
    expectNear(read, { value: 0.5, sigma: 0.17320508075688773 });
    expect(read.scatter).toEqual({ kind: "flat", low: 0.2, high: 0.8 });
  });

  it("is flat in decibels where it is a power", async () => {
    expect(await power("{ flat: [10 mW, 100 mW] }")).toMatchObject({
      value: 15,
      scatter: { kind: "flat", low: 10, high: 20 },
    });
  });

  // Standard deviation of a log-normal: median sqrt(w (w - 1)), w = exp(ln(factor)^2) = 1.2472030.
  it("is log-normal about its median", async () => {
    const read = await rain("{ lognormal: 16 mm/h, factor: 1.6 }");
    expectNear(read, { value: 16, sigma: 8.884139753881259 });
    expect(read.scatter).toEqual({ kind: "lognormal", factor: 1.6 });
  });

  it("is exponential from 0 upwards", async () => {
    const read = await line("{ exponential: 0.3 dB }");
    expectNear(read, { value: 0.3, sigma: 0.3 });
    expect(read.scatter).toEqual({ kind: "exponential", mean: 0.3 });
  });

  it("is a mixture, with mean and standard deviation of the whole", async () => {
    const read = await power(
      "{ mixture: [{ share: 96 %, of: 3 W +/- 0.5 dB }, { share: 4 %, of: { flat: [10 mW, 100 mW] } }] }",
    );
    // Mean of the squares less the square of the mean, with 100/12 dB2 for the flat part.
    const mean = 0.96 * THREE_WATTS_DBM + 0.04 * 15;
    const squares = 0.96 * (THREE_WATTS_DBM ** 2 + 0.25) + 0.04 * (225 + 100 / 12);
    expectNear(read, { value: mean, sigma: Math.sqrt(squares - mean ** 2) });
    expect(read.scatter).toEqual({
      kind: "mixture",
      parts: [
        { share: 0.96, value: expect.closeTo(THREE_WATTS_DBM, 9), scatter: { kind: "normal", sigma: 0.5 } },
        { share: 0.04, value: 15, scatter: { kind: "flat", low: 10, high: 20 } },
      ],
    });
  });

  it("may be a mixture of one part, and of mixtures", async () => {
    expectNear(await line("{ mixture: [{ share: 100 %, of: 0.4 dB +/- 0.1 dB }] }"), {
      value: 0.4,
      sigma: 0.1,
    });
    const inner = "{ mixture: [{ share: 50 %, of: 0 dB }, { share: 50 %, of: 2 dB }] }";
    expectNear(await line(`{ mixture: [{ share: 50 %, of: ${inner} }, { share: 50 %, of: 1 dB }] }`), {
      value: 1,
      sigma: Math.sqrt(0.5),
    });
  });

  it("may have shares of two decimals that just miss the whole, which are then made whole", async () => {
    const third = (level: number) => `{ share: 33.33 %, of: ${level} dB }`;
    const { value, scatter } = await line(`{ mixture: [${third(1)}, ${third(2)}, ${third(3)}] }`);
    expect(value).toBeCloseTo(2, 12);
    expect(scatter).toMatchObject({ parts: [{ share: expect.closeTo(1 / 3, 12) }, {}, {}] });
  });

  it("may stand over more lines than one, and have arithmetic and rare units in it", async () => {
    const block = "shower:\n    rain:\n      flat:\n        - 2 * 3 mm/h\n        - 8 mm/h + 1 cm/hour\n";
    const { weather } = await scenarioOf(spoiled(["shower: { rain: 16 mm/h, extent: 8 km }", block]));
    expectNear(weather["shower"]!.rainMmPerH, { value: 12, sigma: 12 / Math.sqrt(12) });
    const dew = spoiled(["dry: {}", "dry: { dew: { normal: 2 * 2 mil, sigma: 2 * 1 mil } }"]);
    expectNear((await scenarioOf(dew)).weather["dry"]!.dewMm, { value: 0.1016, sigma: 0.0508 });
  });

  it.each<
    [what: string, from: string, to: string, pick: (read: Awaited<ReturnType<typeof scenarioOf>>) => unknown]
  >([
    ["noise figure", "1.1 dB", "{ flat: [1 dB, 2 dB] }", (read) => read.receiver.noiseFigureDb],
    [
      "antenna temperature",
      "mode:",
      "antenna_temperature: { flat: [100 K, 200 K] }, mode:",
      (read) => read.receiver.antennaTemperatureK,
    ],
    [
      "gain of a feed",
      "vswr: 1.2",
      "vswr: 1.2, gain: { flat: [8 dBi, 10 dBi] }",
      (read) => read.feeds["horn"]!.gainDbi,
    ],
    [
      "gain of a dish",
      "focal_ratio: 0.4",
      "gain: { flat: [33 dBi, 35 dBi] }",
      (read) => read.dish["tripod"]!.gainDbi,
    ],
    [
      "other losses of a dish",
      "focal_ratio: 0.4",
      "focal_ratio: 0.4, other_losses: { flat: [1 dB, 2 dB] }",
      (read) => read.dish["tripod"]!.otherLossesDb,
    ],
    [
      "measured loss",
      "insertion_loss: 0.22 dB",
      "insertion_loss: { flat: [0.2 dB, 0.3 dB] }",
      (read) => read.covers["sheet"]!.measured!.insertionLossDb,
    ],
    [
      "change of return loss",
      "return_loss_change: 2.7 dB",
      "return_loss_change: { flat: [-1 dB, 3 dB] }",
      (read) => read.covers["sheet"]!.measured!.returnLossChangeDb,
    ],
    ["dew", "dry: {}", "dry: { dew: { flat: [0 mm, 0.1 mm] } }", (read) => read.weather["dry"]!.dewMm],
  ])("may be the %s", async (_, from, to, pick) => {
    const [, low, high] = /flat: \[(-?[\d.]+) \S+ (-?[\d.]+)/.exec(to)!.map(Number);
    const read = pick(await scenarioOf(spoiled([from, to])));
    expectNear(read as Uncertain, { value: (low! + high!) / 2, sigma: (high! - low!) / Math.sqrt(12) });
    expect(read).toMatchObject({ scatter: { kind: "flat", low, high } });
  });
});

describe("spreads of feeds and layers", () => {
  it("keeps a return loss as a number, with its spread beside it", async () => {
    const plain = (await scenarioOf(spoiled())).feeds["stub"]!;
    expect([plain.returnLossDb, plain.returnLossSpread]).toEqual([14, undefined]);
    const typed = (await scenarioOf(spoiled(["return_loss: 14 dB", "return_loss: 14 dB +/- 1 dB"]))).feeds[
      "stub"
    ]!;
    expect([typed.returnLossDb, typed.returnLossSpread]).toEqual([14, { value: 14, sigma: 1 }]);
    const flat = (await scenarioOf(spoiled(["return_loss: 14 dB", "return_loss: { flat: [12 dB, 18 dB] }"])))
      .feeds["stub"]!;
    expect(flat.returnLossDb).toBe(15);
    expect(flat.returnLossSpread!.scatter).toEqual({ kind: "flat", low: 12, high: 18 });
  });

  const layer = async (written: string) =>
    (await scenarioOf(spoiled(["{ material: FEP film, thickness: 5 mil }", written]))).covers["film"]!
      .layers[0]!;

  it("takes the thickness of a layer by +/- and by name", async () => {
    expect(await layer("{ material: FEP film, thickness: 5 mil }")).toMatchObject({
      thicknessSigmaMm: undefined,
      statedSpread: undefined,
    });
    for (const thickness of ["5 mil +/- 0.3 mil", "{ normal: 5 mil, sigma: 0.3 mil }"]) {
      const read = await layer(`{ material: FEP film, thickness: ${thickness} }`);
      expect(read.thicknessMm).toBeCloseTo(0.127, 12);
      expect(read.thicknessSigmaMm).toBeCloseTo(0.00762, 12);
      expect(read.statedSpread).toBe(true);
    }
  });

  it.each([
    ["permittivity: 2.1", undefined],
    ["permittivity: 2.1 +/- 0.05", true],
    ["loss_tangent: 0.001 +/- 0.0005", true],
    ["permittivity: { normal: 2.1, sigma: 0.05 }", true],
    ["permittivity: { flat: [2, 2.2] }", undefined], // a range, as a published one is
  ])("knows a stated spread from a published one: %s", async (key, stated) => {
    for (const material of ["FEP film", "air", "a film of my own"]) {
      if (material.endsWith("own") && !key.startsWith("permittivity")) continue;
      expect((await layer(`{ material: ${material}, thickness: 1 mm, ${key} }`)).statedSpread).toBe(stated);
    }
  });

  it("takes a flat permittivity from end to end, and by its deviation beside figures that have one", async () => {
    const flat = "material: FEP film, permittivity: { flat: [2, 2.2] }";
    const range = await layer(`{ ${flat}, thickness: 1 mm }`);
    expect(range.permittivity).toEqual({ low: 2, nominal: 2.1, high: 2.2 });
    const beside = await layer(`{ ${flat}, thickness: 1 mm +/- 0.1 mm }`);
    expect(beside.permittivity.high).toBeCloseTo(2.1 + 0.2 / Math.sqrt(12), 9);
    expect(beside.statedSpread).toBe(true);
  });

  it("knows a stated spread of the loss tangent from that of its neighbours", async () => {
    const stated = async (keys: string) =>
      (await layer(`{ material: FEP film, thickness: 1 mm, ${keys} }`)).statedLossTangent;
    expect(await stated("loss_tangent: 0.001 +/- 0.0005")).toBe(true);
    expect(await stated("loss_tangent: 0.001")).toBeUndefined();
    expect(await stated("permittivity: 2.1 +/- 0.05")).toBeUndefined();
  });
});
