import type { Entry, Stage } from "../budget/entry.ts";
import { evaluate } from "../budget/evaluate.ts";
import type { Budget, Case, Link, Warning } from "../budget/types.ts";
import { combinedSigma, probabilityAboveZero } from "../budget/verdict.ts";
import { BENCH_REPEATABILITY_DB } from "../readings/verdict.ts";
import type { Polarization } from "../scenario/types.ts";
import { both, type Comparable, type Pair, type Side, sides } from "./comparable.ts";
import { type Cause, causeOf } from "./compareCauses.ts";
import { comparedInputs, type InputDifference } from "./compareInputs.ts";

/** One entry that is not the same in both, in its figure, its sigma or its bounds; signed as it adds to the margin. */
export interface ComparedEntry {
  readonly id: string;
  readonly stage: Stage;
  readonly cause: Cause;
  readonly label: Pair<string | undefined>;
  /** Undefined where a budget has no such entry, which counts as 0 dB. */
  readonly db: Pair<number | undefined>;
  readonly sigma: Pair<number | undefined>;
  /** B less A: what it does to the margin [dB]. */
  readonly differenceDb: number;
  /** Of the difference, the errors of both taken as independent [dB]; 0 where they come from the same input. */
  readonly differenceSigmaDb: number;
}

export type ComparedBudget = Omit<Budget, "entries" | "noiseEntries" | "requirement" | "warnings">;

/** Both scenarios in one weather. */
export interface ComparedWeather {
  readonly weather: Pair;
  readonly budget: Pair<ComparedBudget>;
  /** All that differ, in the order of the budgets; they add up to `differenceDb`. */
  readonly entries: readonly ComparedEntry[];
  /** The same taken together by what lies behind them, the largest first. */
  readonly causes: readonly { readonly cause: Cause; readonly differenceDb: number }[];
  /** Margin of B less that of A [dB]. */
  readonly differenceDb: number;
  readonly differenceSigmaDb: number;
  /** Probability that B leaves more than A; a half where the difference is not distinguishable. */
  readonly betterProbability: number;
  /** A difference smaller than a bench repeats to cannot be shown by it. */
  readonly distinguishable: boolean;
}

/** What a scenario is, in few words. */
export interface ComparedScenario {
  readonly title: string;
  readonly frequencyGHz: number;
  readonly polarization: Polarization;
  readonly distanceKm: number;
  readonly mode: string;
  readonly modeLabel: string;
  readonly cover: { readonly transmitter: string; readonly receiver: string };
}

export interface Comparison {
  readonly scenario: Pair<ComparedScenario>;
  readonly weathers: readonly ComparedWeather[];
  /** What the files say differently; empty where they were not given. */
  readonly inputs: readonly InputDifference[];
  /** Weathers that only one of them has. */
  readonly lonelyWeathers: Pair<readonly string[]>;
  /** Doubts, each with the sides that have it. */
  readonly warnings: readonly (Warning & { readonly sides: readonly Side[] })[];
}

/** Smallest difference that is one [dB]: beyond the rounding of sums. */
const ROUNDING_DB = 1e-9;

/** Modes to compare in: the first of A that B asks for too, otherwise the first of each. */
export function commonMode(a: Link, b: Link): Pair {
  const [modesA, modesB] = [a.scenario.receiver.modes, b.scenario.receiver.modes];
  const common = modesA.find((mode) => modesB.includes(mode));
  return { a: common ?? modesA[0]!, b: common ?? modesB[0]! };
}

/** Weathers of the same name in both, in the order of A. */
export function commonWeathers(a: Link, b: Link): Pair[] {
  const others = Object.keys(b.weathers);
  return Object.keys(a.weathers)
    .filter((name) => others.includes(name))
    .map((name) => ({ a: name, b: name }));
}

/**
 * Two scenarios entry by entry: what differs and what it does to the margin, weather by weather.
 *
 * @param typed  the YAML documents as typed, of which the differing inputs are told
 * @throws RangeError on a weather, cover or mode that its link does not have
 */
export function compare(a: Link, b: Link, compared: Comparable, typed?: Pair<unknown>): Comparison {
  const links = { a, b };
  const { mode, weathers } = compared;
  const warnings = new Map<string, Warning & { sides: Side[] }>();
  const note = (side: Side, found: readonly Warning[]) => {
    for (const warning of found) {
      const key = `${warning.code} ${warning.where} ${warning.message}`;
      const known = warnings.get(key) ?? { ...warning, sides: [] };
      if (!known.sides.includes(side)) known.sides.push(side);
      warnings.set(key, known);
    }
  };
  const pairs = weathers.map((weather) => {
    const budgets = both((side) => evaluate(links[side], caseOf(links[side], side, weather, compared)));
    for (const side of sides) note(side, budgets[side].warnings);
    return comparedIn(weather, budgets);
  });
  const lonely = (side: Side) => {
    const others = links[side === "a" ? "b" : "a"].weathers;
    return Object.keys(links[side].weathers)
      .filter((name) => !Object.hasOwn(others, name))
      .filter((name) => weathers.every((pair) => pair[side] !== name));
  };
  const first = weathers[0]!;
  const ownCovers = both((side) => caseOf(links[side], side, first, compared));
  return {
    scenario: both((side) => {
      const { scenario, path, modes } = links[side];
      const { title, frequencyGHz, polarization } = scenario;
      const { transmitter, receiver } = ownCovers[side];
      return {
        ...{ title, frequencyGHz, polarization, distanceKm: path.distanceKm },
        ...{ mode: mode[side], modeLabel: modes[mode[side]]!.label },
        cover: { transmitter: transmitter.cover, receiver: receiver.cover },
      };
    }),
    weathers: pairs,
    inputs:
      typed === undefined
        ? []
        : comparedInputs(
            both((side) => ({ scenario: links[side].scenario, typed: typed[side] })),
            compared,
          ),
    lonelyWeathers: both(lonely),
    warnings: [...warnings.values()],
  };
}

function caseOf({ scenario }: Link, side: Side, weather: Pair, { mode, cover }: Comparable): Case {
  const at = (end: "transmitter" | "receiver") => ({
    feed: scenario[end].feed,
    cover: cover?.[side] ?? scenario[end].cover,
  });
  return {
    weather: weather[side],
    mode: mode[side],
    transmitter: at("transmitter"),
    receiver: at("receiver"),
  };
}

function comparedIn(weather: Pair, budgets: Pair<Budget>): ComparedWeather {
  const entries = comparedEntries(budgets);
  const differenceDb = budgets.b.marginDb - budgets.a.marginDb;
  const distinguishable = Math.abs(differenceDb) >= BENCH_REPEATABILITY_DB;
  const differenceSigmaDb = Math.hypot(...entries.map((one) => one.differenceSigmaDb));
  const totals = new Map<Cause, number>();
  for (const one of entries) totals.set(one.cause, (totals.get(one.cause) ?? 0) + one.differenceDb);
  return {
    weather,
    budget: both((side) => {
      const { entries: _, noiseEntries: __, requirement: ___, warnings: ____, ...rest } = budgets[side];
      return rest;
    }),
    entries,
    causes: [...totals]
      .map(([cause, db]) => ({ cause, differenceDb: db }))
      .sort((one, other) => Math.abs(other.differenceDb) - Math.abs(one.differenceDb)),
    differenceDb,
    differenceSigmaDb,
    betterProbability: distinguishable ? probabilityAboveZero(differenceDb, differenceSigmaDb) : 0.5,
    distinguishable,
  };
}

/** The entries that differ, matched by their ids. */
function comparedEntries(budgets: Pair<Budget>): ComparedEntry[] {
  const all = both((side) => allEntries(budgets[side]));
  const byId = both((side) => new Map(all[side].map((entry) => [entry.id, entry])));
  return idsInOrder(all).flatMap((id) => {
    const entry = both((side) => byId[side].get(id));
    const change = (of: (entry: Entry) => number) =>
      (entry.b ? of(entry.b) : 0) - (entry.a ? of(entry.a) : 0);
    const differenceDb = change(({ db }) => db);
    // What moves by less than a bench shows comes from the same input, whose error both share.
    const sharesInput = [differenceDb, change(({ sigma }) => sigma)].every(isUnseen);
    const isAlike =
      Math.abs(differenceDb) <= ROUNDING_DB &&
      sharesInput &&
      [change(({ low, db }) => low - db), change(({ high, db }) => high - db)].every(isUnseen);
    if (isAlike) return [];
    const known = [entry.a, entry.b].filter((one) => one !== undefined);
    return {
      ...{ id, stage: known[0]!.stage, cause: causeOf(id) },
      label: both((side) => entry[side]?.label),
      db: both((side) => entry[side]?.db),
      sigma: both((side) => entry[side]?.sigma),
      differenceDb,
      differenceSigmaDb: sharesInput ? 0 : combinedSigma(known),
    };
  });
}

function isUnseen(db: number): boolean {
  return Math.abs(db) < BENCH_REPEATABILITY_DB;
}

function allEntries({ entries, noiseEntries, requirement }: Budget): readonly Entry[] {
  return [...entries, ...noiseEntries, requirement];
}

/** Ids of both in the order of the budgets; what only B has keeps its place among the rest. */
function idsInOrder({ a, b }: Pair<readonly Entry[]>): string[] {
  const ids = a.map(({ id }) => id);
  let place = 0;
  for (const { id } of b) {
    const known = ids.indexOf(id);
    if (known >= 0) place = known + 1;
    else ids.splice(place++, 0, id);
  }
  return ids;
}
