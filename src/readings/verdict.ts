import { energyFloor } from "../cover/energyFloor.ts";
import { requireFinite, requireNotNegative } from "../numeric/check.ts";

export type LossVerdict =
  | "measured_loss"
  | "indistinguishable_from_zero"
  | "below_energy_floor"
  | "gain_possible_by_matching"
  | "implausible_gain";

/** Free-air insertion loss on an amateur bench repeats to about this half-width [dB]: common practice, no source. */
export const BENCH_REPEATABILITY_DB = 0.05;

export interface LossJudgement {
  readonly verdict: LossVerdict;
  /** Least loss that the change of return loss demands [dB], where both return losses are known. */
  readonly floorDb?: number;
  /** Most that a cover could give back by tuning the feed [dB], where the bare return loss is known. */
  readonly bestPossibleGainDb?: number;
  /** The cover seems to amplify, or contradicts its own return loss: read it again. */
  readonly retake: boolean;
}

/**
 * What one insertion loss may be called, in the light of its uncertainty and of energy.
 *
 * In this order, with limit = the larger of the expanded uncertainty and 0.05 dB: below the energy floor by more
 * than the limit; within the limit of zero; a loss; a gain that tuning the feed could explain; a gain that nothing
 * explains. Without a bare return loss no gain is credited to tuning.
 *
 * Source: floor and gain of `energyFloor`; order of the tests and the 0.05 dB: common practice, no source
 *
 * @param lossDb                insertion loss [dB], positive for a loss
 * @param expandedDb            its expanded uncertainty [dB], at least 0
 * @param feedReturnLossDb      bare feed [dB], above 0
 * @param coveredReturnLossDb   covered feed [dB], above 0; of no use without the bare one
 * @throws RangeError on an argument outside these ranges
 */
export function judgeLoss({
  lossDb,
  expandedDb,
  feedReturnLossDb,
  coveredReturnLossDb,
}: {
  readonly lossDb: number;
  readonly expandedDb: number;
  readonly feedReturnLossDb?: number | undefined;
  readonly coveredReturnLossDb?: number | undefined;
}): LossJudgement {
  requireFinite("lossDb", lossDb);
  requireNotNegative("expandedDb", expandedDb);
  const limitDb = Math.max(expandedDb, BENCH_REPEATABILITY_DB);
  const energy =
    feedReturnLossDb === undefined
      ? undefined
      : energyFloor({
          bareReturnLossDb: feedReturnLossDb,
          coveredReturnLossDb: coveredReturnLossDb ?? feedReturnLossDb,
        });
  const floorDb = coveredReturnLossDb === undefined ? undefined : energy?.floorDb;
  const bestPossibleGainDb = energy?.bestPossibleGainDb;
  const verdict = name(lossDb, limitDb, floorDb, bestPossibleGainDb ?? 0);
  return {
    verdict,
    ...(floorDb !== undefined && { floorDb }),
    ...(bestPossibleGainDb !== undefined && { bestPossibleGainDb }),
    retake: verdict !== "measured_loss" && verdict !== "indistinguishable_from_zero",
  };
}

function name(lossDb: number, limitDb: number, floorDb: number | undefined, gainDb: number): LossVerdict {
  if (floorDb !== undefined && lossDb < floorDb - limitDb) return "below_energy_floor";
  if (Math.abs(lossDb) <= limitDb) return "indistinguishable_from_zero";
  if (lossDb > 0) return "measured_loss";
  return -lossDb <= gainDb + limitDb ? "gain_possible_by_matching" : "implausible_gain";
}
