import { evaluate } from "../budget/evaluate.ts";
import { type GroundPath, groundPath, sightAt } from "../budget/groundPath.ts";
import type { PathSettings } from "../budget/pathSettings.ts";
import type { Link, Mechanism, PathGeometry, Verdict, Warning } from "../budget/types.ts";
import { declination } from "../path/declination.ts";
import { earthBulge } from "../path/horizon.ts";
import { type Obstacle, type Passing, passing, type Raise, raiseToClear } from "../path/obstacles.ts";
import { pathLengthKm } from "../path/profile.ts";
import type { Site } from "../scenario/types.ts";
import { type ClearDay, clearDays } from "./clearDays.ts";

const DEG_PER_MRAD = 180 / Math.PI / 1000;

/** The other end as one end sees it. */
export interface EndView {
  readonly name: string | undefined;
  readonly antennaAmslM: number;
  readonly trueDeg: number;
  /** Undefined where no magnetic model covers the date. */
  readonly magneticDeg: number | undefined;
  readonly declinationDeg: number | undefined;
  readonly elevationDeg: number;
  /** Elevation and distance of the edge that hides the other end; undefined where it is in sight. */
  readonly horizon: { readonly elevationDeg: number; readonly distanceKm: number } | undefined;
}

/** An obstacle on the usual day, and on the day when rays bend least. */
export interface ObstacleRow extends Obstacle {
  readonly low: Pick<Passing, "clearanceM" | "zones">;
}

/** One way for the signal, and what it leaves. */
export interface WayRow extends Omit<Mechanism, "warnings"> {
  readonly marginDb: number;
  readonly carries: boolean;
}

export interface WeatherWays {
  readonly weather: string;
  readonly verdict: Verdict;
  /** Least loss first. */
  readonly ways: readonly WayRow[];
}

/** A point of the profile as a drawing needs it. */
export interface ProfilePoint {
  readonly distanceKm: number;
  readonly groundM: number;
  readonly coverM: number;
  /** Rise of the Earth over the chord between the ends, usual bending [m]. */
  readonly bulgeM: number;
  /** Straight line between the antennas, over the chord [m]. */
  readonly rayM: number;
  readonly fresnelM: number;
  readonly clearanceM: number;
  readonly clearanceLowM: number;
}

/** A path looked at from all sides. */
export interface PathStudy {
  readonly title: string;
  readonly frequencyGHz: number;
  readonly mode: string;
  readonly path: PathGeometry;
  /** The day for which magnetic headings hold, and the model behind them. */
  readonly date: string;
  readonly magneticModel: string | undefined;
  readonly settings: PathSettings;
  readonly ground: "terrain" | "smooth Earth";
  readonly transmitter: EndView;
  readonly receiver: EndView;
  readonly inSight: boolean;
  readonly obstacles: readonly ObstacleRow[];
  /** How far antennas must go up to clear 0.6 of the first Fresnel zone, at median and low k. */
  readonly raise: { readonly median: Raise; readonly low: Raise };
  readonly weathers: readonly WeatherWays[];
  /** Weather whose budget the margins of the days start from. */
  readonly dayWeather: string;
  readonly days: readonly ClearDay[];
  readonly points: readonly ProfilePoint[];
  readonly warnings: readonly Warning[];
}

/**
 * Geometry, obstacles, mechanisms, the normal day and the lift of a link's path.
 *
 * @param names  weathers of the link
 * @param date   for which magnetic headings are wanted
 */
export async function pathStudy(
  link: Link,
  mode: string,
  names: readonly string[],
  date: Date,
): Promise<PathStudy> {
  const { scenario, path } = link;
  const ground = link.ground ?? groundPath(scenario, path);
  const lowSight = sightAt(ground, ground.settings.kLow);
  const budgets = names.map((weather) =>
    evaluate(link, { weather, mode, transmitter: scenario.transmitter, receiver: scenario.receiver }),
  );
  const driest = budgets.reduce((a, b) =>
    wetness(link, b.case.weather) < wetness(link, a.case.weather) ? b : a,
  );
  const { days, warnings } = clearDays(link, ground, driest);
  const north = await magneticNorth(path, ground, date);
  const horizon = (angleMrad: number, distanceKm: number) =>
    ground.analysis.pathType === "los" ? undefined : { elevationDeg: angleMrad * DEG_PER_MRAD, distanceKm };
  const { analysis, sight } = ground;
  return {
    title: scenario.title,
    frequencyGHz: scenario.frequencyGHz,
    mode,
    path,
    date: date.toISOString().slice(0, 10),
    magneticModel: north.model,
    settings: ground.settings,
    ground: ground.fromTerrain ? "terrain" : "smooth Earth",
    transmitter: {
      ...compass(path.from, path.headingDeg, north.fromDeg),
      antennaAmslM: sight.txHeightAmslM,
      elevationDeg: path.elevationDeg,
      horizon: horizon(analysis.txHorizonMrad, analysis.txHorizonKm),
    },
    receiver: {
      ...compass(path.to, path.backHeadingDeg, north.toDeg),
      antennaAmslM: sight.rxHeightAmslM,
      elevationDeg: path.backElevationDeg,
      horizon: horizon(analysis.rxHorizonMrad, analysis.rxHorizonKm),
    },
    inSight: ground.obstacles.every(({ clearanceM }) => clearanceM >= 0),
    obstacles: ground.obstacles.map((one) => {
      const { clearanceM, zones } = passing(lowSight, one.index);
      return { ...one, low: { clearanceM, zones } };
    }),
    raise: { median: raiseToClear(sight), low: raiseToClear(lowSight) },
    weathers: budgets.map(({ case: { weather }, verdict, marginDb, mechanisms }) => ({
      weather,
      verdict,
      ways: mechanisms.map((way, i) => ({
        ...way,
        marginDb: marginDb + mechanisms[0]!.excessDb - way.excessDb,
        carries: i === 0,
      })),
    })),
    dayWeather: driest.case.weather,
    days,
    points: profilePoints(ground),
    warnings: onceEach([...budgets.flatMap((budget) => budget.warnings), ...warnings, ...north.warnings]),
  };
}

/** Rain and fog of a weather on the path [dB]. */
function wetness({ weathers }: Link, weather: string): number {
  return weathers[weather]!.hydrometeorLossDb;
}

function compass({ name }: Site, trueDeg: number, declinationDeg: number | undefined) {
  const magneticDeg = declinationDeg === undefined ? undefined : (trueDeg - declinationDeg + 360) % 360;
  return { name, trueDeg, declinationDeg, magneticDeg };
}

/** Declination at both ends; a warning in its place where no model covers the date. */
async function magneticNorth({ from, to }: PathGeometry, { sight }: GroundPath, date: Date) {
  try {
    const near = await declination({ ...from, heightKm: sight.txHeightAmslM / 1000, date });
    const far = await declination({ ...to, heightKm: sight.rxHeightAmslM / 1000, date });
    const { model } = near;
    return { model, fromDeg: near.declinationDeg, toDeg: far.declinationDeg, warnings: [] };
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    const message = `${error.message}; headings are true ones alone`;
    const warnings: Warning[] = [{ code: "no_magnetic_model", message, where: "path" }];
    return { model: undefined, fromDeg: undefined, toDeg: undefined, warnings };
  }
}

function profilePoints(ground: GroundPath): ProfilePoint[] {
  const { profile, sight, settings } = ground;
  const lowSight = sightAt(ground, settings.kLow);
  const lengthKm = pathLengthKm(profile);
  return Array.from(profile.distancesKm, (distanceKm, i) => {
    const { clearanceM, fresnelM, coverM } = passing(sight, i);
    const { effectiveRadiusKm } = sight;
    return {
      distanceKm,
      groundM: profile.heightsM[i]!,
      coverM,
      bulgeM: earthBulge({ d1Km: distanceKm, d2Km: lengthKm - distanceKm, effectiveRadiusKm }).bulgeM,
      rayM: sight.txHeightAmslM + ((sight.rxHeightAmslM - sight.txHeightAmslM) * distanceKm) / lengthKm,
      fresnelM,
      clearanceM,
      clearanceLowM: passing(lowSight, i).clearanceM,
    };
  });
}

/** Weathers share most warnings: each is told once. */
function onceEach(warnings: readonly Warning[]): Warning[] {
  return [...new Map(warnings.map((one) => [`${one.code} ${one.where} ${one.message}`, one])).values()];
}
