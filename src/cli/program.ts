import { Command } from "commander";
import { budgetCommand } from "./budget.ts";
import { checkCommand } from "./check.ts";
import { coversCommand } from "./covers.ts";
import { horizonCommand } from "./horizon.ts";
import { inferCommand } from "./infer.ts";
import { materialsCommand } from "./materials.ts";
import { newCommand } from "./new.ts";
import { pathCommand } from "./path.ts";
import { readingsCommand } from "./readings.ts";
import { schemaCommand } from "./schema.ts";
import { UserError } from "./terminal.ts";
import { thicknessCommand } from "./thickness.ts";
import { yearCommand } from "./year.ts";

/** Exit status of bad input and of a command line that makes no sense. */
const BAD_INPUT = 2;

// A reader that goes away, as `head` does, is no fault; a full disk is one, but none of the program.
process.stdout.on("error", ({ code, message }: NodeJS.ErrnoException) => {
  if (code === "EPIPE") process.exit();
  process.stderr.write(`the output cannot be written (${code ?? message})\n`);
  process.exit(BAD_INPUT);
});

const program = new Command("oilskin")
  .description("Will this microwave path close, dry and in rain, and what does the cover on the feed cost?")
  .version("0.1.0")
  .showHelpAfterError("(oilskin --help shows the commands)");
for (const command of [
  budgetCommand,
  coversCommand,
  yearCommand,
  pathCommand,
  horizonCommand,
  checkCommand,
  newCommand,
  thicknessCommand,
  materialsCommand,
  readingsCommand,
  inferCommand,
  schemaCommand,
]) {
  program.addCommand(command.showHelpAfterError(`(oilskin ${command.name()} --help shows what it takes)`));
}
for (const command of [program, ...program.commands]) {
  command.exitOverride((end) => {
    process.exit(end.exitCode === 0 ? 0 : BAD_INPUT);
  });
}

program.parseAsync().catch((error: unknown) => {
  if (!(error instanceof UserError)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = BAD_INPUT;
});
