import { availableParallelism } from "node:os";
import { Command, Option } from "commander";
import {
  comparing,
  keepBest,
  openRoster,
  type Roster,
  type RosterPlan,
  rosterCsvHead,
  rosterText,
  sortKeys,
  suitedDishes,
} from "../index.ts";
import { faultsError } from "./benchFile.ts";
import { namesOption } from "./namesAsked.ts";
import { wholeNumber } from "./optionQuantity.ts";
import { rateBar } from "./progress.ts";
import { planOf, type RosterOptions } from "./rosterOptions.ts";
import { type RosterOutcome, runRoster } from "./rosterRun.ts";
import type { RosterJob, Worked } from "./rosterWork.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { stopOnSignal } from "./stopOnSignal.ts";
import { paintFor, UserError } from "./terminal.ts";
import { type Draft, notOver, openDraft } from "./wholeFile.ts";

/** Lines of a table from one site, where `--top` does not say another number. */
const USUAL_TABLE = 2000;
/** Stations that are sorted as data, where `--top` does not keep fewer: some hundred megabytes. */
const MOST_SORTED = 100_000;
/** A file of fewer bytes is done before threads have started. */
const FEW_BYTES = 60_000;
const MOST_WORKERS = 64;

/** Exit status of bad rows. */
const BAD_ROWS = 2;

export const rosterCommand = new Command("roster")
  .description("many stations from one site or several: distance, headings, what carries the path, best mode")
  .argument(
    "<file>",
    "scenario file: its transmitter is the own station, its receiver the pattern of a partner",
  )
  .argument("<stations>", "CSV of stations")
  .option("--sites <file>", "CSV of more own sites: name, locator or latitude and longitude, ground, height")
  .addOption(
    new Option("--sort <key>", "order (default: heading for a table, that of the rows for data)").choices(
      sortKeys,
    ),
  )
  .option("--top <number>", "only so many stations of each site, those with the most margin in the wet")
  .addOption(
    new Option("--closes [weather]", "only stations with a mode that closes")
      .choices(["dry", "wet"])
      .preset("dry"),
  )
  .option("--within <distance>", "only stations at most so far (true distance), such as 300km")
  .option("--beyond <distance>", "only stations at least so far (true distance)")
  .option(
    "--towards <headings>",
    "only stations at true headings from one clockwise to another, such as 330..20",
  )
  .addOption(namesOption("--mode <name>", "this mode in place of the scenario's"))
  .addOption(
    namesOption("--cover <name>", "the own feed under this cover, bare beside it; the first is in the table"),
  )
  .option("--dry <weather>", "the dry weather (default: the first without rain)")
  .option("--wet <weather>", "the wet weather (default: the one with the most rain)")
  .option("--one-way", "leave the way back out, as for a beacon")
  .option("--date <day>", "day of the magnetic headings, such as 2026-07-01 (default: today)")
  .addOption(
    new Option("--csv", "a flat table: a row for each station, own cover and mode").conflicts("jsonl"),
  )
  .option("--jsonl", "a line of JSON for each station")
  .option("--output <file>", "write into this file, whole or not at all")
  .option("--force", "replace the file if it exists")
  .option("--workers <number>", "threads (default: as many as cores; 1 for a short roster)")
  .addHelpText(
    "after",
    `
The CSV has a header, in any order: name; locator, or latitude and longitude;
and where known ground, height, power, dish (a name of the scenario, a diameter
or a gain), noise figure, mode, note. Quantities carry units, in the cell or in
the header ("ground m"). What a row leaves out is as at the scenario's receiver;
a partner that states no power has the own one; ground not stated is 0 m, or
what elevation tiles say. Rows at fault are told on standard error, the rest is
done, and the exit status is 2.

The table shows the margin of the most demanding mode under the own cover, and
the best mode for either; --mode and --cover choose others, data have them all.
Covers are those of the own feed: the partner's stays as in the scenario.

CSV and JSON lines go out as they are worked out, in memory that does not grow.
A table keeps the ${USUAL_TABLE} stations with the most margin; --sort for data holds all
of them, ${MOST_SORTED} at the most, or those of --top.`,
  )
  .action(async (file: string, stations: string, options: RosterOptions) => {
    if (options.force && options.output === undefined) throw new UserError("--force goes with --output");
    if (options.output !== undefined) {
      notOver(options.output, [file, stations, ...(options.sites === undefined ? [] : [options.sites])]);
    }
    const { top: topText, workers } = options;
    const top = topText === undefined ? undefined : wholeNumber("--top", topText, 1, MOST_SORTED);
    const asked = workers === undefined ? undefined : wholeNumber("--workers", workers, 1, MOST_WORKERS);
    const scenario = await scenarioIn(file);
    const { roster, faults } = openRoster(stations, "stations");
    if (roster === undefined) throw faultsError(faults);
    const { plan, notes, date } = await planOf(file, scenario, options);
    const format = options.csv ? "csv" : options.jsonl ? "jsonl" : "table";
    const form = {
      columns: roster.columns,
      separator: roster.separator,
      dishes: suitedDishes(scenario),
      modes: Object.keys(scenario.modes),
    };
    const output =
      options.output === undefined ? undefined : openDraft(options.output, options.force === true);
    try {
      const streamed = format !== "table" && options.sort === undefined && top === undefined;
      const job = { plan, form, format, streamed } as const;
      const outcome = await work(
        job,
        roster,
        {
          ...options,
          top,
          threads: threadsFor(roster, plan, asked),
          notes: [...notes, ...columnNotes(roster)],
          date,
        },
        output,
      );
      if (outcome.interrupted === undefined) output?.keep();
      process.exitCode = tell(outcome, options.output);
    } finally {
      output?.drop();
    }
  });

interface Ways {
  readonly sort?: RosterOptions["sort"];
  readonly top: number | undefined;
  readonly threads: number;
  readonly notes: readonly string[];
  readonly date: Date;
}

/** Works out the roster and writes it as it goes, or at the end where it has to be sorted. */
async function work(
  job: RosterJob,
  roster: Roster,
  { sort, top, threads, notes, date }: Ways,
  output: Draft | undefined,
): Promise<RosterOutcome> {
  const { plan, format } = job;
  const write = output ? output.write : toStandardOutput;
  const bar = rateBar(process.stderr, "roster", "stations");
  const stopping = stopOnSignal(() => output?.drop());
  if (format === "csv") await write(rosterCsvHead);
  const order = comparing(sort ?? (format === "table" ? "heading" : "row"));
  const most = top ?? (format === "table" ? USUAL_TABLE : MOST_SORTED);
  const kept = plan.sites.map(() => keepBest<Worked>(most, comparing("margin")));
  const station = (one: Worked) => {
    kept[one.site]!.add(one);
    if (format !== "table" && top === undefined && kept[one.site]!.seen() > MOST_SORTED) {
      throw new UserError(
        `more than ${MOST_SORTED} stations to be sorted; keep fewer by --top, --within or --closes, or leave --sort out`,
      );
    }
  };
  const take = { text: write, station };
  const outcome = await runRoster(job, roster, threads, take, bar, stopping.signal);
  stopping.end();
  const told = [
    ...(outcome.interrupted !== undefined
      ? [`interrupted: the roster goes on after the first ${outcome.done} stations`]
      : []),
    ...notes,
    ...outcomeNotes(outcome, plan),
  ];
  if (outcome.interrupted !== undefined && output) return outcome;
  const sorted = kept.map((site) => [...site.best()].sort(order));
  if (format === "table") {
    const left = kept.map((site, i) => site.seen() - sorted[i]!.length).filter((count) => count > 0);
    if (left.length > 0) {
      told.push(
        `the table holds the ${most} stations${plan.sites.length > 1 ? " of each site" : ""} with the most margin, ${left.reduce((sum, count) => sum + count)} more are left out; ` +
          "--top takes another number, --csv and --jsonl have all",
      );
    }
    const lines = sorted.map((site) => site.map(({ table }) => table!));
    const day = date.toISOString().slice(0, 10);
    const paint = output ? undefined : paintFor(process.stdout);
    await write(rosterText({ plan, lines, sort: sort ?? "heading", notes: told, date: day }, paint));
  } else {
    for (const { text } of sorted.flat().sort(order)) await write(text);
    for (const note of told) process.stderr.write(`note: ${note}\n`);
  }
  return outcome;
}

/** Columns of a list that say nothing here. */
function columnNotes({ passedOver }: Roster): string[] {
  const names = passedOver.map((name) => (name === "" ? "one without a name" : name));
  if (names.length === 0) return [];
  return [`column${names.length === 1 ? "" : "s"} passed over: ${[...new Set(names)].join(", ")}`];
}

/** What was taken for what the rows do not say. */
function outcomeNotes(
  { groundAssumed, withoutTerrain, terrainReason }: RosterOutcome,
  plan: RosterPlan,
): string[] {
  const stations = (count: number) => (count === 1 ? "1 station" : `${count} stations`);
  return [
    ...(groundAssumed > 0
      ? [`${stations(groundAssumed)} without a ground height: taken to stand at sea level, 0 m`]
      : []),
    ...(withoutTerrain > 0
      ? [`the terrain does not reach ${stations(withoutTerrain)} (${terrainReason}): a smooth Earth is taken`]
      : []),
    ...(plan.scenario.path.terrain === undefined
      ? ["no terrain: hills, trees and buildings in the way are not counted"]
      : []),
  ];
}

/** Faults and an interruption on standard error; the exit status. */
function tell(
  { faults, faultCount, rowsLost, done, interrupted }: RosterOutcome,
  output: string | undefined,
): number {
  const say = (text: string) => process.stderr.write(`${text}\n`);
  for (const line of faults) say(line);
  if (faultCount > faults.length) say(`and ${faultCount - faults.length} more`);
  const rows = (count: number) => (count === 1 ? "1 row" : `${count} rows`);
  if (interrupted !== undefined) {
    const kept = output === undefined ? "what is written stands" : `${output} is not written`;
    say(`interrupted after ${done} stations; ${kept}`);
    return interrupted;
  }
  if (faultCount > 0) {
    say(
      `${faultCount === 1 ? "1 fault" : `${faultCount} faults`}; ${rows(rowsLost)} left out, ${rows(done)} done`,
    );
    return BAD_ROWS;
  }
  return 0;
}

/** As many threads as cores, for work that is worth their start. */
function threadsFor({ bytes }: Roster, { sites, scenario }: RosterPlan, asked: number | undefined): number {
  if (asked !== undefined) return asked;
  const weight = scenario.path.terrain === undefined ? 1 : 20;
  return bytes * sites.length * weight < FEW_BYTES ? 1 : Math.min(MOST_WORKERS, availableParallelism());
}

function toStandardOutput(text: string | Uint8Array): void | Promise<void> {
  if (process.stdout.write(text)) return;
  return new Promise((resolve) => process.stdout.once("drain", resolve));
}
