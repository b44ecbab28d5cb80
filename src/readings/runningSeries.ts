import { requireFinite } from "../numeric/check.ts";
import { OPEN, type TimedReading } from "./bracket.ts";
import { studentQuantile } from "./studentT.ts";
import { BENCH_REPEATABILITY_DB } from "./verdict.ts";

/** Most covered readings between two bare ones that are kept until the second is read. */
export const MOST_BETWEEN = 100_000;
/** Differences of a cover before which its mean is too poor to judge a single reading by. */
const FIRST_JUDGED = 20;

export interface RunningCover {
  readonly state: string;
  /** Bracketed differences that went into it. */
  readonly count: number;
  readonly lossDb: number;
  /** Standard uncertainty of the mean from the scatter of the readings [dB]. */
  readonly typeADb: number;
}

export interface RunningSeriesResult {
  readonly covers: readonly RunningCover[];
  readonly readingStandardDb: number;
  readonly degreesOfFreedom: number;
  /** The reading that fits worst, by its place, where it is too far out to be chance. */
  readonly outlier?: { readonly place: number; readonly shiftDb: number };
  /** How many covered readings no bare one brackets; they are not used. */
  readonly unbracketedCount: number;
}

/** Running sums of the differences of one cover. */
interface Group {
  readonly state: string;
  count: number;
  mean: number;
  squares: number;
  /** Sum of |w_i|^2, and |sum w_i|^2, over its differences. */
  weightSquares: number;
  totalSquared: number;
}

interface Block {
  timeSum: number;
  levelSum: number;
  readonly place: number;
  count: number;
  /** Total weight of the block in the differences of each cover. */
  readonly weights: Map<Group, number>;
  /** Of the differences that lean on it: sum of share^2, and of share times deviation. */
  shareSquares: number;
  leaning: number;
}

interface Waiting {
  readonly group: Group;
  readonly time: number;
  readonly levelDb: number;
  readonly place: number;
}

/**
 * `reduceSeries` of a run too long to be held: one pass, memory that does not grow with the run.
 *
 * The same differences, weights and pooled scatter, as running sums (Welford for the scatter). An outlier is judged
 * against the mean of the readings before it, which a long run knows well enough, from the 21st difference of a cover
 * on; of a block of bare readings the first stands for all.
 *
 * Source: as `reduceSeries`; running sums: Welford 1962, Technometrics 4, 419 (from memory)
 * Valid:  as `reduceSeries`, at most 100 000 covered readings between two bare ones
 *
 * @returns add, which takes one reading and its place (such as its line in a file); end, which gives the result
 * @throws RangeError on a time that does not rise, a level that is not finite, too many readings without a bare one
 *         between, or at the end on too few bracketed readings to judge scatter by
 */
export function runningSeries(): {
  readonly add: (reading: TimedReading, place: number) => void;
  readonly end: () => RunningSeriesResult;
} {
  const groups = new Map<string, Group>();
  let lastTime = -Infinity;
  let before: Block | undefined;
  let after: Block | undefined;
  let waiting: Waiting[] = [];
  let unbracketedCount = 0;
  let readings = 0;
  let worst: { place: number; dot: number; length: number } | undefined;

  const groupOf = (state: string): Group => {
    const known = groups.get(state);
    if (known) return known;
    const group = { state, count: 0, mean: 0, squares: 0, weightSquares: 0, totalSquared: 0 };
    groups.set(state, group);
    return group;
  };
  const suspect = (place: number, dot: number, length: number) => {
    if (length > 0 && dot ** 2 / length > (worst ? worst.dot ** 2 / worst.length : 0)) {
      worst = { place, dot, length };
    }
  };
  /** Nothing more will lean on a block. */
  const close = (block: Block) => {
    for (const [group, weight] of block.weights) group.totalSquared += weight ** 2 / block.count;
    suspect(block.place, block.leaning / block.count, block.shareSquares / block.count ** 2);
  };
  /** The covered readings between two complete blocks. */
  const settle = (from: Block, to: Block) => {
    const [fromTime, toTime] = [from.timeSum / from.count, to.timeSum / to.count];
    for (const { group, time, levelDb, place } of waiting) {
      const share = (time - fromTime) / (toTime - fromTime);
      const bareDb = ((1 - share) * from.levelSum) / from.count + (share * to.levelSum) / to.count;
      const difference = bareDb - levelDb;
      const deviation = group.count > 0 ? difference - group.mean : 0;
      group.count++;
      group.mean += (difference - group.mean) / group.count;
      group.squares += deviation * (difference - group.mean);
      group.weightSquares += 1 + (1 - share) ** 2 / from.count + share ** 2 / to.count;
      group.totalSquared += 1;
      const judged = group.count > FIRST_JUDGED;
      if (judged) suspect(place, -deviation, 1);
      for (const [block, part] of [
        [from, 1 - share],
        [to, share],
      ] as const) {
        block.weights.set(group, (block.weights.get(group) ?? 0) + part);
        if (!judged) continue;
        block.shareSquares += part ** 2;
        block.leaning += part * deviation;
      }
    }
    waiting = [];
    close(from);
  };

  return {
    add: ({ time, state, levelDb }, place) => {
      requireFinite("levelDb", levelDb);
      if (!(time > lastTime)) throw new RangeError(`time must be later than the one before, got ${time}`);
      lastTime = time;
      readings++;
      if (state === OPEN) {
        if (before && waiting.length === 0) return extend(before, time, levelDb);
        if (after) extend(after, time, levelDb);
        else {
          const block = newBlock(time, levelDb, place);
          if (before) after = block;
          else before = block;
        }
        return;
      }
      const group = groupOf(state);
      if (!before) {
        unbracketedCount++;
        return;
      }
      if (after) {
        settle(before, after);
        [before, after] = [after, undefined];
      }
      if (waiting.length >= MOST_BETWEEN) {
        throw new RangeError(`more than ${MOST_BETWEEN} covered readings without a bare one between`);
      }
      waiting.push({ group, time, levelDb, place });
    },
    end: () => {
      if (before && after) {
        settle(before, after);
        close(after);
      } else {
        unbracketedCount += waiting.length;
        if (before) close(before);
      }
      const used = [...groups.values()].filter(({ count }) => count > 0);
      const degreesOfFreedom = used.reduce((sum, { count }) => sum + count - 1, 0);
      if (degreesOfFreedom < 1) {
        throw new RangeError(
          "readings must hold at least two covered readings of one cover, each between open ones",
        );
      }
      const squares = used.reduce((sum, group) => sum + group.squares, 0);
      const spread = used.reduce(
        (sum, { weightSquares, totalSquared, count }) => sum + weightSquares - totalSquared / count,
        0,
      );
      const variance = squares / spread;
      const outlier = worst && outlierOf(worst, squares, degreesOfFreedom, readings);
      return {
        covers: used.map(({ state, count, mean, totalSquared }) => ({
          state,
          count,
          lossDb: mean,
          typeADb: Math.sqrt((variance * totalSquared) / count ** 2),
        })),
        readingStandardDb: Math.sqrt(variance),
        degreesOfFreedom,
        ...(outlier && { outlier }),
        unbracketedCount,
      };
    },
  };
}

function newBlock(time: number, levelDb: number, place: number): Block {
  const sums = { timeSum: time, levelSum: levelDb, count: 1, shareSquares: 0, leaning: 0 };
  return { ...sums, place, weights: new Map() };
}

function extend(block: Block, time: number, levelDb: number): void {
  block.timeSum += time;
  block.levelSum += levelDb;
  block.count++;
}

/** The test of `outlyingReading` for the one reading that explains most. */
function outlierOf(
  { place, dot, length }: { place: number; dot: number; length: number },
  squares: number,
  degreesOfFreedom: number,
  readings: number,
): { place: number; shiftDb: number } | undefined {
  const remaining = degreesOfFreedom - 1;
  if (remaining < 1) return undefined;
  const shiftDb = dot / length;
  const explained = dot ** 2 / length;
  const t = Math.sqrt((remaining * explained) / Math.max(0, squares - explained));
  const limit = studentQuantile(1 - 0.05 / (2 * readings), remaining);
  return t > limit && Math.abs(shiftDb) > BENCH_REPEATABILITY_DB ? { place, shiftDb } : undefined;
}
