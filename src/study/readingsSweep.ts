import { complex } from "../numeric/complex.ts";
import { energyContradiction, type Suspect } from "../readings/energyContradiction.ts";
import { rectangular } from "../readings/gum.ts";
import type { ReducedSweep, SweptCover } from "../readings/sweep.ts";
import type { SweepPoint } from "../readings/touchstone.ts";
import { BENCH_REPEATABILITY_DB } from "../readings/verdict.ts";
import type { SweepFile } from "../scenario/readingsSweep.ts";

/** One frequency of a sweep. */
export interface SweptFigures extends SweptCover {
  /** Which reading is the likelier culprit where the loss lies below the floor. */
  readonly suspects: readonly Suspect[];
}

export interface SweptCoverReport {
  readonly cover: string;
  readonly bareFile: string;
  readonly coveredFile: string;
  /** All frequencies that both sweeps hold. */
  readonly band: ReducedSweep;
  readonly frequencyGHz?: number | undefined;
  /** At that frequency, where the sweeps hold it. */
  readonly at?: SweptFigures;
  /** The frequency whose loss lies farthest below its floor, where one does. */
  readonly worstContradiction?: SweptFigures;
}

/** Sweeps of covers held against the bare one. */
export async function sweptCovers(
  sweeps: Readonly<Record<string, SweepFile>>,
  frequencyGHz: number | undefined,
): Promise<SweptCoverReport[]> {
  const { bare, ...covered } = sweeps;
  if (bare === undefined) return [];
  // What fits lines to sweeps is loaded for sweeps alone.
  const { reduceSweep, sweepAt } = await import("../readings/sweep.ts");
  const bareAt = (frequencyHz: number): SweepPoint => {
    const { s11, s21 } = sweepAt(bare.points, frequencyHz);
    return { frequencyHz, s11: complex(s11, 0), ...(s21 !== undefined && { s21: complex(s21, 0) }) };
  };
  return Object.entries(covered).map(([cover, sweep]) => {
    const band = reduceSweep({ bare: bare.points, covered: sweep.points });
    const hz = frequencyGHz === undefined ? undefined : Math.round(frequencyGHz * 1e12) / 1e3;
    const held = [bare, sweep].every(
      ({ points }) => hz !== undefined && hz >= points[0]!.frequencyHz && hz <= points.at(-1)!.frequencyHz,
    );
    const shortfall = ({ floorDb, insertionLossDb = 0 }: SweptCover) => floorDb - insertionLossDb;
    const [worst] = [...band.contradictions].sort((a, b) => shortfall(b) - shortfall(a));
    return {
      cover,
      bareFile: bare.file,
      coveredFile: sweep.file,
      band,
      frequencyGHz,
      ...(held && {
        at: withSuspects(reduceSweep({ bare: [bareAt(hz!)], covered: sweep.points }).worstReturnLoss),
      }),
      ...(worst && { worstContradiction: withSuspects(worst) }),
    };
  });
}

function withSuspects(figures: SweptCover): SweptFigures {
  const { belowFloor, insertionLossDb: lossDb, bareReturnLossDb, coveredReturnLossDb } = figures;
  if (!belowFloor || lossDb === undefined) return { ...figures, suspects: [] };
  const lossStandardDb = rectangular(BENCH_REPEATABILITY_DB);
  const { suspects } = energyContradiction({ lossDb, lossStandardDb, bareReturnLossDb, coveredReturnLossDb });
  return { ...figures, suspects };
}
