import type { Link } from "../budget/types.ts";
import type { LinkExposure } from "../study/exposureOfLink.ts";
import type { MarginReport } from "../study/marginReport.ts";
import { entryDetail, entryTable } from "./entryText.ts";
import { answer, coverName, marginMatrix, ownBudgets, pathLines } from "./marginText.ts";
import { leftOutText, safetyText, warningText } from "./notes.ts";
import { hertz, type Paint, paragraph, percent, plain, tenth } from "./words.ts";

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
  const heading = (text: string) => paint("strong", paragraph(text));
  const parts = [
    pathLines(report, link, paint),
    answer(report, link),
    ...modes.map(
      (mode) => `${heading(modeTitle(report, link, mode))}\n${marginMatrix(report, link, mode, paint)}`,
    ),
    [
      paragraph(
        `closes: ${tenth(reserveDb)} dB or more left, and holds with ${percent(confidence)}; ` +
          "thin: something left, but less or less sure; fails: nothing left",
      ),
      "±: one standard deviation; *: as the scenario has it; figures rounded to 0.1 dB",
    ].join("\n"),
    `${heading(`How it comes about: ${link.modes[modes[0]!]?.label}, cover ${cover}`)}\n${entryTable(own)}`,
    ...own.slice(0, details.length).map((budget, i) => {
      const title = `Every entry in ${budget.case.weather}: bounds, one standard deviation, source`;
      return `${heading(title)}\n${details[i]}`;
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
