import { type CoveredFeed, coveredFeed } from "../cover/coveredFeed.ts";
import { type Layer, layeredSheet, type SheetScattering } from "../cover/layeredSheet.ts";
import { collectedShare } from "../cover/nearMouth.ts";
import { sheetOverBeam } from "../cover/sheetOverBeam.ts";
import { abs, scale } from "../numeric/complex.ts";
import type { Cover, Feed } from "../scenario/types.ts";

/** The part of a feed's pattern that lights its dish. */
export interface Beam {
  /** n of the feed's power pattern cos^n. */
  readonly exponent: number;
  /** Angle from the axis to the dish's rim [deg]. */
  readonly halfAngleDeg: number;
}

/** A feed's mouth with a cover before it. */
export interface Mouthpiece {
  readonly frequencyGHz: number;
  readonly feed: Feed;
  readonly cover: Cover;
  /** Undefined where the pattern is not known, or where a horn radiates by itself: the sheet is then met straight on. */
  readonly beam: Beam | undefined;
}

/** Width of a mouth that the scenario does not state: a small horn's [mm]. */
const USUAL_MOUTH_MM = 50;

/** The least that is passed on: an opaque cover loses this much and not an infinity, which nothing could be added to. */
const LEAST_TRANSMISSION = 1e-20;

export function mouthWidthMm({ apertureMm = USUAL_MOUTH_MM }: Feed): number {
  return apertureMm;
}

/** A stack met straight on. */
export function sheetOf(frequencyGHz: number, layers: readonly Layer[]): SheetScattering {
  return layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
}

/** A stack before the mouth as the feed's beam meets it: flat or domed, averaged over the pattern where that is known. */
export function sheetBefore(
  { frequencyGHz, cover, beam }: Mouthpiece,
  layers: readonly Layer[],
): SheetScattering {
  const { domeRadiusMm: radiusMm, gapMm } = cover;
  // The gap reaches to the apex of a dome, so that its centre lies behind the mouth by what is left of the radius.
  const dome =
    radiusMm === undefined ? undefined : { radiusMm, centreBehindMm: Math.max(0, radiusMm - gapMm) };
  const sheet =
    beam === undefined || layers.every(({ thicknessMm }) => thicknessMm === 0)
      ? sheetOf(frequencyGHz, layers)
      : sheetOverBeam({ frequencyGHz, layers, ...beam, dome });
  const passed = abs(sheet.transmission);
  if (passed >= LEAST_TRANSMISSION) return sheet;
  const transmission =
    passed > 0 ? scale(sheet.transmission, LEAST_TRANSMISSION / passed) : { re: LEAST_TRANSMISSION, im: 0 };
  return { reflection: sheet.reflection, transmission };
}

/** Feed and sheet together, with the share of the reflected wave that finds back into the mouth. */
export function cascade(
  { frequencyGHz, feed, cover: { gapMm } }: Mouthpiece,
  sheet: SheetScattering,
): CoveredFeed {
  const near = { frequencyGHz, apertureMm: mouthWidthMm(feed), gapMm };
  return coveredFeed({
    feedReturnLossDb: feed.returnLossDb,
    sheet,
    phaseDeg: feed.phaseDeg,
    gapMm,
    frequencyGHz,
    collectedShare: collectedShare(near).collectedShare,
  });
}
