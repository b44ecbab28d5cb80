import { describe, expect, it } from "vitest";
import { rateBar } from "../../src/cli/progress.ts";

function terminal(isTTY: boolean) {
  const written: string[] = [];
  const stream = { isTTY, write: (text: string) => written.push(text) > 0 };
  return { written, stream: stream as unknown as NodeJS.WriteStream };
}

describe("a bar that tells a rate", () => {
  it("tells share, rate and time left, and clears its line", () => {
    const { written, stream } = terminal(true);
    let now = 0;
    const bar = rateBar(stream, "roster", "stations", () => now);
    now = 2000;
    bar.tell(0.25, 1000);
    bar.clear();
    expect(written).toEqual([
      `\rroster [#####${" ".repeat(15)}] 25 %, 500 stations/s, 6 s left\u001b[K`,
      "\r\u001b[K",
    ]);
  });

  it("waits between two states", () => {
    const { written, stream } = terminal(true);
    let now = 0;
    const bar = rateBar(stream, "roster", "stations", () => now);
    for (now = 1; now < 1000; now++) bar.tell(now / 2000, now);
    expect(written.length).toBeGreaterThan(1);
    expect(written.length).toBeLessThan(10);
  });

  it("tells a long wait in minutes or hours", () => {
    const { written, stream } = terminal(true);
    let now = 0;
    const bar = rateBar(stream, "roster", "stations", () => now);
    now = 60_000;
    bar.tell(0.1, 1);
    now = 600_000;
    bar.tell(0.01, 2);
    expect(written[0]).toContain("9 min left");
    expect(written[1]).toContain("16.5 h left");
  });

  it("is silent where nobody watches", () => {
    const { written, stream } = terminal(false);
    const bar = rateBar(stream, "roster", "stations", () => 1e6);
    bar.tell(0.5, 10);
    bar.clear();
    expect(written).toEqual([]);
  });
});
