import { requireFinite, requireNotNegative } from "../numeric/check.ts";
import { gammaOfReturnLoss, mismatchLossDb } from "./reflectionFigures.ts";

/**
 * The least that a cover can cost, by conservation of energy.
 *
 * Insertion loss >= 10 log10((1 - g^2)/(1 - g1^2)), g bare and g1 covered: the change of mismatch loss, met by a
 * cover without heat. No cover can give more than the bare feed's mismatch loss back.
 *
 * Source: own derivation from the gain of a passive two-port, G_T = (1 - |Gin|^2) x (1 - dissipated share)
 * Valid:  total power; a lens-like cover can feign a gain on boresight by narrowing the beam
 *
 * @param bareReturnLossDb     [dB], above 0 to Infinity
 * @param coveredReturnLossDb  [dB], above 0 to Infinity
 * @returns floorDb, least insertion loss [dB], negative where the cover improves the match; bestPossibleGainDb,
 *          what a perfect match would win [dB]
 * @throws RangeError on a return loss outside its range
 */
export function energyFloor({
  bareReturnLossDb,
  coveredReturnLossDb,
}: {
  readonly bareReturnLossDb: number;
  readonly coveredReturnLossDb: number;
}): { floorDb: number; bestPossibleGainDb: number } {
  const bare = mismatchOf("bareReturnLossDb", bareReturnLossDb);
  const covered = mismatchOf("coveredReturnLossDb", coveredReturnLossDb);
  return { floorDb: covered - bare, bestPossibleGainDb: bare };
}

/** A pair of readings that conservation of energy forbids. */
export type Contradiction = "below_energy_floor" | "implausible_gain";

/**
 * Whether a measured insertion loss can be true beside its return losses.
 *
 * @param bareReturnLossDb     [dB], above 0 to Infinity
 * @param coveredReturnLossDb  [dB], above 0 to Infinity; absent: only the best possible gain is held against it
 * @param insertionLossDb      measured [dB], positive for a loss
 * @param repeatabilityDb      expanded uncertainty of that reading [dB], at least 0
 * @returns leastDb, the least loss that energy allows [dB]; shortfallDb, how far the reading lies below it [dB],
 *          0 if it does not; contradiction, only where the shortfall exceeds the repeatability
 * @throws RangeError on an argument outside these ranges
 */
export function energyCheck({
  bareReturnLossDb,
  coveredReturnLossDb,
  insertionLossDb,
  repeatabilityDb,
}: {
  readonly bareReturnLossDb: number;
  readonly coveredReturnLossDb?: number | undefined;
  readonly insertionLossDb: number;
  readonly repeatabilityDb: number;
}): { leastDb: number; shortfallDb: number; contradiction: Contradiction | undefined } {
  requireFinite("insertionLossDb", insertionLossDb);
  requireNotNegative("repeatabilityDb", repeatabilityDb);
  const known = coveredReturnLossDb !== undefined;
  // A perfect match is the most favourable reading that could have been taken.
  const { floorDb } = energyFloor({ bareReturnLossDb, coveredReturnLossDb: coveredReturnLossDb ?? Infinity });
  const shortfallDb = Math.max(0, floorDb - insertionLossDb);
  const forbidden = shortfallDb > repeatabilityDb;
  return {
    leastDb: floorDb,
    shortfallDb,
    contradiction: forbidden ? (known ? "below_energy_floor" : "implausible_gain") : undefined,
  };
}

function mismatchOf(name: string, returnLossDb: number): number {
  const gamma = gammaOfReturnLoss(name, returnLossDb);
  if (gamma === 1) throw new RangeError(`${name} must be above 0`);
  return mismatchLossDb(gamma);
}
