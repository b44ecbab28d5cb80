import { Command, Option } from "commander";
import { coversCsv, coversJson, coversText, coverVerdict, prepare } from "../index.ts";
import { knownName } from "./knownName.ts";
import { namesAsked, namesOption } from "./namesAsked.ts";
import { bandOf } from "./optionQuantity.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print } from "./terminal.ts";

interface CoversOptions {
  readonly weather?: readonly string[];
  readonly mode?: string;
  readonly band?: string;
  readonly json?: true;
  readonly csv?: true;
}

export const coversCommand = new Command("covers")
  .description(
    "judge every cover of the scenario, dry and wet: cost, match, noise, break-even rain, durability",
  )
  .argument("<file>", "scenario file")
  .addOption(namesOption("--weather <name>", "only this weather"))
  .option("--mode <name>", "this mode in place of the scenario's first")
  .option(
    "--band <width>",
    "band in which the ripple is sought, such as 200MHz (default: 2 % of the frequency)",
  )
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "a flat table")
  .action(async (file: string, options: CoversOptions) => {
    const link = prepare(await scenarioIn(file));
    const names = namesAsked("weather", options.weather, Object.keys(link.weathers));
    const { mode = link.scenario.receiver.modes[0]! } = options;
    knownName("mode", mode, Object.keys(link.modes));
    const bandGHz = options.band === undefined ? undefined : bandOf(options.band, link.scenario);
    const verdict = coverVerdict(link, mode, names, bandGHz);
    if (options.json) print(coversJson(verdict));
    else if (options.csv) print(coversCsv(verdict));
    else print(coversText(verdict, link, paintFor(process.stdout)));
  });
