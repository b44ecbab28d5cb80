import { describe, expect, it } from "vitest";
import {
  askedFigure,
  backLines,
  backWords,
  breakEvenFigure,
  rainWordsText,
  rateFigure,
  spreadFigure,
} from "../../src/report/rateWords.ts";
import type { BreakEven } from "../../src/study/breakEven.ts";

describe("rates", () => {
  it.each([
    [0, "0"],
    [0.0234, "0.02"],
    [0.097, "0.1"],
    [0.44, "0.4"],
    [6, "6.0"],
    [9.94, "9.9"],
    [9.96, "10"],
    [46.4, "46"],
  ])("%f is told as %s", (rate, text) => {
    expect(rateFigure(rate)).toBe(text);
  });

  it("that were asked for stay as they were written, to four digits", () => {
    expect([0.5, 16, 12.7, 804.672, 1 / 3].map(askedFigure)).toEqual([
      "0.5",
      "16",
      "12.7",
      "804.7",
      "0.3333",
    ]);
  });

  it("of break-even are bounded by the heaviest rain", () => {
    expect(breakEvenFigure(undefined)).toBe("over 400");
    expect(breakEvenFigure(0)).toBe("0");
    expect(breakEvenFigure(51.7)).toBe("52");
  });

  it("carry what one deviation makes of them, as far as any rain does", () => {
    expect(spreadFigure(52, { lowMmPerH: 42.9, highMmPerH: 64.4 })).toBe("52 (43-64)");
    expect(spreadFigure(212, { lowMmPerH: 0, highMmPerH: undefined })).toBe("212 (from 0)");
    expect(spreadFigure(undefined, { lowMmPerH: 350, highMmPerH: undefined })).toBe("over 400 (from 350)");
    expect(spreadFigure(undefined, { lowMmPerH: undefined, highMmPerH: undefined })).toBe("over 400");
    expect(spreadFigure(0, { lowMmPerH: 0, highMmPerH: 12 })).toBe("0");
  });
});

describe("words for rain", () => {
  // AMS Glossary: heavy above 7.6 mm/h; newspaper wording of 1998: heavy above 4 (rain), violent above 50 (showers)
  it.each([
    [5, "moderate by AMS, UK showers and WMO, heavy by UK rain"],
    [41, "heavy by AMS, UK rain, UK showers and WMO"],
    [60, "heavy by AMS and UK rain, violent by UK showers and WMO"],
  ])("of %f mm/h name every authority", (rate, text) => {
    expect(rainWordsText(rate)).toBe(text);
  });
});

describe("what comes back in harder rain", () => {
  const stretch = { fromMmPerH: 6.14, toMmPerH: 31.6, mechanism: "rain_scatter" } as const;
  const none: BreakEven = {
    zeroMmPerH: 1,
    reserveMmPerH: 0,
    closesMmPerH: 0,
    zeroSpread: { lowMmPerH: 0, highMmPerH: undefined },
    reserveSpread: { lowMmPerH: 0, highMmPerH: undefined },
    zeroBack: [],
    reserveBack: [],
    closesBack: [],
  };

  it("is told from rate to rate, with the way that carries it", () => {
    expect(backWords([stretch])).toBe("from 6.1 to 32 mm/h (by rain scatter)");
    expect(backWords([stretch, { ...stretch, fromMmPerH: 90, toMmPerH: undefined }])).toBe(
      "from 6.1 to 32 mm/h (by rain scatter) and from 90 mm/h on (by rain scatter)",
    );
  });

  it("is a line for a cover that has any", () => {
    expect(backLines("film", none)).toEqual([]);
    expect(backLines("film", { ...none, zeroBack: [stretch], closesBack: [stretch] })).toEqual([
      "film: closes from 6.1 to 32 mm/h (by rain scatter); something is left from 6.1\n" +
        "      to 32 mm/h (by rain scatter).",
    ]);
  });
});
