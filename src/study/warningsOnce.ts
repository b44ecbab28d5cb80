import type { Warning } from "../budget/types.ts";

/** Doubts of many budgets, each once. */
export interface WarningsOnce {
  readonly add: (warnings: readonly Warning[]) => void;
  readonly all: () => Warning[];
}

/** The figures of a doubt differ from budget to budget: they alone make no other doubt, and the last ones stay. */
export function warningsOnce(): WarningsOnce {
  const seen = new Map<string, Warning>();
  return {
    add: (warnings) => {
      for (const warning of warnings) {
        const { code, where, message } = warning;
        seen.set(`${code} ${where} ${message.replace(/[\d.]+/g, "")}`, warning);
      }
    },
    all: () => [...seen.values()],
  };
}
