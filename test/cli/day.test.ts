import { afterEach, describe, expect, it, vi } from "vitest";
import { day } from "../../src/cli/day.ts";

describe("the day of a report", () => {
  afterEach(() => {
    vi.useRealTimers();
  });

  it("is noon of the day asked for, or of today, so that two runs on one day agree", () => {
    expect(day("2026-07-01").toISOString()).toBe("2026-07-01T12:00:00.000Z");
    vi.useFakeTimers({ now: new Date("2026-03-04T23:10:00Z") });
    expect(day(undefined).toISOString()).toBe("2026-03-04T12:00:00.000Z");
  });

  it.each(["2026-06-31", "2026-7-1", "soon", ""])("is not %j", (text) => {
    expect(() => day(text)).toThrow("expected a day such as 2026-07-01");
  });
});
