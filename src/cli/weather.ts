import { Command, Option } from "commander";
import { prepare, weatherCsv, weatherJson, weatherLadder, weatherText } from "../index.ts";
import { knownName } from "./knownName.ts";
import { listOption } from "./optionQuantity.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print, UserError } from "./terminal.ts";

interface WeatherOptions {
  readonly weather?: string;
  readonly mode?: readonly string[];
  readonly rates?: readonly string[];
  readonly extents?: readonly string[];
  readonly cover?: string;
  readonly json?: true;
  readonly csv?: true;
}

/** Rungs and extents that a report can show. */
const MOST_RATES = 40;
const MOST_EXTENTS = 12;
/** What a scenario takes, too: rain [mm/h], length of rain [km]. */
const RATES_MM_PER_H = [0, 400] as const;
const EXTENTS_KM = [0.01, 1000] as const;

const gathered = (text: string, before: readonly string[] = []) => [...before, text];

export const weatherCommand = new Command("weather")
  .description("the rain ladder: margin over rain rate on path, covers and both; break-even rates, extent")
  .argument("<file>", "scenario file")
  .option("--weather <name>", "weather whose rain is varied, all else of it kept (default: the rainiest)")
  .option("--mode <name>", "this mode in place of the scenario's first; may be repeated", gathered)
  .option(
    "--rates <list>",
    "rungs in mm/h or with units, such as 2,5,10 or 0.5in/h; may be repeated",
    gathered,
  )
  .option(
    "--extents <list>",
    "lengths of rain in km or with units, such as 1,5,20; may be repeated",
    gathered,
  )
  .option("--cover <name>", "this cover at both ends in the table of extents (default: the scenario's own)")
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "a flat table")
  .action(async (file: string, options: WeatherOptions) => {
    const { weather, cover } = options;
    const modes = options.mode && [...new Set(options.mode)];
    const ratesMmPerH =
      options.rates &&
      listOption("--rates", options.rates, "rainRateMmPerH", RATES_MM_PER_H, "mm/h", MOST_RATES);
    if (ratesMmPerH?.every((rate) => rate === 0)) {
      throw new UserError(
        "--rates: no rain is always the lowest rung; name a rate above it, such as 2.5 mm/h",
      );
    }
    const extentsKm =
      options.extents &&
      listOption("--extents", options.extents, "distanceKm", EXTENTS_KM, "km", MOST_EXTENTS);
    const link = prepare(await scenarioIn(file));
    if (weather !== undefined) knownName("weather", weather, Object.keys(link.weathers));
    for (const mode of modes ?? []) knownName("mode", mode, Object.keys(link.modes));
    if (cover !== undefined) knownName("cover", cover, Object.keys(link.scenario.covers));
    const ladder = weatherLadder(link, { weather, modes, ratesMmPerH, extentsKm, cover });
    if (options.json) print(weatherJson(ladder));
    else if (options.csv) print(weatherCsv(ladder));
    else print(weatherText(ladder, link, paintFor(process.stdout)));
  });
