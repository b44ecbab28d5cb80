import { energyFloor } from "../cover/energyFloor.ts";
import { returnLossOfGamma } from "../cover/reflectionFigures.ts";
import { requireFinite, requirePositive } from "../numeric/check.ts";

export type EnergyReading = "insertion_loss" | "bare_return_loss" | "covered_return_loss";

export interface Suspect {
  readonly reading: EnergyReading;
  /** Value at which the contradiction would end, the other two readings standing [dB]. */
  readonly neededDb: number;
  /** How far that is from what was read, in standard uncertainties; Infinity where no value would do. */
  readonly standardUncertainties: number;
}

/**
 * Which reading is the likelier culprit where loss and return losses contradict each other.
 *
 * Each reading in turn is moved until the loss just meets the energy floor; the one that needs the fewest of its own
 * standard uncertainties is the likeliest. It names a suspect, not a proof: a cover that narrows the beam like a lens
 * can feign a gain on boresight.
 *
 * Source: own derivation from `energyFloor`; default 0.58 dB of a return loss is a half-width of 1 dB, a coupler 20 dB
 *         above the return loss (common practice, no source)
 *
 * @param lossDb                insertion loss [dB]
 * @param lossStandardDb        its standard uncertainty [dB], above 0
 * @param bareReturnLossDb, coveredReturnLossDb  [dB], above 0
 * @param returnLossStandardDb  standard uncertainty of each return loss [dB], above 0, default 0.58
 * @returns floorDb; shortfallDb, how far the loss lies below it, 0 if it does not; suspects, likeliest first, none
 *          without a shortfall
 * @throws RangeError on an argument outside these ranges
 */
export function energyContradiction({
  lossDb,
  lossStandardDb,
  bareReturnLossDb,
  coveredReturnLossDb,
  returnLossStandardDb = 0.58,
}: {
  readonly lossDb: number;
  readonly lossStandardDb: number;
  readonly bareReturnLossDb: number;
  readonly coveredReturnLossDb: number;
  readonly returnLossStandardDb?: number;
}): { floorDb: number; shortfallDb: number; suspects: readonly Suspect[] } {
  requireFinite("lossDb", lossDb);
  requirePositive("lossStandardDb", lossStandardDb);
  requirePositive("returnLossStandardDb", returnLossStandardDb);
  const { floorDb, bestPossibleGainDb } = energyFloor({ bareReturnLossDb, coveredReturnLossDb });
  const shortfallDb = Math.max(0, floorDb - lossDb);
  if (shortfallDb === 0) return { floorDb, shortfallDb, suspects: [] };
  const coveredMismatchDb = bestPossibleGainDb + floorDb;
  const suspect = (
    reading: EnergyReading,
    readDb: number,
    neededDb: number,
    standardDb: number,
  ): Suspect => ({
    reading,
    neededDb,
    standardUncertainties: Number.isNaN(neededDb) ? Infinity : Math.abs(neededDb - readDb) / standardDb,
  });
  const suspects = [
    suspect("insertion_loss", lossDb, floorDb, lossStandardDb),
    suspect(
      "covered_return_loss",
      coveredReturnLossDb,
      returnLossOfMismatch(bestPossibleGainDb + lossDb),
      returnLossStandardDb,
    ),
    suspect(
      "bare_return_loss",
      bareReturnLossDb,
      returnLossOfMismatch(coveredMismatchDb - lossDb),
      returnLossStandardDb,
    ),
  ];
  suspects.sort((a, b) => a.standardUncertainties - b.standardUncertainties);
  return { floorDb, shortfallDb, suspects };
}

/** Return loss [dB] whose mismatch loss is given [dB]; not a number for a negative one, which no match has. */
function returnLossOfMismatch(lossDb: number): number {
  const gamma = Math.sqrt(-Math.expm1((-lossDb * Math.LN10) / 10));
  return returnLossOfGamma(gamma);
}
