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
  // A race with one promise that outlives all others would keep every result alive for its sake.
  const next = () => {
    const result = underWay.shift()!;
    if (stopped.aborted) return Promise.race([result, undefined]);
    return new Promise<Result | undefined>((resolve, reject) => {
      const giveUp = () => resolve(undefined);
      stopped.addEventListener("abort", giveUp, { once: true });
      result.then(resolve, reject).finally(() => stopped.removeEventListener("abort", giveUp));
    });
  };
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
