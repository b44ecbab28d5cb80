import { cascade, mouthWidthMm, sheetOf } from "../budget/mouthpiece.ts";
import type { Bounded } from "../cover/bounded.ts";
import { layeredSheet } from "../cover/layeredSheet.ts";
import { collectedShare } from "../cover/nearMouth.ts";
import { matchingGap, pairReturnLoss, type SheetPair, sheetPair } from "../cover/sheetGap.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { type Reach, reach } from "./reach.ts";
import { stackAt, type VariedCover, variedLayer } from "./thicknessCost.ts";

/** Two sheets like the cover, one behind the other. */
export interface PairOfSheets extends SheetPair {
  readonly singleReturnLossDb: number;
  /** Where the pair reflects less than one sheet [GHz]. */
  readonly betterBandGHz: Reach;
  /** Where its return loss stays above 20 dB [GHz]; undefined where it never gets there. */
  readonly twentyDbBandGHz: Reach | undefined;
}

/** The sheet at some distance from the feed: at one gap if the feed's phase is known, else anywhere within half a wave. */
export interface FeedGap {
  readonly fromMm: number;
  readonly toMm: number;
  /** Share of the amplitude sent back that the feed collects again; in the middle of the range. */
  readonly collectedShare: number;
  readonly returnLossDb: Bounded;
  /** Change against the bare feed; negative where the sheet tunes the feed. */
  readonly insertionLossDb: Bounded;
  /** Where feed and sheet match better than the bare feed, its own reflection unchanged [GHz]; only with a known phase. */
  readonly betterBandGHz?: Reach;
}

export interface FeedGaps {
  readonly phaseKnown: boolean;
  readonly periodMm: number;
  readonly gaps: readonly FeedGap[];
}

/** Half waves of gap that are looked at: with the phase known and with it unknown. */
const KNOWN_GAPS = 2;
const UNKNOWN_RANGES = 3;
const GOOD_RETURN_LOSS_DB = 20;
/** Search for the end of a band: steps of this share of the frequency, from half of it to half as much again. */
const BAND_STEP = 1 / 200;

/** Two sheets of the cover's own thickness; undefined where one reflects nothing. */
export function pairOfSheets(varied: VariedCover): PairOfSheets | undefined {
  const { frequencyGHz } = varied;
  const layers = stackAt(varied, variedLayer(varied).thicknessMm);
  const pair = sheetPair({ frequencyGHz, layers });
  if (pair === undefined) return undefined;
  const { gapMm } = pair;
  const single = (frequency: number) =>
    layeredSheet({ frequencyGHz: frequency, incidenceDeg: 0, polarization: "te", layers }).returnLossDb;
  const both = (frequency: number) => pairReturnLoss({ frequencyGHz: frequency, layers, gapMm });
  return {
    ...pair,
    singleReturnLossDb: single(frequencyGHz),
    betterBandGHz: bandAround(frequencyGHz, (f) => single(f) - both(f)),
    twentyDbBandGHz:
      pair.returnLossDb > GOOD_RETURN_LOSS_DB
        ? bandAround(frequencyGHz, (f) => GOOD_RETURN_LOSS_DB - both(f))
        : undefined,
  };
}

/** Where the sheet of the cover's own thickness best matches the feed, and what it may do elsewhere. */
export function feedGaps(varied: VariedCover): FeedGaps {
  const { frequencyGHz, feed } = varied;
  const layers = stackAt(varied, variedLayer(varied).thicknessMm);
  const behind = (gapMm: number, frequency = frequencyGHz) => {
    const cover = { ...varied.cover, gapMm };
    const mouthpiece = { frequencyGHz: frequency, feed, cover, beam: undefined };
    const { returnLossDb, insertionLossDb } = cascade(mouthpiece, sheetOf(frequency, layers));
    const near = { frequencyGHz: frequency, apertureMm: mouthWidthMm(feed), gapMm };
    return { ...collectedShare(near), returnLossDb, insertionLossDb };
  };

  if (feed.phaseDeg === undefined) {
    const periodMm = (1e3 * wavelengthM(frequencyGHz)) / 2;
    const gaps = Array.from({ length: UNKNOWN_RANGES }, (_, i) => ({
      fromMm: i * periodMm,
      toMm: (i + 1) * periodMm,
      ...behind((i + 0.5) * periodMm),
    }));
    return { phaseKnown: false, periodMm, gaps };
  }
  const { reflection } = sheetOf(frequencyGHz, layers);
  const { gapMm, periodMm } = matchingGap({ frequencyGHz, phaseDeg: feed.phaseDeg, reflection });
  const gaps = Array.from({ length: KNOWN_GAPS }, (_, i) => {
    const place = gapMm + i * periodMm;
    return {
      fromMm: place,
      toMm: place,
      ...behind(place),
      betterBandGHz: bandAround(
        frequencyGHz,
        (f) => feed.returnLossDb - behind(place, f).returnLossDb.nominal,
      ),
    };
  });
  return { phaseKnown: true, periodMm, gaps };
}

function bandAround(frequencyGHz: number, excess: (frequencyGHz: number) => number): Reach {
  const step = BAND_STEP * frequencyGHz;
  return {
    low: reach(excess, { from: frequencyGHz, step: -step, end: frequencyGHz / 2 }),
    high: reach(excess, { from: frequencyGHz, step, end: 1.5 * frequencyGHz }),
  };
}
