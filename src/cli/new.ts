import { basename } from "node:path";
import { Command } from "commander";
import { starterText } from "./starter.ts";
import { print } from "./terminal.ts";
import { writeWhole } from "./wholeFile.ts";

export const newCommand = new Command("new")
  .description("write a commented starter scenario")
  .argument("<file>", "file to write, such as path.yaml")
  .option("--force", "replace the file if it exists")
  .action((file: string, { force = false }: { force?: boolean }) => {
    writeWhole(file, starterText, force);
    print(`${basename(file)} written; now: oilskin budget ${file}\n`);
  });
