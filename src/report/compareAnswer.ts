import type { Verdict } from "../budget/types.ts";
import { BENCH_REPEATABILITY_DB } from "../readings/verdict.ts";
import type { ComparedWeather, Comparison } from "../study/compare.ts";
import { capital, listed, paragraph, signed, tenth } from "./words.ts";

const verdictWords = {
  closes: { one: "closes", both: "both close" },
  thin: { one: "is thin", both: "both are thin" },
  fails: { one: "fails", both: "both fail" },
} as const satisfies Record<Verdict, { one: string; both: string }>;

/** How many causes of a difference are named. */
const MOST_CAUSES = 4;

/** Least difference of two standard deviations that is told in words [dB]. */
const LEAST_SURENESS_DB = 1;

/** The answer: in each weather which is better, by how much and by what; weathers of the same answer together. */
export function compareAnswer({ weathers, lonelyWeathers, inputs }: Comparison): string {
  const lonely = (["a", "b"] as const).flatMap((side) =>
    lonelyWeathers[side].length === 0
      ? []
      : `Only in ${side.toUpperCase()}, not compared: ${listed(lonelyWeathers[side])}.`,
  );
  const alike = weathers.every(
    ({ entries, budget: { a, b } }) => entries.length === 0 && a.verdict === b.verdict,
  );
  const said = alike && inputs.every(({ counts }) => !counts) ? ["Nothing differs."] : sentences(weathers);
  return [...said, ...lonely].map((text) => paragraph(text)).join("\n");
}

function sentences(weathers: readonly ComparedWeather[]): string[] {
  const byAnswer = new Map<string, string[]>();
  for (const one of weathers) {
    const { a, b } = one.weather;
    const said = sentence(one);
    byAnswer.set(said, [...(byAnswer.get(said) ?? []), a === b ? a : `${a} in A against ${b} in B`]);
  }
  return [...byAnswer].map(([said, names]) => `${capital(listed(names))}: ${said}.`);
}

function sentence(one: ComparedWeather): string {
  const { budget, entries, differenceDb, differenceSigmaDb, distinguishable } = one;
  const [a, b] = [budget.a.verdict, budget.b.verdict];
  const judged = a === b ? verdictWords[a].both : `B ${verdictWords[b].one} where A ${verdictWords[a].one}`;
  if (entries.length === 0) return `${judged}; no entry differs`;
  const beside = `${surenessWords(one)}${carriedWords(one)}`;
  const causes = causesOf(one);
  const by = causes.length === 0 ? "" : `: ${listed(causes)}`;
  if (!distinguishable) {
    return `${judged}; indistinguishable at a bench's repeatability${by}${beside}`;
  }
  const better = differenceDb > 0;
  const expected = a === b || better === ranks.indexOf(b) > ranks.indexOf(a);
  const subject = a === b ? "; B is " : expected ? ", " : " although ";
  const figure = `${tenth(Math.abs(differenceDb))} dB ${better ? "better" : "worse"}`;
  const doubt =
    differenceSigmaDb > Math.abs(differenceDb)
      ? `; within its standard deviation of ${tenth(differenceSigmaDb)} dB`
      : "";
  return `${judged}${subject}${figure}${by}${doubt}${beside}`;
}

const ranks: readonly Verdict[] = ["fails", "thin", "closes"];

/** What lies behind a difference, the largest first, the smallest taken together. */
function causesOf({ causes }: ComparedWeather): string[] {
  const shown = causes.filter(({ differenceDb }) => Math.abs(differenceDb) >= BENCH_REPEATABILITY_DB);
  const few = shown.length > MOST_CAUSES + 1 ? shown.slice(0, MOST_CAUSES) : shown;
  const others = shown.slice(few.length).reduce((sum, { differenceDb }) => sum + differenceDb, 0);
  return [
    ...few.map(({ cause, differenceDb }) => `${cause} ${signed(differenceDb)} dB`),
    ...(few.length < shown.length ? [`others ${signed(others)} dB`] : []),
  ];
}

/** Which margin is surer, where that is more than a shade. */
function surenessWords({ budget: { a, b } }: ComparedWeather): string {
  const [one, other] = [a.marginSigmaDb, b.marginSigmaDb];
  if (Math.abs(one - other) < LEAST_SURENESS_DB) return "";
  return `; B is ${other > one ? "less sure" : "surer"}, ±${tenth(other)} dB against ±${tenth(one)} dB`;
}

/** The ways of the signal, where they are not the same. */
function carriedWords({ budget: { a, b } }: ComparedWeather): string {
  const [one, other] = [a.mechanisms[0]!, b.mechanisms[0]!];
  return one.name === other.name ? "" : `; ${one.label} carries A, ${other.label} B`;
}
