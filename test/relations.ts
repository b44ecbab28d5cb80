/** Reader of reference tables whose rows are calls of named relations: `inputs` as key=value;key=value. */
import { expect } from "vitest";
import type { Row } from "./reference.ts";

export function inputsOf(row: Row): Record<string, number> {
  return Object.fromEntries(
    row["inputs"]!.split(";").map((pair) => {
      const [key, value] = pair.split("=");
      return [key!, Number(value)];
    }),
  );
}

/** Compares within the tolerance that the row itself prints: `abs x`, `rel x` or `exact`. */
export function expectPrinted(row: Row, ours: number, theirs: number): void {
  const [kind, size] = row["tolerance"]!.split(" ");
  const allowed = kind === "exact" ? 1e-12 : Number(size) * (kind === "rel" ? Math.abs(theirs) : 1);
  expect(Math.abs(ours - theirs), `${row["id"]}: ${ours} against ${theirs}`).toBeLessThanOrEqual(allowed);
}
