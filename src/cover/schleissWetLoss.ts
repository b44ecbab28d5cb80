import { requireFinite, requireNotNegative, requirePositive } from "../numeric/check.ts";

export interface SchleissInput {
  /** Attenuation of the link above its dry baseline, one value a step. */
  readonly attenuationDb: readonly number[];
  /** Whether it rains, one value a step. */
  readonly wet: readonly boolean[];
  readonly stepMinutes: number;
  readonly maximumDb?: number | undefined;
  readonly riseMinutes?: number | undefined;
}

/**
 * Loss by wet antennas through a shower, which rises towards a ceiling and never exceeds what the link lost.
 *
 * Wet step: W = min(A, maximum, W + (maximum - W) 3 dt/tau); dry step: W = min(A, maximum). W starts at 0.
 *
 * Source: Schleiss, Rieckermann, Berne 2013, IEEE Geosci. Remote Sens. Lett. 10: ceiling 2.3 dB for both
 *         antennas together, rise 5 to 20 min; form as open libraries on rain from microwave links carry it
 * Valid:  fitted at 38 GHz on a link of 1.85 km; a step above a third of the rise saturates at once
 *
 * @param attenuationDb  [dB] a step
 * @param wet            rain flag a step, as many as attenuationDb
 * @param stepMinutes    length of a step [min], above 0
 * @param maximumDb      ceiling [dB], default 2.3
 * @param riseMinutes    tau, time to about 95 % of the ceiling [min], default 15
 * @returns lossDb, one value a step, both antennas together [dB]
 * @throws RangeError on an argument outside these ranges
 */
export function schleissWetLoss({
  attenuationDb,
  wet,
  stepMinutes,
  maximumDb = 2.3,
  riseMinutes = 15,
}: SchleissInput): { lossDb: number[] } {
  if (wet.length !== attenuationDb.length)
    throw new RangeError("wet must have as many values as attenuationDb");
  requirePositive("stepMinutes", stepMinutes);
  requireNotNegative("maximumDb", maximumDb);
  requirePositive("riseMinutes", riseMinutes);
  const gainedShare = Math.min(1, (3 * stepMinutes) / riseMinutes);
  let loss = 0;
  return {
    lossDb: attenuationDb.map((attenuation, step) => {
      requireFinite(`attenuationDb[${step}]`, attenuation);
      const ceiling = Math.min(Math.max(0, attenuation), maximumDb);
      loss = wet[step] ? Math.min(ceiling, loss + (maximumDb - loss) * gainedShare) : ceiling;
      return loss;
    }),
  };
}
