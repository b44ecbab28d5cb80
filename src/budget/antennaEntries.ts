import { conicalHorn } from "../antenna/conicalHorn.ts";
import { dishGain } from "../antenna/dishGain.ts";
import {
  feedEfficiency,
  feedExponentFromBeamwidth,
  feedExponentFromEdgeTaper,
  rimAngleRad,
} from "../antenna/feedEfficiency.ts";
import { pointingLoss } from "../antenna/pointing.ts";
import { pyramidalHorn } from "../antenna/pyramidalHorn.ts";
import { RADIANS_PER_DEGREE, wavelengthM } from "../numeric/constants.ts";
import { powerToDb } from "../numeric/decibels.ts";
import type { Dish, Feed } from "../scenario/types.ts";
import { type Entry, gainEntry, type Heading, lossEntry, type Stage } from "./entry.ts";
import type { Beam } from "./mouthpiece.ts";

/** 1-sigma of a gain that was measured on a range, or reckoned from size [dB]: common practice, no source. */
const STATED_GAIN_SIGMA_DB = 0.4;
const SIZE_GAIN_SIGMA_DB = 0.6;

/** A dish so deep that its rim stands behind the feed is lit by rays that no flat cover passes [deg]. */
const STEEPEST_RAY_DEG = 85;

/** Makes the heading of an entry of one end: id prefix and stage set. */
export type EndHeading = (id: string, label: string, source: string) => Heading;

export function endHeading(stage: Stage & ("transmitter" | "receiver")): EndHeading {
  const prefix = stage === "transmitter" ? "tx" : "rx";
  return (id, label, source) => ({ id: `${prefix}.${id}`, stage, label, source });
}

export interface AntennaEntries {
  readonly entries: readonly Entry[];
  readonly beamwidthDeg: number | undefined;
  /** The feed's pattern as it lights the dish; undefined where it is not known. */
  readonly beam: Beam | undefined;
  /** Distance at which the far field begins [m]; undefined where the size is not known. */
  readonly farFieldM: number | undefined;
}

/** Gain of one end: a dish lit by its feed, a dish of stated gain, or the feed by itself. */
export function antennaEntries(
  heading: EndHeading,
  frequencyGHz: number,
  feed: Feed,
  dish: Dish | undefined,
): AntennaEntries {
  if (dish === undefined) return feedAlone(heading, frequencyGHz, feed);
  const gain = dish.gainDbi ? statedDish(heading, dish) : litDish(heading, frequencyGHz, feed, dish);
  const beamwidthDeg = dish.diameterM
    ? dishGain({ diameterM: dish.diameterM, frequencyGHz, efficiency: 1 }).beamwidthDeg
    : beamwidthOfGain(dish.gainDbi!.value);
  const { pointingOffsetDeg: offsetDeg, pointingErrorDeg: errorPerAxisDeg } = dish;
  const entries = [...gain];
  if (offsetDeg > 0 || errorPerAxisDeg > 0) {
    const { meanDb, sigmaDb } = pointingLoss({ offsetDeg, errorPerAxisDeg, beamwidthDeg });
    const source = "Gaussian main lobe, mean of a normal aim";
    entries.push(lossEntry(heading("pointing", "pointing, mean of the aim", source), meanDb, sigmaDb));
  }
  const farFieldM = dish.diameterM && (2 * dish.diameterM ** 2) / wavelengthM(frequencyGHz);
  return { entries, beamwidthDeg, beam: beamOf(feed, dish), farFieldM };
}

/** Pattern of a feed in a dish of known shape, where the feed's taper is known too. */
function beamOf({ edgeTaperDb, tenDbWidthDeg }: Feed, { focalRatio }: Dish): Beam | undefined {
  if (focalRatio === undefined) return undefined;
  const pattern =
    edgeTaperDb !== undefined
      ? feedExponentFromEdgeTaper({ edgeTaperDb, focalRatio })
      : tenDbWidthDeg !== undefined
        ? feedExponentFromBeamwidth({ tenDbFullWidthDeg: tenDbWidthDeg })
        : undefined;
  const rimDeg = rimAngleRad(focalRatio) / RADIANS_PER_DEGREE;
  return pattern && { exponent: pattern.exponent, halfAngleDeg: Math.min(rimDeg, STEEPEST_RAY_DEG) };
}

function statedDish(heading: EndHeading, { gainDbi }: Dish): Entry[] {
  const { value, sigma = STATED_GAIN_SIGMA_DB } = gainDbi!;
  return [gainEntry(heading("gain", "dish and feed, stated gain", "scenario"), value, sigma)];
}

function litDish(heading: EndHeading, frequencyGHz: number, feed: Feed, dish: Dish): Entry[] {
  const { diameterM = 0, focalRatio, surfaceRmsMm, blockageM: blockageDiameterM } = dish;
  const size = { diameterM, frequencyGHz, surfaceRmsMm, blockageDiameterM };
  const { apertureGainDbi, surfaceLossDb, blockageLossDb } = dishGain({ ...size, efficiency: 1 });
  const label = `dish, ${Math.round(100 * diameterM)} cm evenly lit`;
  const source = "aperture gain (pi D/lambda)^2";
  const entries = [gainEntry(heading("aperture", label, source), apertureGainDbi, SIZE_GAIN_SIGMA_DB)];
  if (focalRatio === undefined) {
    const loss = -powerToDb(dish.efficiency!);
    entries.push(lossEntry(heading("efficiency", "aperture efficiency, stated", "scenario"), loss));
  } else {
    const { spillover, taper } = feedEfficiency({ exponent: beamOf(feed, dish)!.exponent, focalRatio });
    const balanis = "Balanis, Antenna Theory, 15.4.1";
    entries.push(
      lossEntry(heading("spillover", "feed past the rim", balanis), -powerToDb(spillover)),
      lossEntry(heading("illumination", "uneven illumination", balanis), -powerToDb(taper)),
    );
  }
  if (blockageDiameterM > 0) {
    const source = "uniform aperture, central disc";
    entries.push(lossEntry(heading("blockage", "feed before the dish", source), blockageLossDb));
  }
  if (surfaceRmsMm > 0) {
    entries.push(lossEntry(heading("surface", "surface error", "Ruze 1966"), surfaceLossDb));
  }
  const { value: otherDb, sigma = 0 } = dish.otherLossesDb;
  if (otherDb > 0 || sigma > 0) {
    entries.push(lossEntry(heading("other", "other losses of the dish", "scenario"), otherDb, sigma));
  }
  return entries;
}

function feedAlone(heading: EndHeading, frequencyGHz: number, feed: Feed): AntennaEntries {
  const { value, sigma, source } = feedGain(frequencyGHz, feed);
  return {
    entries: [gainEntry(heading("gain", "feed or horn by itself", source), value, sigma)],
    beamwidthDeg: beamwidthOfGain(value),
    beam: undefined,
    farFieldM: undefined,
  };
}

function feedGain(frequencyGHz: number, feed: Feed): { value: number; sigma: number; source: string } {
  const wavelengths = (lengthM: number) => lengthM / wavelengthM(frequencyGHz);
  const { gainDbi, pyramidalHorn: horn, conicalHorn: cone } = feed;
  if (gainDbi)
    return { value: gainDbi.value, sigma: gainDbi.sigma ?? STATED_GAIN_SIGMA_DB, source: "scenario" };
  if (horn) {
    const { directivityDbi } = pyramidalHorn({
      guideA: wavelengths(horn.guideAM),
      guideB: wavelengths(horn.guideBM),
      apertureA1: wavelengths(horn.apertureAM),
      apertureB1: wavelengths(horn.apertureBM),
      rhoE: wavelengths(horn.slantEM),
      rhoH: wavelengths(horn.slantHM),
    });
    return { value: directivityDbi, sigma: STATED_GAIN_SIGMA_DB, source: "Balanis, Antenna Theory, 13.4" };
  }
  const { directivityDbi } = conicalHorn({
    diameter: wavelengths(cone!.diameterM),
    length: wavelengths(cone!.slantM),
  });
  return { value: directivityDbi, sigma: STATED_GAIN_SIGMA_DB, source: "Balanis, Antenna Theory, 13.5" };
}

/** Beamwidth by 70 lambda/D and 20 log(D/lambda) = G - 7.7, as the ITU-R envelopes take it [deg]. */
function beamwidthOfGain(gainDbi: number): number {
  return Math.min(180, 70 / 10 ** ((gainDbi - 7.7) / 20));
}
