import type { Link } from "../budget/types.ts";
import type { BreakEven } from "../study/breakEven.ts";
import type { ExtentColumn } from "../study/rainExtents.ts";
import { rainOns } from "../study/rainOn.ts";
import type { CoverLadder, ModeLadder, WeatherLadder } from "../study/weatherLadder.ts";
import { chart } from "./chart.ts";
import { cell, columns, RULE } from "./columns.ts";
import { marginCell, meanings, pairName } from "./marginText.ts";
import { askedFigure, breakEvenFigure, spreadFigure, wayWords } from "./rateWords.ts";
import { abreast, type Paint, paragraph, plain, tenth } from "./words.ts";

/** What the rain falls on, as headings say it. */
const onHeads = { path: "path alone", covers: "covers alone", both: "path and covers" } as const;

/** Every rung but that of no rain in the words of each authority, and where the words come from. */
export function wordsTable({ rates }: WeatherLadder): string {
  const rainy = rates.filter(({ words }) => words.length > 0);
  const authorities = rainy[0]!.words;
  const table = columns([
    [cell("mm/h"), ...authorities.map(({ authority }) => cell(authority))],
    RULE,
    ...rainy.map(({ rateMmPerH, words }) => [
      cell(askedFigure(rateMmPerH)),
      ...words.map(({ word }) => cell(word)),
    ]),
  ]);
  const sources = new Map(
    authorities.map(({ authority, source }) => [source, authority.replace(/,.*/, "")] as const),
  );
  const said = [...sources].map(([source, authority]) => `${authority}: ${source}`);
  return `${table}\n${paragraph(`${said.join("; ")}.`)}`;
}

/** Rates at which each cover leaves no more than is asked, by what the rain falls on. */
export function breakEvenTables({ covers }: ModeLadder, { reserveDb }: WeatherLadder): string {
  const levels = [
    { title: "closes up to", figure: ({ closesMmPerH }: BreakEven) => breakEvenFigure(closesMmPerH) },
    {
      title: `${tenth(reserveDb)} dB left up to`,
      figure: ({ reserveMmPerH, reserveSpread }: BreakEven) => spreadFigure(reserveMmPerH, reserveSpread),
    },
    {
      title: "nothing left from",
      figure: ({ zeroMmPerH, zeroSpread }: BreakEven) => spreadFigure(zeroMmPerH, zeroSpread),
    },
  ];
  return abreast(levels, (some) =>
    columns([
      [cell(""), ...some.flatMap(({ title }) => [{ text: title, across: 3 }, cell(""), cell("")])],
      [cell("cover"), ...some.flatMap(() => ["path", "covers", "both"].map((text) => cell(text)))],
      RULE,
      ...covers.map((one) => [
        cell(pairName(one)),
        ...some.flatMap(({ figure }) => rainOns.map((on) => cell(figure(one.breakEven[on])))),
      ]),
    ]),
  );
}

/** Margin over the rain rate, rain on path and covers: the scenario's own covers are drawn last. */
export function marginChart({ covers, curveMmPerH }: ModeLadder): string {
  const marks = marksOf(covers.map(pairName));
  const series = covers.map((one, i) => ({ mark: marks[i]!, label: pairName(one), values: one.curveDb }));
  return chart({
    x: curveMmPerH,
    xLabel: "mm/h",
    yLabel: "dB",
    series: [{ mark: ".", label: "nothing left", values: curveMmPerH.map(() => 0) }, ...series.toReversed()],
  });
}

/** A letter of each name, or a figure where all of its letters are taken. */
function marksOf(names: readonly string[]): string[] {
  const taken = new Set<string>();
  return names.map((name, i) => {
    const letters = [...name.toLowerCase()].filter((letter) => /[a-z]/.test(letter));
    const mark = letters.find((letter) => !taken.has(letter)) ?? String((i + 1) % 10);
    taken.add(mark);
    return mark;
  });
}

/** One cover: rate by what the rain falls on, and where there is ground, the way that carries the path. */
export function coverTable({ rungs }: CoverLadder, { ground }: Link, paint: Paint): string {
  const margins = rainOns.map((on) => ({
    head: onHeads[on],
    cellAt: (i: number, paint: Paint) => marginCell(rungs[on][i]!, paint),
  }));
  const way = { head: "carried by", cellAt: (i: number) => cell(wayWords[rungs.both[i]!.mechanism]) };
  return abreast(ground === undefined ? margins : [...margins, way], (some, measured) =>
    columns([
      [cell("mm/h"), ...some.map(({ head }) => cell(head))],
      RULE,
      ...rungs.both.map(({ rateMmPerH }, i) => [
        cell(askedFigure(rateMmPerH)),
        ...some.map(({ cellAt }) => cellAt(i, measured ? plain : paint)),
      ]),
    ]),
  );
}

/** Margin by rate and extent, and below it how hard it may rain over each. */
export function extentsTable(
  { extents }: ModeLadder,
  { reserveDb, path }: WeatherLadder,
  paint: Paint,
): string {
  const head = ({ kind, extentKm, isOwn }: ExtentColumn) => {
    const words = {
      stated: `${askedFigure(extentKm ?? 0)} km`,
      whole: `all ${path.distanceKm.toFixed(1)}`,
      effective: "P.530",
    };
    return `${words[kind]}${isOwn ? " *" : ""}`;
  };
  const feet = [
    ["closes to", ({ closesMmPerH }: BreakEven) => closesMmPerH],
    [`${tenth(reserveDb)} dB to`, ({ reserveMmPerH }: BreakEven) => reserveMmPerH],
    ["none from", ({ zeroMmPerH }: BreakEven) => zeroMmPerH],
  ] as const;
  return abreast(extents.columns, (some, measured) =>
    columns([
      [cell("mm/h"), ...some.map((column) => cell(head(column)))],
      RULE,
      ...extents.columns[0]!.rungs.map(({ rateMmPerH }, i) => [
        cell(askedFigure(rateMmPerH)),
        ...some.map(({ rungs }) => {
          const { marginDb, verdict } = rungs[i]!;
          const text = tenth(marginDb);
          return cell(text, (measured ? plain : paint)(meanings[verdict], text));
        }),
      ]),
      RULE,
      ...feet.map(([title, rate]) => [
        cell(title),
        ...some.map(({ breakEven }) => cell(shortFigure(rate(breakEven)))),
      ]),
    ]),
  );
}

/** A break-even rate where columns are narrow. */
function shortFigure(rateMmPerH: number | undefined): string {
  return breakEvenFigure(rateMmPerH).replace("over ", ">");
}
