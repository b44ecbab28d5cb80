import {
  describeRefusal,
  kinds,
  type Quantity,
  type QuantityKind,
  type Reading,
  readQuantity,
} from "./quantity.ts";
import { rangeHint } from "./rangeHints.ts";
import { instead } from "./wording.ts";

export interface FieldOptions {
  /** What the field means; an editor shows it. */
  readonly about: string;
  /** Lowest and highest value that can be meant, in the canonical unit of the kind. */
  readonly range: readonly [low: number, high: number];
}

/**
 * A quantity that makes sense in its field, or what is wrong with it; a promise only where arithmetic is in it.
 *
 * @param spread  true where `3 W +/- 0.5 dB` is welcome
 */
export function judgedQuantity(
  input: unknown,
  kind: QuantityKind,
  options: FieldOptions,
  spread: boolean,
): Quantity | string | Promise<Quantity | string> {
  if (typeof input !== "string") return instead(input, kinds[kind].expected);
  const judge = (reading: Reading) => {
    if (!reading.ok) return describeRefusal(reading);
    return outOfRange(reading, kind, options) ?? reading;
  };
  const reading = readQuantity(input, kind, { spread });
  if (reading.ok || !reading.libraryMayRead) return judge(reading);
  // mathjs is slow to start: it is loaded for arithmetic and rare units alone.
  return import("#math-units").then(({ readArithmetic }) => judge(readArithmetic(input, kind)));
}

function outOfRange(read: Quantity, kind: QuantityKind, { about, range }: FieldOptions): string | undefined {
  const [low, high] = range;
  const { value, sigma = 0 } = read;
  const unit = kinds[kind].usual[0]!;
  if (value >= low && value <= high) {
    if (sigma <= high - low) return undefined;
    return `read a spread of ${sigma}, expected less than the range from ${low} to ${high} ${unit}`;
  }
  const hint = rangeHint(read, kind, range);
  return (
    `read "${`${read.number} ${read.unit}`.trim()}", expected ${about} from ${low} to ${high} ${unit}`.trim() +
    (hint === undefined ? "" : ` (${hint})`)
  );
}
