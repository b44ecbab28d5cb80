import { setTimeout as pause } from "node:timers/promises";
import { describe, expect, it } from "vitest";
import { inOrder } from "../../src/cli/inOrder.ts";

async function* numbers(count: number, taken: { count: number }) {
  for (let i = 0; i < count; i++) {
    taken.count++;
    yield i;
  }
}

const never = new AbortController().signal;

describe("tasks under way side by side", () => {
  it("hand out their results in order, however long each takes", async () => {
    const found: number[] = [];
    const work = (i: number) => pause((i % 3) * 5, 10 * i);
    for await (const result of inOrder(numbers(20, { count: 0 }), work, 4, never)) found.push(result);
    expect(found).toEqual(Array.from({ length: 20 }, (_, i) => 10 * i));
  });

  it("are never more than allowed, nor read far ahead", async () => {
    const taken = { count: 0 };
    let [underWay, most, handed] = [0, 0, 0];
    const work = async (i: number) => {
      most = Math.max(most, ++underWay);
      await pause(1);
      underWay--;
      return i;
    };
    for await (const _ of inOrder(numbers(30, taken), work, 3, never)) {
      handed++;
      expect(taken.count - handed).toBeLessThanOrEqual(3);
    }
    expect([most, handed]).toEqual([3, 30]);
  });

  it("end early with those that are finished and next in order", async () => {
    const stop = new AbortController();
    const found: number[] = [];
    // The fourth never ends.
    const work = (i: number) => (i === 3 ? new Promise<number>(() => {}) : Promise.resolve(i));
    setTimeout(() => stop.abort(), 30);
    for await (const result of inOrder(numbers(100, { count: 0 }), work, 5, stop.signal)) found.push(result);
    expect(found).toEqual([0, 1, 2]);
  });

  it("pass on what goes wrong, at its turn", async () => {
    const found: number[] = [];
    const work = async (i: number) => {
      if (i === 2) throw new RangeError("two");
      return i;
    };
    const run = async () => {
      for await (const result of inOrder(numbers(9, { count: 0 }), work, 4, never)) found.push(result);
    };
    await expect(run()).rejects.toThrow("two");
    expect(found).toEqual([0, 1]);
  });

  it("let go of results that are handed out", async () => {
    const handed: WeakRef<object>[] = [];
    const work = async () => ({ bytes: new Uint8Array(1000) });
    const stop = new AbortController();
    for await (const result of inOrder(numbers(200, { count: 0 }), work, 2, stop.signal)) {
      handed.push(new WeakRef(result));
      await pause(0);
    }
    // Weak references are cleared only between turns of the loop, under pressure for memory.
    for (let i = 0; i < 50; i++) {
      Array.from({ length: 1000 }, () => new Array(1000).fill(i));
      await pause(0);
    }
    expect(handed.filter((one) => one.deref() !== undefined).length).toBeLessThan(50);
    stop.abort();
  });
});
