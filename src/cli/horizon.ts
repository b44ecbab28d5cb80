import { dirname } from "node:path";
import { Command, Option } from "commander";
import {
  describeRefusal,
  type ElevationSource,
  type HorizonPlace,
  horizonCsv,
  horizonJson,
  horizonRound,
  horizonText,
  openTerrain,
  readCoordinate,
  type Scenario,
  TerrainError,
} from "../index.ts";
import { knownName } from "./knownName.ts";
import { within } from "./optionQuantity.ts";
import { progressBar } from "./progress.ts";
import { scenarioIn } from "./scenarioFile.ts";
import { paintFor, print, UserError } from "./terminal.ts";

interface HorizonOptions {
  readonly from: string;
  readonly at?: string;
  readonly height?: string;
  readonly k: string;
  readonly reach: string;
  readonly azimuths: string;
  readonly json?: true;
  readonly csv?: true;
}

export const horizonCommand = new Command("horizon")
  .description("show the horizon round a site from elevation tiles: how high, how far, by azimuth")
  .argument("<file>", "scenario file whose path names elevation tiles as terrain")
  .option("--from <site>", "transmitter, receiver or the name of a site", "transmitter")
  .addOption(
    new Option("--at <place>", 'another place in its stead, such as "53.2 N, 3.1 W"').conflicts("from"),
  )
  .option("--height <height>", "antenna above ground (default: that of the site; 2 m with --at)")
  .option("--k <factor>", "effective Earth radius over the true one", "4/3")
  .option("--reach <distance>", "how far to look", "100 km")
  .option("--azimuths <number>", "lines round the circle", "720")
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "a flat table, a row for each azimuth")
  .action(async (file: string, options: HorizonOptions) => {
    const scenario = await scenarioIn(file);
    const site = options.at === undefined ? siteOf(scenario, options.from) : placeOf(options.at);
    const heightM =
      options.height === undefined
        ? site.heightM
        : within("--height", options.height, "lengthM", [0, 1000], "0 to 1000 m");
    const kFactor = within("--k", options.k, "ratio", [0.2, 10], "0.2 to 10");
    const reachKm = within("--reach", options.reach, "distanceKm", [1, 500], "1 to 500 km");
    const azimuths = within("--azimuths", options.azimuths, "ratio", [4, 3600], "4 to 3600");
    if (!Number.isInteger(azimuths))
      throw new UserError(`--azimuths: read "${options.azimuths}", expected a whole number`);
    const source = await elevationIn(scenario, dirname(file));
    const horizon = await horizonRound({
      source,
      at: { ...site, heightM },
      kFactor,
      azimuths,
      reachKm,
      towards: options.at === undefined ? otherEnd(scenario, site) : undefined,
      progress: progressBar(process.stderr, "horizon"),
    }).catch((error: unknown) => {
      throw error instanceof TerrainError ? new UserError(error.message) : error;
    });
    if (horizon === undefined) throw new UserError(`${source.name} holds no height at ${site.name}`);
    if (options.json) print(horizonJson(horizon));
    else if (options.csv) print(horizonCsv(horizon));
    else print(horizonText(horizon, paintFor(process.stdout)));
  });

/** A site of the scenario by its end of the path or its name. */
function siteOf({ path }: Scenario, asked: string): HorizonPlace {
  const ends = { transmitter: path.from, receiver: path.to };
  const names = Object.entries(ends).flatMap(([end, { name }]) => (name === undefined ? [end] : [end, name]));
  knownName("site", asked, names);
  const [end, site] = Object.entries(ends).find(([end, { name }]) => asked === end || asked === name)!;
  return { ...site, name: site.name ?? end };
}

/** The site at the far end of the path. */
function otherEnd({ path: { from, to } }: Scenario, { latitude, longitude }: HorizonPlace) {
  const atFrom = from.latitude === latitude && from.longitude === longitude;
  return atFrom
    ? { ...to, name: to.name ?? "the receiver" }
    : { ...from, name: from.name ?? "the transmitter" };
}

/** Latitude and longitude, with a comma between. */
function placeOf(text: string): HorizonPlace {
  const parts = text.split(",");
  if (parts.length !== 2)
    throw new UserError(`--at: read "${text}", expected a place such as "53.2 N, 3.1 W"`);
  const [latitude, longitude] = (["latitude", "longitude"] as const).map((axis, i) => {
    const reading = readCoordinate(parts[i]!, axis);
    if (!reading.ok) throw new UserError(`--at: ${describeRefusal(reading)}`);
    return reading.degrees;
  }) as [number, number];
  return { latitude, longitude, name: text.trim(), heightM: 2 };
}

async function elevationIn({ path }: Scenario, folder: string): Promise<ElevationSource> {
  const expected = "expected path.terrain to name a folder of elevation tiles or a GeoTIFF file";
  if (path.terrain === undefined) throw new UserError(`the scenario names no terrain; ${expected}`);
  const opened = await openTerrain(path.terrain, folder);
  if (!opened.ok)
    throw new UserError(opened.faults.map(({ file, message }) => `${file}: ${message}`).join("\n"));
  if (opened.elevation) return opened.elevation;
  throw new UserError(
    `${path.terrain} is a profile of one path, which shows no horizon all round; ${expected}`,
  );
}
