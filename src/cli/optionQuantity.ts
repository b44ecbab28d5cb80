import { describeRefusal, type QuantityKind, readQuantity, type Scenario } from "../index.ts";
import { UserError } from "./terminal.ts";

/**
 * A quantity with its unit in an option, in the canonical unit of its kind.
 *
 * @param range  what is taken, in words for the message
 * @throws UserError naming the option
 */
export function within(
  option: string,
  text: string,
  kind: QuantityKind,
  [low, high]: readonly [low: number, high: number],
  range: string,
): number {
  const reading = readQuantity(text, kind);
  if (!reading.ok) throw new UserError(`${option}: ${describeRefusal(reading)}`);
  if (reading.value >= low && reading.value <= high) return reading.value;
  throw new UserError(`${option}: read "${text}", expected ${range}`);
}

/** The same for an option that may be left out. */
export function quantityOption(
  option: string,
  text: string | undefined,
  kind: QuantityKind,
  range: readonly [low: number, high: number],
  unit: string,
): number | undefined {
  return text === undefined
    ? undefined
    : within(option, text, kind, range, `${range[0]} to ${range[1]} ${unit}`);
}

/** Width of a band in an option [GHz]. */
export function bandOf(text: string, { frequencyGHz }: Scenario): number {
  const range = [1, 1e9 * frequencyGHz] as const;
  return within("--band", text, "bandwidthHz", range, `1 Hz to the frequency, ${frequencyGHz} GHz`) / 1e9;
}

/**
 * A list of quantities in an option that may be repeated, parted by commas. One without a unit has that of the next
 * one that names any, `1, 2, 5 mi`, or the canonical one, `unit`.
 *
 * @throws UserError naming the option
 */
export function listOption(
  option: string,
  texts: readonly string[],
  kind: QuantityKind,
  range: readonly [low: number, high: number],
  unit: string,
  most: number,
): number[] {
  const faults: string[] = [];
  const read = (text: string): number => {
    try {
      return within(option, text, kind, range, `${range[0]} to ${range[1]} ${unit}`);
    } catch (error) {
      if (!(error instanceof UserError)) throw error;
      faults.push(error.message);
      return Number.NaN;
    }
  };
  const values = texts.flatMap((list) => {
    let following = unit;
    const withUnit = (text: string) => {
      const reading = readQuantity(text, kind);
      if (reading.ok) following = reading.unit;
      return !reading.ok && reading.code === "bare_number" ? `${text} ${following}` : text;
    };
    const last = list.split(",").toReversed();
    return last
      .map((part) => withUnit(part.trim()))
      .toReversed()
      .map(read);
  });
  if (faults.length > 0) throw new UserError(faults.join("\n"));
  if (values.length > most) {
    throw new UserError(`${option}: ${values.length} values, expected ${most} at most`);
  }
  return values;
}

/** A whole number in an option. */
export function wholeNumber(option: string, text: string, low: number, high: number): number {
  const number = Number(text);
  if (/^\d+$/.test(text) && number >= low && number <= high) return number;
  const expected = low === high ? `${low} alone` : `a whole number from ${low} to ${high}`;
  throw new UserError(`${option}: read "${text}", expected ${expected}`);
}
