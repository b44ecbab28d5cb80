import { REFERENCE_TEMPERATURE_K } from "../numeric/constants.ts";
import { dbToPower, powerToDb } from "../numeric/decibels.ts";
import { antennaTemperatureInRain, levelBeamDefault } from "../receiver/antennaTemperature.ts";
import type { Mode } from "../receiver/modes.ts";
import { noiseTemperatureK, thermalNoiseDbm } from "../receiver/noise.ts";
import type { Scenario } from "../scenario/types.ts";
import { type Entry, gainEntry, type Heading } from "./entry.ts";
import type { DishCoverState, Mouth, PreparedWeather } from "./types.ts";

/** Noise figure off a label [dB]: common practice, no source. */
export const LABEL_NOISE_FIGURE_SIGMA_DB = 0.5;

export interface NoiseSide {
  readonly entries: readonly Entry[];
  readonly noiseDbm: number;
  readonly systemTemperatureK: number;
}

/** The temperatures behind the noise, which no mode changes. */
export interface NoiseTemperatures {
  /** 290 K; with the receiver; with the antenna; behind the line; behind the feed and its cover: the system's [K]. */
  readonly steps: readonly [number, number, number, number, number];
  readonly antennaK: number;
  /** 1-sigma of the noise by the receiver's figure, and by what the antenna sees [dB]. */
  readonly receiverSigmaDb: number;
  readonly antennaSigmaDb: number;
}

/**
 * Noise temperatures at the receiver's input, step by step from 290 K.
 *
 * The feed's mouth is charged in the form of a matched isolator ahead of the line: a share G_T of the antenna's
 * noise comes through, what the cover absorbs glows at its own temperature, what is reflected comes back from
 * the receiver's side at 290 K.
 *
 * Source: noise waves after Bosma 1967 for the mouth; D. M. Pozar, Microwave Engineering, for the line
 */
export function noiseTemperatures(
  { receiver, frequencyGHz }: Scenario,
  weather: PreparedWeather,
  mouth: Mouth,
  over: DishCoverState,
): NoiseTemperatures {
  const figureDb = receiver.noiseFigureDb;
  const usual = levelBeamDefault(frequencyGHz);
  const clear = receiver.antennaTemperatureK ?? { value: usual.temperatureK };
  const { temperatureK: antennaK } = antennaTemperatureInRain({
    clearK: clear.value,
    attenuationDb: weather.hydrometeorLossDb,
  });
  const receiverK = noiseTemperatureK(figureDb.value);
  const linePass = dbToPower(-receiver.lineLossDb.value);
  const lineK = REFERENCE_TEMPERATURE_K * (1 - linePass);

  // Readings that contradict each other may claim less than no mismatch; noise takes no part in that.
  const matched = Math.min(1, dbToPower(-mouth.mismatchLossDb));
  const passed = matched * dbToPower(-mouth.dissipationDb);
  // Over the dish what is reflected shows the feed its own warm side.
  const apertureK =
    over.passed * antennaK +
    over.heated * weather.ambientK +
    (1 - over.passed - over.heated) * REFERENCE_TEMPERATURE_K;
  const mouthK =
    passed * apertureK + (matched - passed) * weather.ambientK + (1 - matched) * REFERENCE_TEMPERATURE_K;
  const systemK = mouthK * linePass + lineK + receiverK;

  const figureSigma = figureDb.sigma ?? LABEL_NOISE_FIGURE_SIGMA_DB;
  // A dB more of noise figure raises the system by its receiver's part only.
  const figureWeight = (receiverK + REFERENCE_TEMPERATURE_K) / systemK;
  const dimmed = dbToPower(-weather.hydrometeorLossDb);
  const antennaSigmaK = (clear.sigma ?? usual.sigmaK) * dimmed * over.passed * passed * linePass;
  return {
    steps: [
      REFERENCE_TEMPERATURE_K,
      REFERENCE_TEMPERATURE_K + receiverK,
      antennaK + receiverK,
      antennaK * linePass + lineK + receiverK,
      systemK,
    ],
    antennaK,
    receiverSigmaDb: figureSigma * figureWeight,
    antennaSigmaDb: (powerToDb(Math.E) * antennaSigmaK) / systemK,
  };
}

/**
 * Noise at the receiver's input in the mode's bandwidth: each step of the temperatures is an entry, so that all of
 * them add up to the system's noise.
 */
export function noiseSide(
  scenario: Scenario,
  mode: Mode,
  weather: PreparedWeather,
  mouth: Mouth,
  over: DishCoverState,
): NoiseSide {
  const found = noiseTemperatures(scenario, weather, mouth, over);
  const { steps, antennaK } = found;
  const systemK = steps[4];
  const step = (from: number, to: number) => powerToDb(from / to);

  const thermalDbm = thermalNoiseDbm({
    temperatureK: REFERENCE_TEMPERATURE_K,
    bandwidthHz: mode.noiseBandwidthHz,
  });
  const sky = scenario.receiver.antennaTemperatureK ? "scenario" : "level beam: common practice, P.676-13";
  const entries = [
    gainEntry(heading("thermal", "290 K in the bandwidth", "k T B"), -thermalDbm),
    gainEntry(
      heading("receiver", "receiver's noise", "scenario"),
      step(steps[0], steps[1]),
      found.receiverSigmaDb,
    ),
    gainEntry(
      heading("antenna", `sky and ground, ${Math.round(antennaK)} K`, sky),
      step(steps[1], steps[2]),
      found.antennaSigmaDb,
    ),
    gainEntry(heading("line", "line's noise", "Pozar"), step(steps[2], steps[3])),
    gainEntry(heading("cover", "noise of feed and covers", "Bosma 1967"), step(steps[3], steps[4])),
  ];
  return {
    entries,
    noiseDbm: thermalDbm + powerToDb(systemK / REFERENCE_TEMPERATURE_K),
    systemTemperatureK: systemK,
  };
}

function heading(id: string, label: string, source: string): Heading {
  return { id: `noise.${id}`, stage: "noise", label, source };
}
