import type { MechanismName, Verdict } from "../budget/types.ts";
import { capital, listed, tenth } from "./words.ts";

/** One way for the signal, as far as a sentence needs it. */
export interface Way {
  readonly name: MechanismName;
  readonly label: string;
  readonly excessDb: number;
}

export const verdictWords = { closes: "closes", thin: "is thin", fails: "fails" } as const satisfies Record<
  Verdict,
  string
>;

/** Which way carries the path in a weather, what that leaves, and what the next best would give. */
export function mechanismSentence(
  weather: string,
  mode: string,
  verdict: Verdict,
  ways: readonly (Way & { readonly marginDb: number })[],
): string {
  const [best, next] = ways;
  const cost = best!.name === "line_of_sight" ? "" : `, ${tenth(best!.excessDb)} dB beyond free space`;
  const other = next === undefined ? "" : `; next best ${next.label}, ${tenth(next.marginDb)} dB left`;
  return (
    `${capital(weather)}: ${best!.label} carries the path${cost}; ${mode} ${verdictWords[verdict]} ` +
    `with ${tenth(best!.marginDb)} dB${other}.`
  );
}

/** A budget, as far as the way of its signal goes. */
interface Carried {
  readonly case: { readonly weather: string };
  readonly marginDb: number;
  readonly mechanisms: readonly Way[];
}

/** The same for a margin report: weathers with the same way taken together, the next best of each beside it. */
export function carriedText(budgets: readonly Carried[]): string[] {
  const byWay = new Map<string, Carried[]>();
  for (const budget of budgets) {
    const { label } = budget.mechanisms[0]!;
    byWay.set(label, [...(byWay.get(label) ?? []), budget]);
  }
  return [...byWay].map(([label, some]) => {
    const { name, excessDb } = some[0]!.mechanisms[0]!;
    const where = byWay.size === 1 ? "" : ` in ${listed(some.map((budget) => budget.case.weather))}`;
    const cost = name === "line_of_sight" ? "" : `, ${tenth(excessDb)} dB beyond free space`;
    const others = some.flatMap(({ case: { weather }, marginDb, mechanisms: [best, next] }) =>
      next === undefined
        ? []
        : [`${next.label} in ${weather} (${tenth(marginDb + best!.excessDb - next.excessDb)} dB left)`],
    );
    const second = others.length === 0 ? "" : `; next best ${listed(others)}`;
    return `${capital(label)} carries the path${where}${cost}${second}.`;
  });
}
