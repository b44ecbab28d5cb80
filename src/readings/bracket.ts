import { requireFinite } from "../numeric/check.ts";

/** One reading of a run: the bare feed, or a cover by its name. */
export interface TimedReading {
  /** Any unit, or just the order. */
  readonly time: number;
  /** "open" for the bare feed; anything else names a cover. */
  readonly state: string;
  readonly levelDb: number;
}

export const OPEN = "open";

export interface BracketedDifference {
  readonly state: string;
  /** Place of the covered reading in the series. */
  readonly reading: number;
  /** Bare level at that time less the covered level [dB]: positive for a loss. */
  readonly differenceDb: number;
  /** Its weight of every reading of the series; open ones add to 1, the covered one is -1. */
  readonly weights: readonly number[];
}

interface OpenBlock {
  readonly time: number;
  readonly members: readonly number[];
}

/**
 * Each covered reading held against the bare level at its own time.
 *
 * The bare level is interpolated linearly between the open readings on either side; open readings that follow one
 * another without a cover between count as one at their mean. A linear drift thus cancels exactly, and a step
 * falls on one difference alone. In equal steps this is (O_i + O_(i+1))/2 - C_i.
 *
 * Source: common practice (bracketing, "ABA" readings), no source
 *
 * @param readings  in order of time, strictly rising
 * @returns differences, in the order of the readings; unbracketed, places of covered readings that have no open one
 *          before or after them, which are not used
 * @throws RangeError on a time that does not rise or a level that is not finite
 */
export function bracketDifferences(readings: readonly TimedReading[]): {
  differences: BracketedDifference[];
  unbracketed: number[];
} {
  readings.forEach(({ time, levelDb }, i) => {
    requireFinite(`readings[${i}].time`, time);
    requireFinite(`readings[${i}].levelDb`, levelDb);
    if (i > 0 && !(time > readings[i - 1]!.time)) {
      throw new RangeError(`readings[${i}].time must be later than the one before, got ${time}`);
    }
  });
  const blocks = openBlocks(readings);
  const differences: BracketedDifference[] = [];
  const unbracketed: number[] = [];
  readings.forEach(({ time, state }, reading) => {
    if (state === OPEN) return;
    const next = blocks.findIndex((block) => block.time > time);
    const before = blocks[next - 1];
    const after = blocks[next];
    if (before === undefined || after === undefined) {
      unbracketed.push(reading);
      return;
    }
    const weights = readings.map((_, i): number => (i === reading ? -1 : 0));
    const share = (time - before.time) / (after.time - before.time);
    for (const member of before.members) weights[member] = (1 - share) / before.members.length;
    for (const member of after.members) weights[member] = share / after.members.length;
    const differenceDb = weights.reduce((sum, weight, i) => sum + weight * readings[i]!.levelDb, 0);
    differences.push({ state, reading, differenceDb, weights });
  });
  return { differences, unbracketed };
}

function openBlocks(readings: readonly TimedReading[]): OpenBlock[] {
  const blocks: number[][] = [];
  readings.forEach(({ state }, i) => {
    if (state !== OPEN) return;
    if (i > 0 && readings[i - 1]!.state === OPEN) blocks.at(-1)!.push(i);
    else blocks.push([i]);
  });
  return blocks.map((members) => ({
    time: members.reduce((sum, i) => sum + readings[i]!.time, 0) / members.length,
    members,
  }));
}
