import type { Budget, MechanismName, Verdict } from "../budget/types.ts";

/** Margin in one rain. */
export interface Rung {
  readonly rateMmPerH: number;
  readonly marginDb: number;
  readonly marginSigmaDb: number;
  readonly holdProbability: number;
  readonly verdict: Verdict;
  /** The way that carries the path. */
  readonly mechanism: MechanismName;
}

export function rungOf(rateMmPerH: number, budget: Budget): Rung {
  const { marginDb, marginSigmaDb, holdProbability, verdict, mechanisms } = budget;
  return { rateMmPerH, marginDb, marginSigmaDb, holdProbability, verdict, mechanism: mechanisms[0]!.name };
}
