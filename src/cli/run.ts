import { Command } from "commander";
import { UserError } from "./terminal.ts";

/** Exit status of bad input and of a command line that makes no sense. */
const BAD_INPUT = 2;

// A reader that goes away, as `head` does, is no fault; a full disk is one, but none of the program.
process.stdout.on("error", ({ code, message }: NodeJS.ErrnoException) => {
  if (code === "EPIPE") process.exit();
  process.stderr.write(`the output cannot be written (${code ?? message})\n`);
  process.exit(BAD_INPUT);
});

/** Runs the command line with these commands of the program. */
export function run(commands: readonly Command[]): void {
  const program = new Command("oilskin")
    .description("Will this microwave path close, dry and in rain, and what does the cover on the feed cost?")
    .version("0.1.0")
    .showHelpAfterError("(oilskin --help shows the commands)");
  for (const command of commands) {
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
}
