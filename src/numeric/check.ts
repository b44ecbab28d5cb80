/**
 * Guards for the arguments of public functions. A broken guard is an error of the calling program, so it
 * throws RangeError; what a user typed has been refused long before, with a line and a column.
 */

/** @throws RangeError if `value` is not a finite number within [low, high]. */
export function requireWithin(name: string, value: number, low: number, high: number): void {
  if (!(value >= low && value <= high)) {
    throw new RangeError(`${name} must be a number from ${low} to ${high}, got ${value}`);
  }
}

/** @throws RangeError if `value` is not finite. */
export function requireFinite(name: string, value: number): void {
  if (!Number.isFinite(value)) throw new RangeError(`${name} must be a finite number, got ${value}`);
}

/** @throws RangeError if `value` is not finite and above 0. */
export function requirePositive(name: string, value: number): void {
  if (!(value > 0 && value < Infinity)) {
    throw new RangeError(`${name} must be a finite number above 0, got ${value}`);
  }
}

/** @throws RangeError if `value` is not finite and at least 0. */
export function requireNotNegative(name: string, value: number): void {
  if (!(value >= 0 && value < Infinity)) {
    throw new RangeError(`${name} must be a finite number of at least 0, got ${value}`);
  }
}

/** The range in which the source of a model vouches for it: field name to [low, high], in the field's unit. */
export type Validity = Readonly<Record<string, readonly [low: number, high: number]>>;

export interface Overreach {
  readonly field: string;
  readonly value: number;
  readonly low: number;
  readonly high: number;
}

/** The fields of `values` that lie outside `validity`; a model still answers there, the budget warns. */
export function outside(
  validity: Validity,
  values: Readonly<Record<string, number | undefined>>,
): Overreach[] {
  return Object.entries(validity).flatMap(([field, [low, high]]) => {
    const value = values[field];
    return value === undefined || (value >= low && value <= high) ? [] : [{ field, value, low, high }];
  });
}
