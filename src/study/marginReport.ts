import { evaluate } from "../budget/evaluate.ts";
import type { Budget, Case, Link, PathGeometry, Warning } from "../budget/types.ts";

/** The margin report: every asked case, and the doubts about all of them, each said once. */
export interface MarginReport {
  readonly title: string;
  readonly frequencyGHz: number;
  readonly path: PathGeometry;
  readonly budgets: readonly Omit<Budget, "warnings">[];
  readonly warnings: readonly Warning[];
}

/** Evaluates the cases one by one. */
export function marginReport(link: Link, chosen: readonly Case[]): MarginReport {
  const seen = new Map<string, Warning>();
  const budgets = chosen.map((one) => {
    const { warnings, ...budget } = evaluate(link, one);
    for (const warning of warnings) seen.set(`${warning.code} ${warning.where} ${warning.message}`, warning);
    return budget;
  });
  const { title, frequencyGHz } = link.scenario;
  return { title, frequencyGHz, path: link.path, budgets, warnings: [...seen.values()] };
}
