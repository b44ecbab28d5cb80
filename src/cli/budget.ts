import { Command, Option } from "commander";
import {
  type Case,
  cases,
  exposureOfLink,
  type Link,
  marginCsv,
  marginJson,
  marginReport,
  marginReportText,
  prepare,
} from "../index.ts";
import { knownName } from "./knownName.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print, UserError } from "./terminal.ts";

interface BudgetOptions {
  readonly feed?: string;
  readonly cover?: string;
  readonly weather?: string;
  readonly mode?: string;
  readonly detail?: true;
  readonly json?: true;
  readonly csv?: true;
  readonly require?: "closes" | "thin";
}

/** Exit status where `--require` was asked for and a case falls short. */
const FALLS_SHORT = 3;

export const budgetCommand = new Command("budget")
  .description("margin of every cover in every weather: does the path close, and what does the cover take?")
  .argument("<file>", "scenario file")
  .option("--feed <name>", "take this feed at both ends")
  .option("--cover <name>", "only this cover, at both ends")
  .option("--weather <name>", "only this weather")
  .option("--mode <name>", "this mode in place of the scenario's")
  .option("--detail", "bounds, deviation and source of each entry")
  .addOption(new Option("--json", "everything as JSON").conflicts(["csv", "detail"]))
  .addOption(new Option("--csv", "all entries as one flat table").conflicts("detail"))
  .addOption(
    new Option("--require [verdict]", "exit with status 3 if a case of the report falls short")
      .choices(["closes", "thin"])
      .preset("closes"),
  )
  .action(async (file: string, options: BudgetOptions) => {
    const link = prepare(await scenarioIn(file));
    const chosen = choose(link, options);
    const report = marginReport(link, chosen);
    if (options.json) print(marginJson(report));
    else if (options.csv) print(marginCsv(report));
    else {
      const how = { detail: options.detail ?? false, paint: paintFor(process.stdout) };
      print(await marginReportText(report, link, exposureOfLink(link), how));
    }
    const enough = options.require === "thin" ? ["closes", "thin"] : ["closes"];
    if (options.require && report.budgets.some(({ verdict }) => !enough.includes(verdict))) {
      process.exitCode = FALLS_SHORT;
    }
  });

/** The cases that the options leave. */
function choose(link: Link, { feed, cover, weather, mode }: BudgetOptions): Case[] {
  const { transmitter, receiver } = link.ends;
  if (feed !== undefined) {
    knownName("feed", feed, Object.keys(link.scenario.feeds));
    for (const [end, feeds] of Object.entries({ transmitter, receiver })) {
      if (!(feed in feeds))
        throw new UserError(`feed "${feed}" does not suit the ${end}'s dish, or has no gain by itself`);
    }
  }
  if (cover !== undefined) knownName("cover", cover, Object.keys(link.scenario.covers));
  if (weather !== undefined) knownName("weather", weather, Object.keys(link.weathers));
  if (mode !== undefined) knownName("mode", mode, Object.keys(link.modes));
  const all = cases(link)
    .filter((one) => weather === undefined || one.weather === weather)
    .filter((one) => cover === undefined || (one.transmitter.cover === cover && one.receiver.cover === cover))
    .map((one) => ({
      ...one,
      transmitter: { ...one.transmitter, feed: feed ?? one.transmitter.feed },
      receiver: { ...one.receiver, feed: feed ?? one.receiver.feed },
    }));
  if (mode === undefined) return all;
  const first = all[0]?.mode;
  return all.filter((one) => one.mode === first).map((one) => ({ ...one, mode }));
}
