import type { Stage } from "../budget/entry.ts";
import { BENCH_REPEATABILITY_DB } from "../readings/verdict.ts";
import type { Pair, Side } from "../study/comparable.ts";
import type { ComparedEntry, ComparedWeather, Comparison } from "../study/compare.ts";
import { type Cell, cell, columns, RULE } from "./columns.ts";
import { compareAnswer } from "./compareAnswer.ts";
import { inputsText } from "./compareInputsText.ts";
import { marginCell } from "./marginText.ts";
import { warningText } from "./notes.ts";
import { abreast, lengthOf, listed, type Paint, paragraph, percent, plain, signed, tenth } from "./words.ts";

/** Widest name of a weather, or of two, in a table [characters]. */
const WIDEST_NAME = 38;

/** Two scenarios: the answer first, then what differs in the files, the margins and the entries behind them. */
export function compareText(comparison: Comparison, names: Pair, paint: Paint = plain): string {
  const heading = (text: string) => paint("strong", paragraph(text));
  const parts = [
    scenarioLines(comparison, names, paint),
    compareAnswer(comparison),
    inputsText(comparison.inputs, paint),
    `${heading("Margin in dB")}\n${marginTable(comparison.weathers, paint)}`,
    entriesText(comparison.weathers, heading),
    legend(comparison.weathers),
    warningText(
      comparison.warnings.map(({ sides, ...warning }) => ({
        ...warning,
        where: `${listed(sides.map((side) => side.toUpperCase()))}, ${warning.where}`,
      })),
      paint,
    ),
    paragraph(
      "`oilskin budget` shows the whole budget of each, with its cautions and what its figures leave out.",
    ),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

/** What A is and what B is. */
function scenarioLines({ scenario }: Comparison, names: Pair, paint: Paint): string {
  return (["a", "b"] as const)
    .flatMap((side) => {
      const { title, distanceKm, frequencyGHz, polarization, cover, modeLabel } = scenario[side];
      const lead = `${side.toUpperCase()}  `;
      const covers =
        cover.transmitter === cover.receiver ? cover.transmitter : `${cover.transmitter} / ${cover.receiver}`;
      const facts =
        `${distanceKm.toFixed(1)} km at ${Number(frequencyGHz.toPrecision(6))} GHz, ${polarization}; ` +
        `${modeLabel}; cover ${covers}`;
      return [paint("strong", paragraph(`${title} (${names[side]})`, lead)), paragraph(facts, "   ")];
    })
    .join("\n");
}

/** A name in a table, cut where it would push the figures off the line; the sentences above have it whole. */
function weatherName({ weather: { a, b } }: ComparedWeather): string {
  const whole = a === b ? a : `${a} / ${b}`;
  if (lengthOf(whole) <= WIDEST_NAME) return whole;
  const half = Math.floor((WIDEST_NAME - 3) / 2);
  return a === b ? cut(a, WIDEST_NAME) : `${cut(a, half)} / ${cut(b, half)}`;
}

function cut(name: string, width: number): string {
  return lengthOf(name) <= width ? name : `${[...name].slice(0, width - 3).join("")}...`;
}

function marginTable(weathers: readonly ComparedWeather[], paint: Paint): string {
  const margins = {
    heads: ["A", "B"],
    cells: ({ budget: { a, b } }: ComparedWeather, paint: Paint) => [
      marginCell(a, paint),
      marginCell(b, paint),
    ],
  };
  const differences = {
    heads: ["B less A", "B better with"],
    cells: ({ differenceDb, differenceSigmaDb, distinguishable, betterProbability }: ComparedWeather) => [
      cell(`${signed(differenceDb)} ±${tenth(differenceSigmaDb)}`),
      cell(distinguishable ? percent(betterProbability) : "-"),
    ],
  };
  return abreast([margins, differences], (some, measured) =>
    columns([
      [cell("weather"), ...some.flatMap(({ heads }) => heads.map((head) => cell(head)))],
      RULE,
      ...weathers.map((one) => [
        cell(weatherName(one)),
        ...some.flatMap(({ cells }) => cells(one, measured ? plain : paint)),
      ]),
    ]),
  );
}

/** Whether an entry moves the margin enough for a line of its own. */
function isFelt({ differenceDb }: ComparedEntry): boolean {
  return Math.abs(differenceDb) >= BENCH_REPEATABILITY_DB;
}

/** Whether it has a line: it moves the margin, or is the same figure but surer in one. */
function isShown(entry: ComparedEntry): boolean {
  const { a = 0, b = 0 } = entry.sigma;
  return isFelt(entry) || Math.abs(a - b) >= BENCH_REPEATABILITY_DB;
}

function entriesText(weathers: readonly ComparedWeather[], heading: (text: string) => string): string {
  const shown = weathers.filter(({ entries }) => entries.some(isShown));
  if (shown.length === 0) return "";
  return `${heading("How it comes about, in dB")}\n${abreast(shown, entryTable)}`;
}

const titles = {
  transmitter: "TRANSMITTER",
  path: "PATH",
  receiver: "RECEIVER",
  noise: "NOISE",
  mode: "MODE",
} as const satisfies Record<Stage, string>;

/** The entries that differ in any of these weathers, in the order of the budgets. */
function entryTable(weathers: readonly ComparedWeather[]): string {
  const across = (text: string): Cell[] => [{ text, across: 3 }, cell(""), cell("")];
  const rest = weathers.map(({ entries }) =>
    entries.filter((one) => !isShown(one)).reduce((sum, { differenceDb }) => sum + differenceDb, 0),
  );
  return columns([
    [cell(""), ...weathers.flatMap((one) => across(weatherName(one)))],
    [cell(""), ...weathers.flatMap(() => [cell("A"), cell("B"), cell("margin")])],
    RULE,
    ...(Object.keys(titles) as Stage[]).flatMap((stage) => stageRows(weathers, stage)),
    ...(weathers.some(({ entries }) => !entries.every(isShown))
      ? [[cell("the rest"), ...rest.flatMap((db) => [cell(""), cell(""), cell(signed(db))])]]
      : []),
    [
      cell("margin"),
      ...weathers.flatMap(({ budget: { a, b }, differenceDb }) => [
        cell(tenth(a.marginDb)),
        cell(tenth(b.marginDb)),
        cell(signed(differenceDb)),
      ]),
    ],
    ...(["marginLowDb", "marginHighDb"] as const).map((bound) => [
      cell(bound === "marginLowDb" ? "  lowest, phase and water" : "  highest"),
      ...weathers.flatMap(({ budget: { a, b } }) => [cell(tenth(a[bound])), cell(tenth(b[bound])), cell("")]),
    ]),
  ]);
}

function stageRows(weathers: readonly ComparedWeather[], stage: Stage): Cell[][] {
  const of = (one: ComparedWeather) => one.entries.filter((entry) => entry.stage === stage && isShown(entry));
  const ids = [...new Set(weathers.flatMap((one) => of(one).map(({ id }) => id)))];
  if (ids.length === 0) return [];
  const rows = ids.map((id) => {
    const found = weathers.map((one) => of(one).find((entry) => entry.id === id));
    const label = found.map((entry) => entry && labelOf(entry)).find(Boolean) ?? id;
    return [
      cell(`  ${label}`),
      ...found.flatMap((entry) =>
        entry === undefined
          ? [cell(""), cell(""), cell("")]
          : [cell(figure(entry, "a")), cell(figure(entry, "b")), cell(signed(entry.differenceDb))],
      ),
    ];
  });
  return [[cell(titles[stage])], ...rows];
}

/** As the budget shows it: noise and what the mode needs are read there as they stand, not as they count. */
function figure(entry: ComparedEntry, side: Side): string {
  const { stage, db, sigma } = entry;
  const value = db[side];
  if (value === undefined) return "-";
  const told = tenth(stage === "noise" || stage === "mode" ? 0 - value : value);
  return isFelt(entry) ? told : `${told} ±${tenth(sigma[side]!)}`;
}

/** One label for both, the words that differ set beside each other: `rain, 8.0/5.0 km of it`. */
export function labelOf({ label: { a, b } }: Pick<ComparedEntry, "label">): string {
  if (a === undefined || b === undefined || a === b) return a ?? b ?? "";
  const [one, other] = [a.split(" "), b.split(" ")];
  let start = 0;
  while (start < Math.min(one.length, other.length) && one[start] === other[start]) start++;
  let end = 0;
  while (end < Math.min(one.length, other.length) - start && one.at(-1 - end) === other.at(-1 - end)) end++;
  const middle = [one, other].map((words) => words.slice(start, words.length - end).join(" "));
  if (middle.includes("")) return `${a}/${b}`;
  return [...one.slice(0, start), middle.join("/"), ...one.slice(one.length - end)].join(" ");
}

function legend(weathers: readonly ComparedWeather[]): string {
  if (weathers.every(({ entries }) => entries.length === 0)) return "";
  return paragraph(
    "±: one standard deviation, that of a difference from the entries that differ, the errors of A and B taken as " +
      "independent; what is the same in both cancels. Noise as it stands: more of it takes from the margin. " +
      `Entries that differ by less than ${BENCH_REPEATABILITY_DB} dB are the rest; figures rounded to 0.1 dB.`,
  );
}
