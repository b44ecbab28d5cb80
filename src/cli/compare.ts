import { Command, Option } from "commander";
import {
  commonMode,
  commonWeathers,
  compare,
  compareCsv,
  compareJson,
  compareText,
  type Link,
  prepare,
} from "../index.ts";
import { knownName } from "./knownName.ts";
import { namesOption } from "./namesAsked.ts";
import { scenariosIn } from "./scenarioFile.ts";
import { paintFor, print, UserError } from "./terminal.ts";

interface CompareOptions {
  readonly weather?: readonly string[];
  readonly cover?: string;
  readonly mode?: string;
  readonly json?: true;
  readonly csv?: true;
}

interface Pair {
  readonly a: string;
  readonly b: string;
}

export const compareCommand = new Command("compare")
  .description("two scenarios entry by entry: only what differs, and what it does to the margin")
  .argument("<A>", "scenario file")
  .argument("[B]", "another one; the same where not given")
  .addOption(namesOption("--weather <name>", "only this weather; IN-A=IN-B where their names differ"))
  .option("--cover <name>", "this cover at both ends; IN-A=IN-B for two (default: as each scenario has it)")
  .option("--mode <name>", "this mode; IN-A=IN-B for two (default: the first that both ask for)")
  .addOption(new Option("--json", "everything as JSON").conflicts("csv"))
  .option("--csv", "the entries that differ as one flat table")
  .addHelpText(
    "after",
    "\nOne scenario is compared with itself by pairs, such as\n  oilskin compare path.yaml --cover film=bare",
  )
  .action(async (fileA: string, fileB: string | undefined, options: CompareOptions) => {
    const files = { a: fileA, b: fileB ?? fileA };
    const asked = [...(options.weather ?? []), options.cover, options.mode];
    if (fileB === undefined && !asked.some((name) => name?.includes("="))) {
      throw new UserError(
        `${fileA} is compared with nothing; name a second scenario, or a pair: --cover film=bare, ` +
          "--weather dry=shower, --mode cw=ssb",
      );
    }
    const [readA, readB] = await scenariosIn([files.a, files.b]);
    const [a, b] = [prepare(readA!.scenario), prepare(readB!.scenario)];
    const pairs = (noun: string, text: string, namesOf: (link: Link) => object) =>
      pairsIn(noun, text, [Object.keys(namesOf(a)), Object.keys(namesOf(b))], files);
    const one = (noun: string, text: string | undefined, namesOf: (link: Link) => object) =>
      text === undefined ? undefined : pairs(noun, text, namesOf)[0]!;

    const named = options.weather?.flatMap((text) => pairs("weather", text, (link) => link.weathers));
    const weathers = named === undefined ? commonWeathers(a, b) : eachOnce(named);
    if (weathers.length === 0) {
      throw new UserError(
        `no weather of ${files.a} (${Object.keys(a.weathers).join(", ")}) has its name in ${files.b} ` +
          `(${Object.keys(b.weathers).join(", ")}); pair them: --weather IN-A=IN-B`,
      );
    }
    const compared = {
      mode: one("mode", options.mode, (link) => link.modes) ?? commonMode(a, b),
      weathers,
      cover: one("cover", options.cover, (link) => link.scenario.covers),
    };
    const comparison = compare(a, b, compared, { a: readA!.typed, b: readB!.typed });
    if (options.json) print(compareJson(comparison));
    else if (options.csv) print(compareCsv(comparison));
    else print(compareText(comparison, files, paintFor(process.stdout)));
  });

/** `dry`, `dry=clear` or some of them between commas, as the names in A and in B. A name may hold either sign. */
function pairsIn(
  noun: string,
  text: string,
  known: readonly [readonly string[], readonly string[]],
  files: Pair,
): Pair[] {
  const pair = pairIn(text, known);
  if (pair !== undefined) return [pair];
  const holdsComma = known.flat().some((name) => name.includes(","));
  if (text.includes(",") && !holdsComma) {
    return text.split(",").flatMap((part) => pairsIn(noun, part.trim(), known, files));
  }
  const cut = text.indexOf("=");
  const [nameA, nameB] = cut < 0 ? [text, text] : [text.slice(0, cut).trim(), text.slice(cut + 1).trim()];
  knownName(noun, nameA, known[0], files.a);
  knownName(noun, nameB, known[1], files.b);
  return [{ a: nameA, b: nameB }];
}

function eachOnce(pairs: readonly Pair[]): readonly Pair[] {
  return pairs.filter((one, i) => pairs.findIndex(({ a, b }) => a === one.a && b === one.b) === i);
}

function pairIn(text: string, [inA, inB]: readonly [readonly string[], readonly string[]]): Pair | undefined {
  if (inA.includes(text) && inB.includes(text)) return { a: text, b: text };
  return inA
    .filter((name) => text.startsWith(`${name}=`))
    .map((name) => ({ a: name, b: text.slice(name.length + 1) }))
    .find(({ b }) => inB.includes(b));
}
