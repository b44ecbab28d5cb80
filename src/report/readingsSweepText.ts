import type { SweptCover } from "../readings/sweep.ts";
import type { SweptCoverReport, SweptFigures } from "../study/readingsSweep.ts";
import { cell, columns, RULE } from "./columns.ts";
import { counted, culpritWords, decibels, gigahertz } from "./readingsWords.ts";
import { hundredth, type Paint, paragraph, tenth } from "./words.ts";

/** Rows of the table over the band; the rest is in the data. */
const MOST_ROWS = 11;

/** The cover at the frequency asked for, or over the band, in one sentence. */
export function sweepAnswer(sweep: SweptCoverReport, paint: Paint): string {
  const { cover, at, band, frequencyGHz } = sweep;
  const shown = at ?? band.worstReturnLoss;
  const match =
    `return loss ${tenth(shown.bareReturnLossDb)} dB bare, ${tenth(shown.coveredReturnLossDb)} dB covered` +
    `${shown.insertionLossDb === undefined ? "" : `, insertion loss ${decibels(shown.insertionLossDb)}`}`;
  const where = at
    ? `at ${gigahertz(at.frequencyHz)}`
    : `${frequencyGHz === undefined ? "" : `${frequencyGHz} GHz lies outside the sweeps; `}worst match at ${gigahertz(shown.frequencyHz)}`;
  const lie = at?.belowFloor ? `; retake: ${contradiction(at)}` : "";
  return paint(lie ? "bad" : "strong", paragraph(`${cover} by sweep, ${where}: ${match}${lie}`));
}

/** `the change of return loss demands 0.31 dB or more (below_energy_floor); likelier culprit: ...` */
function contradiction({ floorDb, suspects }: SweptFigures): string {
  return `the change of return loss demands ${decibels(floorDb)} or more (below_energy_floor); ${culpritWords(suspects)}`;
}

/** A cover over the band of its sweeps. */
export function sweepText(sweep: SweptCoverReport, paint: Paint): string {
  const { cover, bareFile, coveredFile, band, worstContradiction } = sweep;
  const { points, meanInsertionLossDb, worstInsertionLoss, insertionLossRippleDb, contradictions } = band;
  const [first, last] = [points[0]!, points.at(-1)!];
  const facts = [
    `${counted(points.length, "frequency").replace("frequencys", "frequencies")}, ${gigahertz(first.frequencyHz)} to ` +
      `${gigahertz(last.frequencyHz)}; bare ${bareFile}, covered ${coveredFile}`,
    ...(meanInsertionLossDb === undefined || worstInsertionLoss === undefined
      ? ["one port: no insertion loss; the floor is the least that the match alone costs"]
      : [
          `insertion loss ${decibels(meanInsertionLossDb)} on average, at most ` +
            `${decibels(worstInsertionLoss.insertionLossDb!)} at ${gigahertz(worstInsertionLoss.frequencyHz)}` +
            `${insertionLossRippleDb === undefined ? "" : `; ripple about a straight line ${decibels(insertionLossRippleDb)} peak to peak`}`,
        ]),
    ...(worstContradiction
      ? [
          `${contradictions.length} of them contradict themselves, worst at ` +
            `${gigahertz(worstContradiction.frequencyHz)}: ${contradiction(worstContradiction)}`,
        ]
      : []),
  ];
  return [
    paint("strong", `Sweep: ${cover}`),
    ...facts.map((fact) => paragraph(fact, "  - ")),
    bandTable(points),
  ].join("\n");
}

function bandTable(points: readonly SweptCover[]): string {
  const step = Math.max(1, (points.length - 1) / (MOST_ROWS - 1));
  const places = [...new Set(Array.from({ length: MOST_ROWS }, (_, i) => Math.round(i * step)))];
  const shown = places.flatMap((place) => points[place] ?? []);
  const swept = points.some(({ insertionLossDb }) => insertionLossDb !== undefined);
  return columns([
    ["GHz", "RL bare", "RL covered", "change", ...(swept ? ["loss"] : []), "floor"].map((text) => cell(text)),
    RULE,
    ...shown.map((point) =>
      [
        (point.frequencyHz / 1e9).toFixed(4),
        tenth(point.bareReturnLossDb),
        tenth(point.coveredReturnLossDb),
        tenth(point.returnLossChangeDb),
        ...(swept ? [point.insertionLossDb === undefined ? "" : hundredth(point.insertionLossDb)] : []),
        hundredth(point.floorDb),
      ].map((text) => cell(text)),
    ),
  ]);
}
