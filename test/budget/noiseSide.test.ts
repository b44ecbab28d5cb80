import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { coverNoise } from "../../src/cover/coverNoise.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { noiseTemperatureK, systemTemperatureK } from "../../src/receiver/noise.ts";
import { budgetOf, coverOf, dishOf, entryOf, feedOf, layerOf, scenarioOf, weatherOf } from "./scenarios.ts";

/** Matched, bare feeds; the receiver as given. */
function matched({ lineDb = 0, figureDb = 1.1, antennaK = 200, rain = 0, fog = 0 }) {
  return budgetOf(
    scenarioOf({
      transmitter: { cover: "bare" },
      receiver: {
        cover: "bare",
        lineLossDb: { value: lineDb },
        noiseFigureDb: { value: figureDb },
        antennaTemperatureK: { value: antennaK },
      },
      feeds: { stub: feedOf({ returnLossDb: Number.POSITIVE_INFINITY }) },
      weather: { now: weatherOf({ rainMmPerH: { value: rain }, extentKm: 10, fogGPerM3: fog }) },
    }),
  );
}

describe("the noise side", () => {
  // Pozar, Microwave Engineering, noise of an attenuator: T = Ta/l + 290 (1 - 1/l) + Trx.
  it.each([
    [0, 1, 200],
    [3, 1, 200],
    [0.5, 0.7, 50],
    [10, 3, 20],
  ])("of a matched mouth: line %d dB, figure %d dB, antenna %d K", (lineDb, figureDb, antennaK) => {
    const l = 10 ** (lineDb / 10);
    const byHand = antennaK / l + 290 * (1 - 1 / l) + 290 * (10 ** (figureDb / 10) - 1);
    const ours = matched({ lineDb, figureDb, antennaK }).systemTemperatureK;
    expect(ours).toBeCloseTo(byHand, 9);
    const receiver = { antennaK, lossDb: lineDb, lineK: 290, noiseFigureDb: figureDb };
    expect(ours).toBeCloseTo(systemTemperatureK(receiver), 9);
  });

  it("of a room at 290 K is the noise figure over k 290 K B, whatever line stands ahead", () => {
    // -174 dBm/Hz (-173.975), 500 Hz (26.990 dB), 2 dB of noise figure.
    for (const lineDb of [0, 1, 6]) {
      expect(matched({ lineDb, figureDb: 2, antennaK: 290 }).noiseDbm).toBeCloseTo(-144.985, 3);
    }
  });

  // P.618-14 section 3: T = T0 10^(-A/10) + 275 K (1 - 10^(-A/10)).
  it("takes rain as warming a cool beam and cooling a hot one", () => {
    const rainy = matched({ rain: 50, antennaK: 100 });
    const passed = 10 ** (entryOf(rainy, "path.rain").db / 10);
    expect(passed).toBeLessThan(0.1);
    const receiverK = 290 * (10 ** 0.11 - 1);
    expect(rainy.systemTemperatureK).toBeCloseTo(100 * passed + 275 * (1 - passed) + receiverK, 6);
    expect(matched({ rain: 50, antennaK: 1000 }).noiseDbm).toBeLessThan(matched({ antennaK: 1000 }).noiseDbm);
  });

  it("is as sure of the antenna behind rain as the rain lets it through", () => {
    const sigma = (rain: number) => entryOf(matched({ rain }), "noise.antenna").sigma;
    const kelvin = (rain: number) => sigma(rain) * matched({ rain }).systemTemperatureK;
    const passed = 10 ** (entryOf(matched({ rain: 30 }), "path.rain").db / 10);
    expect(kelvin(30) / kelvin(0)).toBeCloseTo(passed, 9);
  });

  it("carries the sigma of figure and antenna as small changes of them do", () => {
    const step = 1e-4;
    const by = (change: Parameters<typeof matched>[0]) =>
      (matched({ lineDb: 0.5, ...change }).noiseDbm - matched({ lineDb: 0.5 }).noiseDbm) / step;
    const budget = matched({ lineDb: 0.5 });
    // Usual spreads, common practice: 0.5 dB of noise figure, 40 K of antenna.
    expect(entryOf(budget, "noise.receiver").sigma).toBeCloseTo(0.5 * by({ figureDb: 1.1 + step }), 4);
    expect(entryOf(budget, "noise.antenna").sigma).toBeCloseTo(40 * by({ antennaK: 200 + step }), 4);
  });
});

describe("a covered mouth ahead of a receiver", () => {
  it("loses in carrier to noise what the isolator form of the cover's noise says, phase known", () => {
    const degrees = fc.integer({ min: -180, max: 180 });
    const tenths = (low: number, high: number) =>
      fc.integer({ min: 10 * low, max: 10 * high }).map((value) => value / 10);
    fc.assert(
      fc.property(
        fc.record({
          returnLossDb: tenths(6, 40),
          phaseDeg: degrees,
          gapMm: tenths(0, 20),
          thicknessMm: tenths(0.1, 8),
          permittivity: tenths(1.1, 6),
          loss: tenths(0, 1),
          skyK: tenths(10, 400),
          figureDb: tenths(0.3, 6),
          temperatureC: fc.integer({ min: -20, max: 40 }),
        }),
        ({ returnLossDb, phaseDeg, gapMm, skyK, figureDb, temperatureC, ...layer }) => {
          const scenario = scenarioOf({
            transmitter: { cover: "bare", feed: "perfect" },
            receiver: {
              lineLossDb: { value: 0 },
              noiseFigureDb: { value: figureDb },
              antennaTemperatureK: { value: skyK },
            },
            feeds: {
              // A mouth so wide that it collects all that the sheet sends back, as the reference has it.
              stub: feedOf({ returnLossDb, phaseDeg, apertureMm: 5000 }),
              perfect: feedOf({ returnLossDb: Number.POSITIVE_INFINITY }),
            },
            covers: {
              bare: coverOf(),
              film: coverOf({
                layers: [layerOf(layer.thicknessMm, layer.permittivity, layer.loss / 10)],
                gapMm,
              }),
            },
            // Of a dish whose shape is not known the sheet is met straight on, as the reference has it.
            dish: { tripod: dishOf({ focalRatio: undefined, efficiency: 0.55 }) },
            weather: { dry: weatherOf({ temperatureC }) },
          });
          const covered = budgetOf(scenario);
          const reference = budgetOf({
            ...scenario,
            receiver: { ...scenario.receiver, cover: "bare", feed: "perfect" },
          });
          const { carrierToNoiseChangeIsolatorDb } = coverNoise({
            feedReturnLossDb: returnLossDb,
            phaseDeg,
            gapMm,
            frequencyGHz: 10.368,
            sheet: layeredSheet({
              frequencyGHz: 10.368,
              incidenceDeg: 0,
              polarization: "te",
              layers: [
                {
                  thicknessMm: layer.thicknessMm,
                  permittivity: layer.permittivity,
                  lossTangent: layer.loss / 10,
                },
              ],
            }),
            skyK,
            coverK: 273.15 + temperatureC,
            receiverK: noiseTemperatureK(figureDb),
          });
          expect(reference.snrDb - covered.snrDb).toBeCloseTo(carrierToNoiseChangeIsolatorDb, 8);
        },
      ),
    );
  });

  // Common practice, no source: a lossy cover of 0.1 dB costs 0.13 dB on a level path, 0.37 dB towards a sky of 20 K.
  it.each([
    [200, 0.13],
    [20, 0.37],
  ])("of 0.1 dB of heat costs more towards %d K: %d dB", (antennaK, lostDb) => {
    const under = (lossDb: number) =>
      budgetOf(
        scenarioOf({
          transmitter: { cover: "bare" },
          receiver: {
            cover: "film",
            lineLossDb: { value: 0 },
            noiseFigureDb: { value: 1 },
            antennaTemperatureK: { value: antennaK },
          },
          feeds: { stub: feedOf({ returnLossDb: Number.POSITIVE_INFINITY }) },
          covers: { bare: coverOf(), film: coverOf({ measured: { insertionLossDb: { value: lossDb } } }) },
        }),
      ).snrDb;
    expect(Math.abs(under(0) - under(0.1) - lostDb)).toBeLessThan(0.02);
  });
});
