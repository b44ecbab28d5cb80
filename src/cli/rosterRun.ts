import { join } from "node:path";
import { setImmediate } from "node:timers/promises";
import { type Roster, type RosterLines, rosterLines, seenStations } from "../index.ts";
import { inOrder } from "./inOrder.ts";
import type { RateBar } from "./progress.ts";
import { type RosterJob, rosterWork, type Worked, type WorkedLines } from "./rosterWork.ts";
import { workerPool } from "./workerPool.ts";

/** Rows handed to a thread at once: some 80 ms of work. */
const ROWS_AT_ONCE = 400;
/** With tiles a row takes many times as long. */
const ROWS_WITH_TERRAIN = 10;
/** Tasks under way for each thread: one in work, one before it, one done and waiting for its turn. */
const TASKS_PER_THREAD = 3;
/** Faults listed; more are counted. */
const MOST_FAULTS = 20;

/** What became of a roster. */
export interface RosterOutcome {
  /** Stations worked out, before the filter. */
  readonly done: number;
  readonly groundAssumed: number;
  readonly withoutTerrain: number;
  readonly terrainReason: string | undefined;
  /** `file:line:column: message`, and how many there were in all. */
  readonly faults: readonly string[];
  readonly faultCount: number;
  /** Rows that were not worked out at all. */
  readonly rowsLost: number;
  /** Exit status of an interruption; undefined where there was none. */
  readonly interrupted: number | undefined;
}

/** What gets the stations that the filter keeps, in the order of the file. */
export interface Taker {
  /** Where they are streamed: some stations' lines. */
  readonly text: (text: Uint8Array) => void | Promise<void>;
  /** Where they are not: one after the other. */
  readonly station: (worked: Worked) => void;
}

/**
 * Works out a roster, by itself or spread over threads; what comes out does not depend on how many.
 *
 * @param stopped  ends it early
 */
export async function runRoster(
  job: RosterJob,
  roster: Roster,
  threads: number,
  take: Taker,
  bar: RateBar,
  stopped: AbortSignal,
): Promise<RosterOutcome> {
  const engine = await engineOf(job, threads);
  const seen = seenStations();
  const faults: string[] = [];
  let [done, faultCount, rowsLost, groundAssumed, withoutTerrain] = [0, 0, 0, 0, 0];
  let terrainReason: string | undefined;
  const fault = (line: number, column: number, message: string) => {
    faultCount++;
    if (faults.length < MOST_FAULTS) faults.push(`${roster.path}:${line}:${column}: ${message}`);
  };
  const takeAll = async (worked: WorkedLines) => {
    const found = [...worked.faults];
    rowsLost += new Set(found.map(({ line }) => line)).size;
    const twice = new Set<number>();
    for (const [i, line] of worked.lines.entries()) {
      const first = seen.firstLineOf([worked.keys[2 * i]!, worked.keys[2 * i + 1]!], line);
      if (first === undefined) {
        if (worked.reached[i] === 1) done++;
        else rowsLost++;
        groundAssumed += worked.groundAssumed[i]!;
        continue;
      }
      twice.add(i);
      rowsLost++;
      found.push({ line, column: 1, message: `the same station as in line ${first}, which stands` });
    }
    const counts = ({ station }: { readonly station: number }) => !twice.has(station);
    found.push(...worked.noPaths.filter(counts));
    for (const { reason } of worked.noTerrain.filter(counts)) {
      withoutTerrain++;
      terrainReason ??= reason;
    }
    if (twice.size === 0) await take.text(worked.text);
    else {
      for (const [i, end] of worked.ends.entries()) {
        if (!twice.has(i)) await take.text(worked.text.subarray(worked.ends[i - 1] ?? 0, end));
      }
    }
    for (const one of worked.kept.filter((_, i) => !twice.has(i)).flat()) take.station(one);
    for (const one of found.sort((a, b) => a.line - b.line)) fault(one.line, one.column, one.message);
    bar.tell(worked.share, done);
  };
  try {
    const most = threads === 1 ? 1 : TASKS_PER_THREAD * threads;
    const atOnce = job.plan.scenario.path.terrain === undefined ? ROWS_AT_ONCE : ROWS_WITH_TERRAIN;
    let broken: RosterLines["fault"];
    async function* tasks() {
      for await (const rows of rosterLines(roster, atOnce)) {
        broken = rows.fault;
        yield rows;
      }
    }
    for await (const worked of inOrder(tasks(), engine.run, most, stopped)) {
      if (worked !== undefined) await takeAll(worked);
    }
    if (broken) fault(broken.line, broken.column ?? 1, broken.message);
  } finally {
    bar.clear();
    await engine.end();
  }
  const rows = done + rowsLost;
  if (rows === 0 && faultCount === 0 && !stopped.aborted) {
    fault(roster.headerLine, 1, "a header and no stations below it");
  }
  const interrupted = stopped.aborted ? (stopped.reason as number) : undefined;
  return { done, groundAssumed, withoutTerrain, terrainReason, faults, faultCount, rowsLost, interrupted };
}

/** Threads of their own, or this one, which then lets the keyboard be heard between two tasks. */
async function engineOf(job: RosterJob, threads: number) {
  if (threads > 1) {
    return workerPool<RosterLines, WorkedLines>(join(__dirname, "rosterWorker.cjs"), threads, job);
  }
  const work = await rosterWork(job);
  return {
    run: async (rows: RosterLines) => {
      await setImmediate();
      return work(rows);
    },
    end: async () => {},
  };
}
