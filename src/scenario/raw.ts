/** A group of keys as typed, before any schema. */
export type Raw = Readonly<Record<string, unknown>>;

export function isGroup(value: unknown): value is Raw {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}
