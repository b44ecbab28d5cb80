import { OPEN, type TimedReading } from "./bracket.ts";
import { type CoverageChoice, type ReducedCover, reduceSeries, type TypeBInput } from "./reduceSeries.ts";

export interface ReduceReadingsInput extends CoverageChoice, TypeBInput {
  /** n + 1 bare readings [dB], the first before and the last after all covered ones. */
  readonly openDb: readonly number[];
  /** n covered readings [dB], taken in turn between the bare ones, in equal steps. */
  readonly coveredDb: readonly number[];
  readonly feedReturnLossDb?: number | undefined;
  readonly coveredReturnLossDb?: number | undefined;
}

export interface SuspectReading {
  readonly state: "open" | "covered";
  /** Place in openDb or coveredDb. */
  readonly index: number;
  /** How far the reading lies from where the others put it [dB]. */
  readonly shiftDb: number;
}

export interface ReducedReadings extends Omit<ReducedCover, "state"> {
  readonly degreesOfFreedom: number;
  /** Standard deviation of one reading [dB]. */
  readonly readingStandardDb: number;
  /** Kept in all figures; empty where every reading fits. */
  readonly outliers: readonly SuspectReading[];
}

/**
 * Insertion loss of one cover from readings taken in turn: open, covered, open, ..., covered, open.
 *
 * `reduceSeries` in equal steps.
 *
 * Source: see `reduceSeries`
 *
 * @param openDb               n + 1 bare readings [dB], n at least 2
 * @param coveredDb            n covered readings [dB]
 * @param repeatabilityDb      half-width of the bench's repeatability [dB], default 0.05
 * @param feedReturnLossDb     bare [dB], above 0
 * @param coveredReturnLossDb  covered [dB], above 0
 * @param coverage             factor k, default 2
 * @throws RangeError on other numbers of readings or an argument outside its range
 */
export function reduceReadings({
  openDb,
  coveredDb,
  coveredReturnLossDb,
  ...rest
}: ReduceReadingsInput): ReducedReadings {
  if (openDb.length !== coveredDb.length + 1) {
    throw new RangeError(
      `openDb must hold one reading more than coveredDb, got ${openDb.length} and ${coveredDb.length}`,
    );
  }
  const readings: TimedReading[] = openDb.flatMap((levelDb, i) => {
    const open = { time: 2 * i, state: OPEN, levelDb };
    const covered = coveredDb[i];
    return covered === undefined ? [open] : [open, { time: 2 * i + 1, state: "covered", levelDb: covered }];
  });
  const series = reduceSeries({
    readings,
    ...rest,
    ...(coveredReturnLossDb !== undefined && { coveredReturnLossDb: { covered: coveredReturnLossDb } }),
  });
  const { state: _, ...cover } = series.covers[0]!;
  const { outlier, degreesOfFreedom, readingStandardDb } = series;
  return {
    ...cover,
    degreesOfFreedom,
    readingStandardDb,
    outliers: outlier ? [suspect(outlier.reading, outlier.shiftDb)] : [],
  };
}

function suspect(reading: number, shiftDb: number): SuspectReading {
  return { state: reading % 2 === 0 ? "open" : "covered", index: Math.floor(reading / 2), shiftDb };
}
