import { describeRefusal, type QuantityKind, readQuantity, type Scenario } from "../index.ts";
import { UserError } from "./terminal.ts";

/** Width of a band in an option [GHz]. */
export function bandOf(text: string, { frequencyGHz }: Scenario): number {
  const range = [1, 1e9 * frequencyGHz] as const;
  return within("--band", text, "bandwidthHz", range, `1 Hz to the frequency, ${frequencyGHz} GHz`) / 1e9;
}

/** A quantity in an option, in the canonical unit of its kind. */
export function within(
  option: string,
  text: string,
  kind: QuantityKind,
  [low, high]: readonly [number, number],
  range: string,
): number {
  const reading = readQuantity(text, kind);
  if (!reading.ok) throw new UserError(`${option}: ${describeRefusal(reading)}`);
  if (reading.value >= low && reading.value <= high) return reading.value;
  throw new UserError(`${option}: read "${text}", expected ${range}`);
}
