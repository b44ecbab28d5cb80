import type { Matter } from "../budget/causes.ts";
import { isBare } from "../study/coverPairs.ts";
import type { SpreadStudy } from "../study/spread.ts";
import { coverMatters, type MatterOfSpread, type SpreadRanking } from "../study/spreadRanking.ts";
import { cell, columns, RULE } from "./columns.ts";
import { matterWords } from "./spreadWords.ts";
import { abreast, capital, listed, paragraph, signed, tenth } from "./words.ts";

/** Shares below this are nothing that a ranking of some thousand draws can tell. */
const LEAST_SHARE = 0.02;
/** Matters worth advice in one weather. */
const MOST_ADVICE = 2;

/** Matter by weather: share of the variance and rank correlation, the largest first. */
export function rankingTable({ rankings }: SpreadStudy): string {
  const share = (matter: Matter, ranking: SpreadRanking) =>
    ranking.matters.find((one) => one.matter === matter)?.varianceShare ?? 0;
  const most = (matter: Matter) => Math.max(...rankings.map((ranking) => share(matter, ranking)));
  const all = [...new Set(rankings.flatMap(({ matters }) => matters.map(({ matter }) => matter)))];
  const told = all.filter((matter) => most(matter) >= LEAST_SHARE).sort((a, b) => most(b) - most(a));
  const figures = (matter: Matter, { matters }: SpreadRanking) => {
    const found = matters.find((one) => one.matter === matter);
    if (found === undefined) return "-";
    const percent = found.varianceShare < LEAST_SHARE ? "<2" : `${Math.round(100 * found.varianceShare)}`;
    return `${percent} % ${found.rankCorrelation.toFixed(2)} ±${tenth(found.sigmaDb)}`;
  };
  if (told.length === 0) return "Nothing: no input scatters.";
  return abreast(rankings, (some) =>
    columns([
      [cell("share, rank, dB"), ...some.map((ranking) => cell(ranking.case.weather))],
      RULE,
      ...told.map((matter) => [
        cell(matterWords[matter].name),
        ...some.map((ranking) => cell(figures(matter, ranking))),
      ]),
    ]),
  );
}

/** What follows: what matters how much more than the cover, what knowing it would bring, what to do. */
export function adviceText({ rankings }: SpreadStudy): string {
  const comparisons = rankings.map(comparison).filter((line) => line !== "");
  const worth = rankings.flatMap((ranking) =>
    ranking.matters
      .filter(({ varianceShare }) => varianceShare >= LEAST_SHARE)
      .slice(0, MOST_ADVICE)
      .map((one) => ({ one, ranking, gainDb: one.knownLowDb - ranking.lowDb })),
  );
  // Each matter once, where knowing it would bring the most.
  const best = new Map<Matter, (typeof worth)[number]>();
  for (const entry of worth.toSorted((a, b) => b.gainDb - a.gainDb)) {
    if (!best.has(entry.one.matter)) best.set(entry.one.matter, entry);
  }
  const advices = [...best.values()].map(({ one, ranking }) => advice(one, ranking));
  return [...comparisons, ...advices].map((line) => paragraph(line, "- ")).join("\n");
}

function comparison({ case: one, matters, coverSigmaDb: own }: SpreadRanking): string {
  const { weather } = one;
  const covers = matters.filter(({ matter }) => coverMatters.includes(matter));
  const [first] = matters.filter(({ matter }) => !coverMatters.includes(matter));
  if (first === undefined) return "";
  const { many } = matterWords[first.matter];
  const name = subject(first.matter);
  const verb = many ? "matter" : "matters";
  if (own < 0.05) {
    const what = isBare(one) ? "the feeds are bare" : "the cover adds nothing to the spread";
    return `${capital(weather)}: ${what}; ${name} ${many ? "lead" : "leads"}.`;
  }
  const times = first.sigmaDb / own;
  const wet = covers.some(({ matter, sigmaDb }) => matter === "water" && sigmaDb > 0.05);
  const what = wet ? "the cover and its water" : "the cover";
  const figures = `(${tenth(first.sigmaDb)} against ${tenth(own)} dB)`;
  if (times < 1 / 1.25) {
    const verb = wet ? "matter" : "matters";
    return `${capital(weather)}: ${what} ${verb} more than anything else (${tenth(own)} against ${tenth(first.sigmaDb)} dB).`;
  }
  if (times < 1.25) return `${capital(weather)}: ${name} ${verb} about as much as ${what} ${figures}.`;
  return `${capital(weather)}: ${name} ${verb} ${timesWords(times)} as much as ${what} ${figures}.`;
}

/** A matter as a sentence begins with it: "the" before what is one of its kind. */
function subject(matter: Matter): string {
  const { name } = matterWords[matter];
  return /^(threshold|extent|place|match|way|rain rate|receiver|transmitter)\b/.test(name)
    ? `the ${name}`
    : name;
}

const counts = [
  "",
  "",
  "twice",
  "three times",
  "four times",
  "five times",
  "six times",
  "seven times",
  "eight times",
  "nine times",
  "ten times",
];

function timesWords(times: number): string {
  if (times < 1.75) return "one and a half times";
  if (times < 2.75 && times > 2.25) return "two and a half times";
  return counts[Math.round(times)] ?? `${Math.round(times)} times`;
}

function advice(
  { matter, knownLowDb, knownCloses }: MatterOfSpread,
  { case: one, lowDb, closes }: SpreadRanking,
): string {
  const { name, many, advice } = matterWords[matter];
  const points = 100 * (knownCloses - closes);
  const gains = [
    ...(Math.abs(knownLowDb - lowDb) >= 0.05
      ? [`the 5 % margin would move by ${signed(knownLowDb - lowDb)} dB`]
      : []),
    ...(Math.abs(points) >= 1 ? [`the chance to close by ${pointsWords(Math.round(points))}`] : []),
  ];
  const effect =
    gains.length > 0
      ? ` Were ${many ? "they" : "it"} as the scenario has ${many ? "them" : "it"} for sure, ${listed(gains)} (${one.weather}).`
      : "";
  return `${capital(name)}: ${advice}.${effect}`;
}

function pointsWords(points: number): string {
  return `${points > 0 ? "+" : ""}${points} point${Math.abs(points) === 1 ? "" : "s"}`;
}
