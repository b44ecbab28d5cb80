import { uniformFloat64 } from "pure-rand/distribution/uniformFloat64";
import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";
import { type Row, referenceRows } from "../reference.ts";

/** `name=value` pairs of a cell of the bench table. */
export function fieldsOf(cell: string): Record<string, string> {
  return Object.fromEntries(cell.split(" ").map((pair) => pair.split("=") as [string, string]));
}

/** Rows of the bench table of one kind, with their input and expected cells; none where the table is absent. */
export function benchRows(kind: string): { row: Row; input: string; expected: string; tolerance: number }[] {
  const rows = referenceRows("covers/check-bench.csv") ?? [];
  return rows
    .filter((row) => row["kind"] === kind)
    .map((row) => ({
      row,
      input: row["input"]!,
      expected: row["expected"]!,
      tolerance: Number(row["tol"]),
    }));
}

/** Draws of random variates, the same ones for the same start. */
export function randomSource(start: number): { uniform: () => number; normal: () => number } {
  const generator = xoroshiro128plus(start);
  const uniform = () => uniformFloat64(generator);
  // Box-Muller
  const normal = () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
  return { uniform, normal };
}
