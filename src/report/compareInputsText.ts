import type { InputDifference } from "../study/compareInputs.ts";
import { LINE_WIDTH, lengthOf, listed, type Paint, paragraph } from "./words.ts";

/** Longest value of a file that is shown whole [characters]. */
const LONGEST_VALUE = 240;
/** How many keys of no weight are named. */
const MOST_KEYS = 12;

/** What the two files say differently, each in its own words. */
export function inputsText(inputs: readonly InputDifference[], paint: Paint): string {
  const counting = inputs.filter(({ counts }) => counts);
  const others = [...new Set(inputs.filter(({ counts }) => !counts).map(({ path }) => shortKey(path)))];
  const more = others.length > MOST_KEYS ? [`${others.length - MOST_KEYS} more`] : [];
  const beside = [...others.slice(0, MOST_KEYS), ...more];
  const parts = [
    ...(counting.length === 0 ? [] : [paint("strong", "What differs in the files"), ...counting.map(line)]),
    ...(beside.length === 0 ? [] : [paragraph(`Without a part in this comparison: ${listed(beside)}.`)]),
  ];
  return parts.join("\n");
}

/** `covers.film.layer 1.thickness: 5 mil -> 10 mil`, on lines of its own where it is long. */
function line({ path, a, b }: InputDifference): string {
  const [from, to] = [a, b].map((value) => (value === undefined ? "not given" : cut(value)));
  const whole = `  ${keyOf(path)}: ${from} -> ${to}`;
  if (lengthOf(whole) <= LINE_WIDTH) return whole;
  return [`${paragraph(keyOf(path), "  ")}:`, paragraph(from!, "    A "), paragraph(to!, "    B ")].join(
    "\n",
  );
}

/** What has a name of its own is named by it, without what differs in it. */
function shortKey(path: InputDifference["path"]): string {
  const hasMembers = ["feeds", "covers", "dish", "modes", "weather", "climate"].includes(String(path[0]));
  return keyOf(hasMembers ? path.slice(0, 2) : path);
}

/** `covers.film.layer 1.thickness`: layers are counted from 1, as the program's options count them. */
function keyOf(path: InputDifference["path"]): string {
  return path
    .flatMap((key, i) => {
      if (typeof key === "number") return [];
      const item = path[i + 1];
      return typeof item === "number" ? `${key.replace(/s$/, "")} ${item + 1}` : key;
    })
    .join(".");
}

function cut(text: string): string {
  return lengthOf(text) <= LONGEST_VALUE ? text : `${[...text].slice(0, LONGEST_VALUE - 3).join("")}...`;
}
