import type { Link, Verdict } from "../budget/types.ts";
import type { MarginReport } from "../study/marginReport.ts";
import { cell, columns, RULE } from "./columns.ts";
import { abreast, capital, listed, type Meaning, type Paint, paragraph, plain, tenth } from "./words.ts";

export type ReportBudget = MarginReport["budgets"][number];

export const meanings = { closes: "good", thin: "doubtful", fails: "bad" } as const satisfies Record<
  Verdict,
  Meaning
>;

/** Path, headings, frequency: what a report is about. */
export function pathLines(
  { title, frequencyGHz, path }: Pick<MarginReport, "title" | "frequencyGHz" | "path">,
  link: Link,
  paint: Paint,
): string {
  const degrees = (value: number) => value.toFixed(1);
  const { from, to } = path;
  const names = [from.name, to.name].filter((name) => name !== undefined && !title.includes(name));
  const doubt = path.headingErrorDeg >= 0.05 ? `, good to ${degrees(path.headingErrorDeg)} deg` : "";
  return [
    paint("strong", paragraph(title)),
    paragraph(
      `${names.length > 0 ? `${names.join(" to ")}: ` : ""}${path.distanceKm.toFixed(1)} km at ` +
        `${Number(frequencyGHz.toPrecision(6))} GHz, ${link.scenario.polarization}`,
    ),
    `heading ${degrees(path.headingDeg)} deg TRUE out, ${degrees(path.backHeadingDeg)} deg TRUE back${doubt}`,
    `elevation ${degrees(path.elevationDeg)} deg out, ${degrees(path.backElevationDeg)} deg back`,
  ].join("\n");
}

/** The answer in a sentence or two: does it close, by weather, and what does the cover take. */
export function answer(report: MarginReport, link: Link): string {
  const own = ownBudgets(report, link);
  const mode = own[0]?.case.mode;
  if (mode === undefined) return "No case was asked for.";
  const inMode = own.filter((budget) => budget.case.mode === mode);
  const said = (["closes", "thin", "fails"] as const).flatMap((verdict) => {
    const weathers = inMode
      .filter((budget) => budget.verdict === verdict)
      .map((budget) => `${budget.case.weather} (${tenth(budget.marginDb)} dB)`);
    if (weathers.length === 0) return [];
    return `${verdict === "thin" ? "is thin" : verdict} in ${listed(weathers)}`;
  });
  return paragraph(`${capital(link.modes[mode]!.label)} ${listed(said)}. ${coverCosts(report, inMode)}`);
}

/** What the scenario's own covers take against bare mouths, weather by weather. */
function coverCosts(report: MarginReport, own: readonly ReportBudget[]): string {
  const costs = own.flatMap((budget) => {
    const { weather, mode } = budget.case;
    const bare = report.budgets.find(
      (other) => isBare(other) && other.case.mode === mode && other.case.weather === weather,
    );
    if (bare === undefined || isBare(budget)) return [];
    return `${tenth(bare.marginDb - budget.marginDb)} dB in ${weather}`;
  });
  return costs.length === 0
    ? ""
    : `The cover (${coverName(own[0]!)}) takes ${listed(costs)}, both ends together.`;
}

function isBare({ case: { transmitter, receiver } }: ReportBudget): boolean {
  return transmitter.cover === "bare" && receiver.cover === "bare";
}

/** The cover of both ends, or the transmitter's and the receiver's where they differ. */
export function coverName({ case: { transmitter, receiver } }: ReportBudget): string {
  return transmitter.cover === receiver.cover
    ? transmitter.cover
    : `${transmitter.cover} / ${receiver.cover}`;
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

/** Cover by weather for one mode; a cell holds margin, deviation and verdict. */
export function marginMatrix(report: MarginReport, link: Link, mode: string, paint: Paint = plain): string {
  const budgets = report.budgets.filter((budget) => budget.case.mode === mode);
  const covers = [...new Set(budgets.map(coverName))];
  const own = new Set(ownBudgets(report, link).map(coverName));
  const margin = (cover: string, weather: string, paint: Paint) => {
    const budget = budgets.find((one) => coverName(one) === cover && one.case.weather === weather);
    if (budget === undefined) return cell("-");
    const figures = `${tenth(budget.marginDb)} ±${tenth(budget.marginSigmaDb)} `;
    const verdict = budget.verdict.padEnd(6);
    return cell(figures + verdict, figures + paint(meanings[budget.verdict], verdict));
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
