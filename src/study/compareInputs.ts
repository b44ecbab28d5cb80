import { type TypedDifference, typedDifferences } from "../scenario/differences.ts";
import type { ReadScenario, Scenario } from "../scenario/types.ts";
import { both, type Comparable, type Pair, type Side } from "./comparable.ts";

/** What two scenarios say differently, in their own words. */
export interface InputDifference extends TypedDifference {
  /** Whether it has a part in the margins or verdicts that are compared. */
  readonly counts: boolean;
}

type Group = Readonly<Record<string, unknown>>;

/** Groups of which a comparison uses some by name. */
type Named = "weather" | "covers";

/** What differs in the files, and what was chosen to differ; a pair of two names stands as `dry/shower`. */
export function comparedInputs(read: Pair<ReadScenario>, compared: Comparable): InputDifference[] {
  const { mode, weathers, cover } = compared;
  const covers = cover === undefined ? [] : [cover];
  const alike = both((side): ReadScenario => {
    const { scenario, typed } = read[side];
    return { scenario, typed: paired(paired(typed, "weather", weathers, side), "covers", covers, side) };
  });
  const chosen = [
    ...covers.map((pair) => ({ path: ["cover on both feeds"], ...pair })),
    { path: ["mode"], ...mode },
  ].filter(({ a, b }) => a !== b);
  const used = usedNames(read, compared);
  const isChoice = ({ path }: TypedDifference) => path.join(".") === "receiver.mode" && mode.a !== mode.b;
  return [
    ...chosen.map((one) => ({ ...one, counts: true })),
    ...typedDifferences(alike.a, alike.b)
      .filter((one) => !isChoice(one))
      .map((one) => ({ ...one, counts: hasPart(one.path, used, cover !== undefined) })),
  ];
}

const label = ({ a, b }: Pair) => (a === b ? a : `${a}/${b}`);

/** A file in which the members of a group that are compared with another name stand under both names. */
function paired(typed: unknown, group: Named, pairs: readonly Pair[], side: Side): unknown {
  const unlike = pairs.filter(({ a, b }) => a !== b);
  const members = (typed as Group)[group] as Group | null | undefined;
  if (unlike.length === 0 || members === null || members === undefined) return typed;
  const alike = pairs.filter(({ a, b }) => a === b).map(({ a }) => a);
  const renamed = new Set(unlike.flatMap(({ a, b }) => [a, b]));
  const kept = Object.entries(members).filter(([name]) => !renamed.has(name) || alike.includes(name));
  const under = unlike.flatMap((pair) =>
    Object.hasOwn(members, pair[side]) ? [[label(pair), members[pair[side]]] as const] : [],
  );
  return { ...(typed as Group), [group]: Object.fromEntries([...under, ...kept]) };
}

/** Names of each group that the compared budgets use, on either side. */
function usedNames(read: Pair<ReadScenario>, { mode, weathers, cover }: Comparable) {
  const scenarios: readonly Scenario[] = [read.a.scenario, read.b.scenario];
  const ends = scenarios.flatMap(({ transmitter, receiver }) => [transmitter, receiver]);
  return {
    feeds: ends.map(({ feed }) => feed),
    dish: ends.map(({ dish }) => dish),
    covers: [
      ...(cover === undefined ? ends.map((end) => end.cover) : [label(cover)]),
      ...ends.map((end) => end.dishCover),
    ],
    modes: [mode.a, mode.b],
    weather: weathers.map(label),
  } as const satisfies Record<string, readonly (string | undefined)[]>;
}

function hasPart(
  [top, name, ...rest]: TypedDifference["path"],
  used: ReturnType<typeof usedNames>,
  coverChosen: boolean,
): boolean {
  if (top === "title" || top === "climate" || rest.at(-1) === "name" || rest.at(-1) === "source")
    return false;
  if (coverChosen && name === "cover" && (top === "transmitter" || top === "receiver")) return false;
  const names: readonly (string | undefined)[] | undefined = used[top as keyof typeof used];
  return names === undefined || name === undefined || names.includes(String(name));
}
