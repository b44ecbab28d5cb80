import { Command, Option } from "commander";
import { inferCsv, inferJson, inferReport, inferText, loadInferReadings } from "../index.ts";
import { faultsError } from "./benchFile.ts";
import { paintFor, print } from "./terminal.ts";

export const inferCommand = new Command("infer")
  .description("find a feed's reflection from known sheets, or the material of a sheet from a known feed")
  .argument("<file>", "YAML of readings: frequency, feed, sheets, unknown")
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "a row for each solution")
  .action(async (file: string, options: { readonly json?: true; readonly csv?: true }) => {
    const { readings, faults } = await loadInferReadings(file);
    if (readings === undefined) throw faultsError(faults);
    const report = await inferReport(readings);
    if (options.json) print(inferJson(report));
    else if (options.csv) print(inferCsv(report));
    else print(inferText(report, paintFor(process.stdout)));
  });
