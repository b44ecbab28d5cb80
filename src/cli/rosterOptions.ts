import { dirname } from "node:path";
import {
  declination,
  driest,
  isIdleRow,
  mostDemandingFirst,
  openRoster,
  openTerrain,
  ownCoverFirst,
  type RosterPlan,
  type RosterSite,
  rosterLines,
  rowReader,
  type Scenario,
  type SortKey,
  wettest,
} from "../index.ts";
import { faultsError } from "./benchFile.ts";
import { day } from "./day.ts";
import { knownName } from "./knownName.ts";
import { namesAsked } from "./namesAsked.ts";
import { quantityOption } from "./optionQuantity.ts";
import { UserError } from "./terminal.ts";

export interface RosterOptions {
  readonly sites?: string;
  readonly sort?: SortKey;
  readonly top?: string;
  readonly closes?: "dry" | "wet";
  readonly within?: string;
  readonly beyond?: string;
  readonly towards?: string;
  readonly mode?: readonly string[];
  readonly cover?: readonly string[];
  readonly dry?: string;
  readonly wet?: string;
  readonly oneWay?: true;
  readonly date?: string;
  readonly csv?: true;
  readonly jsonl?: true;
  readonly output?: string;
  readonly force?: true;
  readonly workers?: string;
}

/** Sites that an operator may rove between. */
const MOST_SITES = 100;

/** What the command line asks of every station, and what has to be said about it. */
export async function planOf(
  file: string,
  scenario: Scenario,
  options: RosterOptions,
): Promise<{ readonly plan: RosterPlan; readonly notes: readonly string[]; readonly date: Date }> {
  const notes: string[] = [];
  const date = day(options.date);
  const folder = dirname(file);
  for (const name of [options.dry, options.wet]) {
    if (name !== undefined) knownName("weather", name, Object.keys(scenario.weather));
  }
  const modes =
    options.mode === undefined
      ? scenario.receiver.modes
      : namesAsked("mode", options.mode, Object.keys(scenario.modes));
  const coversAsked = namesAsked("cover", options.cover, Object.keys(scenario.covers));
  const dry = options.dry ?? driest(scenario);
  const wet = options.wet ?? wettest(scenario);
  if (wet === undefined) notes.push("the scenario has no weather with rain: there is no wet half");
  if (options.closes === "wet" && (wet === undefined || wet === dry)) {
    throw new UserError("--closes wet: there is no wet weather beside the dry one; --wet names it");
  }
  const withinKm = quantityOption("--within", options.within, "distanceKm", [0, 20_000], "km");
  const beyondKm = quantityOption("--beyond", options.beyond, "distanceKm", [0, 20_000], "km");
  if (withinKm !== undefined && beyondKm !== undefined && withinKm < beyondKm) {
    throw new UserError(`--within ${options.within} and --beyond ${options.beyond} leave no distance`);
  }
  const own = options.cover && coversAsked[0];
  const pattern = await withTerrainOf(scenario, folder, notes);
  const asked =
    own === undefined ? pattern : { ...pattern, transmitter: { ...pattern.transmitter, cover: own } };
  const covers = ownCoverFirst(asked).filter((name) => name === "bare" || coversAsked.includes(name));
  if (scenario.path.foliageM)
    notes.push("trees of the scenario's path are left out: they stand on that path");
  const sites = await sitesOf(scenario, options.sites, date, notes);
  return {
    plan: {
      scenario: asked,
      folder,
      sites,
      weathers: wet === undefined || wet === dry ? [dry] : [dry, wet],
      modes: mostDemandingFirst(scenario, modes),
      covers,
      bothWays: options.oneWay === undefined,
      filter: {
        closesIn: options.closes === undefined ? undefined : options.closes === "dry" ? 0 : 1,
        withinKm,
        beyondKm,
        towardsDeg: sectorOf(options.towards),
      },
    },
    notes,
    date,
  };
}

/** Terrain serves a roster where it knows heights anywhere. */
async function withTerrainOf(scenario: Scenario, folder: string, notes: string[]): Promise<Scenario> {
  const { terrain } = scenario.path;
  const { profile: _, gaps: __, ...path } = scenario.path;
  if (terrain === undefined) return { ...scenario, path };
  const opened = await openTerrain(terrain, folder);
  if (!opened.ok || opened.elevation) return { ...scenario, path };
  notes.push(
    `${terrain} is the profile of one path and serves no roster; without terrain a smooth Earth is taken ` +
      "(path.terrain may name a folder of elevation tiles)",
  );
  return { ...scenario, path: { ...path, terrain: undefined } };
}

/** The transmitter's site, and those of a list. */
async function sitesOf(
  { path: { from, to } }: Scenario,
  file: string | undefined,
  date: Date,
  notes: string[],
): Promise<RosterSite[]> {
  const first = { name: from.name ?? "the transmitter", site: from };
  const places = [first, ...(file === undefined ? [] : await listedSites(file, to.heightM))];
  const sites: RosterSite[] = [];
  for (const { name, site } of places) {
    const heightKm = ((site.groundM ?? 0) + site.heightM) / 1000;
    try {
      const { declinationDeg } = await declination({ ...site, heightKm, date });
      sites.push({ name, site, declinationDeg });
    } catch (error) {
      if (!(error instanceof RangeError)) throw error;
      if (sites.length === 0) notes.push(`${error.message}; headings are true ones alone`);
      sites.push({ name, site, declinationDeg: undefined });
    }
  }
  return sites;
}

/** A list of own sites; any fault of it is one of the command line, for none of its stations could be trusted. */
async function listedSites(file: string, heightM: number): Promise<Pick<RosterSite, "name" | "site">[]> {
  const { roster, faults } = openRoster(file, "sites");
  if (roster === undefined) throw faultsError(faults);
  const read = rowReader({ ...roster, dishes: [], modes: [] });
  const found: Pick<RosterSite, "name" | "site">[] = [];
  const wrong = [];
  for await (const { lines, firstLine, fault } of rosterLines(roster, MOST_SITES + 1)) {
    for (const [i, text] of lines.entries()) {
      if (isIdleRow(text, roster.separator)) continue;
      const { station, faults: unread } = read(text, firstLine + i);
      if (station)
        found.push({ name: station.name, site: { ...station, heightM: station.heightM ?? heightM } });
      else wrong.push(...unread.map((one) => ({ ...one, code: "bad_site", file })));
    }
    if (fault) wrong.push(fault);
    if (found.length > MOST_SITES) throw new UserError(`${file} holds more than ${MOST_SITES} sites`);
  }
  if (wrong.length > 0) throw faultsError(wrong);
  if (found.length === 0) throw new UserError(`${file}: a header and no sites below it`);
  return found;
}

/** `40..90`: from one true heading clockwise to another. */
function sectorOf(text: string | undefined): readonly [number, number] | undefined {
  if (text === undefined) return undefined;
  const match = /^\s*(-?\d+(?:\.\d+)?)\s*(?:deg)?\s*\.\.\s*(-?\d+(?:\.\d+)?)\s*(?:deg)?\s*$/.exec(text);
  const [from, to] = [Number(match?.[1]), Number(match?.[2])];
  if (match && Math.abs(from) <= 360 && Math.abs(to) <= 360) return [from, to];
  throw new UserError(
    `--towards: read "${text}", expected two true headings clockwise, such as 40..90 or 330..20`,
  );
}
