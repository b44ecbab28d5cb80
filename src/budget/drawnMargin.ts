import { REFERENCE_TEMPERATURE_K } from "../numeric/constants.ts";
import { NEPERS_PER_DB } from "../numeric/decibels.ts";
import { column, type Sketch } from "./causes.ts";
import type { DrawnDish } from "./drawnDish.ts";
import type { DrawnMouth } from "./drawnMouth.ts";
import type { DrawnReceiver } from "./drawnReceiver.ts";
import type { DrawnWeather } from "./drawnWeather.ts";
import type { Budget } from "./types.ts";

/** Everything that a case's margin is made of, in a block of draws. */
export interface DrawnParts {
  readonly common: Float64Array;
  readonly weather: DrawnWeather;
  readonly receiver: DrawnReceiver;
  readonly sent: DrawnMouth;
  readonly heard: DrawnMouth;
  readonly overSender: DrawnDish;
  readonly overReceiver: DrawnDish;
}

/**
 * Margins of a case [dB]: the budget's, and how far each draw lies from it. Signal and noise go through the
 * receiver's mouth together, as in `noiseSide.ts`, so that one logarithm a draw is enough.
 */
export function marginColumn(sketch: Sketch, budget: Budget, parts: DrawnParts): Float64Array {
  const { common, weather, receiver, sent, heard, overSender, overReceiver } = parts;
  const { antennaK, ambientK, level } = weather;
  const { passed: overPassed, nominal: over } = overReceiver;
  const entered = over.passed + over.heated;
  const nominalDb =
    budget.marginDb +
    sent.nominal.mismatchDb +
    sent.nominal.heatDb +
    heard.nominal.mismatchDb +
    heard.nominal.heatDb +
    Math.log(budget.systemTemperatureK) / NEPERS_PER_DB;
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) {
      const raw = Math.exp(-NEPERS_PER_DB * heard.mismatchDb[i]!) / heard.beat[i]!;
      const warm = Math.exp(-NEPERS_PER_DB * heard.heatDb[i]!);
      const matched = Math.min(1, raw);
      const passed = matched * Math.min(1, warm);
      const through = overPassed === undefined ? over.passed : overPassed[i]!;
      const apertureK =
        through * antennaK[i]! + (entered - through) * ambientK + (1 - entered) * REFERENCE_TEMPERATURE_K;
      const mouthK =
        passed * apertureK + (matched - passed) * ambientK + (1 - matched) * REFERENCE_TEMPERATURE_K;
      const line = receiver.linePassed[i]!;
      const systemK = mouthK * line + REFERENCE_TEMPERATURE_K * (1 - line) + receiver.receiverK[i]!;
      const ratio = (raw * warm) / (systemK * sent.beat[i]!);
      let margin = nominalDb + common[i]! + level[i]! - sent.mismatchDb[i]! - sent.heatDb[i]!;
      if (overSender.excessDb !== undefined) margin -= overSender.excessDb[i]!;
      if (overReceiver.excessDb !== undefined) margin -= overReceiver.excessDb[i]!;
      out[i] = margin + Math.log(ratio) / NEPERS_PER_DB;
    }
  });
}
