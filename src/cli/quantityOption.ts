import { describeRefusal, type QuantityKind, readQuantity } from "../index.ts";
import { UserError } from "./terminal.ts";

/**
 * An option that holds a quantity with its unit; undefined where it was not given.
 *
 * @param range  lowest and highest, in the canonical unit of the kind
 * @throws UserError naming the option
 */
export function quantityOption(
  option: string,
  text: string | undefined,
  kind: QuantityKind,
  [low, high]: readonly [low: number, high: number],
  unit: string,
): number | undefined {
  if (text === undefined) return undefined;
  const reading = readQuantity(text, kind);
  if (!reading.ok) throw new UserError(`${option}: ${describeRefusal(reading)}`);
  if (reading.value >= low && reading.value <= high) return reading.value;
  throw new UserError(`${option}: read "${text}", expected ${low} to ${high} ${unit}`);
}
