/** The same names with other values; written out as a loop, because a roster does it for every station. */
export function mapValues<T, U>(
  group: Readonly<Record<string, T>>,
  f: (value: T, name: string) => U,
): Record<string, U> {
  const made: Record<string, U> = {};
  for (const name in group) made[name] = f(group[name]!, name);
  return made;
}
