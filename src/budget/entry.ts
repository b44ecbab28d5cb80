import type { Bounded } from "../cover/bounded.ts";

export type Stage = "transmitter" | "path" | "receiver" | "noise" | "mode";

/**
 * One line of a budget, whatever produced it.
 *
 * `db` is signed as it adds to the level (losses negative), `low` and `high` bound what physics leaves unknown
 * (the phase between feed and cover, the spread of a plastic), `sigma` is the 1-sigma uncertainty of the input,
 * `source` names the Recommendation, the paper or the scenario.
 */
export interface Entry {
  readonly id: string;
  readonly stage: Stage;
  readonly label: string;
  readonly db: number;
  readonly low: number;
  readonly high: number;
  readonly sigma: number;
  readonly source: string;
}

/** What an entry says beside its figures. */
export type Heading = Pick<Entry, "id" | "stage" | "label" | "source">;

/** Entry of a level or gain [dB], known but for `sigma`. */
export function gainEntry({ id, stage, label, source }: Heading, db: number, sigma = 0): Entry {
  // Field by field: spreading the heading takes many times as long, and a roster makes millions of entries.
  return { id, stage, label, source, db, low: db, high: db, sigma };
}

/** Entry of a loss [dB, positive], with bounds or without. */
export function lossEntry({ id, stage, label, source }: Heading, loss: Bounded | number, sigma = 0): Entry {
  const { nominal, low, high } = typeof loss === "number" ? { nominal: loss, low: loss, high: loss } : loss;
  // Subtraction, not a minus sign: no loss is 0 and never -0.
  return { id, stage, label, source, db: 0 - nominal, low: 0 - high, high: 0 - low, sigma };
}

export function sumOf(entries: readonly Entry[], figure: "db" | "low" | "high"): number {
  let sum = 0;
  for (const entry of entries) sum += entry[figure];
  return sum;
}
