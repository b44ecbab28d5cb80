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
import { namesAsked, namesOption } from "./namesAsked.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print, UserError } from "./terminal.ts";

interface BudgetOptions {
  readonly feed?: string;
  readonly cover?: readonly string[];
  readonly weather?: readonly string[];
  readonly mode?: string;
  readonly detail?: true;
  readonly json?: true;
  readonly csv?: true;
  /** What followed `--require`: a verdict, or the file where nothing else names one. */
  readonly require?: string;
}

/** Exit status where `--require` was asked for and a case falls short. */
const FALLS_SHORT = 3;

/** Verdicts that are enough for what was asked for. */
const enough: Readonly<Record<"closes" | "thin", readonly string[]>> = {
  closes: ["closes"],
  thin: ["closes", "thin"],
};

export const budgetCommand = new Command("budget")
  .description("margin of every cover in every weather: does the path close, and what does the cover take?")
  .usage("[options] <file>")
  .argument("[file]", "scenario file")
  .option("--feed <name>", "take this feed at both ends")
  .addOption(namesOption("--cover <name>", "only this cover, at both ends"))
  .addOption(namesOption("--weather <name>", "only this weather"))
  .option("--mode <name>", "this mode in place of the scenario's")
  .option("--detail", "bounds, deviation and source of each entry")
  .addOption(new Option("--json", "everything as JSON").conflicts(["csv", "detail"]))
  .addOption(new Option("--csv", "all entries as one flat table").conflicts("detail"))
  .addOption(
    new Option(
      "--require [verdict]",
      "exit with status 3 if a case of the report falls short of closes (default) or thin",
    ).preset("closes"),
  )
  .action(async (named: string | undefined, options: BudgetOptions, command: Command) => {
    const { file, verdict: wanted } = requiredOf(named, options.require, command);
    const link = prepare(await scenarioIn(file));
    const chosen = choose(link, options);
    const report = marginReport(link, chosen);
    if (options.json) print(marginJson(report));
    else if (options.csv) print(marginCsv(report));
    else {
      const how = { detail: options.detail ?? false, paint: paintFor(process.stdout) };
      print(await marginReportText(report, link, exposureOfLink(link), how));
    }
    if (wanted !== undefined && report.budgets.some(({ verdict }) => !enough[wanted].includes(verdict))) {
      process.exitCode = FALLS_SHORT;
    }
  });

/** The file and the verdict asked for: `--require` right before the file has taken the file for its verdict. */
function requiredOf(
  named: string | undefined,
  required: string | undefined,
  command: Command,
): { file: string; verdict: keyof typeof enough | undefined } {
  const verdict = required === "closes" || required === "thin" ? required : undefined;
  const took = verdict === undefined ? required : undefined;
  if (named !== undefined && took !== undefined) {
    command.error(`error: --require: read "${took}", expected one of closes, thin`);
  }
  const file = named ?? took ?? command.error("error: missing required argument 'file'");
  return { file, verdict: took === undefined ? verdict : "closes" };
}

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
  const covers = cover && namesAsked("cover", cover, Object.keys(link.scenario.covers));
  const weathers = namesAsked("weather", weather, Object.keys(link.weathers));
  if (mode !== undefined) knownName("mode", mode, Object.keys(link.modes));
  const all = cases(link)
    .filter((one) => weathers.includes(one.weather))
    .filter(({ transmitter: { cover: sent }, receiver: { cover: heard } }) =>
      covers === undefined ? true : sent === heard && covers.includes(sent),
    )
    .map((one) => ({
      ...one,
      transmitter: { ...one.transmitter, feed: feed ?? one.transmitter.feed },
      receiver: { ...one.receiver, feed: feed ?? one.receiver.feed },
    }));
  if (mode === undefined) return all;
  const first = all[0]?.mode;
  return all.filter((one) => one.mode === first).map((one) => ({ ...one, mode }));
}
