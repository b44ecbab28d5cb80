import { Command, Option } from "commander";
import { type Case, cases, prepare, spreadCsv, spreadJson, spreadOf, spreadText } from "../index.ts";
import { knownName } from "./knownName.ts";
import { namesAsked, namesOption } from "./namesAsked.ts";
import { wholeNumber, within } from "./optionQuantity.ts";
import { progressBar } from "./progress.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print } from "./terminal.ts";

interface SpreadOptions {
  readonly weather?: readonly string[];
  readonly cover?: readonly string[];
  readonly mode?: string;
  readonly draws: string;
  readonly seed: string;
  readonly precision: string;
  readonly detail?: true;
  readonly json?: true;
  readonly csv?: true;
}

const MOST_DRAWS = 1_000_000;
const MOST_SEED = 2 ** 32 - 1;

export const spreadCommand = new Command("spread")
  .description(
    "how sure is the verdict: draw every uncertain input, with each cover, and rank what it hangs on",
  )
  .argument("<file>", "scenario file")
  .addOption(namesOption("--weather <name>", "only this weather"))
  .addOption(namesOption("--cover <name>", "only this cover at both ends, beside the scenario's own"))
  .option("--mode <name>", "this mode in place of the scenario's first")
  .option("--draws <number>", "most draws", "200000")
  .option("--seed <number>", "another whole number draws other numbers; the same one the same", "1")
  .option("--precision <percent>", "stop when every chance to close is known to this, at 95 %", "0.5 %")
  .addOption(new Option("--detail", "every input with its distribution").conflicts(["json", "csv"]))
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "a flat table, a row for each weather and cover")
  .action(async (file: string, options: SpreadOptions) => {
    const draws = wholeNumber("--draws", options.draws, 1, MOST_DRAWS);
    const seed = wholeNumber("--seed", options.seed, 0, MOST_SEED);
    const precision = within("--precision", options.precision, "percent", [0.001, 50], "0.001 to 50 %") / 100;
    const link = prepare(await scenarioIn(file));
    const { mode = link.scenario.receiver.modes[0]! } = options;
    knownName("mode", mode, Object.keys(link.modes));
    const weathers = namesAsked("weather", options.weather, Object.keys(link.weathers));
    const covers = namesAsked("cover", options.cover, Object.keys(link.scenario.covers));
    const progress = progressBar(process.stderr, "spread");
    const chosen = choose(cases(link), mode, weathers, covers);
    const study = spreadOf(link, chosen, { draws, seed, precision, progress });
    if (options.json) print(spreadJson(study));
    else if (options.csv) print(spreadCsv(study));
    else print(spreadText(study, link, { detail: options.detail ?? false, paint: paintFor(process.stdout) }));
  });

/** Cases of one mode; the scenario's own covers stay, for the ranking is theirs. */
function choose(
  all: readonly Case[],
  mode: string,
  weathers: readonly string[],
  covers: readonly string[],
): Case[] {
  const first = all[0]!;
  return all
    .filter((one) => one.mode === first.mode && weathers.includes(one.weather))
    .filter(({ transmitter: { cover }, receiver }) => {
      const own = cover === first.transmitter.cover && receiver.cover === first.receiver.cover;
      return own || covers.includes(cover);
    })
    .map((one) => ({ ...one, mode }));
}
