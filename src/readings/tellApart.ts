import { wavelengthM } from "../numeric/constants.ts";
import { foretell, type SheetOnFeed } from "./sheetOnFeed.ts";

export interface FurtherReading {
  readonly change: "gap" | "thickness" | "frequency";
  readonly gapMm: number;
  readonly thicknessMm: number;
  readonly frequencyGHz: number;
  /** Return loss that each solution foretells for it [dB], in their order. */
  readonly returnLossDb: readonly number[];
  /** Least difference between any two of them [dB]. */
  readonly separationDb: number;
  /** Whether that exceeds the expanded uncertainty of the difference. */
  readonly decides: boolean;
}

/**
 * The readings that would tell several solutions apart, best first.
 *
 * Tried are the same sheet an eighth wave further out, half and twice the thickness, and frequencies 5 % away. For
 * another frequency the feed is taken as unchanged, which its maker or a reading has to confirm.
 *
 * Source: own derivation: what each solution foretells by `coveredFeed`
 *
 * @param solutions             at least two
 * @param returnLossStandardDb  standard uncertainty of a return loss [dB]
 */
export function tellApart(
  solutions: readonly SheetOnFeed[],
  returnLossStandardDb: number,
): readonly FurtherReading[] {
  const [{ gapMm, layer, frequencyGHz }] = solutions as [SheetOnFeed];
  const now = { gapMm, thicknessMm: layer.thicknessMm, frequencyGHz };
  const eighthWaveMm = (1e3 * wavelengthM(frequencyGHz)) / 8;
  const changes = [
    { ...now, change: "gap" as const, gapMm: gapMm + eighthWaveMm },
    { ...now, change: "thickness" as const, thicknessMm: now.thicknessMm / 2 },
    { ...now, change: "thickness" as const, thicknessMm: now.thicknessMm * 2 },
    { ...now, change: "frequency" as const, frequencyGHz: frequencyGHz * 0.95 },
    { ...now, change: "frequency" as const, frequencyGHz: frequencyGHz * 1.05 },
  ];
  const readings = changes.map((reading) => {
    const returnLossDb = solutions.map(
      (solution) =>
        foretell({
          ...solution,
          gapMm: reading.gapMm,
          frequencyGHz: reading.frequencyGHz,
          layer: { ...solution.layer, thicknessMm: reading.thicknessMm },
        }).returnLossDb,
    );
    const separationDb = leastDifference(returnLossDb);
    return {
      ...reading,
      returnLossDb,
      separationDb,
      decides: separationDb > 2 * Math.SQRT2 * returnLossStandardDb,
    };
  });
  return readings.sort((a, b) => b.separationDb - a.separationDb);
}

function leastDifference(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return Math.min(...sorted.slice(1).map((value, i) => value - sorted[i]!));
}
