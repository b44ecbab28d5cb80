import { kinds, type QuantityKind, readQuantity } from "./quantity.ts";
import { isGroup, type Raw } from "./raw.ts";
import type { ReadScenario, Scenario } from "./types.ts";

/** One thing that two files say differently, each in its own words; undefined where a file does not say it. */
export interface TypedDifference {
  /** Keys from the top of the file; a number is an item of a list, from 0. */
  readonly path: readonly (string | number)[];
  readonly a: string | undefined;
  readonly b: string | undefined;
}

type Path = TypedDifference["path"];

/** Keys under which names and files stand: `1 in` and `25.4 mm` are two names there. */
const naming = new Set([
  ...["title", "name", "feed", "dish", "cover", "dish_cover", "mode", "material", "source"],
  ...["terrain", "readings", "map", "locator"],
]);

/**
 * What two files say differently, in the order of the first and then of the second.
 *
 * The same quantity in other units is no difference. Files of the same name that hold something else are one: what
 * is in them stands behind their names.
 */
export function typedDifferences(a: ReadScenario, b: ReadScenario): TypedDifference[] {
  const found: TypedDifference[] = [];
  const walk = (left: unknown, right: unknown, path: Path): void => {
    // Members of the file's own groups are told one by one, even where the other file has no such group.
    const whole = (value: unknown) => (value === undefined && path.length === 1 ? {} : value);
    const both = [left, right].some(isGroup) ? [whole(left), whole(right)] : [left, right];
    if (both.every(isGroup)) {
      const [one, other] = both as [Raw, Raw];
      for (const key of new Set([...Object.keys(one), ...Object.keys(other)])) {
        walk(own(one, key), own(other, key), [...path, key]);
      }
    } else if (both.every(isListOfGroups)) {
      const [one, other] = both as [readonly unknown[], readonly unknown[]];
      const longer = Math.max(one.length, other.length);
      for (let i = 0; i < longer; i++) walk(one[i], other[i], [...path, i]);
    } else {
      const [one, other] = [said(left, path, a.scenario), said(right, path, b.scenario)];
      if (!same(one, other, path)) found.push({ path, a: one, b: other });
      else if (path.join(".") === "path.terrain" && !sameGround(a, b)) {
        found.push({ path, a: one, b: `${other}, other heights` });
      }
    }
  };
  walk(a.typed, b.typed, []);
  return found;
}

function isListOfGroups(value: unknown): boolean {
  return Array.isArray(value) && value.some(isGroup);
}

function own(group: Raw, key: string): unknown {
  return Object.hasOwn(group, key) ? group[key] : undefined;
}

/** A value in one line; of a file that it names, also what was read from it. */
function said(value: unknown, path: Path, scenario: Scenario): string | undefined {
  if (value === undefined) return undefined;
  const read = contents(path, scenario);
  return read === undefined ? inOneLine(value) : `${inOneLine(value)} (${read})`;
}

function inOneLine(value: unknown): string {
  if (value === null) return "nothing";
  if (Array.isArray(value)) return value.length === 0 ? "[]" : value.map(inOneLine).join(", ");
  if (!isGroup(value)) return String(value);
  const inside = Object.entries(value).map(([key, one]) => {
    const text = inOneLine(one);
    return `${key}: ${Array.isArray(one) ? `[${text}]` : text}`;
  });
  return inside.length === 0 ? "{}" : `{ ${inside.join(", ")} }`;
}

/** What a file named in a scenario holds, in few words. */
function contents(path: Path, { path: { profile }, covers }: Scenario): string | undefined {
  const [top, second, ...rest] = path.map(String);
  if (top === "path" && second === "terrain" && profile !== undefined) {
    const { distancesKm, heightsM } = profile;
    const heights = Array.from(heightsM, Math.round).sort((low, high) => low - high);
    return `${distancesKm.length} points, ${heights[0]} to ${heights.at(-1)} m`;
  }
  if (top === "covers" && rest.join(".") === "measured.readings") {
    const measured = covers[second!]?.measured;
    if (measured === undefined) return undefined;
    const { insertionLossDb: loss, returnLossChangeDb: change } = measured;
    return `${loss.value.toFixed(3)} dB${change === undefined ? "" : `, match ${change.value.toFixed(2)} dB`}`;
  }
  return undefined;
}

function same(a: string | undefined, b: string | undefined, path: Path): boolean {
  if (a === b) return true;
  if (a === undefined || b === undefined || naming.has(String(path.at(-1)))) return false;
  return (Object.keys(kinds) as QuantityKind[]).some((kind) => {
    const [one, other] = [a, b].map((text) => readQuantity(text, kind, { spread: true }));
    if (!one!.ok || !other!.ok) return false;
    return close(one!.value, other!.value) && close(one!.sigma ?? -1, other!.sigma ?? -1);
  });
}

function sameGround(a: ReadScenario, b: ReadScenario): boolean {
  return JSON.stringify(a.scenario.path.profile) === JSON.stringify(b.scenario.path.profile);
}

/** Equal but for the rounding of a conversion. */
function close(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), Math.abs(b));
}
