import type { Cause } from "../budget/causes.ts";
import { drawingOf } from "../budget/drawing.ts";
import type { Budget, Case, Link, PathGeometry, Verdict, Warning } from "../budget/types.ts";
import { verdictOf } from "../budget/verdict.ts";
import { proportionInterval } from "../numeric/proportion.ts";
import { mean, quantilesOf, shareAbove, variance } from "../numeric/ranking.ts";
import { isBare } from "./coverPairs.ts";
import { type SpreadRanking, spreadRanking } from "./spreadRanking.ts";
import { type Sampling, sampleOf } from "./spreadSampling.ts";
import { warningsOnce } from "./warningsOnce.ts";

/** Quantiles of a margin or of a cost [dB]: in one of twenty draws it is less than `lowDb`, in one more than `highDb`. */
export interface Range {
  readonly lowDb: number;
  readonly medianDb: number;
  readonly highDb: number;
}

/** A probability found by drawing, with the ends of its 95 % interval. */
export interface Chance {
  readonly share: number;
  readonly low: number;
  readonly high: number;
}

/** One case drawn. */
export interface SpreadRow {
  readonly case: Case;
  readonly marginDb: Range;
  readonly meanDb: number;
  readonly sigmaDb: number;
  /** That the margin is above 0, and above the reserve. */
  readonly closes: Chance;
  readonly keepsReserve: Chance;
  /** By the rule of a budget, with the median and the drawn probability in the place of its own. */
  readonly verdict: Verdict;
  /** What the budget says of the same case. */
  readonly budget: Pick<Budget, "marginDb" | "marginSigmaDb" | "holdProbability" | "verdict" | "mechanisms">;
  /** Bare mouths less this case, draw by draw; undefined for bare ones. */
  readonly costDb: Range | undefined;
  /** Share of the draws that close with bare mouths and not with these covers, and the other way round. */
  readonly lost: number;
  readonly won: number;
}

export interface SpreadStudy {
  readonly title: string;
  readonly frequencyGHz: number;
  readonly path: PathGeometry;
  readonly mode: string;
  readonly seed: number;
  readonly draws: number;
  readonly mostDraws: number;
  readonly precision: number;
  /** Widest half-width of the 95 % intervals of the probabilities of closing. */
  readonly halfWidth: number;
  readonly causes: readonly Cause[];
  readonly rows: readonly SpreadRow[];
  /** What the spread hangs on, for the scenario's own covers in each weather. */
  readonly rankings: readonly SpreadRanking[];
  readonly warnings: readonly Warning[];
}

const QUANTILES = [0.05, 0.5, 0.95] as const;

/**
 * How sure the margins of a link are: all of its cases in one mode drawn together with every uncertain input, what
 * their spread hangs on, and what each cover takes in draws that differ by the cover alone.
 *
 * @param chosen  cases of one mode and one pair of feeds, at least one
 */
export function spreadOf(link: Link, chosen: readonly Case[], sampling: Sampling): SpreadStudy {
  const { title, frequencyGHz, decision, transmitter, receiver } = link.scenario;
  // Bare mouths are drawn along where nobody asked for them: covers are judged against them.
  const bares = chosen.filter((one) => !isBare(one)).map(bareOf);
  const cases = distinct([...chosen, ...bares]);
  const drawing = drawingOf(link, cases);
  const sample = sampleOf(drawing, sampling);
  const marginsOf = new Map(cases.map((one, k) => [keyOf(one), sample.margins[k]!]));
  const budgetOf = new Map(cases.map((one, k) => [keyOf(one), drawing.budgets[k]!]));

  const rows = chosen.map((one): SpreadRow => {
    const margins = marginsOf.get(keyOf(one))!;
    const bare = marginsOf.get(keyOf(bareOf(one)))!;
    const { marginDb, marginSigmaDb, holdProbability, verdict, mechanisms } = budgetOf.get(keyOf(one))!;
    const closes = chanceOf(margins, 0);
    const range = rangeOf(margins.slice());
    return {
      case: one,
      marginDb: range,
      meanDb: mean(margins),
      sigmaDb: Math.sqrt(variance(margins)),
      closes,
      keepsReserve: chanceOf(margins, decision.reserveDb),
      verdict: verdictOf(range.medianDb, closes.share, decision),
      budget: { marginDb, marginSigmaDb, holdProbability, verdict, mechanisms },
      costDb: isBare(one) ? undefined : rangeOf(difference(bare, margins)),
      lost: shareOf(margins.length, (i) => bare[i]! > 0 && margins[i]! <= 0),
      won: shareOf(margins.length, (i) => bare[i]! <= 0 && margins[i]! > 0),
    };
  });
  const own = chosen.filter(
    (one) => one.transmitter.cover === transmitter.cover && one.receiver.cover === receiver.cover,
  );
  const warnings = warningsOnce();
  for (const one of cases) warnings.add(budgetOf.get(keyOf(one))!.warnings);
  return {
    title,
    frequencyGHz,
    path: link.path,
    mode: chosen[0]!.mode,
    seed: sampling.seed,
    draws: sample.draws,
    mostDraws: sampling.draws,
    precision: sampling.precision,
    halfWidth: sample.halfWidth,
    causes: drawing.causes,
    rows,
    rankings: spreadRanking(link, own.length > 0 ? own : chosen, sampling.seed),
    warnings: warnings.all(),
  };
}

function bareOf(one: Case): Case {
  return {
    ...one,
    transmitter: { ...one.transmitter, cover: "bare" },
    receiver: { ...one.receiver, cover: "bare" },
  };
}

function keyOf({ weather, transmitter, receiver }: Case): string {
  return JSON.stringify([weather, transmitter.cover, receiver.cover]);
}

function distinct(cases: readonly Case[]): Case[] {
  return [...new Map(cases.map((one) => [keyOf(one), one])).values()];
}

function rangeOf(sample: Float64Array): Range {
  const [lowDb, medianDb, highDb] = quantilesOf(sample, QUANTILES) as [number, number, number];
  return { lowDb, medianDb, highDb };
}

function chanceOf(margins: Float64Array, levelDb: number): Chance {
  const share = shareAbove(margins, levelDb);
  const { low, high } = proportionInterval({
    hits: Math.round(share * margins.length),
    trials: margins.length,
  });
  return { share, low, high };
}

function difference(a: Float64Array, b: Float64Array): Float64Array {
  const out = new Float64Array(a.length);
  for (let i = 0; i < out.length; i++) out[i] = a[i]! - b[i]!;
  return out;
}

function shareOf(count: number, holds: (i: number) => boolean): number {
  let hits = 0;
  for (let i = 0; i < count; i++) if (holds(i)) hits++;
  return hits / count;
}
