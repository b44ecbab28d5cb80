import { Command } from "commander";
import { materials, materialsText } from "../index.ts";
import { paintFor, print } from "./terminal.ts";

export const materialsCommand = new Command("materials")
  .description("list the cover materials with their figures, durability and source")
  .action(async () => print(await materialsText(materials, paintFor(process.stdout))));
