/** A figure with the limits that physics or the spread of a material leaves it: low <= nominal <= high. */
export interface Bounded {
  readonly nominal: number;
  readonly low: number;
  readonly high: number;
}

/** A figure that is known: all three equal. */
export function exactly(value: number): Bounded {
  return { nominal: value, low: value, high: value };
}

/** Nominal value between two limits; limits that meet it may cross it by rounding and are then moved to it. */
export function bounded(low: number, nominal: number, high: number): Bounded {
  return { nominal, low: Math.min(low, nominal), high: Math.max(high, nominal) };
}

export function plus(a: Bounded, b: Bounded): Bounded {
  return { low: a.low + b.low, nominal: a.nominal + b.nominal, high: a.high + b.high };
}
