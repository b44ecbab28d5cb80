import { describe, expect, it } from "vitest";
import { inferText } from "../../src/report/inferText.ts";
import { readingsCsv } from "../../src/report/readingsData.ts";
import { readingsText } from "../../src/report/readingsText.ts";
import type { InferReport } from "../../src/study/inferReadings.ts";
import type { BenchReport, ChangeFigure, LossFigure } from "../../src/study/readings.ts";
import { widest } from "../cli/run.ts";

const figure = {
  pairs: 6,
  valueDb: 0.213,
  typeADb: 0.012,
  combinedDb: 0.031,
  expandedDb: 0.0612,
  coverageFactor: 1.97,
  effectiveDegreesOfFreedom: 212,
  limitDb: 0.0612,
  leastDb: 0.0566,
};
const loss: LossFigure = { ...figure, verdict: "measured_loss", retake: false, suspects: [] };
const change: ChangeFigure = { ...figure, verdict: "worse_match" };

const report = (
  one: { loss?: LossFigure; change?: ChangeFigure },
  more: Partial<BenchReport> = {},
): BenchReport => ({
  file: "bench.csv",
  rows: 13,
  confidence: 0.95,
  repeatabilityDb: 0.05,
  covers: [{ cover: "film", ...one }],
  runs: [],
  sweeps: [],
  notes: [],
  doubts: [],
  ...more,
});

function said(written: BenchReport): string {
  const text = readingsText(written);
  expect(widest(text)).toBeLessThanOrEqual(80);
  return text.replace(/\s+/g, " ");
}

describe("readingsText", () => {
  it.each<[verdict: string, one: LossFigure, words: string]>([
    ["a loss", loss, "film: 0.21 dB ± 0.06 dB (95 %)"],
    [
      "nothing",
      { ...loss, valueDb: -0.001, verdict: "indistinguishable_from_zero" },
      "film: indistinguishable from zero: below 0.06 dB (read 0.00 dB ±",
    ],
    [
      "a gain",
      { ...loss, valueDb: -0.4, verdict: "implausible_gain", retake: true },
      "film: retake: it seems to amplify, -0.40 dB ±",
    ],
    [
      "a gain by tuning",
      {
        ...loss,
        valueDb: -0.2,
        verdict: "gain_possible_by_matching",
        retake: true,
        bestPossibleGainDb: 0.46,
      },
      "tuning the feed could explain up to 0.46 dB",
    ],
    [
      "a contradiction",
      {
        ...loss,
        verdict: "below_energy_floor",
        retake: true,
        floorDb: 0.5,
        suspects: [{ reading: "covered_return_loss", neededDb: 12.15, standardUncertainties: 5 }],
      },
      "demands 0.50 dB or more (below_energy_floor); likelier culprit: the covered return loss (12.15 dB would fit)",
    ],
  ])("says %s in plain words", (_, one, words) => {
    expect(said(report({ loss: one }))).toContain(words);
  });

  it("says what more pairs would do", () => {
    const more = (wanted: { db: number; more: number | undefined }) =>
      said(report({ loss: { ...loss, wanted } }));
    expect(more({ db: 0.058, more: 4 })).toContain("film: 4 more pairs would reach ±0.06 dB");
    expect(more({ db: 0.058, more: 1 })).toContain("film: 1 more pair would reach");
    expect(more({ db: 0.03, more: undefined })).toContain("no number of pairs reaches ±0.03 dB");
    expect(more({ db: 0.1, more: 0 })).toContain("film: reaches ±0.10 dB already");
    expect(said(report({ loss }))).toContain("without end, pairs would reach ±0.06 dB");
  });

  it("says what a coupler leaves of a match", () => {
    const returnLosses = {
      bare: { db: 15, lowDb: 13, highDb: 18 },
      covered: { db: 13, lowDb: 11, highDb: Infinity },
    };
    const text = said(report({ change: { ...change, valueDb: 2, returnLosses, leakLimitDb: Infinity } }));
    expect(text).toContain("return loss falls by 2.00 dB");
    expect(text).toContain("bare 15.0 dB (13.0 to 18.0), covered 13.0 dB (11.0 to any)");
    expect(text).toContain("the coupler's leak can feign or hide all of it");
  });

  it("names lines that stand out or are not used, and no more than a few", () => {
    const run = {
      figure: "level" as const,
      unit: "dB",
      count: 40,
      driftDb: -0.3,
      overS: 1800,
      readingStandardDb: 0.02,
      degreesOfFreedom: 11,
      outlier: { line: 7, state: "open", shiftDb: 0.4 },
      unbracketedCount: 20,
      unbracketedLines: Array.from({ length: 20 }, (_, i) => i + 20),
    };
    const text = said(report({ loss }, { runs: [run] }));
    expect(text).toContain("bare moved by -0.30 dB over 30 min");
    expect(text).toContain("The reading in line 7 (bare) stands out by 0.40 dB");
    expect(text).toContain("(line 20, 21, 22, 23, 24, 25, 26, 27 and 12 more): not used");
  });

  it("shows of a note nothing that a terminal would obey", () => {
    const text = readingsText(report({ loss }, { notes: [{ line: 3, text: "wind\nand \u001b[2J rain" }] }));
    expect(text).toContain("line 3: wind and \\u{1b}[2J rain");
  });

  it("keeps to 80 columns with a long name, and has a row of data for each figure", () => {
    const long = report(
      {},
      { covers: [{ cover: "a very long name of a cover ".repeat(6).trim(), loss, change }] },
    );
    said(long);
    expect(readingsCsv(long).trim().split("\n")).toHaveLength(3);
  });
});

describe("inferText", () => {
  const base: InferReport = {
    file: "infer.yaml",
    frequencyGHz: 10.4,
    returnLossStandardDb: 0.58,
    lossStandardDb: 0.029,
    phaseFrom: "nowhere",
    sheets: [],
    contradictions: [],
  };
  const feed = { residuals: [], degreesOfFreedom: 0, advice: [] };

  it.each<[what: string, more: Partial<InferReport>, words: string]>([
    [
      "a contradiction of one sheet",
      { feed: { ...feed, outcome: "contradictory", feeds: [], cosSum: 1.8, cosSumExpanded: 0.2 } },
      "contradictory: no phase of the feed explains these readings of this sheet (cosine 1.80 ± 0.20, beyond 1)",
    ],
    [
      "an open phase",
      {
        feed: {
          ...feed,
          outcome: "undetermined",
          feeds: [
            { gamma: 0.1, returnLossDb: 20, phaseDeg: 3, phaseLowDeg: -Infinity, phaseHighDeg: Infinity },
          ],
        },
      },
      "the readings cannot decide the phase: return loss 20.0 dB",
    ],
    [
      "a sheet without a phase",
      {
        sheets: [
          {
            name: "grey",
            thicknessMm: 2.4,
            byFeed: [
              {
                feedPhaseDeg: undefined,
                result: {
                  outcome: "undetermined",
                  ambiguous: false,
                  solutions: [],
                  permittivityIntervals: [
                    [1.2, 3],
                    [8, 9],
                  ],
                  advice: [],
                },
              },
            ],
          },
        ],
      },
      "permittivity 1.20 to 3.00, or 8.00 to 9.00",
    ],
    [
      "a loss below its floor",
      {
        contradictions: [
          {
            sheet: "grey",
            insertionLossDb: 0.02,
            floorDb: 0.4,
            suspects: [{ reading: "insertion_loss", neededDb: 0.4, standardUncertainties: 9 }],
          },
        ],
      },
      "grey: a loss of 0.02 dB lies below the 0.40 dB that the return losses demand (below_energy_floor); likelier culprit: the insertion loss",
    ],
  ])("says %s plainly", (_, more, words) => {
    const text = inferText({ ...base, ...more });
    expect(widest(text)).toBeLessThanOrEqual(80);
    expect(text.replace(/\s+/g, " ")).toContain(words);
  });
});
