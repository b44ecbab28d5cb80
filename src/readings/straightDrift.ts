import { OPEN, type TimedReading } from "./bracket.ts";
import { leastSquares } from "./leastSquares.ts";

export interface StraightDrift {
  /** Drift of the bare level [dB per unit of time]. */
  readonly driftDb: number;
  /** Standard deviation of one reading about the fit [dB]. */
  readonly readingStandardDb: number;
  readonly degreesOfFreedom: number;
  readonly losses: readonly {
    readonly state: string;
    readonly lossDb: number;
    readonly standardDb: number;
  }[];
}

/**
 * Losses of all covers of a run by one straight line of drift: level = a + b time - IL(cover).
 *
 * The second opinion beside `reduceSeries`: it uses readings without a bracket too, but a drift that is not
 * straight enters its losses.
 *
 * Source: ordinary least squares, JCGM 100:2008 annex H.3
 *
 * @param readings  more than two and one for each cover, both kinds among them, at two times or more
 * @throws RangeError where the readings leave a figure free
 */
export function straightDrift(readings: readonly TimedReading[]): StraightDrift {
  const states = [...new Set(readings.map(({ state }) => state))].filter((state) => state !== OPEN);
  const parameters = 2 + states.length;
  if (readings.length <= parameters) {
    throw new RangeError(
      `a straight drift and ${states.length} covers need more than ${parameters} readings`,
    );
  }
  // Time from 0 to 1, so that no parameter is far from the others in size.
  const first = Math.min(...readings.map(({ time }) => time));
  const span = Math.max(...readings.map(({ time }) => time)) - first || 1;
  const fit = leastSquares({
    measured: readings.map(({ levelDb }) => levelDb - readings[0]!.levelDb),
    standard: readings.map(() => 1),
    predict: ([level, drift, ...losses]) =>
      readings.map(
        ({ time, state }) => level! + (drift! * (time - first)) / span - (losses[states.indexOf(state)] ?? 0),
      ),
    start: Array.from({ length: parameters }, () => 0),
    step: Array.from({ length: parameters }, () => 1),
  });
  const { covariance } = fit;
  if (covariance === undefined) throw new RangeError("the readings leave the drift or a loss free");
  const variance = fit.chiSquared / fit.degreesOfFreedom;
  return {
    driftDb: fit.parameters[1]! / span,
    readingStandardDb: Math.sqrt(variance),
    degreesOfFreedom: fit.degreesOfFreedom,
    losses: states.map((state, i) => ({
      state,
      lossDb: fit.parameters[2 + i]!,
      standardDb: Math.sqrt(variance * covariance[2 + i]![2 + i]!),
    })),
  };
}
