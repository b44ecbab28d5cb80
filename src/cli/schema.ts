import { Command } from "commander";
import { scenarioJsonSchema } from "../index.ts";
import { print } from "./terminal.ts";

export const schemaCommand = new Command("schema")
  .description("print the JSON Schema of a scenario file, for an editor")
  .action(() => print(`${JSON.stringify(scenarioJsonSchema(), null, 2)}\n`));
