import { Command, Option } from "commander";
import { pathCsv, pathJson, pathStudy, pathText, prepare } from "../index.ts";
import { day } from "./day.ts";
import { knownName } from "./knownName.ts";
import { namesAsked, namesOption } from "./namesAsked.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print } from "./terminal.ts";

interface PathOptions {
  readonly weather?: readonly string[];
  readonly mode?: string;
  readonly date?: string;
  readonly json?: true;
  readonly csv?: true;
}

export const pathCommand = new Command("path")
  .description("what carries the path: headings, horizons, obstacles, every mechanism, the lift, a drawing")
  .argument("<file>", "scenario file")
  .addOption(namesOption("--weather <name>", "only this weather"))
  .option("--mode <name>", "this mode in place of the scenario's first")
  .option("--date <day>", "day of the magnetic headings, such as 2026-07-01 (default: today)")
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "profile, ray and clearance as a flat table")
  .action(async (file: string, options: PathOptions) => {
    const link = prepare(await scenarioIn(file));
    const names = namesAsked("weather", options.weather, Object.keys(link.weathers));
    const { mode = link.scenario.receiver.modes[0]! } = options;
    knownName("mode", mode, Object.keys(link.modes));
    const study = await pathStudy(link, mode, names, day(options.date));
    if (options.json) print(pathJson(study));
    else if (options.csv) print(pathCsv(study));
    else print(pathText(study, link, paintFor(process.stdout)));
  });
