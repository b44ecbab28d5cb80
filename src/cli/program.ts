import { budgetCommand } from "./budget.ts";
import { checkCommand } from "./check.ts";
import { compareCommand } from "./compare.ts";
import { coversCommand } from "./covers.ts";
import { horizonCommand } from "./horizon.ts";
import { inferCommand } from "./infer.ts";
import { materialsCommand } from "./materials.ts";
import { newCommand } from "./new.ts";
import { pathCommand } from "./path.ts";
import { readingsCommand } from "./readings.ts";
import { rosterCommand } from "./roster.ts";
import { run } from "./run.ts";
import { schemaCommand } from "./schema.ts";
import { spreadCommand } from "./spread.ts";
import { thicknessCommand } from "./thickness.ts";
import { weatherCommand } from "./weather.ts";
import { yearCommand } from "./year.ts";

run([
  budgetCommand,
  coversCommand,
  spreadCommand,
  compareCommand,
  weatherCommand,
  yearCommand,
  pathCommand,
  rosterCommand,
  horizonCommand,
  checkCommand,
  newCommand,
  thicknessCommand,
  materialsCommand,
  readingsCommand,
  inferCommand,
  schemaCommand,
]);
