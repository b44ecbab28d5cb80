import { Command, Option } from "commander";
import { type Scenario, thickness, thicknessCsv, thicknessJson, thicknessText } from "../index.ts";
import { knownName } from "./knownName.ts";
import { bandOf, wholeNumber, within } from "./optionQuantity.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print, UserError } from "./terminal.ts";

interface ThicknessOptions {
  readonly cover: string;
  readonly layer?: string;
  readonly end?: "transmitter" | "receiver";
  readonly from?: string;
  readonly to?: string;
  readonly points: string;
  readonly cost: string;
  readonly band?: string;
  readonly stock?: string;
  readonly json?: true;
  readonly csv?: true;
}

const MOST_POINTS = 20_000;
/** Thickest layer that a scenario may have [mm]. */
const THICKEST_MM = 1000;

export const thicknessCommand = new Command("thickness")
  .description("how thick should a cover be: cost by thickness, thin limit, half wave, stock sizes, gaps")
  .argument("<file>", "scenario file")
  .requiredOption("--cover <name>", "cover of the scenario, one layer of which varies")
  .option("--layer <number>", "the layer that varies, counted from the feed (default: the thickest)")
  .addOption(
    new Option("--end <end>", "whose feed stands behind it (default: the end that has this cover)").choices([
      "transmitter",
      "receiver",
    ]),
  )
  .option("--from <thickness>", "thinnest, such as 0 or 1mm (default: 0)")
  .option("--to <thickness>", "thickest, such as 10mm or 1/2in (default: past the first half wave)")
  .option("--points <number>", `thicknesses from thinnest to thickest, 2 to ${MOST_POINTS}`, "2000")
  .option("--cost <loss>", "what the cover may cost", "0.1dB")
  .option("--band <width>", "width of the band, such as 200MHz (default: 2 % of the frequency)")
  .option("--stock <sizes>", 'sizes that you can get, such as "1 mm, 1/8 in" (default: the usual ones)')
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "cost and return loss by thickness, for plotting")
  .action(async (file: string, options: ThicknessOptions) => {
    const scenario = await scenarioIn(file);
    const { cover, end, from, to, points, cost, band, stock } = options;
    const layer = layerOf(scenario, options);
    const fromMm = from === undefined ? undefined : thicknessOf("--from", from);
    const toMm = to === undefined ? undefined : thicknessOf("--to", to);
    if (toMm !== undefined && toMm <= (fromMm ?? 0)) {
      throw new UserError(`--to ${to} is not thicker than --from ${from ?? 0}`);
    }
    const study = thickness(scenario, {
      cover,
      layer,
      end,
      fromMm,
      toMm,
      points: wholeNumber("--points", points, 2, MOST_POINTS),
      costLimitDb: within("--cost", cost, "levelDb", [0.001, 20], "0.001 to 20 dB"),
      bandGHz: band === undefined ? undefined : bandOf(band, scenario),
      stock: stock?.split(",").map((size) => ({
        label: size.trim(),
        thicknessMm: thicknessOf("--stock", size.trim()),
      })),
    });
    if (options.json) print(thicknessJson(study));
    else if (options.csv) print(thicknessCsv(study));
    else print(thicknessText(study, paintFor(process.stdout)));
  });

/** The layer asked for, as an index; undefined where none was. */
function layerOf({ covers }: Scenario, { cover, layer }: ThicknessOptions): number | undefined {
  knownName("cover", cover, Object.keys(covers));
  const { layers, measured } = covers[cover]!;
  if (layers.length === 0) {
    const why = measured === undefined ? "is bare" : "is given by readings alone";
    throw new UserError(`cover "${cover}" ${why}: there is no layer to vary; give it layers in the scenario`);
  }
  return layer === undefined ? undefined : wholeNumber("--layer", layer, 1, layers.length) - 1;
}

/** A thickness with its unit; nothing is 0 in any. */
function thicknessOf(option: string, text: string): number {
  if (text === "0") return 0;
  return within(option, text, "thicknessMm", [0, THICKEST_MM], `0 to ${THICKEST_MM} mm`);
}
