import { Command } from "commander";
import { cases, checkText, marginReport, prepare } from "../index.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print } from "./terminal.ts";

export const checkCommand = new Command("check")
  .description("say that a scenario is sound, or list all its faults with line and column")
  .argument("<file>", "scenario file")
  .action(async (file: string) => {
    const scenario = await scenarioIn(file);
    const link = prepare(scenario);
    const { warnings } = marginReport(link, cases(link));
    print(checkText(file, scenario, warnings, paintFor(process.stdout)));
  });
