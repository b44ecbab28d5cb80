import { REFERENCE_TEMPERATURE_K } from "../numeric/constants.ts";
import { NEPERS_PER_DB } from "../numeric/decibels.ts";
import { column, type Sketch, STILL, uniformsOf, valuesOf } from "./causes.ts";
import { isStated } from "./drawnLevels.ts";
import { LABEL_NOISE_FIGURE_SIGMA_DB } from "./noiseSide.ts";
import type { Link } from "./types.ts";

/** The receiver and its line in a block of draws. */
export interface DrawnReceiver {
  /** Noise temperature of the receiver itself [K]. */
  readonly receiverK: Float64Array;
  /** Share of the power that the line passes on. */
  readonly linePassed: Float64Array;
}

/**
 * Noise of the receiver and of its line.
 *
 * @param lineLossDb  drawn loss of the line [dB]
 */
export function drawnReceiver(sketch: Sketch, { scenario }: Link, lineLossDb: Float64Array): DrawnReceiver {
  const { noiseFigureDb: input } = scenario.receiver;
  const scatter = input.scatter ?? {
    kind: "normal" as const,
    sigma: input.sigma ?? LABEL_NOISE_FIGURE_SIGMA_DB,
  };
  const uniforms = uniformsOf(sketch, {
    id: "noise.receiver",
    matter: "noise",
    end: undefined,
    label: "noise figure",
    scatter,
    unit: "dB",
    stated: isStated(input),
    still: STILL,
  });
  const values = valuesOf(sketch, input.value, scatter, uniforms);
  return {
    receiverK: column(sketch, (out) => {
      for (let i = 0; i < out.length; i++) {
        out[i] = REFERENCE_TEMPERATURE_K * (Math.exp(NEPERS_PER_DB * Math.max(0, values[i]!)) - 1);
      }
    }),
    linePassed: column(sketch, (out) => {
      for (let i = 0; i < out.length; i++) out[i] = Math.exp(-NEPERS_PER_DB * lineLossDb[i]!);
    }),
  };
}
