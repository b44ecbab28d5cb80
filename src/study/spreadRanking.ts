import type { Matter } from "../budget/causes.ts";
import { type Drawing, drawingOf } from "../budget/drawing.ts";
import type { Case, Link } from "../budget/types.ts";
import { mean, quantilesOf, rankCorrelation, shareAbove, skewness, variance } from "../numeric/ranking.ts";
import { uniformStream } from "../numeric/uniformStream.ts";
import { varianceShare } from "../numeric/varianceShare.ts";
import { fill } from "./spreadSampling.ts";

/** Draws of the ranking: shares come out to some 2 %. */
const DRAWS = 4096;

/** What one matter does to a margin; blunders are left out of all of it. */
export interface MatterOfSpread {
  readonly matter: Matter;
  /** Share of the variance that would go on the mean if the matter were known, 0 to 1. */
  readonly varianceShare: number;
  /** Spearman's rank correlation of the margin with what the matter by itself makes of it, 0 to 1. */
  readonly rankCorrelation: number;
  /** Standard deviation that it makes by itself [dB]. */
  readonly sigmaDb: number;
  /** By itself: mean less the budget's margin [dB], and third standardised moment. */
  readonly shiftDb: number;
  readonly skewness: number;
  /** Of a margin in which the matter has its usual value: 5 % quantile [dB], and probability above 0. */
  readonly knownLowDb: number;
  readonly knownCloses: number;
}

/** What the spread of one case hangs on, the largest share first. */
export interface SpreadRanking {
  readonly case: Case;
  /** 5 % quantile [dB] and probability of closing where there are no blunders. */
  readonly lowDb: number;
  readonly closes: number;
  readonly matters: readonly MatterOfSpread[];
  /** Root-sum-square of the matters' deviations: of all, of the covers with their water, and of all others [dB]. */
  readonly sigmaDb: number;
  readonly coverSigmaDb: number;
  readonly otherSigmaDb: number;
}

/** Matters that a cover brings. */
export const coverMatters: readonly Matter[] = ["cover", "water"];

/**
 * What the spread of cases hangs on: two independent samples, and mixtures of them matter by matter. Matters that
 * both ends have are taken together, with what ties them.
 *
 * Source: shares as `numeric/varianceShare.ts` has them
 */
export function spreadRanking(link: Link, cases: readonly Case[], seed: number): SpreadRanking[] {
  const drawing = drawingOf(link, cases, DRAWS);
  const { causes, uniforms } = drawing;
  const columns = (name: string) => {
    fill(
      causes.map(({ id }) => uniformStream(seed, `${name} ${id}`)),
      uniforms,
    );
    return uniforms.map((some, i) =>
      causes[i]!.matter === "blunder" ? new Float64Array(DRAWS).fill(causes[i]!.still) : some.slice(),
    );
  };
  const [first, second] = [columns("first"), columns("second")];
  const still = causes.map((cause) => new Float64Array(DRAWS).fill(cause.still));
  const a = marginsWith(drawing, first);
  const b = marginsWith(drawing, second);
  const base = marginsWith(drawing, still).map((margins) => margins[0]!);
  const matters = [...new Set(causes.map(({ matter }) => matter))].filter((matter) => matter !== "blunder");
  const all = matters.map((matter) => {
    const take = (ours: readonly Float64Array[], others: readonly Float64Array[]) =>
      marginsWith(
        drawing,
        causes.map((cause, i) => (cause.matter === matter ? ours : others)[i]!),
      );
    return { matter, mixed: take(second, first), alone: take(first, still), known: take(still, first) };
  });
  return cases.map((one, k): SpreadRanking => {
    const found = all.map(({ matter, mixed, alone, known }): MatterOfSpread => {
      const by = alone[k]!;
      return {
        matter,
        varianceShare: Math.min(1, Math.max(0, varianceShare(a[k]!, b[k]!, mixed[k]!))),
        rankCorrelation: Math.max(0, rankCorrelation(a[k]!, by)),
        sigmaDb: Math.sqrt(variance(by)),
        shiftDb: mean(by) - base[k]!,
        skewness: skewness(by),
        knownCloses: shareAbove(known[k]!, 0),
        knownLowDb: quantilesOf(known[k]!.slice(), [0.05])[0]!,
      };
    });
    const matters = found
      .filter(({ sigmaDb }) => sigmaDb > LEAST_DB)
      .sort((x, y) => y.varianceShare - x.varianceShare || y.sigmaDb - x.sigmaDb);
    return {
      case: one,
      lowDb: quantilesOf(a[k]!.slice(), [0.05])[0]!,
      closes: shareAbove(a[k]!, 0),
      matters,
      sigmaDb: deviationOf(matters),
      coverSigmaDb: deviationOf(matters.filter(({ matter }) => coverMatters.includes(matter))),
      otherSigmaDb: deviationOf(matters.filter(({ matter }) => !coverMatters.includes(matter))),
    };
  });
}

/** Less than this is no spread [dB]. */
const LEAST_DB = 1e-6;

function marginsWith({ uniforms, margins, work }: Drawing, columns: readonly Float64Array[]): Float64Array[] {
  for (const [i, some] of columns.entries()) uniforms[i]!.set(some);
  work();
  return margins.map((some) => some.slice());
}

function deviationOf(matters: readonly MatterOfSpread[]): number {
  return Math.hypot(...matters.map(({ sigmaDb }) => sigmaDb));
}
