import { powerToDb } from "../numeric/decibels.ts";
import { requiredSnrInBandwidth } from "../receiver/modes.ts";
import type { Dish, Scenario, Site } from "../scenario/types.ts";
import { rainiest } from "./breakEven.ts";
import { isClear } from "./clearWeather.ts";
import type { RosterFilter } from "./rosterOrder.ts";

/** A site that the operator calls from. */
export interface RosterSite {
  readonly name: string;
  /** Ground is 0 m where not known, unless terrain tells it. */
  readonly site: Omit<Site, "groundM"> & { readonly groundM: number | undefined };
  /** East positive [deg]; undefined where no model covers the day. */
  readonly declinationDeg: number | undefined;
}

/** What a roster asks of every station: plain data, so that it can be sent to another thread. */
export interface RosterPlan {
  readonly scenario: Scenario;
  /** Where the scenario's files lie. */
  readonly folder: string;
  readonly sites: readonly RosterSite[];
  /** The dry weather and, where the scenario has rain, the wet one. */
  readonly weathers: readonly string[];
  /** The most demanding first. */
  readonly modes: readonly string[];
  /** Of the own feed: the scenario's first. */
  readonly covers: readonly string[];
  /** Whether the way back counts: a contact needs both, a beacon is only heard. */
  readonly bothWays: boolean;
  readonly filter: RosterFilter;
}

/** Aperture efficiency of a dish of which only the size is known: common practice, no source. */
const USUAL_EFFICIENCY = 0.5;
/** A feed stands before no more of a dish than this: own choice. */
const MOST_BLOCKED = 0.5;

/** The weather of a scenario that is clear, the first such; where none is, the one with the least rain. */
export function driest({ weather }: Scenario): string {
  const names = Object.keys(weather);
  const rate = (name: string) => weather[name]!.rainMmPerH.value;
  return names.find((name) => isClear(weather[name]!)) ?? names.reduce((a, b) => (rate(b) < rate(a) ? b : a));
}

/** The weather with the most rain; undefined where none has any. */
export function wettest(scenario: Scenario): string | undefined {
  const most = rainiest({ scenario }, Object.keys(scenario.weather));
  return scenario.weather[most]!.rainMmPerH.value > 0 ? most : undefined;
}

/** Modes by what they ask of the signal, the most first: voice comes before telegraphy. */
export function mostDemandingFirst({ modes }: Scenario, names: readonly string[]): string[] {
  const asks = (name: string) =>
    requiredSnrInBandwidth(modes[name]!) + powerToDb(modes[name]!.noiseBandwidthHz);
  return [...new Set(names)].sort((a, b) => asks(b) - asks(a));
}

/** The cover that the scenario puts on the own feed, then the others, bare among them. */
export function ownCoverFirst({ transmitter: { cover }, covers }: Scenario): string[] {
  return [cover, ...Object.keys(covers).filter((name) => name !== cover)];
}

/** Dishes of the scenario that the partner's feed can light. */
export function suitedDishes({ dish, feeds, receiver }: Scenario): string[] {
  const { edgeTaperDb, tenDbWidthDeg } = feeds[receiver.feed]!;
  const patterned = (edgeTaperDb ?? tenDbWidthDeg) !== undefined;
  return Object.keys(dish).filter((name) => patterned || dish[name]!.focalRatio === undefined);
}

/** A dish of another size or gain, otherwise like the scenario's partner's. */
export function dishLike(
  { dish, receiver }: Scenario,
  stated: { readonly diameterM: number } | { readonly gainDbi: NonNullable<Dish["gainDbi"]> },
): Dish {
  const pattern = receiver.dish === undefined ? undefined : dish[receiver.dish];
  const aim = {
    pointingOffsetDeg: pattern?.pointingOffsetDeg ?? 0,
    pointingErrorDeg: pattern?.pointingErrorDeg ?? 0,
  };
  const plain = { surfaceRmsMm: 0, otherLossesDb: { value: 0 }, blockageM: 0, ...aim };
  if ("gainDbi" in stated) return { ...plain, gainDbi: stated.gainDbi };
  const { diameterM } = stated;
  if (pattern === undefined || pattern.gainDbi !== undefined) {
    return { ...plain, diameterM, efficiency: USUAL_EFFICIENCY };
  }
  return { ...pattern, diameterM, blockageM: Math.min(pattern.blockageM, MOST_BLOCKED * diameterM) };
}

/**
 * The scenario as far as a roster needs it: the weathers asked for, the feeds in use, and nothing that belongs to the
 * far end's place, which are its ground, its trees and its coast. Its far end stands somewhere else than any site.
 */
export function patternOf(scenario: Scenario, weathers: readonly string[]): Scenario {
  const { path, weather, feeds, transmitter, receiver } = scenario;
  const { from, to, k, kLow, N0, dN } = path;
  const elsewhere = { ...to, latitude: from.latitude > 0 ? from.latitude - 1 : from.latitude + 1 };
  return {
    ...scenario,
    feeds: { [transmitter.feed]: feeds[transmitter.feed]!, [receiver.feed]: feeds[receiver.feed]! },
    weather: Object.fromEntries(weathers.map((name) => [name, weather[name]!])),
    path: { from, to: { ...elsewhere, longitude: from.longitude }, k, kLow, N0, dN },
  };
}
