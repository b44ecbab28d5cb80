/** Scenarios in which nothing scatters but what a test switches on. */
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import type { Scenario, SpreadSettings, Uncertain } from "../../src/scenario/types.ts";
import { spreadOf } from "../../src/study/spread.ts";
import { caseOf, coverOf, dishOf, feedOf, layerOf, scenarioOf, weatherOf } from "../budget/scenarios.ts";

/** Everything switched off; each field is then switched on by itself. */
export const quiet: SpreadSettings = {
  tiltLossDb: { value: 0 },
  blunder: { chance: 0, lossDb: { value: 0 } },
  feedReturnLossDb: 0,
  coverLossShare: 0,
  waterShare: 0,
  gasShare: 0,
  fogShare: 0,
  rainRateFactor: 1,
  rainLengthShare: 0,
};
export const exact = (value: number): Uncertain => ({ value, sigma: 0 });
export const still = (value: number) => (value === 0 ? { value: 0 } : exact(value));

export type Change = Parameters<typeof scenarioOf>[0];

export function quietScenario({
  transmitter,
  receiver,
  spread,
  ...rest
}: NonNullable<Change> = {}): Scenario {
  const scenario = scenarioOf({
    dish: {
      tripod: dishOf({
        diameterM: undefined,
        focalRatio: undefined,
        gainDbi: exact(34),
        pointingErrorDeg: 0,
      }),
    },
    covers: { bare: coverOf() },
    weather: { now: weatherOf() },
    ...rest,
    transmitter: { cover: "bare", lineLossDb: exact(0), powerDbm: exact(30), ...transmitter },
    receiver: {
      cover: "bare",
      lineLossDb: exact(0),
      noiseFigureDb: exact(1),
      antennaTemperatureK: exact(200),
      ...receiver,
    },
    spread: { ...quiet, ...spread },
  });
  return { ...scenario, modes: { cw: { ...scenario.modes["cw"]!, sigmaDb: 0, ...rest.modes?.["cw"] } } };
}

export const DRAWS = 16_384;

export function varianceOf(scenario: Scenario): number {
  const link = prepare(scenario);
  const study = spreadOf(link, [caseOf(scenario, "now")], { draws: DRAWS, seed: 11, precision: 1e-9 });
  return study.rows[0]!.sigmaDb ** 2;
}

export const marginOf = (scenario: Scenario) => evaluate(prepare(scenario), caseOf(scenario, "now")).marginDb;

/** A feed so well matched that no phase counts. */
export const matched = { stub: feedOf({ returnLossDb: 70 }) };
export const rain = (rainMmPerH: Uncertain) => ({ now: weatherOf({ rainMmPerH, extentKm: 10 }) });
export const wetting = {
  bare: coverOf(),
  film: coverOf({ layers: [layerOf(0.5, 2.5)], surface: "wetting" }),
};
export const on = (cover: string) => ({ transmitter: { cover } });
export const layered = (change: object) => ({
  ...on("plate"),
  feeds: matched,
  covers: { bare: coverOf(), plate: coverOf({ layers: [{ ...layerOf(6, 2.8, 0.05), ...change }] }) },
});
