import { sheetOf } from "../budget/mouthpiece.ts";
import { abs } from "../numeric/complex.ts";
import { wavelengthM } from "../numeric/constants.ts";
import { minimum } from "../numeric/minimum.ts";
import { type Reach, reach } from "./reach.ts";
import {
  coveredWith,
  halfWaveMm,
  stackAt,
  type ThicknessPoint,
  thicknessPoint,
  type VariedCover,
  variedLayer,
} from "./thicknessCost.ts";

/** Where a thin layer begins to cost; undefined where it does not within ten wavelengths, 0 where the rest of the stack does. */
export interface ThinLimit {
  readonly nominalMm: number | undefined;
  /** Nominal material at the frequency, worst phase. */
  readonly worstPhaseMm: number | undefined;
  /** Any phase, any material within its spread, anywhere in the band. */
  readonly worstMm: number | undefined;
}

/** What a plate out of the shop must be held to; "never" where even the exact thickness costs too much. */
export type PlateVerdict = "any" | "usual" | "selected" | "beyond" | "never";

/** A thickness at which the reflection is least: half waves of a single layer, tuned ones within a stack. */
export interface TunedThickness {
  readonly thicknessMm: number;
  /** Half waves in the layer. */
  readonly halfWaves: number;
  readonly point: ThicknessPoint;
  /** Thickness [mm], permittivity and frequency [GHz] between which the cost stays below the limit in the worst phase. */
  readonly thicknessRangeMm: Reach;
  readonly permittivityRange: Reach;
  readonly frequencyRangeGHz: Reach;
  /** The nearer end of the thickness range, in per cent of the thickness. */
  readonly tolerancePercent: number | undefined;
  readonly plate: PlateVerdict;
}

/** Thickness of a plate as it is sold is off by so many per cent: common practice, no source. */
export const USUAL_PLATE_PERCENT = [5, 10] as const;
/** How far a search for the thin limit goes. */
export const MOST_WAVELENGTHS = 10;
/** Steps of a search in one half wave. */
const STEPS = 32;

/** The thicknesses below which the cost stays under a limit. */
export function thinLimit(varied: VariedCover, limitDb: number): ThinLimit {
  const below = (cost: (thicknessMm: number) => number) =>
    reach((mm) => cost(mm) - limitDb, {
      from: 0,
      step: halfWaveMm(varied) / STEPS,
      end: MOST_WAVELENGTHS * 1e3 * wavelengthM(varied.frequencyGHz),
    });
  return {
    nominalMm: below((thicknessMm) => coveredWith(varied, { thicknessMm }).insertionLossDb.nominal),
    worstPhaseMm: below((thicknessMm) => coveredWith(varied, { thicknessMm }).insertionLossDb.high),
    worstMm: below((thicknessMm) => thicknessPoint(varied, thicknessMm).worstCostDb),
  };
}

/** Every thickness of a range at which the sheet reflects least, with what it tolerates. */
export function tunedThicknesses(
  varied: VariedCover,
  { fromMm, toMm }: { readonly fromMm: number; readonly toMm: number },
  limitDb: number,
): TunedThickness[] {
  const reflected = (mm: number) => abs(sheetOf(varied.frequencyGHz, stackAt(varied, mm)).reflection);
  const count = Math.ceil((STEPS * (toMm - fromMm)) / halfWaveMm(varied)) + 2;
  const at = (i: number) => fromMm + ((toMm - fromMm) * i) / count;
  const found: TunedThickness[] = [];
  for (let i = 1; i < count; i++) {
    const here = reflected(at(i));
    if (reflected(at(i - 1)) > here && here <= reflected(at(i + 1))) {
      found.push(tuned(varied, minimum(reflected, at(i - 1), at(i + 1)), limitDb));
    }
  }
  return found;
}

function tuned(varied: VariedCover, thicknessMm: number, limitDb: number): TunedThickness {
  const { frequencyGHz } = varied;
  const period = halfWaveMm(varied);
  const halfWaves = thicknessMm / period;
  const permittivity = variedLayer(varied).permittivity.nominal;
  const excess = (change: Partial<Parameters<typeof coveredWith>[1]>) =>
    coveredWith(varied, { thicknessMm, ...change }).insertionLossDb.high - limitDb;
  // One step is a STEPS-th of the change that adds half a wave.
  const share = 1 / STEPS / Math.max(1, halfWaves);
  const both = (of: (x: number) => number, from: number, step: number, low: number, high: number): Reach => ({
    low: reach(of, { from, step: -step, end: low }),
    high: reach(of, { from, step, end: high }),
  });
  const thicknessRangeMm = both(
    (mm) => excess({ thicknessMm: mm }),
    thicknessMm,
    period / STEPS,
    0,
    thicknessMm + 2 * period,
  );
  const tolerancePercent = nearerEnd(thicknessMm, thicknessRangeMm);
  return {
    thicknessMm,
    halfWaves,
    point: thicknessPoint(varied, thicknessMm),
    thicknessRangeMm,
    permittivityRange: both(
      (eps) => excess({ permittivity: eps }),
      permittivity,
      permittivity * share,
      1,
      2 * permittivity,
    ),
    frequencyRangeGHz: both(
      (frequency) => excess({ frequencyGHz: frequency }),
      frequencyGHz,
      frequencyGHz * share,
      frequencyGHz / 2,
      1.5 * frequencyGHz,
    ),
    tolerancePercent,
    plate: excess({}) > 0 ? "never" : plateVerdict(tolerancePercent),
  };
}

function nearerEnd(value: number, { low, high }: Reach): number | undefined {
  const distances = [low, high].flatMap((end) => (end === undefined ? [] : Math.abs(end - value)));
  return distances.length === 0 ? undefined : (100 * Math.min(...distances)) / value;
}

function plateVerdict(tolerancePercent: number | undefined): PlateVerdict {
  const [fine, coarse] = USUAL_PLATE_PERCENT;
  if (tolerancePercent === undefined) return "any";
  if (tolerancePercent >= coarse) return "usual";
  return tolerancePercent >= fine ? "selected" : "beyond";
}
