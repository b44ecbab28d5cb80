import { cascade, sheetOf } from "../budget/mouthpiece.ts";
import type { Bounded } from "../cover/bounded.ts";
import type { CoveredFeed } from "../cover/coveredFeed.ts";
import { type Layer, layeredSheet } from "../cover/layeredSheet.ts";
import { wavelengthM } from "../numeric/constants.ts";
import type { Cover, CoverLayer, Feed } from "../scenario/types.ts";

/** A cover before a feed, one layer of which may be of any thickness. */
export interface VariedCover {
  readonly frequencyGHz: number;
  /** Whole width of the band about the frequency. */
  readonly bandGHz: number;
  readonly feed: Feed;
  readonly cover: Cover;
  /** Index of the layer that varies, feed side first. */
  readonly layer: number;
}

/** What the cover does with the varied layer of one thickness. */
export interface ThicknessPoint {
  readonly thicknessMm: number;
  /** Of the sheet by itself, plane wave, nominal material. */
  readonly sheetLossDb: number;
  readonly sheetReturnLossDb: number;
  /** Change against the bare feed at the frequency, nominal material; bounds by the phase if that is unknown. */
  readonly costDb: Bounded;
  /** Feed and cover at the frequency, nominal material; bounds by the phase if that is unknown. */
  readonly returnLossDb: Bounded;
  /** Any phase, any material within its spread, anywhere in the band. */
  readonly worstCostDb: number;
  readonly bestCostDb: number;
  readonly worstReturnLossDb: number;
}

/** Phase thickness [rad] from one sample of the band, or of the spread of the permittivity, to the next at most. */
const STEP_RAD = 0.15;
/** Samples on either side of the middle at most. */
const MOST_STEPS = 20;

/** The layer that varies. */
export function variedLayer({ cover, layer }: VariedCover): CoverLayer {
  return cover.layers[layer]!;
}

/** Thickness over which the layer's reflection runs through its period [mm]: half a wave in the material. */
export function halfWaveMm(varied: VariedCover): number {
  return (1e3 * wavelengthM(varied.frequencyGHz)) / (2 * Math.sqrt(variedLayer(varied).permittivity.nominal));
}

/** The stack with another thickness, at a place within the spread of its permittivities and loss tangents. */
export function stackAt(
  { cover, layer }: VariedCover,
  thicknessMm: number,
  place = 0,
  loss: keyof Bounded = "nominal",
): Layer[] {
  return cover.layers.map((one, i) => ({
    permittivity: within(one.permittivity, place),
    lossTangent: one.lossTangent[loss],
    thicknessMm: i === layer ? thicknessMm : one.thicknessMm,
  }));
}

function within({ low, nominal, high }: Bounded, place: number): number {
  return nominal + place * (place < 0 ? nominal - low : high - nominal);
}

/** Feed and cover, nominal but for what is given. */
export function coveredWith(
  varied: VariedCover,
  {
    thicknessMm,
    frequencyGHz = varied.frequencyGHz,
    permittivity,
  }: {
    readonly thicknessMm: number;
    readonly frequencyGHz?: number;
    /** Of the varied layer. */
    readonly permittivity?: number;
  },
): CoveredFeed {
  const layers = stackAt(varied, thicknessMm);
  if (permittivity !== undefined) layers[varied.layer] = { ...layers[varied.layer]!, permittivity };
  return covered(varied, frequencyGHz, layers);
}

/** Cost and return loss with the varied layer of a thickness. */
export function thicknessPoint(varied: VariedCover, thicknessMm: number): ThicknessPoint {
  const { frequencyGHz } = varied;
  const layers = stackAt(varied, thicknessMm);
  const sheet = layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
  const { insertionLossDb, returnLossDb } = cascade({ ...varied, frequencyGHz, beam: undefined }, sheet);
  let worstCostDb = -Infinity;
  let bestCostDb = Infinity;
  let worstReturnLossDb = Infinity;
  const frequencies = bandFrequencies(varied, thicknessMm);
  for (const place of spreadPlaces(varied, thicknessMm)) {
    const lossy = stackAt(varied, thicknessMm, place, "high");
    const clear = stackAt(varied, thicknessMm, place, "low");
    for (const frequency of frequencies) {
      const most = covered(varied, frequency, lossy);
      worstCostDb = Math.max(worstCostDb, most.insertionLossDb.high);
      worstReturnLossDb = Math.min(worstReturnLossDb, most.returnLossDb.low);
      // Without loss a sheet may reflect more: both ends count for the match.
      const least = covered(varied, frequency, clear);
      bestCostDb = Math.min(bestCostDb, least.insertionLossDb.low);
      worstReturnLossDb = Math.min(worstReturnLossDb, least.returnLossDb.low);
    }
  }
  return {
    thicknessMm,
    sheetLossDb: sheet.transmissionLossDb,
    sheetReturnLossDb: sheet.returnLossDb,
    costDb: insertionLossDb,
    returnLossDb,
    worstCostDb,
    bestCostDb,
    worstReturnLossDb,
  };
}

function covered(varied: VariedCover, frequencyGHz: number, layers: readonly Layer[]): CoveredFeed {
  return cascade(before(varied, frequencyGHz), sheetOf(frequencyGHz, layers));
}

/** The cover before the feed, met straight on: an average over the beam for every thickness would take too long. */
function before({ feed, cover }: VariedCover, frequencyGHz: number) {
  return { frequencyGHz, feed, cover, beam: undefined };
}

/** Frequencies of the band from end to end, the middle among them. */
function bandFrequencies(varied: VariedCover, thicknessMm: number): number[] {
  const { frequencyGHz, bandGHz } = varied;
  const share = bandGHz / 2 / frequencyGHz;
  return stepsOf(share * phaseRad(varied, thicknessMm)).map((step) => frequencyGHz * (1 + share * step));
}

/** Places within the spread of the permittivities: -1 is the low end, 0 nominal, 1 the high end. */
function spreadPlaces(varied: VariedCover, thicknessMm: number): number[] {
  const { low, nominal, high } = variedLayer(varied).permittivity;
  return stepsOf((phaseRad(varied, thicknessMm) * (high - low)) / 4 / nominal);
}

function phaseRad(varied: VariedCover, thicknessMm: number): number {
  return (Math.PI * thicknessMm) / halfWaveMm(varied);
}

/** From -1 to 1, 0 among them; the more of them the further half the way turns the phase. */
function stepsOf(halfRad: number): number[] {
  const half = Math.min(MOST_STEPS, Math.max(1, Math.ceil(halfRad / STEP_RAD)));
  return Array.from({ length: 2 * half + 1 }, (_, i) => i / half - 1);
}
