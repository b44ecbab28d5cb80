import { carrier, type Margin, margins } from "../budget/margins.ts";
import { type BothWays, bothWays, fromSite, towards, withFarDish } from "../budget/towards.ts";
import type { Case, Mechanism, MechanismName, Verdict, Warning } from "../budget/types.ts";
import { geodesicPath, type Point, sphereDistanceKm } from "../path/geodesic.ts";
import { locatorToPoint, pointToLocator, squareCentre } from "../path/locator.ts";
import type { Station } from "../scenario/rosterRow.ts";
import { samePlace } from "../scenario/siteSchema.ts";
import { openTerrain } from "../scenario/terrain/openTerrain.ts";
import { LONGEST_PATH_KM } from "../scenario/terrain/sampleProfile.ts";
import type { Terrain } from "../scenario/terrain/types.ts";
import type { Site } from "../scenario/types.ts";
import { dishLike, patternOf, type RosterPlan, type RosterSite } from "./rosterPlan.ts";

/** A mode under one cover in one weather. */
export interface ModeRow {
  readonly mode: string;
  /** I am heard [dB]. */
  readonly outDb: number;
  /** I hear them [dB]; undefined where only the way out counts. */
  readonly backDb: number | undefined;
  /** Of the weaker way. */
  readonly marginDb: number;
  readonly marginSigmaDb: number;
  readonly verdict: Verdict;
}

export interface CoverRow {
  readonly cover: string;
  /** The most demanding first. */
  readonly modes: readonly ModeRow[];
  /** The most demanding that closes; where none does, that is thin; undefined where all fail. */
  readonly best: { readonly mode: string; readonly verdict: Verdict } | undefined;
}

export interface WeatherRow {
  readonly weather: string;
  /** What carries the path. */
  readonly way: MechanismName;
  /** By own cover, the scenario's first. */
  readonly covers: readonly CoverRow[];
}

/** A station seen from one site. */
export interface RosterRow {
  readonly line: number;
  readonly name: string;
  /** Index of the site among the plan's. */
  readonly site: number;
  readonly from: string;
  readonly locator: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly groundM: number;
  readonly distanceKm: number;
  /** Whole kilometres from square's centre to square's centre. */
  readonly scoreKm: number;
  readonly headingDeg: number;
  readonly magneticDeg: number | undefined;
  readonly backHeadingDeg: number;
  /** Largest error of the heading that the locators leave [deg]. */
  readonly headingErrorDeg: number;
  /** `none` where terrain was asked for and does not reach the station; undefined where none was. */
  readonly terrain: "whole" | "gaps" | "none" | undefined;
  readonly weathers: readonly WeatherRow[];
  /** Where a model is asked beyond its range, and other doubts about this path; each code once. */
  readonly doubts: readonly Doubt[];
}

export type Doubt = Pick<Warning, "code" | "message">;

/** A station that has no path from a site, and why. */
export interface NoPath {
  readonly message: string;
}

/** What was taken for things that a row does not say, or could not be had. */
export interface Assumed {
  readonly ground: boolean;
  readonly noTerrain: string | undefined;
}

export interface StationSeen {
  readonly rows: readonly RosterRow[];
  readonly noPaths: readonly NoPath[];
  readonly assumed: Assumed;
}

/** Dishes of stations kept ready; a roster with more different ones works the rest out anew. */
const MOST_DISHES = 200;

/** Characters of the squares between whose centres distances for scoring are counted: common practice, no source. */
const SCORING_CHARACTERS = 6;

/**
 * A function that works out one station after another, from every site of the plan. The link is prepared once.
 *
 * @throws Error on terrain that cannot be opened
 */
export async function rosterStudy(plan: RosterPlan): Promise<(station: Station) => Promise<StationSeen>> {
  const { scenario } = plan;
  const terrain = await terrainOf(plan);
  const sites = await Promise.all(
    plan.sites.map(async (one) => {
      return { ...one, site: await grounded(one, terrain), centre: scoringCentre(one.site) };
    }),
  );
  const ways = bothWays(patternOf(scenario, plan.weathers));
  const fitted = new Map<string, BothWays>();
  const waysFor = ({ dish }: Station): BothWays => {
    if (dish === undefined) return ways;
    const key = JSON.stringify(dish);
    const known = fitted.get(key);
    if (known) return known;
    if (fitted.size === MOST_DISHES) fitted.clear();
    const made = withFarDish(ways, "name" in dish ? scenario.dish[dish.name]! : dishLike(scenario, dish));
    fitted.set(key, made);
    return made;
  };

  return async (station) => {
    const rows: RosterRow[] = [];
    const noPaths: NoPath[] = [];
    let [assumesGround, noTerrain]: [boolean, string | undefined] = [false, undefined];
    for (const [i, near] of sites.entries()) {
      const there: Site = {
        ...station,
        groundM: station.groundM ?? 0,
        heightM: station.heightM ?? scenario.path.to.heightM,
      };
      const message = pathFault(near, there);
      if (message !== undefined) {
        noPaths.push({ message });
        continue;
      }
      const ground = terrain && (await terrain.profileBetween(near.site, station));
      const found = ground?.ok ? ground : undefined;
      if (ground && !ground.ok) noTerrain ??= `${ground.faults[0]!.file}: ${ground.faults[0]!.message}`;
      const underFoot = found?.profile.heightsM[found.profile.heightsM.length - 1];
      if (station.groundM === undefined && underFoot === undefined) assumesGround = true;
      const site = { ...there, groundM: station.groundM ?? underFoot ?? 0 };
      const both = towards(fromSite(waysFor(station), near.site), {
        site,
        profile: found?.profile,
        gaps: found?.gaps,
        powerDbm: station.powerDbm,
        noiseFigureDb: station.noiseFigureDb,
      });
      const covered = found && (found.gaps.length > 0 ? "gaps" : "whole");
      const ways = plan.weathers.map((weather) => carrierIn(plan, both, weather));
      rows.push({
        ...placed(station, site, near, i, both),
        terrain: terrain && (covered ?? "none"),
        weathers: ways.map((way, k) => inWeather(plan, both, plan.weathers[k]!, way, station.mode)),
        doubts: doubtsAbout(plan, both, ways),
      });
    }
    return { rows, noPaths, assumed: { ground: assumesGround, noTerrain } };
  };
}

/** Tiles or a GeoTIFF file; a profile of one path serves no roster. */
async function terrainOf({ scenario, folder }: RosterPlan): Promise<Terrain | undefined> {
  if (scenario.path.terrain === undefined) return undefined;
  const opened = await openTerrain(scenario.path.terrain, folder);
  if (!opened.ok) throw new Error(opened.faults.map(({ file, message }) => `${file}: ${message}`).join("\n"));
  return opened.elevation && opened;
}

async function grounded({ site }: RosterSite, terrain: Terrain | undefined): Promise<Site> {
  if (site.groundM !== undefined) return { ...site, groundM: site.groundM };
  // A broken tile is told of the stations that it keeps from having terrain.
  const heights = await terrain?.elevation
    ?.heightsAt([site.latitude], [site.longitude])
    .catch(() => undefined);
  const known = heights?.heightsM[0] ?? Number.NaN;
  return { ...site, groundM: Number.isNaN(known) ? 0 : known };
}

function pathFault(
  { name, site }: { readonly name: string; readonly site: Site },
  there: Site,
): string | undefined {
  if (samePlace(site, there)) return `the same place as ${name}: no path from there`;
  // The exact length is worked out with the path; the sphere's is good to 0.6 %.
  if (sphereDistanceKm(site, there) < 0.99 * LONGEST_PATH_KM) return undefined;
  const { distanceKm } = geodesicPath(site, there);
  if (distanceKm <= LONGEST_PATH_KM) return undefined;
  return (
    `a path of ${distanceKm.toFixed(0)} km from ${name}, expected at most ${LONGEST_PATH_KM} km ` +
    "(check the sign of the longitudes)"
  );
}

function placed(
  station: Station,
  site: Site,
  near: Omit<RosterSite, "site"> & { readonly site: Site; readonly centre: Point },
  index: number,
  { out: { path } }: BothWays,
) {
  const { line, name, latitude, longitude } = station;
  const { declinationDeg } = near;
  return {
    line,
    name,
    site: index,
    from: near.name,
    locator: station.locator ?? pointToLocator(station, SCORING_CHARACTERS),
    latitude,
    longitude,
    groundM: site.groundM,
    distanceKm: path.distanceKm,
    scoreKm: betweenCentres(near.centre, scoringCentre(station)),
    headingDeg: path.headingDeg,
    magneticDeg: declinationDeg === undefined ? undefined : (path.headingDeg - declinationDeg + 360) % 360,
    backHeadingDeg: path.backHeadingDeg,
    headingErrorDeg: path.headingErrorDeg,
  };
}

/**
 * Distance for scoring: between the centres of the squares of six characters, or of the shorter locator that a
 * station gave, to the nearest kilometre and at least 1.
 *
 * Source: common practice, no source; rules of contests differ
 */
export function scoreDistanceKm(
  a: Point & { readonly locator?: string | undefined },
  b: Point & { readonly locator?: string | undefined },
): number {
  return betweenCentres(scoringCentre(a), scoringCentre(b));
}

function scoringCentre(end: Point & { readonly locator?: string | undefined }): Point {
  const short = end.locator !== undefined && end.locator.length < SCORING_CHARACTERS;
  return short ? locatorToPoint(end.locator!) : squareCentre(end, SCORING_CHARACTERS);
}

function betweenCentres(from: Point, to: Point): number {
  const same = from.latitude === to.latitude && from.longitude === to.longitude;
  return same ? 1 : Math.max(1, Math.round(geodesicPath(from, to).distanceKm));
}

/** The own feed under a cover calls the partner's. */
function outward({ scenario }: RosterPlan, weather: string, cover: string): Omit<Case, "mode"> {
  const { transmitter: own, receiver: partner } = scenario;
  return {
    weather,
    transmitter: { feed: own.feed, cover },
    receiver: { feed: partner.feed, cover: partner.cover },
  };
}

function carrierIn(plan: RosterPlan, { out }: BothWays, weather: string): Mechanism {
  return carrier(out, outward(plan, weather, plan.scenario.transmitter.cover));
}

function doubtsAbout({ scenario }: RosterPlan, { out }: BothWays, ways: readonly Mechanism[]): Doubt[] {
  const found = new Map<string, Doubt>();
  for (const warnings of [
    out.warnings,
    out.ends.transmitter[scenario.transmitter.feed]!.warnings,
    out.ends.receiver[scenario.receiver.feed]!.warnings,
    ...Object.values(out.weathers).map((weather) => weather.warnings),
    ...ways.map((way) => way.warnings),
  ]) {
    for (const { code, message } of warnings) if (!found.has(code)) found.set(code, { code, message });
  }
  return [...found.values()];
}

function inWeather(
  plan: RosterPlan,
  { out, back }: BothWays,
  weather: string,
  way: Mechanism,
  only: string | undefined,
): WeatherRow {
  const modes = only === undefined ? plan.modes : [only];
  return {
    weather,
    way: way.name,
    covers: plan.covers.map((cover) => {
      const chosen = outward(plan, weather, cover);
      const heard = margins(out, chosen, modes, way);
      const homeward = { weather, transmitter: chosen.receiver, receiver: chosen.transmitter };
      const hears = plan.bothWays ? margins(back, homeward, modes, way) : undefined;
      const rows = modes.map((mode, i) => modeRow(mode, heard[i]!, hears?.[i]));
      return { cover, modes: rows, best: bestOf(rows) };
    }),
  };
}

const worseFirst: readonly Verdict[] = ["fails", "thin", "closes"];

function modeRow(mode: string, out: Margin, back: Margin | undefined): ModeRow {
  const weaker = back !== undefined && back.marginDb < out.marginDb ? back : out;
  const verdicts = [out.verdict, back?.verdict ?? out.verdict];
  return {
    mode,
    outDb: out.marginDb,
    backDb: back?.marginDb,
    marginDb: weaker.marginDb,
    marginSigmaDb: weaker.marginSigmaDb,
    verdict: worseFirst.find((verdict) => verdicts.includes(verdict))!,
  };
}

function bestOf(rows: readonly ModeRow[]): CoverRow["best"] {
  const { mode, verdict } =
    rows.find((row) => row.verdict === "closes") ?? rows.find((row) => row.verdict === "thin") ?? {};
  return mode === undefined || verdict === undefined ? undefined : { mode, verdict };
}
