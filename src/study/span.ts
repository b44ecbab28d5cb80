/** A figure that may be known within bounds only; `low` and `high` are the same where it is known. */
export interface Span {
  readonly low: number;
  readonly high: number;
}

export const exact = (value: number): Span => ({ low: value, high: value });

/** The same rising function of both bounds. */
export function mapSpan({ low, high }: Span, f: (value: number) => number): Span {
  return { low: f(low), high: f(high) };
}

export function sum(a: Span, b: Span): Span {
  return { low: a.low + b.low, high: a.high + b.high };
}

/** What `a` is more than `b`; each may lie anywhere within its bounds. */
export function difference(a: Span, b: Span): Span {
  return { low: a.low - b.high, high: a.high - b.low };
}
