import { describe, expect, it } from "vitest";
import { dewFilmMm, filmAfterRain } from "../../src/cover/drying.ts";

describe("a cover after the rain", () => {
  it("starts with the film it had", () => {
    const { thicknessMm } = filmAfterRain({ thicknessMm: 0.08, minutesSinceRain: 0 });
    expect(thicknessMm).toEqual({ nominal: 0.08, low: 0.08, high: 0.08 });
  });

  it("keeps 1/e of it after a known time constant", () => {
    const { thicknessMm } = filmAfterRain({
      thicknessMm: 0.08,
      minutesSinceRain: 12,
      timeConstantMinutes: 12,
    });
    expect(thicknessMm.nominal).toBeCloseTo(0.02943, 5);
    expect(thicknessMm.low).toBe(thicknessMm.high);
  });

  // Common practice, no source: minutes to tens of minutes.
  it("is nearly dry after two hours at best guess, and may be within half an hour", () => {
    const left = (minutesSinceRain: number) =>
      filmAfterRain({ thicknessMm: 0.1, minutesSinceRain }).thicknessMm;
    expect(left(120).nominal).toBeLessThan(0.0001);
    expect(left(30).low).toBeLessThan(0.001);
    expect(left(30).high).toBeGreaterThan(0.02);
    expect(left(30).low).toBeLessThan(left(30).nominal);
    expect(left(30).nominal).toBeLessThan(left(30).high);
  });

  it("bears dew of some tenths of a millimetre at most", () => {
    expect(dewFilmMm.low).toBeLessThan(dewFilmMm.nominal);
    expect(dewFilmMm.nominal).toBeLessThan(dewFilmMm.high);
    expect(dewFilmMm.high).toBeLessThan(0.8); // yield of the best dew collectors in a night (from memory)
  });

  it.each([
    [{ thicknessMm: -1 }, /thicknessMm/],
    [{ minutesSinceRain: -1 }, /minutesSinceRain/],
    [{ timeConstantMinutes: 0 }, /timeConstantMinutes/],
  ])("refuses %o", (change, named) => {
    expect(() => filmAfterRain({ thicknessMm: 0.1, minutesSinceRain: 5, ...change })).toThrow(named);
  });
});
