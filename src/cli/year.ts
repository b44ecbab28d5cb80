import { Command, Option } from "commander";
import { prepare, yearCsv, yearJson, yearOutage, yearText } from "../index.ts";
import { knownName } from "./knownName.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print, UserError } from "./terminal.ts";

interface YearOptions {
  readonly mode?: string;
  readonly json?: true;
  readonly csv?: true;
}

export const yearCommand = new Command("year")
  .description("tell what rain and multipath take from a permanent path in a year, bare and under each cover")
  .argument("<file>", "scenario file with a climate")
  .option("--mode <name>", "this mode in place of the scenario's first")
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "a flat table")
  .action(async (file: string, options: YearOptions) => {
    const scenario = await scenarioIn(file);
    if (scenario.climate === undefined) {
      throw new UserError(
        `${file}:1:1: missing key "climate", expected the rain of an average year, such as ` +
          "climate: { rain_rate: 30 mm/h } (the rate exceeded for 0.01 % of it)",
      );
    }
    const link = prepare(scenario);
    const { mode = scenario.receiver.modes[0]! } = options;
    knownName("mode", mode, Object.keys(link.modes));
    const year = yearOutage(link, mode);
    if (options.json) print(yearJson(year));
    else if (options.csv) print(yearCsv(year));
    else print(yearText(year, link, paintFor(process.stdout)));
  });
