import { visible } from "../scenario/wording.ts";
import type {
  BenchReport,
  BoundedReturnLoss,
  ChangeFigure,
  CoverReadings,
  LossFigure,
  ReducedFigure,
  RunOfReadings,
} from "../study/readings.ts";
import { type Cell, cell, columns, RULE } from "./columns.ts";
import { sweepAnswer, sweepText } from "./readingsSweepText.ts";
import { confidenceWords, counted, culpritWords, decibels, spread, withSpread } from "./readingsWords.ts";
import { capital, hundredth, listed, type Paint, paragraph, plain, tenth } from "./words.ts";

/** Lines named of a long list. */
const MOST_LINES = 8;

/** What the bench says of each cover, for a terminal of 80 columns: the answer first. */
export function readingsText(report: BenchReport, paint: Paint = plain): string {
  const { file, title, covers, runs, sweeps, doubts, notes } = report;
  const parts = [
    [
      paint("strong", paragraph(`Readings of ${file}`)),
      ...(title === undefined ? [] : [paragraph(title)]),
    ].join("\n"),
    [
      ...covers.flatMap((cover) => answers(cover, report, paint)),
      ...sweeps.map((sweep) => sweepAnswer(sweep, paint)),
    ].join("\n"),
    covers.length === 0 ? "" : `${paint("strong", "Uncertainty in dB")}\n${uncertaintyTable(report)}`,
    covers.length === 0 ? "" : morePairs(report, paint),
    runs.length === 0 ? "" : [paint("strong", "Run"), ...runs.flatMap((run) => runWords(run))].join("\n"),
    ...sweeps.map((sweep) => sweepText(sweep, paint)),
    lines(
      "Doubts",
      doubts.map(({ line, message }) => `line ${line}: ${message}`),
      paint,
    ),
    lines(
      "Notes",
      notes.map(({ line, text }) => `line ${line}: ${visible(text.replace(/\s+/g, " "))}`),
      paint,
    ),
    covers.length === 0 ? "" : paragraph(trustWords(report)),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

function lines(title: string, texts: readonly string[], paint: Paint): string {
  if (texts.length === 0) return "";
  return [paint("strong", title), ...texts.map((text) => paragraph(text, "  - "))].join("\n");
}

/** One sentence for the loss and one for the match. */
function answers({ cover, loss, change }: CoverReadings, report: BenchReport, paint: Paint): string[] {
  return [
    ...(loss ? [paint(lossMeaning(loss), paragraph(`${cover}: ${lossWords(loss, report)}`))] : []),
    ...(change ? [paragraph(`${cover}, match: ${changeWords(change, report)}`)] : []),
  ];
}

function lossMeaning({ verdict, retake }: LossFigure) {
  return retake ? "bad" : verdict === "measured_loss" ? "strong" : "good";
}

function lossWords(loss: LossFigure, { confidence }: BenchReport): string {
  const { verdict, valueDb, expandedDb, limitDb, bestPossibleGainDb } = loss;
  const figure = withSpread(valueDb, expandedDb, confidence);
  switch (verdict) {
    case "measured_loss":
      return figure;
    case "indistinguishable_from_zero":
      return `indistinguishable from zero: below ${spread(limitDb)} (read ${figure})`;
    case "below_energy_floor":
      return (
        `retake: ${figure} contradicts the change of return loss, which demands ${decibels(loss.floorDb!)} ` +
        `or more (below_energy_floor); ${culpritWords(loss.suspects)}`
      );
    case "gain_possible_by_matching":
      return (
        `retake: it seems to amplify, ${figure}; tuning the feed could explain up to ` +
        `${decibels(bestPossibleGainDb!)} of that, so read the return loss with the cover too`
      );
    case "implausible_gain":
      return (
        `retake: it seems to amplify, ${figure}, and nothing explains that; ` +
        "did the level drift, or something move?"
      );
  }
}

function changeWords(
  { verdict, valueDb, expandedDb, limitDb, ...rest }: ChangeFigure,
  report: BenchReport,
): string {
  const figure = withSpread(Math.abs(valueDb), expandedDb, report.confidence);
  const change =
    verdict === "indistinguishable_from_zero"
      ? `change of return loss indistinguishable from zero: below ${spread(limitDb)} (read ${decibels(valueDb)})`
      : `return loss ${verdict === "worse_match" ? "falls" : "rises"} by ${figure}`;
  const { returnLosses, leakLimitDb } = rest;
  const both = returnLosses
    ? `; bare ${boundsWords(returnLosses.bare)}, covered ${boundsWords(returnLosses.covered)}`
    : "";
  if (leakLimitDb === undefined) return change + both;
  const leak =
    leakLimitDb === Infinity
      ? "the coupler's leak can feign or hide all of it"
      : `the coupler's leak can falsify it by up to ${decibels(leakLimitDb)}, which no repeat lowers`;
  return `${change}${both}; ${leak}`;
}

function boundsWords({ db, lowDb, highDb }: BoundedReturnLoss): string {
  if (lowDb === undefined || highDb === undefined) return `${tenth(db)} dB`;
  return `${tenth(db)} dB (${tenth(lowDb)} to ${highDb === Infinity ? "any" : tenth(highDb)})`;
}

function uncertaintyTable({ covers }: BenchReport): string {
  const row = (name: string, figure: ReducedFigure): Cell[] =>
    [
      name,
      String(figure.pairs),
      figure.valueDb.toFixed(3),
      figure.typeADb.toFixed(3),
      figure.combinedDb.toFixed(3),
      hundredth(figure.coverageFactor),
      figure.effectiveDegreesOfFreedom > 999 ? "many" : figure.effectiveDegreesOfFreedom.toFixed(0),
      figure.expandedDb.toFixed(3),
    ].map((text) => cell(text));
  const table = columns([
    ["", "pairs", "mean", "type A", "A and B", "k", "freedom", "expanded"].map((text) => cell(text)),
    RULE,
    ...covers.flatMap(({ cover, loss, change }) => [
      ...(loss ? [row(shortened(cover), loss)] : []),
      ...(change ? [row(`${shortened(cover)}, match`, change)] : []),
    ]),
  ]);
  return table;
}

/** Names are the user's own; the table keeps its columns on the line. */
function shortened(name: string): string {
  const characters = [...name];
  return characters.length > 14 ? `${characters.slice(0, 11).join("")}...` : name;
}

function morePairs({ covers }: BenchReport, paint: Paint): string {
  const words = (name: string, { wanted, leastDb, expandedDb }: ReducedFigure): string[] => {
    if (wanted === undefined) return [`${name}: without end, pairs would reach ±${spread(leastDb)}`];
    const goal = `±${spread(wanted.db)}`;
    if (wanted.more === undefined) {
      return [`${name}: no number of pairs reaches ${goal}; the bench itself leaves ±${spread(leastDb)}`];
    }
    if (expandedDb <= wanted.db || wanted.more === 0) return [`${name}: reaches ${goal} already`];
    return [`${name}: ${wanted.more} more ${wanted.more === 1 ? "pair" : "pairs"} would reach ${goal}`];
  };
  return lines(
    "More pairs",
    covers.flatMap(({ cover, loss, change }) => [
      ...(loss ? words(cover, loss) : []),
      ...(change ? words(`${cover}, match`, change) : []),
    ]),
    paint,
  );
}

function runWords(run: RunOfReadings): string[] {
  const { figure, count, driftDb, overS, readingStandardDb, outlier, unbracketedCount } = run;
  const over = overS === undefined ? "" : ` over ${duration(overS)}`;
  const sentences = [
    `${capital(figure)}: ${counted(count, "reading")}; bare moved by ${decibels(driftDb)}${over}, which the pairs ` +
      `take out; one reading scatters by ${readingStandardDb.toFixed(3)} dB.`,
  ];
  if (outlier) {
    const { line, state, shiftDb } = outlier;
    const named = state === undefined ? "" : ` (${state === "open" ? "bare" : state})`;
    sentences.push(
      `The reading in line ${line}${named} stands out by ${decibels(shiftDb)} from where the others put it; it is kept ` +
        "in all figures. Leave one out only for a reason that you can write down.",
    );
  }
  if (unbracketedCount > 0) {
    sentences.push(
      `${counted(unbracketedCount, "covered reading")} without a bare one on either side${linesWords(run)}: not used.`,
    );
  }
  return sentences.map((sentence) => paragraph(sentence, "  - "));
}

function linesWords({ unbracketedLines: all }: RunOfReadings): string {
  if (all.length === 0) return "";
  const shown = all.slice(0, MOST_LINES).map(String);
  const more = all.length - shown.length;
  return ` (line ${listed(more > 0 ? [...shown, `${more} more`] : shown)})`;
}

function duration(seconds: number): string {
  if (seconds < 120) return `${Math.round(seconds)} s`;
  return seconds < 7200 ? `${Math.round(seconds / 60)} min` : `${(seconds / 3600).toFixed(1)} h`;
}

function trustWords({ confidence, repeatabilityDb, averages }: BenchReport): string {
  const counts = averages
    ? ` Averages a reading: ${listed([...new Set([averages.least, averages.most])].map(String))}.`
    : "";
  return (
    `Each covered reading is held against the bare level of its own moment. Type A: scatter of the pairs, pooled ` +
    `over the covers of a run; type B: the bench repeats to ±${decibels(repeatabilityDb)} (common practice, no source, ` +
    `unless you gave it). Expanded for ${confidenceWords(confidence)} by Student's k (JCGM 100:2008). No verdict ` +
    `rests on less than 0.05 dB.${counts}`
  );
}
