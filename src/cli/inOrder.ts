/**
 * Results in the order of their tasks, however long each takes, with no more than `most` tasks under way.
 *
 * @param stopped  ends it early: what is finished and next in order is handed out, the rest is given up
 */
export async function* inOrder<Task, Result>(
  tasks: AsyncIterable<Task>,
  work: (task: Task) => Promise<Result>,
  most: number,
  stopped: AbortSignal,
): AsyncGenerator<Result> {
  const underWay: Promise<Result>[] = [];
  const stop = new Promise<undefined>((resolve) => {
    stopped.addEventListener("abort", () => resolve(undefined), { once: true });
  });
  const next = () => Promise.race([underWay.shift()!, stop]);
  for await (const task of tasks) {
    if (stopped.aborted) break;
    const result = work(task);
    result.catch(() => {}); // a fault is met where its turn comes, or not at all
    underWay.push(result);
    if (underWay.length < most) continue;
    const done = await next();
    if (done === undefined) return;
    yield done;
  }
  while (underWay.length > 0) {
    const done = await next();
    if (done === undefined) return;
    yield done;
  }
}
