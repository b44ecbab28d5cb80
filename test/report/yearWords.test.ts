import { describe, expect, it } from "vitest";
import {
  availabilityFigure,
  hoursFigure,
  hoursWords,
  minutesFigure,
  monthWords,
} from "../../src/report/yearWords.ts";

describe("times of a year in words", () => {
  it.each([
    [6.23, 6.23, "6.2", "6.2 hours"],
    [123.4, 123.4, "123", "123 hours"],
    [1, 1, "1", "1 hour"],
    [0.1712, 0.1712, "0.17", "10 minutes"],
    [0.01, 0.01, "0.01", "36 seconds"],
    [0, 0, "0", "no time"],
    [0, 0.08766, "<0.088", "under 5.3 minutes"],
    [0.001, 0.0886, "<0.089", "under 5.3 minutes"],
    [87.66, 8766, ">88", "over 88 hours"],
    [87.66, 507, "88-507", "88 hours to 507 hours"],
  ])("%d to %d hours are %s, %s", (low, high, figure, words) => {
    expect(hoursFigure({ low, high })).toBe(figure);
    expect(hoursWords({ low, high })).toBe(words);
  });

  it.each([
    [897.2, 897.2, "897", "15 hours"],
    [0, 3.07, "<3.1", "under 3.1 minutes"],
    [1250, 43_830, ">1250", "over 21 hours"],
  ])("%d to %d minutes of a month are %s, %s", (low, high, figure, words) => {
    expect(minutesFigure({ low, high })).toBe(figure);
    expect(monthWords({ low, high })).toBe(words);
  });

  it.each([
    [99.9934, 99.9934, "99.9934"],
    [99.5, 99.5, "99.50"],
    [100, 100, "100"],
    [0, 0, "0"],
    [99.999, 100, ">99.9990"],
    [0, 99, "<99.0"],
  ])("%d to %d %% available are %s", (low, high, figure) => {
    expect(availabilityFigure({ low, high })).toBe(figure);
  });
});
