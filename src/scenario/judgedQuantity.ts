import { describeRefusal, kinds, type Quantity, type QuantityKind, readQuantity } from "./quantity.ts";
import { rangeHint } from "./rangeHints.ts";
import { instead } from "./wording.ts";

export interface FieldOptions {
  /** What the field means; an editor shows it. */
  readonly about: string;
  /** Lowest and highest value that can be meant, in the canonical unit of the kind. */
  readonly range: readonly [low: number, high: number];
}

/**
 * What is said of a quantity that only the arithmetic can read, while that is not loaded: mathjs is slow to start,
 * and few files need it. `yamlFile.ts` then loads it and judges the file again. A schema that waited here for the
 * module would put what it waited for behind its neighbours, and the weathers of a file out of their order.
 */
export const ARITHMETIC_WANTED = "arithmetic is wanted";

let arithmetic: typeof import("#math-units") | undefined;

/** Takes arithmetic and rare units into memory. */
export async function loadArithmetic(): Promise<void> {
  arithmetic = await import("#math-units");
}

/**
 * A quantity that makes sense in its field, or what is wrong with it.
 *
 * @param spread  true where `3 W +/- 0.5 dB` is welcome
 */
export function judgedQuantity(
  input: unknown,
  kind: QuantityKind,
  options: FieldOptions,
  spread: boolean,
): Quantity | string {
  if (typeof input !== "string") return instead(input, kinds[kind].expected);
  let reading = readQuantity(input, kind, { spread });
  if (!reading.ok && reading.libraryMayRead) {
    if (arithmetic === undefined) return ARITHMETIC_WANTED;
    reading = arithmetic.readArithmetic(input, kind);
  }
  return reading.ok ? (outOfRange(reading, kind, options) ?? reading) : describeRefusal(reading);
}

export function outOfRange(
  read: Quantity,
  kind: QuantityKind,
  { about, range }: FieldOptions,
): string | undefined {
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
