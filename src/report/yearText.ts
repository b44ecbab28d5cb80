import type { Link } from "../budget/types.ts";
import { isBare } from "../study/coverPairs.ts";
import type { Span } from "../study/span.ts";
import type { CoverYear, YearOutage } from "../study/yearOutage.ts";
import { cell, columns, RULE } from "./columns.ts";
import { pairName, pathLines } from "./marginText.ts";
import { cautionLines, warningText } from "./notes.ts";
import { capital, type Paint, paragraph, plain, tenth } from "./words.ts";
import { availabilityFigure, hoursFigure, hoursWords, minutesFigure, monthWords } from "./yearWords.ts";

/** The year of a permanent path: what rain and multipath take, and what the covers add to it. */
export function yearText(year: YearOutage, link: Link, paint: Paint = plain): string {
  const parts = [
    pathLines(year, link, paint),
    answer(year, link)
      .map((sentence) => paragraph(sentence))
      .join("\n"),
    `${paint("strong", "Hours of an average year below a margin of 0")}\n${hoursTable(year)}`,
    `${paint("strong", "Minutes of the worst month, availability, and hours below the reserve")}\n${monthTable(year)}`,
    paint("strong", "How") +
      `\n${methods(year)
        .map((sentence) => paragraph(sentence, "  - "))
        .join("\n")}`,
    warningText(year.warnings, paint),
    `${paint("strong", "Caution")}\n${cautionLines()}`,
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

/** Rain first, then multipath, then what the cover costs; of the covers that the scenario has on. */
function answer({ covers, mode, multipath, reserveDb }: YearOutage, { modes }: Link): string[] {
  const own = covers[0]!;
  const bare = covers.find(isBare)!;
  const label = modes[mode]!.label;
  if (bare.clearMarginDb < 0) {
    return [
      `${capital(label)} fails on this path in clear air already, by ${tenth(-bare.clearMarginDb)} dB with bare ` +
        "feeds: rain has nothing left to take.",
    ];
  }
  const under = isBare(own) ? undefined : own;
  return [
    `Rain takes ${hoursWords(bare.wet.rainHours)} a year from this path with bare feeds${rainUnder(under)}.`,
    multipath.occurrencePercent === 0
      ? "Multipath takes no time that counts from so short a path."
      : `Multipath takes ${hoursWords(own.wet.multipathHours)} a year besides.`,
    ...(under?.costHours === undefined ? [] : [costSentence(pairName(under), under.costHours)]),
    `${capital(label)} is available for ${availabilityWords(own)} of an average year, and down for ` +
      `${monthWords(own.wet.monthMinutes)} of the worst month.`,
    `It has less than its reserve of ${reserveDb} dB for ${hoursWords(own.belowReserve.yearHours)} a year.`,
  ];
}

function rainUnder(under: CoverYear | undefined): string {
  if (under === undefined) return "";
  if (under.clearMarginDb < 0) return `; under ${pairName(under)} it fails in clear air already`;
  const [wet, dry] = [hoursWords(under.wet.rainHours), hoursWords(under.dry.rainHours)];
  return `, ${wet} under ${pairName(under)}${wet === dry ? "" : ` (${dry} if that stayed dry)`}`;
}

function availabilityWords({ wet }: CoverYear): string {
  const figure = availabilityFigure(wet.availabilityPercent);
  return `${figure.replace("<", "less than ").replace(">", "more than ")} %`;
}

/** What the wet cover costs; between bounds that reach to both sides of nothing, only how much at most. */
function costSentence(cover: string, { low, high }: Span): string {
  if (low === high && Math.abs(low) < 1 / 3600)
    return `The cover (${cover}) costs no time that could be told.`;
  if (high <= 0) return `The cover (${cover}) wins ${hoursWords({ low: -high, high: -low })} a year.`;
  if (low >= 0) return `The cover (${cover}) costs ${hoursWords({ low, high })} a year.`;
  return `What the cover (${cover}) costs cannot be told: ${hoursWords({ low: 0, high })} a year.`;
}

function hoursTable({ covers }: YearOutage): string {
  return columns([
    [
      cell(""),
      cell("margin dB"),
      { text: "rain, cover", across: 2 },
      cell(""),
      cell(""),
      cell(""),
      cell("cover"),
    ],
    ["cover", "clear air", "dry", "wet", "multipath", "all, wet", "costs"].map((text) => cell(text)),
    RULE,
    ...covers.map((one) => [
      cell(pairName(one)),
      cell(tenth(one.clearMarginDb)),
      cell(hoursFigure(one.dry.rainHours)),
      cell(hoursFigure(one.wet.rainHours)),
      cell(hoursFigure(one.wet.multipathHours)),
      cell(hoursFigure(one.wet.yearHours)),
      cell(costFigure(one.costHours)),
    ]),
  ]);
}

function costFigure(cost: Span | undefined): string {
  if (cost === undefined) return "-";
  if (cost.low === cost.high && cost.low < 0) return `-${hoursFigure({ low: -cost.low, high: -cost.low })}`;
  return cost.high <= 0 ? "0" : hoursFigure(cost);
}

function monthTable({ covers, reserveDb }: YearOutage): string {
  return columns([
    [
      cell(""),
      { text: "worst month, minutes", across: 3 },
      cell(""),
      cell(""),
      cell("available"),
      cell("hours"),
      cell("margin 0"),
    ],
    ["cover", "rain", "multipath", "all", "%", `below ${reserveDb} dB`, "at mm/h"].map((text) => cell(text)),
    RULE,
    ...covers.map((one) => [
      cell(pairName(one)),
      cell(minutesFigure(one.wet.rainMonthMinutes)),
      cell(minutesFigure(one.wet.multipathMonthMinutes)),
      cell(minutesFigure(one.wet.monthMinutes)),
      cell(availabilityFigure(one.wet.availabilityPercent)),
      cell(hoursFigure(one.belowReserve.yearHours)),
      cell(one.wet.atRain === undefined ? "-" : tenth(one.wet.atRain.rateMmPerH)),
    ]),
  ]);
}

/** Where the figures come from, how far they reach and what they leave out. */
function methods({ rainRate001MmPerH, rainSource, meanRainHeightM, multipath }: YearOutage): string[] {
  const snow =
    meanRainHeightM === undefined
      ? "Wet snow on the path is left out: the climate names no rain_height."
      : `Wet snow on the path is counted, about a rain height of ${Math.round(meanRainHeightM)} m.`;
  return [
    `Rain by P.530-18 from ${tenth(rainRate001MmPerH)} mm/h exceeded for 0.01 % of the year (${rainSource}), ` +
      "with the water that such rain puts on the covers of both ends. Between 5 minutes and 88 hours a year " +
      "(0.001 to 1 %) the method holds; beyond, only a bound is told, by < or >.",
    snow,
    `Multipath by ${multipath.method}, dN1 ${multipath.dN1} N/km (${multipath.dN1Source}).`,
    "Worst month of rain by P.841's planning values (from memory); rain and multipath are added there as " +
      "though their worst months were the same one.",
    "A single year may bring half or twice as much (common practice, no source).",
    "Not in these figures: covers that stay wet when the rain is over; dew, ice and snow on covers; fading " +
      "by hills and trees; distortion of wide signals by multipath; faults and power cuts.",
  ];
}
