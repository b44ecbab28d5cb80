import { basename } from "node:path";
import { Command, Option } from "commander";
import {
  type BenchReadings,
  benchReport,
  coversRead,
  loadReadings,
  loadSweeps,
  readingsCsv,
  readingsJson,
  readingsText,
  type Scenario,
} from "../index.ts";
import { faultsError, progressOf } from "./benchFile.ts";
import { knownName } from "./knownName.ts";
import { quantityOption } from "./optionQuantity.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print, UserError } from "./terminal.ts";
import { writeCover } from "./writeCover.ts";

interface ReadingsOptions {
  readonly bare?: string;
  readonly covered?: string;
  readonly cover?: string;
  readonly scenario?: string;
  readonly frequency?: string;
  readonly wanted?: string;
  readonly repeatability?: string;
  readonly directivity?: string;
  readonly confidence?: string;
  readonly write?: string;
  readonly force?: true;
  readonly json?: true;
  readonly csv?: true;
}

export const readingsCommand = new Command("readings")
  .description("reduce bench readings: what a cover costs, how sure that is, and whether it can be true")
  .argument("[file]", "CSV or YAML of readings, bare and covered in turn")
  .option("--bare <sweep>", "Touchstone sweep of the bare feed, in place of a file")
  .option("--covered <sweep>", "Touchstone sweep with the cover")
  .option("--cover <name>", "this cover alone; with --covered, what to call it")
  .option("--frequency <frequency>", "where on a sweep to read, such as 10.368GHz")
  .option("--scenario <file>", "take the frequency from this scenario")
  .option("--wanted <loss>", "uncertainty wanted, such as 0.03dB: how many more pairs would reach it")
  .option("--repeatability <loss>", "half-width to which the bench repeats (default: 0.05dB)")
  .option("--directivity <ratio>", "directivity of the coupler that read the return losses, such as 35dB")
  .option("--confidence <percentage>", "level of confidence (default: 95%)")
  .option("--write <scenario>", "put the result into this scenario as a measured cover")
  .option("--force", "write it even where the cover exists, or where its readings should be retaken")
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "a flat table")
  .action(async (file: string | undefined, options: ReadingsOptions) => {
    const decibels = (option: "wanted" | "repeatability", low: number) =>
      quantityOption(`--${option}`, options[option], "levelDb", [low, 10], "dB");
    const percent = quantityOption("--confidence", options.confidence, "percent", [50, 99.99], "%");
    const choice = {
      confidence: percent === undefined ? undefined : percent / 100,
      wantedDb: decibels("wanted", 0.001),
      repeatabilityDb: decibels("repeatability", 0),
      directivityDb: quantityOption("--directivity", options.directivity, "levelDb", [7, 100], "dB"),
      frequencyGHz: quantityOption("--frequency", options.frequency, "frequencyGHz", [0.1, 350], "GHz"),
    };
    const scenario = await scenarioOf(options);
    const readings = await readingsOf(file, options);
    const frequencyGHz = choice.frequencyGHz ?? scenario?.frequencyGHz;
    const all = await benchReport(readings, { ...choice, frequencyGHz });
    const { cover } = options;
    if (cover !== undefined) knownName("cover", cover, coversRead(all), "the readings");
    const of = <T extends { readonly cover: string }>(ones: readonly T[]) =>
      cover === undefined ? ones : ones.filter((one) => one.cover === cover);
    const report = { ...all, covers: of(all.covers), sweeps: of(all.sweeps) };
    if (options.json) print(readingsJson(report));
    else if (options.csv) print(readingsCsv(report));
    else print(readingsText(report, paintFor(process.stdout)));
    if (options.write !== undefined) {
      const said = await writeCover(report, scenario!, options.write, options.force === true);
      // Data on standard output stay data.
      (options.json || options.csv ? process.stderr : process.stdout).write(said);
    }
  });

async function scenarioOf({ scenario, write }: ReadingsOptions): Promise<Scenario | undefined> {
  const file = write ?? scenario;
  return file === undefined ? undefined : scenarioIn(file);
}

async function readingsOf(
  file: string | undefined,
  { bare, covered, cover }: ReadingsOptions,
): Promise<BenchReadings> {
  if ((bare === undefined) !== (covered === undefined)) {
    throw new UserError("--bare and --covered go together: a sweep of the bare feed and one with the cover");
  }
  if ((file === undefined) === (bare === undefined)) {
    throw new UserError("name a file of readings, or two sweeps by --bare and --covered");
  }
  const progress = progressOf(process.stderr);
  const { readings, faults } =
    file === undefined
      ? loadSweeps(bare!, covered!, cover ?? basename(covered!).replace(/\.s[12]p$/i, ""))
      : await loadReadings(file, progress.tell);
  progress.clear();
  if (readings === undefined) throw faultsError(faults);
  return readings;
}
