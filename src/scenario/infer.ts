import type { Layer } from "../cover/layeredSheet.ts";
import { abs } from "../numeric/complex.ts";
import { LOSS_STANDARD_DB, RETURN_LOSS_STANDARD_DB, sheetOf } from "../readings/sheetOnFeed.ts";
import type { Places } from "./positions.ts";
import type { FileFault } from "./readingsFaults.ts";
import type { Uncertain } from "./types.ts";
import { judgeYaml, readText } from "./yamlFile.ts";

/** A known sheet before the feed, with what was read. */
export interface KnownSheetReading {
  readonly name: string;
  readonly layer: Layer;
  readonly permittivityStandard: number;
  readonly thicknessStandardMm: number;
  readonly gapMm: number;
  readonly coveredReturnLossDb?: number | undefined;
  readonly insertionLossDb?: number | undefined;
}

/** A sheet whose material is to be found. */
export interface UnknownSheetReading {
  readonly name: string;
  readonly thicknessMm: number;
  readonly thicknessStandardMm: number;
  readonly gapMm: number;
  readonly coveredReturnLossDb: number;
  readonly insertionLossDb?: number | undefined;
  /** Taken as given where no insertion loss was read. */
  readonly lossTangent?: number | undefined;
  readonly permittivityUpTo: number;
}

/** Readings from which a feed or a sheet is to be inferred. */
export interface InferReadings {
  readonly file: string;
  readonly title?: string | undefined;
  readonly frequencyGHz: number;
  readonly feedReturnLossDb?: number | undefined;
  readonly feedPhaseDeg?: Uncertain | undefined;
  readonly sheets: readonly KnownSheetReading[];
  readonly unknown: readonly UnknownSheetReading[];
  readonly returnLossStandardDb: number;
  readonly lossStandardDb: number;
}

export type LoadedInferReadings =
  | { readonly readings: InferReadings; readonly faults?: undefined }
  | { readonly readings?: undefined; readonly faults: readonly FileFault[] };

/** A sheet that reflects less tells nothing of the feed. */
const LEAST_REFLECTION = 1e-3;

/** Reads a YAML file of `oilskin infer`; it never throws for a bad file. */
export async function loadInferReadings(file: string): Promise<LoadedInferReadings> {
  const { text, fault } = readText(file, "infer");
  if (text === undefined) return { faults: [{ ...fault, file }] };
  const { inferSchema } = await import("./inferSchema.ts");
  const { value, places, diagnostics } = await judgeYaml(text, {
    schema: inferSchema,
    noun: "infer",
    starter: "it needs frequency, feed, sheets or unknown",
    resolve: async (raw) => ({ raw, faults: [] }),
  });
  if (value === undefined) return { faults: diagnostics.map((one) => ({ ...one, file })) };
  const withNames = <T>(group: Readonly<Record<string, T>> = {}) =>
    Object.entries(group).map(([name, one]) => ({ name, ...one }));
  const readings: InferReadings = {
    file,
    title: value.title,
    frequencyGHz: value.frequency,
    feedReturnLossDb: value.feed?.return_loss,
    feedPhaseDeg: value.feed?.phase,
    sheets: withNames(value.sheets),
    unknown: withNames(value.unknown),
    returnLossStandardDb: value.return_loss_uncertainty ?? RETURN_LOSS_STANDARD_DB,
    lossStandardDb: value.loss_uncertainty ?? LOSS_STANDARD_DB,
  };
  const faults = shortfalls(readings, places).map((one) => ({ ...one, file }));
  return faults.length > 0 ? { faults } : { readings };
}

/** What the readings lack for what is asked of them. */
function shortfalls(readings: InferReadings, places: Places): Omit<FileFault, "file">[] {
  const { frequencyGHz, feedReturnLossDb, sheets, unknown } = readings;
  const faults: Omit<FileFault, "file">[] = [];
  const fault = (path: readonly string[], message: string) => {
    faults.push({ code: "missing_readings", message, ...places.ofValue(path) });
  };
  if (sheets.length + unknown.length === 0) fault(["sheets"], "no sheet in the file");
  const figures = sheets.flatMap(({ coveredReturnLossDb, insertionLossDb }) =>
    [coveredReturnLossDb, insertionLossDb].filter((figure) => figure !== undefined),
  );
  if (sheets.length > 0 && figures.length + (feedReturnLossDb === undefined ? 0 : 1) < 2) {
    fault(
      ["sheets"],
      "a feed has magnitude and phase: two readings or more are needed, the bare return loss included",
    );
  }
  if (unknown.length > 0 && feedReturnLossDb === undefined) {
    fault(["unknown"], "missing return_loss of the feed, against which an unknown sheet is read");
  }
  for (const { name, layer } of sheets) {
    if (abs(sheetOf(layer, frequencyGHz).reflection) >= LEAST_REFLECTION) continue;
    fault(
      ["sheets", name],
      `this sheet reflects next to nothing at ${frequencyGHz} GHz and tells nothing of the feed`,
    );
  }
  return faults;
}
