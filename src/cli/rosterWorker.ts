import type { RosterLines } from "../index.ts";
import { type RosterJob, rosterWork, type WorkedLines } from "./rosterWork.ts";
import { poolData } from "./workerPool.ts";

/** One thread of a roster: it makes itself ready with its first rows. */
let ready: Promise<(rows: RosterLines) => Promise<WorkedLines>> | undefined;

export async function work(rows: RosterLines): Promise<WorkedLines> {
  ready ??= rosterWork(poolData() as RosterJob);
  return (await ready)(rows);
}
