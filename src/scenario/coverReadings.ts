import type { Fault } from "./issues.ts";
import { isGroup, type Raw } from "./raw.ts";
import type { BenchReadings } from "./readings.ts";
import { didYouMean, listed, shown } from "./wording.ts";
import { fromFolder } from "./yamlFile.ts";

/**
 * A scenario as typed, the tables that its covers name (`measured: { readings: bench.csv }`) read and reduced in
 * place: what the schema then sees are figures.
 *
 * @param folder  where relative paths start
 */
export async function withReadings(raw: unknown, folder: string): Promise<{ raw: unknown; faults: Fault[] }> {
  const faults: Fault[] = [];
  if (!isGroup(raw) || !isGroup(raw["covers"])) return { raw, faults };
  const covers: Record<string, unknown> = { ...raw["covers"] };
  for (const [name, cover] of Object.entries(raw["covers"])) {
    const measured = isGroup(cover) ? cover["measured"] : undefined;
    if (!isGroup(cover) || !isGroup(measured) || typeof measured["readings"] !== "string") continue;
    const { readings: file, ...typed } = measured as Raw & { readings: string };
    const path = ["covers", name, "measured", "readings"];
    const twice = ["insertion_loss", "source"].filter((key) => Object.hasOwn(typed, key));
    if (twice.length > 0) {
      const message = `both readings and ${listed(twice)}, expected readings alone`;
      faults.push({ code: "bad_value", message, path });
    }
    const { figures, messages } = await figuresOf(fromFolder(folder, file), name);
    faults.push(...messages.map((message) => ({ code: "bad_readings", message, path })));
    // Where the table has faults any figure will do: the rest of the scenario is judged with it.
    covers[name] = { ...cover, measured: { ...figures, ...typed, source: file } };
  }
  return { raw: { ...raw, covers }, faults };
}

/** Figures of one cover as a scenario has them typed; its standard uncertainty follows each. */
async function figuresOf(path: string, cover: string): Promise<{ figures: Raw; messages: string[] }> {
  // Few scenarios name a table: what reads and reduces it is loaded for those alone.
  const { loadReadings } = await import("./readings.ts");
  const { readings, faults } = await loadReadings(path);
  const stand = { insertion_loss: "0 dB" };
  if (readings === undefined) {
    const messages = faults.map(({ file, line, message }) => `${file}:${line}: ${message}`);
    return { figures: stand, messages };
  }
  const loss = await measuredFigure(readings, "level", cover);
  if (loss === undefined) {
    const names = readings.table?.covers ?? [];
    const levels = readings.table?.series.some(({ figure }) => figure === "level");
    const message = !levels
      ? `${path} holds no levels of readings, which the insertion loss needs`
      : `${path} has no pairs of the state ${shown(cover)}, expected ${listed(names)}${didYouMean(cover, names)}`;
    return { figures: stand, messages: [message] };
  }
  const change = await measuredFigure(readings, "return_loss", cover);
  const typed = ({ valueDb, sigmaDb }: MeasuredFigure) =>
    `${valueDb.toFixed(6)} dB +/- ${sigmaDb.toFixed(6)} dB`;
  return {
    figures: {
      insertion_loss: typed(loss),
      ...(change && { return_loss_change: typed(change) }),
    },
    messages: [],
  };
}

interface MeasuredFigure {
  readonly valueDb: number;
  /** Standard uncertainty [dB]. */
  readonly sigmaDb: number;
}

/** Insertion loss or change of return loss of one cover by a table; undefined where the table does not tell. */
async function measuredFigure(
  { table, repeatabilityDb }: BenchReadings,
  figure: "level" | "return_loss",
  cover: string,
): Promise<MeasuredFigure | undefined> {
  const series = table?.series.find((one) => (one.figure === "level") === (figure === "level"));
  const found = series?.running.covers.find(({ state }) => state === cover);
  if (series === undefined || found === undefined) return undefined;
  const { expandedUncertainty } = await import("../readings/reduceSeries.ts");
  const { degreesOfFreedom } = series.running;
  const { combinedDb } = expandedUncertainty(found.typeADb, degreesOfFreedom, {
    repeatabilityDb,
    confidence: 0.95,
  });
  return { valueDb: found.lossDb, sigmaDb: combinedDb };
}
