import { csvFormatRow } from "d3-dsv";
import type { RosterRow } from "../study/roster.ts";
import type { RosterPlan } from "../study/rosterPlan.ts";

const perWeather = [
  "weather",
  "way",
  "out_db",
  "back_db",
  "margin_db",
  "margin_sigma_db",
  "verdict",
  "best_mode",
];

/** The header of a roster's flat table. */
export const rosterCsvHead = `${csvFormatRow([
  ...["from", "name", "row", "locator", "latitude", "longitude", "ground_m", "distance_km", "score_km"],
  ...[
    "heading_true_deg",
    "heading_magnetic_deg",
    "heading_error_deg",
    "back_heading_true_deg",
    "terrain",
    "doubts",
  ],
  ...["cover", "mode"],
  ...["dry", "wet"].flatMap((when) => perWeather.map((column) => `${when}_${column}`)),
])}\n`;

/** A station as lines of the flat table: one for each own cover and mode, dry and wet beside each other. */
export function rosterCsvLines(row: RosterRow): string {
  const station = csvFormatRow([
    ...[row.from, row.name, String(row.line), row.locator],
    ...[digits(row.latitude, 6), digits(row.longitude, 6), digits(row.groundM, 1), digits(row.distanceKm, 3)],
    ...[
      String(row.scoreKm),
      digits(row.headingDeg, 2),
      digits(row.magneticDeg, 2),
      digits(row.headingErrorDeg, 2),
    ],
    ...[digits(row.backHeadingDeg, 2), row.terrain ?? "", codesOf(row).join(" ")],
  ]);
  const first = row.weathers[0]!;
  let lines = "";
  for (const [i, { cover, modes }] of first.covers.entries()) {
    for (const [j, { mode }] of modes.entries()) {
      const figures = [0, 1].map((k) => weatherCells(row, k, i, j)).join(",");
      lines += `${station},${csvFormatRow([cover, mode])},${figures}\n`;
    }
  }
  return lines;
}

/** Of a scenario without rain there is no wet half. */
function weatherCells({ weathers }: RosterRow, weather: number, cover: number, mode: number): string {
  const found = weathers[weather];
  if (found === undefined) return ",".repeat(perWeather.length - 1);
  const { modes, best } = found.covers[cover]!;
  const { outDb, backDb, marginDb, marginSigmaDb, verdict } = modes[mode]!;
  const figures = [outDb, backDb, marginDb, marginSigmaDb].map((db) => digits(db, 2));
  return [
    csvFormatRow([found.weather]),
    found.way,
    ...figures,
    verdict,
    csvFormatRow([best?.mode ?? ""]),
  ].join(",");
}

/** A station as one line of JSON. */
export function rosterJsonLine(row: RosterRow): string {
  const { latitude, longitude, weathers, doubts: _, site: __, line, ...station } = row;
  const figures = Object.fromEntries(
    Object.entries(station).map(([key, value]) => [
      key,
      typeof value === "number" ? rounded(value, 3) : value,
    ]),
  );
  const shown = {
    ...{ from: row.from, name: row.name, row: line, locator: row.locator },
    ...{ latitude: rounded(latitude, 6), longitude: rounded(longitude, 6) },
    ...figures,
    doubts: codesOf(row),
    weathers: weathers.map(({ weather, way, covers }) => ({
      weather,
      way,
      covers: covers.map(({ cover, modes, best }) => ({
        cover,
        best: best ?? null,
        modes: modes.map((one) => ({
          mode: one.mode,
          outDb: rounded(one.outDb, 2),
          ...(one.backDb !== undefined && { backDb: rounded(one.backDb, 2) }),
          marginDb: rounded(one.marginDb, 2),
          marginSigmaDb: rounded(one.marginSigmaDb, 2),
          verdict: one.verdict,
        })),
      })),
    })),
  };
  return `${JSON.stringify(shown)}\n`;
}

function codesOf({ doubts }: RosterRow): string[] {
  return doubts.map(({ code }) => code);
}

function rounded(value: number, decimals: number): number {
  const scale = 10 ** decimals;
  return Math.round(value * scale) / scale + 0; // -0 is 0
}

function digits(value: number | undefined, decimals: number): string {
  return value === undefined ? "" : String(rounded(value, decimals));
}

/** What a table line needs of a station: little, for a table holds thousands. */
export interface RosterLine {
  readonly line: number;
  readonly name: string;
  readonly site: number;
  readonly headingDeg: number;
  readonly magneticDeg: number | undefined;
  readonly headingErrorDeg: number;
  readonly distanceKm: number;
  readonly scoreKm: number;
  readonly terrain: RosterRow["terrain"];
  readonly doubts: RosterRow["doubts"];
  /** The mode of the margins: the most demanding of the station. */
  readonly mode: string;
  /** Margin under the own cover in the last weather, in that mode [dB]. */
  readonly rankDb: number;
  readonly weathers: readonly {
    readonly way: RosterRow["weathers"][number]["way"];
    readonly marginDb: number;
    /** Bare margin less that under the own cover [dB]. */
    readonly costDb: number;
    /** `out` where I am heard worse than I hear, `back` the other way round; undefined where both are alike. */
    readonly weaker: "out" | "back" | undefined;
    readonly best: RosterRow["weathers"][number]["covers"][number]["best"];
    readonly bareBest: RosterRow["weathers"][number]["covers"][number]["best"];
  }[];
}

/** Ways that differ by less than this are alike [dB]: a table shows no more. */
const ALIKE_DB = 0.05;

/** A station as a line of the table, and as its order needs it. */
export function rosterLine(row: RosterRow, { covers }: Pick<RosterPlan, "covers">): RosterLine {
  const bare = covers.indexOf("bare");
  const weathers = row.weathers.map(({ way, covers: under }) => {
    const own = under[0]!;
    const open = under[bare] ?? own;
    const { outDb, backDb = outDb, marginDb } = own.modes[0]!;
    const alike = Math.abs(outDb - backDb) < ALIKE_DB;
    return {
      way,
      marginDb,
      costDb: open.modes[0]!.marginDb - marginDb,
      weaker: alike ? undefined : outDb < backDb ? ("out" as const) : ("back" as const),
      best: own.best,
      bareBest: open.best,
    };
  });
  const { line, name, site, headingDeg, magneticDeg, headingErrorDeg, distanceKm, scoreKm, terrain, doubts } =
    row;
  const where = { headingDeg, magneticDeg, headingErrorDeg, distanceKm, scoreKm, terrain, doubts };
  const { mode } = row.weathers[0]!.covers[0]!.modes[0]!;
  return { line, name, site, ...where, mode, rankDb: weathers[weathers.length - 1]!.marginDb, weathers };
}
