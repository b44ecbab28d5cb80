import { Command } from "commander";
import { cases, marginReport, prepare } from "../index.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { print } from "./terminal.ts";

export const checkCommand = new Command("check")
  .description("say that a scenario is sound, or list all its faults with line and column")
  .argument("<file>", "scenario file")
  .action(async (file: string) => {
    const scenario = await scenarioIn(file);
    const link = prepare(scenario);
    const { warnings } = marginReport(link, cases(link));
    const count = (noun: string, group: object) => {
      const number = Object.keys(group).length;
      return `${number} ${noun}${number === 1 ? "" : "s"}`;
    };
    const { feeds, covers, weather } = scenario;
    print(
      `${file}: sound; ${count("feed", feeds)}, ${count("cover", covers)} with bare, ${count("weather", weather)}\n`,
    );
    for (const { where, message } of warnings) print(`${file}: warning: ${where}: ${message}\n`);
  });
