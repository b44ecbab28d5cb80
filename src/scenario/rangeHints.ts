import { either, kinds, type Quantity, type QuantityKind, readQuantity, round } from "./quantity.ts";

/**
 * What was probably meant by a quantity outside its window: the same number in another of its usual units.
 *
 * `10368 GHz: did you mean 10368 MHz (10.368 GHz)?` Every usual unit that brings the number into the window is
 * named; undefined where none does, or where the value lies in the window already.
 *
 * @param window  lowest and highest plausible value, in the canonical unit of the kind
 */
export function rangeHint(
  { number, unit, value }: Quantity,
  kind: QuantityKind,
  [low, high]: readonly [low: number, high: number],
): string | undefined {
  if (value >= low && value <= high) return undefined;
  const canonical = kinds[kind].usual[0]!;
  const meant = kinds[kind].usual.flatMap((name) => {
    const reading = readQuantity(`${number} ${name}`, kind);
    if (!reading.ok || reading.value < low || reading.value > high) return [];
    const converted = name === canonical ? "" : ` (${Number(reading.value.toPrecision(6))} ${canonical})`;
    return [`${number} ${name}${converted}`];
  });
  if (meant.length === 0) return undefined;
  return `${round(number)} ${unit}: did you mean ${either(meant)}?`;
}
