/** Threads that work through tasks, all with the same data to start from. */
export interface WorkerPool<Task, Result> {
  readonly run: (task: Task) => Promise<Result>;
  readonly end: () => Promise<void>;
}

/** Tasks that a thread has before it: with one alone it would stand idle until the next is handed over. */
const AT_HAND = 2;

/**
 * @param file     whose function `work` does a task
 * @param threads  how many
 * @param data     what each thread is told when it starts
 */
export async function workerPool<Task, Result>(
  file: string,
  threads: number,
  data: unknown,
): Promise<WorkerPool<Task, Result>> {
  const { Tinypool } = await import("tinypool");
  const pool = new Tinypool({
    filename: file,
    name: "work",
    minThreads: threads,
    maxThreads: threads,
    concurrentTasksPerWorker: AT_HAND,
    workerData: data,
  });
  return {
    run: (task) => pool.run(task) as Promise<Result>,
    end: () => pool.destroy(),
  };
}

/** What the pool told this thread. */
export function poolData(): unknown {
  return (process as unknown as { __tinypool_state__: { workerData: unknown } }).__tinypool_state__
    .workerData;
}
