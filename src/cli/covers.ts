import { Command, Option } from "commander";
import { coversCsv, coversJson, coversText, coverVerdict, prepare } from "../index.ts";
import { knownName } from "./knownName.ts";
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
  .option("--weather <names...>", "only these weathers")
  .option("--mode <name>", "this mode in place of the scenario's first")
  .option(
    "--band <width>",
    "band in which the ripple is sought, such as 200MHz (default: 2 % of the frequency)",
  )
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "a flat table")
  .action(async (file: string, options: CoversOptions) => {
    const link = prepare(await scenarioIn(file));
    const { weather: names = Object.keys(link.weathers), mode = link.scenario.receiver.modes[0]! } = options;
    for (const name of names) knownName("weather", name, Object.keys(link.weathers));
    knownName("mode", mode, Object.keys(link.modes));
    const bandGHz = options.band === undefined ? undefined : bandOf(options.band, link.scenario);
    const verdict = coverVerdict(link, mode, names, bandGHz);
    if (options.json) print(coversJson(verdict));
    else if (options.csv) print(coversCsv(verdict));
    else print(coversText(verdict, link, paintFor(process.stdout)));
  });
