import { coveredFeed } from "../cover/coveredFeed.ts";
import { type Layer, layeredSheet, type Sheet } from "../cover/layeredSheet.ts";
import { gammaOfReturnLoss } from "../cover/reflectionFigures.ts";

/** Standard uncertainty of a return loss [dB]: half-width 1 dB, a coupler 20 dB above it (common practice, no source). */
export const RETURN_LOSS_STANDARD_DB = 0.58;

/** Standard uncertainty of an insertion loss [dB]: half-width 0.05 dB (common practice, no source). */
export const LOSS_STANDARD_DB = 0.029;

/** All that decides what a sheet does to a feed. */
export interface SheetOnFeed {
  readonly frequencyGHz: number;
  readonly feedReturnLossDb: number;
  /** arg S22 of the feed at its aperture plane [deg]. */
  readonly phaseDeg: number;
  readonly layer: Layer;
  /** Aperture plane to sheet [mm]. */
  readonly gapMm: number;
}

/** What a bench would read of it: magnitude of the reflection, return loss and insertion loss [dB]. */
export interface Foretold {
  readonly gamma: number;
  readonly returnLossDb: number;
  readonly insertionLossDb: number;
}

/** A single sheet straight on. */
export function sheetOf(layer: Layer, frequencyGHz: number): Sheet {
  return layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers: [layer] });
}

/** Readings that `coveredFeed` foretells for a sheet of known phase before a feed. */
export function foretell(
  { frequencyGHz, feedReturnLossDb, phaseDeg, layer, gapMm }: SheetOnFeed,
  sheet = sheetOf(layer, frequencyGHz),
): Foretold {
  const covered = coveredFeed({ feedReturnLossDb, sheet, phaseDeg, gapMm, frequencyGHz });
  const returnLossDb = covered.returnLossDb.nominal;
  return {
    gamma: gammaOfReturnLoss("returnLossDb", returnLossDb),
    returnLossDb,
    insertionLossDb: covered.insertionLossDb.nominal,
  };
}
