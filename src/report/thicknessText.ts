import type { Reach } from "../study/reach.ts";
import type { ThicknessStudy } from "../study/thickness.ts";
import type { TunedThickness } from "../study/thicknessLimits.ts";
import { chart } from "./chart.ts";
import { cell, columns, RULE } from "./columns.ts";
import { handsOnText, warningText } from "./notes.ts";
import { gapText, pairText } from "./thicknessGapText.ts";
import { decibels, millimetres, returnLoss } from "./thicknessWords.ts";
import { hundredth, type Paint, paragraph, plain, tenth } from "./words.ts";

/** Rows of the tables that a screen shows; the rest is in the data. */
const MOST_TUNED = 4;
const MOST_SIZES = 15;

/** How thick a cover should be, for a terminal of 80 columns: the answer first. */
export function thicknessText(study: ThicknessStudy, paint: Paint = plain): string {
  const parts = [
    headline(study, paint),
    paragraph(answer(study)),
    `${paint("strong", `Cost of ${varied(study).material} by thickness`)}\n${costChart(study)}`,
    worstWords(study),
    `${paint("strong", `Thickness up to which it costs less than ${decibels(study.costLimitDb)}`)}\n${thinTable(study)}`,
    tunedText(study, paint),
    stockText(study, paint),
    pairText(study, paint),
    gapText(study, paint),
    warningText(study.warnings, paint),
    handsOnText(paint),
    paragraph(trustWords(study)),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

function varied({ layers, layer }: ThicknessStudy) {
  return layers[layer]!;
}

function headline(study: ThicknessStudy, paint: Paint): string {
  const { frequencyGHz, bandGHz, feedReturnLossDb, layers, layer } = study;
  const ends = [frequencyGHz - bandGHz / 2, frequencyGHz + bandGHz / 2].map((f) => f.toFixed(3));
  const stack = layers.map(
    ({ material, thicknessMm }, i) => `${i === layer ? "any" : millimetres(thicknessMm)} of ${material}`,
  );
  return [
    paint("strong", `How thick? Cover ${study.cover} before the feed ${study.feed}`),
    paragraph(study.title),
    paragraph(
      `${Number(frequencyGHz.toPrecision(6))} GHz, band ${ends.join(" to ")} GHz` +
        `${study.bandGiven ? "" : " (2 % taken; --band sets it)"}`,
    ),
    paragraph(
      `${study.end}'s feed ${study.feed}: return loss ${returnLoss(feedReturnLossDb)} dB bare, phase ` +
        `${study.phaseKnown ? "as the scenario gives it" : "unknown"}`,
    ),
    ...(layers.length > 1 ? [paragraph(`layers from the feed: ${stack.join(", ")}`)] : []),
  ].join("\n");
}

/** The answer in two or three sentences. */
function answer(study: ThicknessStudy): string {
  const { thinLimit, costLimitDb, phaseKnown, asBuilt } = study;
  const { material, thicknessMm } = varied(study);
  const limit = decibels(costLimitDb);
  const upTo = (mm: number | undefined) =>
    mm === undefined ? "at any thickness up to ten wavelengths" : `up to ${millimetres(mm)}`;
  const { nominalMm, worstPhaseMm } = thinLimit;
  const thin =
    nominalMm === 0
      ? `${material}: the rest of the cover alone costs ${limit} or more.`
      : phaseKnown
        ? `${material}: ${upTo(nominalMm)} costs less than ${limit}.`
        : `${material}: ${upTo(nominalMm)} costs less than ${limit} on average over the unknown phase, ` +
          `${worstPhaseMm === 0 ? "at no thickness" : upTo(worstPhaseMm)} in the worst.`;
  return `${thin} ${tunedAnswer(study)} As it is, ${millimetres(thicknessMm)} costs ${figureOf(asBuilt.costDb.nominal)}, ${figureOf(asBuilt.worstCostDb)} at worst.`;
}

function tunedAnswer(study: ThicknessStudy): string {
  const first = study.tuned[0];
  if (first === undefined) return "";
  const where = `${study.layers.length === 1 ? "The half wave at" : "Least reflection at"} ${millimetres(first.thicknessMm)}`;
  const limit = decibels(study.costLimitDb);
  if (first.plate === "never") {
    return `${where} costs ${figureOf(first.point.costDb.high)}${study.phaseKnown ? "" : " in the worst phase"}, more than ${limit}.`;
  }
  const { tolerancePercent } = first;
  if (tolerancePercent === undefined) return `${where} is not critical.`;
  const off = millimetres((first.thicknessMm * tolerancePercent) / 100);
  return `${where} must be true to ${off} (${tenth(tolerancePercent)} %) for that. ${plateWords(first)}`;
}

/** What can be bought against what is needed. */
function plateWords({ plate }: TunedThickness): string {
  switch (plate) {
    case "usual":
      return "A usual plate (5 to 10 % off, common practice, no source) meets that.";
    case "selected":
      return "Plates are usually 5 to 10 % off (common practice, no source): choose one by measuring it.";
    case "beyond":
      return "A plate as sold is usually 5 to 10 % off (common practice, no source): it cannot be trusted to meet that.";
    default:
      return "";
  }
}

function costChart({ points, phaseKnown }: ThicknessStudy): string {
  return chart({
    x: points.map(({ thicknessMm }) => thicknessMm),
    xLabel: "mm",
    yLabel: "dB",
    series: [
      { mark: "+", label: "worst", values: points.map(({ worstCostDb }) => worstCostDb) },
      {
        mark: "o",
        label: phaseKnown ? "nominal" : "average over the phase",
        values: points.map(({ costDb }) => costDb.nominal),
      },
    ],
  });
}

function worstWords({ phaseKnown }: ThicknessStudy): string {
  const of = phaseKnown ? "" : "any phase between feed and cover, ";
  return paragraph(
    `cost: loss against the bare feed; worst: ${of}the material anywhere in its spread, anywhere in the band`,
  );
}

function thinTable({ thinLimit, phaseKnown }: ThicknessStudy): string {
  const { nominalMm, worstPhaseMm, worstMm } = thinLimit;
  const row = (label: string, mm: number | undefined) => [
    cell(`  ${label}`),
    cell(mm === undefined ? "any" : mm === 0 ? "none" : millimetres(mm)),
  ];
  return columns([
    row(phaseKnown ? "nominal" : "average over the phase", nominalMm),
    ...(phaseKnown ? [] : [row("worst phase, nominal material, mid-band", worstPhaseMm)]),
    row(`worst of ${phaseKnown ? "" : "phase, "}material and band`, worstMm),
  ]);
}

function tunedText(study: ThicknessStudy, paint: Paint): string {
  const { tuned, layers, costLimitDb, fromMm, toMm } = study;
  const single = layers.length === 1;
  const title = paint("strong", single ? "Half-wave thickness" : "Thickness of least reflection");
  if (tuned.length === 0) {
    return `${title}\n${paragraph(`none from ${millimetres(fromMm)} to ${millimetres(toMm)}`, "  ")}`;
  }
  const between = ({ low, high }: Reach, figure: (value: number) => string) =>
    low === undefined && high === undefined
      ? "any"
      : `${low === undefined ? "..." : figure(low)}-${high === undefined ? "..." : figure(high)}`;
  const shown = tuned.slice(0, MOST_TUNED);
  const table = columns([
    ["waves/2", "mm", "cost", "worst", "true to", "thickness mm", "permittivity", "band GHz"].map((head) =>
      cell(head),
    ),
    RULE,
    ...shown.map((one) => {
      const ranges =
        one.plate === "never"
          ? ["-", "-", "-", "-"]
          : [
              one.tolerancePercent === undefined ? "any" : `${tenth(one.tolerancePercent)} %`,
              between(one.thicknessRangeMm, hundredth),
              between(one.permittivityRange, hundredth),
              between(one.frequencyRangeGHz, hundredth),
            ];
      const { costDb, worstCostDb } = one.point;
      return [
        one.halfWaves.toFixed(2),
        hundredth(one.thicknessMm),
        hundredth(costDb.nominal),
        hundredth(worstCostDb),
        ...ranges,
      ].map((text) => cell(text));
    }),
  ]);
  const more = tuned.length > shown.length ? `${tuned.length - shown.length} more in --json. ` : "";
  const words =
    `${more}Ranges: one thing off at a time, cost below ${decibels(costLimitDb)}${study.phaseKnown ? "" : " in the worst phase"}. ` +
    spreadWords(study, tuned[0]!);
  return [title, table, paragraph(words, "  ")].join("\n");
}

/** Whether the material by itself is known well enough for the first of the tuned thicknesses. */
function spreadWords(study: ThicknessStudy, { permittivityRange, plate }: TunedThickness): string {
  const { material, permittivity } = varied(study);
  const { low, high } = permittivity;
  if (plate === "never" || low === high) return "";
  const within = low >= (permittivityRange.low ?? 0) && high <= (permittivityRange.high ?? Infinity);
  const spread = `The permittivity of ${material} lies between ${low} and ${high}`;
  return within
    ? `${spread}, which the first of them bears.`
    : `${spread}: more than the first of them bears, so measure the sheet you buy.`;
}

function stockText({ stock, phaseKnown, fromMm, toMm }: ThicknessStudy, paint: Paint): string {
  const title = paint("strong", "Stock sizes, the least cost at worst first");
  if (stock.length === 0) {
    return `${title}\n${paragraph(`no usual size from ${millimetres(fromMm)} to ${millimetres(toMm)}`, "  ")}`;
  }
  const shown = stock.slice(0, MOST_SIZES);
  const [low, high] = phaseKnown ? [[], []] : [[cell("low")], [cell("high")]];
  const table = columns([
    [cell(""), cell("mm"), cell("cost dB"), ...low, ...high, cell("worst"), cell("RL dB"), cell("worst RL")],
    RULE,
    ...shown.map(({ label, thicknessMm, point }) => [
      cell(label),
      cell(thicknessMm.toFixed(3)),
      cell(hundredth(point.costDb.nominal)),
      ...(phaseKnown ? [] : [cell(hundredth(point.costDb.low)), cell(hundredth(point.costDb.high))]),
      cell(hundredth(point.worstCostDb)),
      cell(returnLoss(point.returnLossDb.nominal)),
      cell(returnLoss(point.worstReturnLossDb)),
    ]),
  ]);
  const left = stock.length - shown.length;
  const legend =
    `${left > 0 ? `${left} more cost more; --json has them. ` : ""}` +
    `${fromMm === 0 ? "--from 1mm leaves out the films. " : ""}` +
    `${phaseKnown ? "" : "low, high: by the phase. "}RL: return loss of feed and cover. ` +
    "Sizes: common practice, no source; ask what the dealer keeps.";
  return [title, table, paragraph(legend, "  ")].join("\n");
}

function trustWords({ trust }: ThicknessStudy): string {
  const rough =
    "A plane wave straight on a flat dry sheet without end: take no cost for truer than 0.1 dB or 30 %, whichever is more, " +
    "and no return loss for truer than 2 dB (common practice, no source). `oilskin budget` and `covers` average over the " +
    "feed's beam where the dish's focal_ratio tells it: a thick sheet then costs somewhat more than here.";
  return trust.reason === undefined ? rough : `${rough} Here even that is a guess: ${trust.reason}.`;
}

function figureOf(db: number): string {
  return `${hundredth(db)} dB`;
}
