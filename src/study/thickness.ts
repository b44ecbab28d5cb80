import { mouthWidthMm } from "../budget/mouthpiece.ts";
import type { Warning } from "../budget/types.ts";
import { type NearMouth, nearMouth } from "../cover/nearMouth.ts";
import { wavelengthM } from "../numeric/constants.ts";
import type { CoverLayer, EndName, Scenario } from "../scenario/types.ts";
import { halfWaveMm, type ThicknessPoint, thicknessPoint, type VariedCover } from "./thicknessCost.ts";
import { type FeedGaps, feedGaps, type PairOfSheets, pairOfSheets } from "./thicknessGaps.ts";
import {
  MOST_WAVELENGTHS,
  type ThinLimit,
  type TunedThickness,
  thinLimit,
  tunedThicknesses,
} from "./thicknessLimits.ts";
import { type RankedSize, rankStock, type StockSize, usualStock } from "./thicknessStock.ts";

export interface ThicknessQuestion {
  /** Name of a cover with layers. */
  readonly cover: string;
  /** Index of the layer that varies, feed side first; the thickest of them where not given. */
  readonly layer?: number | undefined;
  /** Whose feed stands behind it; the end that has this cover, then the transmitter, where not given. */
  readonly end?: EndName | undefined;
  readonly fromMm?: number | undefined;
  /** Past the first half wave in the material and past the cover as it is, where not given. */
  readonly toMm?: number | undefined;
  readonly points: number;
  /** What the cover may cost [dB]. */
  readonly costLimitDb: number;
  /** Whole width [GHz]; 2 % of the frequency where not given. */
  readonly bandGHz?: number | undefined;
  /** Sizes that can be had; the usual ones of the range where not given. */
  readonly stock?: readonly StockSize[] | undefined;
}

export interface ThicknessStudy {
  readonly title: string;
  readonly frequencyGHz: number;
  readonly bandGHz: number;
  /** False where 2 % was taken for want of a band. */
  readonly bandGiven: boolean;
  readonly end: EndName;
  readonly feed: string;
  readonly feedReturnLossDb: number;
  readonly phaseKnown: boolean;
  readonly cover: string;
  readonly layers: readonly CoverLayer[];
  /** Index of the layer that varies. */
  readonly layer: number;
  readonly fromMm: number;
  readonly toMm: number;
  readonly costLimitDb: number;
  /** The cover with the thickness of the scenario. */
  readonly asBuilt: ThicknessPoint;
  readonly thinLimit: ThinLimit;
  /** Within the range. */
  readonly tuned: readonly TunedThickness[];
  readonly stock: readonly RankedSize[];
  readonly pair: PairOfSheets | undefined;
  readonly feedGaps: FeedGaps;
  readonly points: readonly ThicknessPoint[];
  /** How far the plane wave may be trusted at this mouth. */
  readonly trust: NearMouth;
  readonly warnings: readonly Warning[];
}

export const USUAL_BAND_SHARE = 0.02;

/** How thick one layer of a cover should be, and where to put the cover. */
export function thickness(scenario: Scenario, question: ThicknessQuestion): ThicknessStudy {
  const { frequencyGHz, covers, feeds } = scenario;
  const cover = covers[question.cover]!;
  const end = question.end ?? endWith(scenario, question.cover);
  const feedName = scenario[end].feed;
  const feed = feeds[feedName]!;
  const layer = question.layer ?? thickest(cover.layers);
  const bandGHz = question.bandGHz ?? USUAL_BAND_SHARE * frequencyGHz;
  const varied: VariedCover = { frequencyGHz, bandGHz, feed, cover, layer };
  const own = cover.layers[layer]!.thicknessMm;
  const fromMm = question.fromMm ?? 0;
  const toMm = question.toMm ?? usualEnd(varied, fromMm, own);
  const { costLimitDb, points } = question;
  const asBuilt = thicknessPoint(varied, own);
  return {
    title: scenario.title,
    frequencyGHz,
    bandGHz,
    bandGiven: question.bandGHz !== undefined,
    end,
    feed: feedName,
    feedReturnLossDb: feed.returnLossDb,
    phaseKnown: feed.phaseDeg !== undefined,
    cover: question.cover,
    layers: cover.layers,
    layer,
    fromMm,
    toMm,
    costLimitDb,
    asBuilt,
    thinLimit: thinLimit(varied, costLimitDb),
    tuned: tunedThicknesses(varied, { fromMm, toMm }, costLimitDb),
    stock: rankStock(varied, question.stock ?? within(usualStock, fromMm, toMm)),
    pair: pairOfSheets(varied),
    feedGaps: feedGaps(varied),
    points: Array.from({ length: points }, (_, i) =>
      thicknessPoint(varied, fromMm + ((toMm - fromMm) * i) / (points - 1)),
    ),
    trust: nearMouth({
      frequencyGHz,
      apertureMm: mouthWidthMm(feed),
      gapMm: cover.gapMm,
      sheetLossDb: asBuilt.sheetLossDb,
    }),
    warnings: warningsOf(varied, question.cover, feedName, toMm),
  };
}

/** The receiver if it alone has the cover. */
function endWith({ transmitter, receiver }: Scenario, cover: string): EndName {
  return receiver.cover === cover && transmitter.cover !== cover ? "receiver" : "transmitter";
}

/** The thickest layer that is a material; air counts only where there is nothing else. */
function thickest(layers: readonly CoverLayer[]): number {
  const weight = ({ material, thicknessMm }: CoverLayer) =>
    material === "air" ? -1 / (1 + thicknessMm) : thicknessMm;
  return layers.reduce((best, one, i) => (weight(one) > weight(layers[best]!) ? i : best), 0);
}

function within(sizes: readonly StockSize[], fromMm: number, toMm: number): StockSize[] {
  return sizes.filter(({ thicknessMm }) => thicknessMm >= fromMm && thicknessMm <= toMm);
}

/** A round figure past the first half wave after `fromMm`, and past the cover as it is. */
function usualEnd(varied: VariedCover, fromMm: number, ownMm: number): number {
  const least = Math.max(fromMm + 1.2 * halfWaveMm(varied), 1.2 * ownMm);
  const decade = 10 ** Math.floor(Math.log10(least));
  return decade * [1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10].find((step) => step * decade >= least)!;
}

function warningsOf(
  { frequencyGHz, feed, cover }: VariedCover,
  coverName: string,
  feedName: string,
  toMm: number,
): Warning[] {
  const wavelengths = toMm / (1e3 * wavelengthM(frequencyGHz));
  const where = `covers.${coverName}`;
  const warnings: Warning[] = [];
  if (wavelengths > MOST_WAVELENGTHS) {
    const message = `a thickness of ${Math.round(wavelengths)} wavelengths is hardly a cover; the flat infinite sheet says little there`;
    warnings.push({ code: "very_thick", message, where });
  }
  if (cover.measured !== undefined) {
    const message =
      "the readings of this cover hold for one thickness; these figures are of its layers alone";
    warnings.push({ code: "readings_unused", message, where });
  }
  if (feed.apertureMm === undefined) {
    const message = `no aperture is given: a mouth of ${mouthWidthMm(feed)} mm is taken for what it collects across a gap`;
    warnings.push({ code: "aperture_unknown", message, where: `feeds.${feedName}` });
  }
  return warnings;
}
