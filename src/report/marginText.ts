import { sumOf } from "../budget/entry.ts";
import type { Budget, Case, Link, Verdict } from "../budget/types.ts";
import { isBare } from "../study/coverPairs.ts";
import type { MarginReport } from "../study/marginReport.ts";
import { type Cell, cell, columns, RULE } from "./columns.ts";
import { carriedText, verdictWords } from "./mechanismText.ts";
import {
  abreast,
  capital,
  listed,
  type Meaning,
  type Paint,
  paragraph,
  percent,
  plain,
  tenth,
} from "./words.ts";

export type ReportBudget = MarginReport["budgets"][number];

export const meanings = { closes: "good", thin: "doubtful", fails: "bad" } as const satisfies Record<
  Verdict,
  Meaning
>;

/** Free-air tests repeat to this [dB]: common practice, no source. */
const UNSEEN_DB = 0.05;

/** Path, headings, frequency: what a report is about. */
export function pathLines(
  { title, frequencyGHz, path }: Pick<MarginReport, "title" | "frequencyGHz" | "path">,
  link: Link,
  paint: Paint,
): string {
  const { from, to } = path;
  const names = [from.name, to.name].filter((name) => name !== undefined);
  const isTitled = names.every((name) => title.toLowerCase().includes(name.toLowerCase()));
  const doubt = path.headingErrorDeg >= 0.05 ? `, good to ${tenth(path.headingErrorDeg)} deg` : "";
  return [
    paint("strong", paragraph(title)),
    paragraph(
      `${isTitled ? "" : `${names.join(" to ")}: `}${path.distanceKm.toFixed(1)} km at ` +
        `${Number(frequencyGHz.toPrecision(6))} GHz, ${link.scenario.polarization}`,
    ),
    `heading ${tenth(path.headingDeg)} deg TRUE out, ${tenth(path.backHeadingDeg)} deg TRUE back${doubt}`,
    `elevation ${tenth(path.elevationDeg)} deg out, ${tenth(path.backElevationDeg)} deg back`,
  ].join("\n");
}

/** The answer: does it close, a sentence a mode, what the cover takes, and what is taken for granted. */
export function answer(report: MarginReport, link: Link): string {
  const own = ownBudgets(report, link);
  if (own.length === 0) return "No case was asked for.";
  const modes = [...new Set(own.map(({ case: { mode } }) => mode))];
  const sentences = modes.map((mode) =>
    modeAnswer(
      link.modes[mode]!.label,
      own.filter((budget) => budget.case.mode === mode),
    ),
  );
  const first = own.filter(({ case: { mode } }) => mode === modes[0]);
  const costs = [...coverCosts(report, first), ...dishCoverCosts(first, link)];
  const way =
    link.ground === undefined
      ? ["Line of sight is taken: no hill, tree or building in the way."]
      : carriedText(first);
  return [...sentences, ...costs, ...way].map((sentence) => paragraph(sentence)).join("\n");
}

/** One mode in all weathers, the worst first. */
function modeAnswer(label: string, budgets: readonly ReportBudget[]): string {
  const said = (["fails", "thin", "closes"] as const).flatMap((verdict) => {
    const some = budgets.filter((budget) => budget.verdict === verdict);
    if (some.length === 0) return [];
    if (some.length === budgets.length && some.length > 1) {
      const least = Math.min(...some.map(({ marginDb }) => marginDb));
      return `${verdictWords[verdict]} in every weather (${tenth(least)} dB at the least)`;
    }
    const weathers = some.map(({ case: { weather }, marginDb, holdProbability }) => {
      const holds = verdict === "thin" ? `, holds with ${percent(holdProbability)}` : "";
      return `${weather} (${tenth(marginDb)} dB${holds})`;
    });
    return `${verdictWords[verdict]} in ${listed(weathers)}`;
  });
  return `${capital(label)} ${listed(said)}.`;
}

/** What the scenario's own covers take against bare mouths, weather by weather. */
function coverCosts(report: MarginReport, own: readonly ReportBudget[]): string[] {
  const costs = own.flatMap((budget) => {
    const { weather, mode } = budget.case;
    const bare = report.budgets.find(
      (other) => isBare(other.case) && other.case.mode === mode && other.case.weather === weather,
    );
    if (bare === undefined || isBare(budget.case)) return [];
    const cost = bare.marginDb - budget.marginDb;
    return Math.abs(cost) < UNSEEN_DB
      ? `nothing that a bench could show in ${weather}`
      : `${tenth(cost)} dB in ${weather}`;
  });
  if (costs.length === 0) return [];
  return [`The cover (${coverName(own[0]!)}) takes ${listed(costs)}, both ends together.`];
}

/** What a cover over a dish takes of the signal; it stays in every case, bare feeds too. */
function dishCoverCosts(own: readonly ReportBudget[], { scenario }: Link): string[] {
  return (["transmitter", "receiver"] as const).flatMap((end) => {
    const { dishCover } = scenario[end];
    const part = (budget: ReportBudget) =>
      budget.entries.filter(({ id, stage }) => stage === end && id.includes("dish_cover"));
    if (dishCover === undefined || own.every((budget) => part(budget).length === 0)) return [];
    const costs = own.map((budget) => `${tenth(0 - sumOf(part(budget), "db"))} dB in ${budget.case.weather}`);
    const noise = end === "receiver" ? ", beside the noise that it adds" : "";
    return `The cover over the ${end}'s dish (${dishCover}) takes ${listed(costs)}${noise}.`;
  });
}

/** The cover of both ends, or the transmitter's and the receiver's where they differ. */
export function pairName({ transmitter, receiver }: Pick<Case, "transmitter" | "receiver">): string {
  return transmitter.cover === receiver.cover
    ? transmitter.cover
    : `${transmitter.cover} / ${receiver.cover}`;
}

export function coverName({ case: chosen }: Pick<ReportBudget, "case">): string {
  return pairName(chosen);
}

/** The budgets with the covers that the scenario puts on its ends; where those were not asked for, with the first. */
export function ownBudgets(report: MarginReport, { scenario }: Link): ReportBudget[] {
  const withCovers = (tx: string, rx: string) =>
    report.budgets.filter((b) => b.case.transmitter.cover === tx && b.case.receiver.cover === rx);
  const own = withCovers(scenario.transmitter.cover, scenario.receiver.cover);
  const first = report.budgets[0];
  if (own.length > 0 || first === undefined) return own;
  return withCovers(first.case.transmitter.cover, first.case.receiver.cover);
}

/** Margin, deviation and verdict. */
export function marginCell(
  { marginDb, marginSigmaDb, verdict }: Pick<Budget, "marginDb" | "marginSigmaDb" | "verdict">,
  paint: Paint,
): Cell {
  const figures = `${tenth(marginDb)} ±${tenth(marginSigmaDb)} `;
  const word = verdict.padEnd(6);
  return cell(figures + word, figures + paint(meanings[verdict], word));
}

/** Cover by weather for one mode; a cell holds margin, deviation and verdict. */
export function marginMatrix(report: MarginReport, link: Link, mode: string, paint: Paint = plain): string {
  const budgets = report.budgets.filter((budget) => budget.case.mode === mode);
  const covers = [...new Set(budgets.map(coverName))];
  const own = new Set(ownBudgets(report, link).map(coverName));
  const margin = (cover: string, weather: string, paint: Paint) => {
    const budget = budgets.find((one) => coverName(one) === cover && one.case.weather === weather);
    return budget === undefined ? cell("-") : marginCell(budget, paint);
  };
  const weathers = [...new Set(budgets.map(({ case: { weather } }) => weather))];
  return abreast(weathers, (some, measured) =>
    columns([
      [cell("cover"), ...some.map((weather) => cell(weather))],
      RULE,
      ...covers.map((cover) => [
        cell(own.has(cover) ? `${cover} *` : cover),
        ...some.map((weather) => margin(cover, weather, measured ? plain : paint)),
      ]),
    ]),
  );
}
