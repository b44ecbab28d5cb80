import { describe, expect, it } from "vitest";
import { rainWords } from "../../src/atmosphere/rainWords.ts";

describe("words for a rain rate", () => {
  // AMS Glossary of Meteorology (2.5 and 7.6 mm/h); Met Office wording of 1998 (rain 0.5 and 4, showers 2, 10
  // and 50 mm/h); WMO-No. 8 (2.5, 10 and 50 mm/h, from memory).
  it.each([
    [0.3, "light", "slight", "slight", "light"],
    [2.5, "light", "moderate", "moderate", "moderate"],
    [4, "moderate", "moderate", "moderate", "moderate"],
    [5, "moderate", "heavy", "moderate", "moderate"],
    [7.7, "heavy", "heavy", "moderate", "moderate"],
    [10, "heavy", "heavy", "heavy", "heavy"],
    [50, "heavy", "heavy", "heavy", "heavy"],
    [51, "heavy", "heavy", "violent", "violent"],
  ])("%d mm/h", (rainRateMmPerH, ams, ukRain, ukShowers, wmo) => {
    const words = rainWords({ rainRateMmPerH }).map(({ authority, word }) => [authority, word]);
    expect(words).toEqual([
      ["AMS", ams],
      ["UK, rain", ukRain],
      ["UK, showers", ukShowers],
      ["WMO", wmo],
    ]);
  });

  it("has no word for no rain, and every word has a source", () => {
    expect(rainWords({ rainRateMmPerH: 0 })).toEqual([]);
    for (const { source } of rainWords({ rainRateMmPerH: 3 })) expect(source).not.toBe("");
    expect(() => rainWords({ rainRateMmPerH: -1 })).toThrow(/rainRateMmPerH/);
  });
});
