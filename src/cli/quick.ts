import { budgetCommand } from "./budget.ts";
import { checkCommand } from "./check.ts";
import { run } from "./run.ts";

/** The commands that people wait for between two trials, by themselves: a smaller bundle starts sooner. */
run([budgetCommand, checkCommand]);
