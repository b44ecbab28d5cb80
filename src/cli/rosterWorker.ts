import type { RosterLines } from "../index.ts";
import { type RosterJob, rosterWork, type WorkedLines } from "./rosterWork.ts";
import { poolData } from "./workerPool.ts";

/** One thread of a roster: it makes itself ready with its first rows. */
let ready: Promise<(rows: RosterLines) => Promise<WorkedLines>> | undefined;
let last: Promise<unknown> = Promise.resolve();

/** One after the other, so that the first of two tasks is not kept waiting for the second. */
export function work(rows: RosterLines): Promise<WorkedLines> {
  ready ??= rosterWork(poolData() as RosterJob);
  const before = last;
  const result = ready.then(async (worker) => {
    await before;
    return worker(rows);
  });
  last = result.catch(() => {});
  return result;
}
