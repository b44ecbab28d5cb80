import type { Link } from "../budget/types.ts";
import { HEAVIEST_MM_PER_H } from "../study/breakEven.ts";
import type { ModeLadder, WeatherLadder } from "../study/weatherLadder.ts";
import { dishCoverText } from "./coversText.ts";
import { pairName, pathLines } from "./marginText.ts";
import { handsOnText, warningText } from "./notes.ts";
import { askedFigure, backLines } from "./rateWords.ts";
import { breakEvenTables, coverTable, extentsTable, marginChart, wordsTable } from "./weatherTables.ts";
import { keptSentence, modeAnswer, partsSentence, waySentence } from "./weatherWords.ts";
import { capital, listed, type Paint, paragraph, percent, plain, tenth } from "./words.ts";

/** The rain ladder: how hard it may rain first, then the rungs behind it. */
export function weatherText(ladder: WeatherLadder, link: Link, paint: Paint = plain): string {
  const { modes } = ladder;
  const parts = [
    pathLines(ladder, link, paint),
    ...modes.map((one) => paragraph(modeAnswer(one, link))),
    [partsSentence(ladder, link), waySentence(modes[0]!, link), keptSentence(ladder, link)]
      .map((text) => paragraph(text))
      .join("\n"),
    dishCoverText(link),
    `${paint("strong", "Rain in words")}\n${wordsTable(ladder)}`,
    ...modes.flatMap((one) => modeText(one, ladder, link, paint)),
    howText(link, paint),
    warningText(ladder.warnings, paint),
    handsOnText(paint),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

function modeText(one: ModeLadder, ladder: WeatherLadder, link: Link, paint: Paint): string[] {
  const { covers, extents } = one;
  const heading = (text: string) =>
    paint("strong", paragraph(ladder.modes.length === 1 ? capital(text) : `${label(one, link)}: ${text}`));
  const beyond =
    extents.beyondKm.length === 0
      ? ""
      : `\n${paragraph(`Rain over ${listed(extents.beyondKm.map(askedFigure))} km is all of the path.`)}`;
  const back = covers.flatMap((cover) => backLines(pairName(cover), cover.breakEven.both));
  return [
    [
      heading("rain rate in mm/h that uses the margin up, rain on"),
      breakEvenTables(one, ladder),
      ...back,
    ].join("\n"),
    `${heading("margin over the rain rate, rain on path and covers")}\n${marginChart(one)}`,
    ...covers.map(
      (cover, i) =>
        `${heading(`margin in dB, cover ${pairName(cover)}${i === 0 ? " *" : ""}, rain on`)}\n${coverTable(cover, link, paint)}`,
    ),
    `${heading(`margin in dB by extent of the rain, cover ${pairName(extents)}, rain on path and covers`)}\n${extentsTable(one, ladder, paint)}${beyond}`,
  ];
}

function label({ mode }: ModeLadder, { modes }: Link): string {
  return capital(modes[mode]!.label);
}

/** What the columns mean. */
function howText({ scenario: { decision } }: Link, paint: Paint): string {
  const { reserveDb, confidence } = decision;
  const sentences = [
    "path: rain on the path, none on the covers; covers: as wet as such rain makes them, none on the path. Both " +
      "together take less than their sum where rain on the path has warmed the noise already.",
    `closes: ${tenth(reserveDb)} dB or more left, and holds with ${percent(confidence)}; thin: something left, but ` +
      `less or less sure; fails: nothing left. Rates are sought up to ${HEAVIEST_MM_PER_H} mm/h; ` +
      "0: without rain already.",
    "±: one standard deviation; in brackets the rates at which that much less and more margin is used up; *: as the " +
      "scenario has it.",
    "Covers that share a row of the chart hide each other: the later in its list is drawn.",
    "By extent: all of the path, or by P.530 its effective length at the rate.",
  ];
  return [paint("strong", "How to read it"), ...sentences.map((text) => paragraph(text, "  - "))].join("\n");
}
