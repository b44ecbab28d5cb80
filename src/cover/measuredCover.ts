import { requireFinite, requirePositive, requireWithin } from "../numeric/check.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { type Bounded, bounded } from "./bounded.ts";
import { energyFloor } from "./energyFloor.ts";
import type { Layer } from "./layeredSheet.ts";
import { gammaOfReturnLoss } from "./reflectionFigures.ts";

export interface MeasuredCoverInput {
  readonly feedReturnLossDb: number;
  readonly insertionLossDb: number;
  readonly returnLossChangeDb?: number | undefined;
}

export interface MeasuredCover {
  /** Return loss with the cover on [dB]. */
  readonly coveredReturnLossDb: number;
  /** Share of the insertion loss that is change of mismatch [dB], negative where the cover tunes the feed. */
  readonly mismatchChangeDb: number;
  /** Share of the insertion loss that is heat [dB]. */
  readonly dissipationDb: number;
  /** How far the insertion loss lies below the change of mismatch, which energy forbids [dB]. */
  readonly belowFloorDb: number;
  /** Magnitude of the reflection of a sheet that explains the change of return loss. */
  readonly reflection: Bounded;
}

/**
 * A measured cover taken apart: mismatch and heat, and the sheet that would explain it.
 *
 * An insertion loss read with and without the cover already holds the reflection, so the heat is what the change
 * of mismatch loss leaves of it. The sheet's reflection a lies between |g - g1|/(1 - g g1) and
 * (g + g1)/(1 + g g1), the phase being unknown. Nominal is the a whose mean reflected power over a random phase is
 * g1^2: a^2 = D/((1 - g^2)^2 + g^2 D), D = g1^2 - g^2. Where the match improved no mean explains it, and the
 * smallest a that can is taken.
 *
 * Source: own derivation from the averages of `coveredFeed`
 * Valid:  sheet on the mouth; without a change of return loss the match is taken as unchanged and the sheet
 *         as reflecting nothing, all loss being heat
 *
 * @param feedReturnLossDb    bare return loss [dB], above 0 to Infinity
 * @param insertionLossDb     measured change of level [dB], positive for a loss
 * @param returnLossChangeDb  bare less covered return loss [dB], positive where the cover spoils the match; below
 *                            the bare return loss
 * @throws RangeError on an argument outside these ranges; a change from a perfect match cannot be told
 */
export function measuredCover({
  feedReturnLossDb,
  insertionLossDb,
  returnLossChangeDb = 0,
}: MeasuredCoverInput): MeasuredCover {
  requireFinite("insertionLossDb", insertionLossDb);
  requireFinite("returnLossChangeDb", returnLossChangeDb);
  if (feedReturnLossDb === Infinity && returnLossChangeDb !== 0) {
    throw new RangeError("returnLossChangeDb cannot be counted from a perfect match");
  }
  const coveredReturnLossDb = feedReturnLossDb - returnLossChangeDb;
  const { floorDb } = energyFloor({ bareReturnLossDb: feedReturnLossDb, coveredReturnLossDb });
  const heatDb = insertionLossDb - floorDb;
  return {
    coveredReturnLossDb,
    mismatchChangeDb: floorDb,
    dissipationDb: Math.max(0, heatDb),
    belowFloorDb: Math.max(0, -heatDb),
    reflection: sheetReflection(
      gammaOfReturnLoss("feedReturnLossDb", feedReturnLossDb),
      gammaOfReturnLoss("returnLossChangeDb", coveredReturnLossDb),
    ),
  };
}

function sheetReflection(bare: number, covered: number): Bounded {
  const least = Math.abs(bare - covered) / (1 - bare * covered);
  const most = (bare + covered) / (1 + bare * covered);
  const rise = covered * covered - bare * bare;
  const nominal = rise < 0 ? least : Math.sqrt(rise / ((1 - bare * bare) ** 2 + bare * bare * rise));
  return bounded(least, nominal, most);
}

/** Permittivity of the stand-in for a measured cover: that of common plastics. */
const STAND_IN_PERMITTIVITY = 2.5;

/**
 * The thinnest lossless layer of a given reflection straight on, to put a water film upon.
 *
 * |G|^2 = F sin^2 d/(1 + F sin^2 d), F = (eps - 1)^2/(4 eps), solved for the phase thickness d. A permittivity of
 * 2.5 reaches |G| = 0.43 at a quarter wave; above, a quarter wave of eps = (1 + |G|)/(1 - |G|) is taken.
 *
 * Source: Born & Wolf, Principles of Optics, section 7.6 (Airy's form)
 *
 * @param reflection    magnitude |G|, 0 to 0.99
 * @param frequencyGHz  [GHz], above 0
 * @throws RangeError on an argument outside these ranges
 */
export function equivalentLayer({
  reflection,
  frequencyGHz,
}: {
  readonly reflection: number;
  readonly frequencyGHz: number;
}): Layer {
  requireWithin("reflection", reflection, 0, 0.99);
  requirePositive("frequencyGHz", frequencyGHz);
  const permittivity = Math.max(STAND_IN_PERMITTIVITY, (1 + reflection) / (1 - reflection));
  const finesse = (permittivity - 1) ** 2 / (4 * permittivity);
  const sine = Math.min(1, reflection / Math.sqrt(finesse * (1 - reflection * reflection)));
  const wavelengthMm = (1e3 * wavelengthM(frequencyGHz)) / Math.sqrt(permittivity);
  return { permittivity, lossTangent: 0, thicknessMm: (Math.asin(sine) / (2 * Math.PI)) * wavelengthMm };
}
