import { readFileSync, realpathSync } from "node:fs";
import { dirname, relative, resolve } from "node:path";
import {
  type BenchReport,
  coversRead,
  entryOfCover,
  judgeScenario,
  type Scenario,
  withMeasuredCover,
} from "../index.ts";
import { diagnosticsText, UserError } from "./terminal.ts";
import { writeWhole } from "./wholeFile.ts";

/**
 * Puts the one cover of a report into a scenario file as a measured cover.
 *
 * @returns what was written, for the user
 */
export async function writeCover(
  report: BenchReport,
  scenario: Scenario,
  file: string,
  force: boolean,
): Promise<string> {
  const [cover, ...more] = coversRead(report);
  if (cover === undefined) throw new UserError("--write: the readings hold no cover");
  if (more.length > 0) {
    throw new UserError(
      `--write: choose one by --cover: ${[cover, ...more].join(", ")}; nothing was written`,
    );
  }
  const entry = entryOfCover(report, cover);
  if (entry === undefined) {
    throw new UserError(
      `--write: the readings hold no insertion loss of ${cover} at the scenario's frequency, which a measured ` +
        "cover needs; nothing was written",
    );
  }
  if (entry.retake && !force) {
    throw new UserError(
      `--write: the readings of ${cover} should be retaken; --force writes them all the same`,
    );
  }
  if (scenario.covers[cover] !== undefined && !force) {
    throw new UserError(
      `--write: ${file} has a cover ${cover} already; --force replaces what it says is measured`,
    );
  }
  const { insertionLossDb, insertionLossSigmaDb, returnLossChangeDb, returnLossChangeSigmaDb } = entry;
  const measured = {
    insertion_loss: typed(insertionLossDb, insertionLossSigmaDb),
    ...(returnLossChangeDb !== undefined && {
      return_loss_change: typed(returnLossChangeDb, returnLossChangeSigmaDb),
    }),
    source: relative(dirname(resolve(file)), resolve(report.file)) || report.file,
  };
  const text = withMeasuredCover(readFileSync(file, "utf8"), cover, measured);
  const judged = text === undefined ? undefined : await judgeScenario(text, dirname(file));
  if (text === undefined || judged?.scenario === undefined) {
    const faults = judged?.diagnostics ? `\n${diagnosticsText(file, judged.diagnostics)}` : "";
    throw new UserError(
      `--write: ${file} has no place for it that this program knows; write it by hand under covers: ` +
        `${cover}: { measured: ${JSON.stringify(measured)} }${faults}`,
    );
  }
  writeWhole(realpathSync(file), text, true); // through a link, not over it
  return `${file}: cover ${cover} written, insertion loss ${measured.insertion_loss} (one standard uncertainty)\n`;
}

/** A figure and its standard uncertainty as a scenario has them, to a hundredth of a dB. */
function typed(db: number, sigmaDb: number | undefined): string {
  const figure = `${Number(db.toFixed(2)) + 0} dB`;
  return sigmaDb === undefined ? figure : `${figure} +/- ${Math.max(0.01, Number(sigmaDb.toFixed(2)))} dB`;
}
