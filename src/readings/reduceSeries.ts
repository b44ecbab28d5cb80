import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import { type BracketedDifference, bracketDifferences, type TimedReading } from "./bracket.ts";
import { combineUncertainty, rectangular, type UncertaintyComponent } from "./gum.ts";
import { outlyingReading } from "./outliers.ts";
import { coverageFactorFor } from "./studentT.ts";
import { BENCH_REPEATABILITY_DB, judgeLoss, type LossJudgement } from "./verdict.ts";

export interface CoverageChoice {
  /** Coverage factor k, fixed; default 2, but Student's for 95.45 % where a single degree of freedom is left. */
  readonly coverage?: number | undefined;
  /** Instead of k: the level of confidence, k then from the effective degrees of freedom. */
  readonly confidence?: number | undefined;
}

export interface TypeBInput {
  /** Half-width a of the repeatability of the bench [dB], default 0.05. */
  readonly repeatabilityDb?: number | undefined;
  /** Further sources: linearity, resolution, mismatch ripple, room. */
  readonly typeB?: readonly UncertaintyComponent[] | undefined;
}

export interface ReduceSeriesInput extends CoverageChoice, TypeBInput {
  readonly readings: readonly TimedReading[];
  readonly feedReturnLossDb?: number | undefined;
  /** By the name of the cover. */
  readonly coveredReturnLossDb?: Readonly<Record<string, number>> | undefined;
}

export interface ReducedCover extends LossJudgement {
  readonly state: string;
  readonly lossDb: number;
  /** Standard uncertainty of the mean from the scatter of the readings [dB]. */
  readonly typeADb: number;
  readonly combinedDb: number;
  readonly expandedDb: number;
  readonly coverageFactor: number;
  readonly effectiveDegreesOfFreedom: number;
  readonly differencesDb: readonly number[];
}

export interface ReducedSeries {
  readonly covers: readonly ReducedCover[];
  /** Standard deviation of one reading, pooled over all covers [dB], and its degrees of freedom. */
  readonly readingStandardDb: number;
  readonly degreesOfFreedom: number;
  /** The reading that fits worst, where it is too far out to be chance; it is kept in all figures. */
  readonly outlier?: { readonly reading: number; readonly shiftDb: number };
  /** Places of covered readings that no open reading brackets: not used. */
  readonly unbracketed: readonly number[];
}

/**
 * Insertion loss of each cover from a run of bare and covered readings in any order.
 *
 * Differences by `bracketDifferences`. Neighbouring ones share an open reading and so are correlated; with the
 * weights w_i of the readings in each difference, and their mean m over the n differences of a cover,
 *
 *     sigma^2 = sum (D_i - IL)^2 / sum |w_i - m|^2     both sums over all covers (pooled)
 *     u_A^2 = sigma^2 |m|^2
 *
 * which in equal steps, one cover, is [s^2/(1 - 1/(3n))]/n x [1 + (n - 1)/(3n)]. Type B is added by
 * `combineUncertainty`.
 *
 * Source: JCGM 100:2008, 4.2, 4.3, 5.1 and annex G; the weights: own derivation
 * Valid:  equal and independent scatter of all readings; drift linear between open readings. A step of the level
 *         goes half into one difference and widens the interval rather than hiding.
 *
 * @param readings             in order of time; at least two bracketed ones of one cover
 * @param feedReturnLossDb     bare [dB], above 0: lets a gain be judged
 * @param coveredReturnLossDb  covered [dB], above 0, by cover: with the bare one lets the energy floor be judged
 * @throws RangeError on readings that leave no scatter to judge by, or on an argument outside these ranges
 */
export function reduceSeries({
  readings,
  repeatabilityDb,
  typeB,
  feedReturnLossDb,
  coveredReturnLossDb = {},
  coverage,
  confidence,
}: ReduceSeriesInput): ReducedSeries {
  const { differences, unbracketed } = bracketDifferences(readings);
  const groups = groupByCover(differences);
  const degreesOfFreedom = groups.reduce((sum, { members }) => sum + members.length - 1, 0);
  if (degreesOfFreedom < 1) {
    throw new RangeError(
      "readings must hold at least two covered readings of one cover, each between open ones",
    );
  }
  const deviations = groups.flatMap(({ members, lossDb }) => members.map((one) => one.differenceDb - lossDb));
  const centred = groups.flatMap(({ members, meanWeights }) =>
    members.map((one) => one.weights.map((weight, r) => weight - meanWeights[r]!)),
  );
  const readingVariance = sumOfSquares(deviations) / sumOfSquares(centred.flat());
  const outlier = outlyingReading({
    values: deviations,
    shifts: readings.map((_, r) => centred.map((row) => row[r]!)),
    degreesOfFreedom,
    leastShift: Math.max(repeatabilityDb ?? 0, BENCH_REPEATABILITY_DB),
  });
  const covers = groups.map(({ state, members, lossDb, meanWeights }) => {
    const typeADb = Math.sqrt(readingVariance * sumOfSquares(meanWeights));
    const uncertainty = expandedUncertainty(typeADb, degreesOfFreedom, {
      repeatabilityDb,
      typeB,
      coverage,
      confidence,
    });
    const judgement = judgeLoss({
      lossDb,
      expandedDb: uncertainty.expandedDb,
      feedReturnLossDb,
      coveredReturnLossDb: coveredReturnLossDb[state],
    });
    const differencesDb = members.map((one) => one.differenceDb);
    return { state, lossDb, typeADb, ...uncertainty, ...judgement, differencesDb };
  });
  return {
    covers,
    readingStandardDb: Math.sqrt(readingVariance),
    degreesOfFreedom,
    ...(outlier && { outlier: { reading: outlier.index, shiftDb: outlier.shift } }),
    unbracketed,
  };
}

/**
 * Type A and type B together, expanded.
 *
 * @param typeADb           standard uncertainty from scatter [dB], at least 0
 * @param degreesOfFreedom  of that scatter, at least 1
 * @throws RangeError on an argument outside these ranges
 */
export function expandedUncertainty(
  typeADb: number,
  degreesOfFreedom: number,
  { repeatabilityDb = BENCH_REPEATABILITY_DB, typeB = [], coverage, confidence }: CoverageChoice & TypeBInput,
): { combinedDb: number; expandedDb: number; coverageFactor: number; effectiveDegreesOfFreedom: number } {
  requireNotNegative("repeatabilityDb", repeatabilityDb);
  if (coverage !== undefined) requirePositive("coverage", coverage);
  const { standard, effectiveDegreesOfFreedom } = combineUncertainty([
    { standard: typeADb, degreesOfFreedom },
    { standard: rectangular(repeatabilityDb) },
    ...typeB,
  ]);
  const fixed = coverage ?? (confidence === undefined && degreesOfFreedom > 1 ? 2 : undefined);
  const coverageFactor = fixed ?? coverageFactorFor(confidence ?? 0.9545, effectiveDegreesOfFreedom);
  return {
    combinedDb: standard,
    expandedDb: coverageFactor * standard,
    coverageFactor,
    effectiveDegreesOfFreedom,
  };
}

function groupByCover(differences: readonly BracketedDifference[]) {
  const states = [...new Set(differences.map(({ state }) => state))];
  return states.map((state) => {
    const members = differences.filter((one) => one.state === state);
    const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
    return {
      state,
      members,
      lossDb: mean(members.map((one) => one.differenceDb)),
      meanWeights: members[0]!.weights.map((_, r) => mean(members.map((one) => one.weights[r]!))),
    };
  });
}

function sumOfSquares(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value * value, 0);
}
