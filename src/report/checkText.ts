import type { Warning } from "../budget/types.ts";
import type { Scenario } from "../scenario/types.ts";
import { warningText } from "./notes.ts";
import { type Paint, plain } from "./words.ts";

/** A sound scenario: what it holds, in one line behind its file's name, and the doubts below. */
export function checkText(
  file: string,
  { feeds, covers, weather }: Scenario,
  warnings: readonly Warning[],
  paint: Paint = plain,
): string {
  const count = (noun: string, group: object) => {
    const number = Object.keys(group).length;
    return `${number} ${noun}${number === 1 ? "" : "s"}`;
  };
  const holds = `${count("feed", feeds)}, ${count("cover", covers)} with bare, ${count("weather", weather)}`;
  const doubts = warningText(warnings, paint);
  return `${file}: sound; ${holds}\n${doubts === "" ? "" : `${doubts}\n`}`;
}
