import { requirePositive, requireWithin } from "../numeric/check.ts";
import { powerToDb } from "../numeric/decibels.ts";
import { normalQuantile } from "../numeric/normal.ts";

/** Two-phase coherent, two-phase differential, or two tones received without their phase. */
export type Keying = "coherentPhase" | "differentialPhase" | "twoTone";

/**
 * Energy a bit over noise density [dB] that uncoded keying needs for a bit error ratio in white noise.
 *
 *     coherent two-phase Q(sqrt(2x)), differential exp(-x)/2, two tones exp(-x/2)/2
 *
 * Source: J. G. Proakis, Digital Communications
 *
 * @param bitErrorRatio  above 0, up to 0.4
 */
export function requiredEbN0Db({ keying, bitErrorRatio }: { keying: Keying; bitErrorRatio: number }): number {
  requirePositive("bitErrorRatio", bitErrorRatio);
  requireWithin("bitErrorRatio", bitErrorRatio, 0, 0.4);
  if (keying === "coherentPhase") return powerToDb(normalQuantile(bitErrorRatio) ** 2 / 2);
  const x = -Math.log(2 * bitErrorRatio);
  return powerToDb(keying === "differentialPhase" ? x : 2 * x);
}
