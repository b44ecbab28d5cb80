import { statSync } from "node:fs";
import { dirname } from "node:path";
import type { Progress } from "./csvText.ts";
import { type FileFault, faultList } from "./readingsFaults.ts";
import { portsOf, readSweeps, type SweepFile, unreadable } from "./readingsSweep.ts";
import type { ReadingsTable } from "./readingsTable.ts";
import { didYouMean, listed, shown } from "./wording.ts";
import { fromFolder, judgeYaml, readText } from "./yamlFile.ts";

/** What a coupler adds to a return loss. */
export interface Coupler {
  readonly directivityDb: number;
  readonly sourceMatchDb?: number | undefined;
  /** Levels reflected by an open and by a short. */
  readonly openDb?: number | undefined;
  readonly shortDb?: number | undefined;
  readonly padMismatchDb?: number | undefined;
}

/** Readings of a bench, checked. */
export interface BenchReadings {
  /** As the user named it. */
  readonly file: string;
  readonly title?: string | undefined;
  readonly frequencyGHz?: number | undefined;
  readonly repeatabilityDb?: number | undefined;
  /** 0 to 1. */
  readonly confidence?: number | undefined;
  readonly wantedDb?: number | undefined;
  /** Known return losses, by "bare" or the name of a cover [dB]. */
  readonly returnLossesDb: Readonly<Record<string, number>>;
  readonly coupler?: Coupler | undefined;
  readonly table?: ReadingsTable | undefined;
  /** By "bare" or the name of a cover. */
  readonly sweeps: Readonly<Record<string, SweepFile>>;
}

export type LoadedReadings =
  | { readonly readings: BenchReadings; readonly faults?: undefined }
  | { readonly readings?: undefined; readonly faults: readonly FileFault[] };

/**
 * Reads a file of bench readings: YAML by its ending (.yaml, .yml), otherwise CSV.
 *
 * @param progress  told while a long CSV is read
 * @returns the readings, or every fault with its file and line; it never throws for a bad file
 */
export async function loadReadings(file: string, progress?: Progress): Promise<LoadedReadings> {
  if (/\.ya?ml$/i.test(file)) return loadYaml(file, progress);
  const { table, faults } = await loadTable(file, file, progress);
  return table ? { readings: { file, returnLossesDb: {}, sweeps: {}, table } } : { faults };
}

/** A pair of sweeps as readings. */
export function loadSweeps(bare: string, covered: string, cover: string): LoadedReadings {
  const { sweeps, faults } = readSweeps({ bare, [cover]: covered });
  return faults.length > 0 ? { faults } : { readings: { file: covered, returnLossesDb: {}, sweeps } };
}

/** A CSV, and what the user calls it. */
async function loadTable(
  path: string,
  file: string,
  progress?: Progress,
): Promise<{ table: ReadingsTable | undefined; faults: readonly FileFault[] }> {
  const faults = faultList(file);
  let table: ReadingsTable | undefined;
  if (portsOf(path)) {
    const message = "is a sweep; name it by --bare or --covered, or under sweeps in a YAML file";
    faults.add("not_a_table", 1, message);
  } else {
    try {
      const status = statSync(path);
      if (status.isDirectory()) faults.add("not_a_file", 1, "is a folder, expected a file of readings");
      else if (!status.isFile()) faults.add("not_a_file", 1, "is no plain file, expected a file of readings");
      else table = await (await import("./readingsCsv.ts")).readCsv(path, file, faults, progress);
    } catch (error) {
      faults.add("unreadable", 1, unreadable(error));
    }
  }
  return { table, faults: faults.list() };
}

async function loadYaml(file: string, progress?: Progress): Promise<LoadedReadings> {
  const [{ readingsSchema }, { tableOfRows }] = await Promise.all([
    import("./readingsSchema.ts"),
    import("./readingsRows.ts"),
  ]);
  const { text, fault } = readText(file, "readings");
  if (text === undefined) return { faults: [{ ...fault, file }] };
  const { value, places, diagnostics } = await judgeYaml(text, {
    schema: readingsSchema,
    noun: "readings",
    starter: "it needs readings, a table or sweeps",
    resolve: async (raw) => ({ raw, faults: [] }),
  });
  if (value === undefined) return { faults: diagnostics.map((one) => ({ ...one, file })) };
  const { table: csv, readings: rows, sweeps: named = {}, ...settings } = value;
  const beside = (path: string) => fromFolder(dirname(file), path);
  const faults: FileFault[] = [];
  const read =
    csv !== undefined
      ? await loadTable(beside(csv), beside(csv), progress)
      : rows && tableOfRows(rows, file, places);
  faults.push(...(read?.faults ?? []));
  const { sweeps, faults: unread } = readSweeps(
    Object.fromEntries(Object.entries(named).map(([state, path]) => [state, beside(path)])),
  );
  faults.push(...unread);
  const names = Object.keys(named);
  if (names.length > 0 && (!names.includes("bare") || names.length < 2)) {
    const message = "sweeps of bare and of one cover or more are needed";
    faults.push({ code: "missing_sweep", message, file, ...places.ofKey(["sweeps"]) });
  }
  const known = ["bare", ...(read?.table?.covers ?? []), ...names];
  for (const state of Object.keys(settings.returnLossesDb)) {
    if (known.includes(state) || read?.faults.length) continue;
    const message = `no reading of ${shown(state)}, expected ${listed([...new Set(known)])}${didYouMean(state, known)}`;
    faults.push({ code: "unknown_state", message, file, ...places.ofKey(["return_losses", state]) });
  }
  if (read?.table && aboveReference(settings.coupler, read.table)) {
    const message =
      "a level reflected is not below that of open and short: nothing reflects more than they do";
    faults.push({ code: "bad_reference", message, file, ...places.ofKey(["coupler"]) });
  }
  if (faults.length > 0) return { faults };
  return { readings: { file, ...settings, table: read?.table, sweeps } };
}

/** Whether bare or a cover seems to reflect as much as the coupler's open and short. */
function aboveReference(coupler: Coupler | undefined, { series }: ReadingsTable): boolean {
  const reflected = series.find(({ figure }) => figure === "reflected");
  const references = [coupler?.openDb, coupler?.shortDb].filter((level) => level !== undefined);
  if (reflected === undefined || references.length === 0) return false;
  const referenceDb = references.reduce((sum, level) => sum + level, 0) / references.length;
  const bareDb = -reflected.bare.meanDb;
  return [0, ...reflected.running.covers.map(({ lossDb }) => lossDb)].some(
    (lossDb) => bareDb + lossDb >= referenceDb,
  );
}
