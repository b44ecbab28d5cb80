import type { Link } from "../budget/types.ts";
import type { LinkExposure } from "../study/exposureOfLink.ts";
import type { MarginReport } from "../study/marginReport.ts";
import { entryDetail, entryTable } from "./entryText.ts";
import { answer, coverName, headline, marginMatrix, ownBudgets } from "./marginText.ts";
import { leftOutText, safetyText, warningText } from "./notes.ts";
import { hertz, type Paint, percent, plain, tenth } from "./words.ts";

export interface TextOptions {
  /** Adds bounds, deviation and source of every entry. */
  readonly detail?: boolean;
  readonly paint?: Paint;
}

/** The margin report for a terminal of 80 columns: the answer first, then how it comes about. */
export async function marginReportText(
  report: MarginReport,
  link: Link,
  exposed: LinkExposure,
  { detail = false, paint = plain }: TextOptions = {},
): Promise<string> {
  const { reserveDb, confidence } = link.scenario.decision;
  const modes = [...new Set(report.budgets.map(({ case: { mode } }) => mode))];
  const own = ownBudgets(report, link).filter(({ case: { mode } }) => mode === modes[0]);
  const cover = own[0] === undefined ? "" : coverName(own[0]);
  const details = detail ? await Promise.all(own.map(entryDetail)) : [];
  const parts = [
    headline(report, link, paint),
    answer(report, link),
    ...modes.map(
      (mode) =>
        `${paint("strong", modeTitle(report, link, mode))}\n${marginMatrix(report, link, mode, paint)}`,
    ),
    `closes: ${tenth(reserveDb)} dB or more left, and holds with ${percent(confidence)}; thin: less; fails: none left\n` +
      "±: one standard deviation; *: as the scenario has it",
    `${paint("strong", `How it comes about: ${link.modes[modes[0]!]?.label}, cover ${cover}`)}\n${entryTable(own)}`,
    ...own.slice(0, details.length).map((budget, i) => {
      const title = `Every entry in ${budget.case.weather}: bounds, one standard deviation, source`;
      return `${paint("strong", title)}\n${details[i]}`;
    }),
    warningText(report.warnings, paint),
    safetyText(exposed, paint),
    leftOutText(link),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

function modeTitle({ budgets }: MarginReport, { modes }: Link, mode: string): string {
  const { label, noiseBandwidthHz } = modes[mode]!;
  const { requiredSnrDb } = budgets.find(({ case: chosen }) => chosen.mode === mode)!;
  return `Margin in dB, ${label} (needs ${tenth(requiredSnrDb)} dB in ${hertz(noiseBandwidthHz)})`;
}
