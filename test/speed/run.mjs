/**
 * Speed as ratios of two things measured in one run, so that the machine and its load cancel.
 *
 *     npm run build && npm run speed
 */
import { coldStart } from "./coldStart.mjs";
import { diffraction } from "./diffraction.mjs";
import { rosterCost, rosterThreads } from "./roster.mjs";
import { sheetRate } from "./sheets.mjs";
import { spread } from "./spread.mjs";

for (const measure of [coldStart, sheetRate, diffraction, spread, rosterThreads, rosterCost]) {
  process.stdout.write(`${await measure()}\n`);
}
