import { rectangular } from "../readings/gum.ts";
import { BENCH_REPEATABILITY_DB } from "../readings/verdict.ts";
import type { BenchReport } from "./readings.ts";

/** What a report gives a scenario of one cover; uncertainties are standard ones [dB]. */
export interface EntryOfCover {
  readonly insertionLossDb: number;
  readonly insertionLossSigmaDb: number;
  readonly returnLossChangeDb?: number;
  readonly returnLossChangeSigmaDb?: number;
  /** The readings contradict themselves or amplify. */
  readonly retake: boolean;
}

/** Names of all covers of a report. */
export function coversRead({ covers, sweeps }: BenchReport): string[] {
  return [...new Set([...covers, ...sweeps].map(({ cover }) => cover))];
}

/** The figures of one cover, those of a table before those of a sweep; undefined without an insertion loss. */
export function entryOfCover({ covers, sweeps }: BenchReport, cover: string): EntryOfCover | undefined {
  const read = covers.find((one) => one.cover === cover);
  const swept = sweeps.find((one) => one.cover === cover)?.at;
  const change = read?.change
    ? {
        returnLossChangeDb: read.change.valueDb,
        returnLossChangeSigmaDb: read.change.combinedDb,
      }
    : swept && { returnLossChangeDb: swept.returnLossChangeDb };
  if (read?.loss) {
    const { valueDb, combinedDb, retake } = read.loss;
    return { insertionLossDb: valueDb, insertionLossSigmaDb: combinedDb, ...change, retake };
  }
  if (swept?.insertionLossDb === undefined) return undefined;
  return {
    insertionLossDb: swept.insertionLossDb,
    insertionLossSigmaDb: rectangular(BENCH_REPEATABILITY_DB),
    ...change,
    retake: swept.belowFloor,
  };
}
