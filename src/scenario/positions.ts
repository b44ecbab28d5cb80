import { type Document, isMap, isNode, isPair, isScalar, type LineCounter, type Node } from "yaml";

/** Where something stands in a file, lines and columns from 1. */
export interface Position {
  readonly line: number;
  readonly column: number;
}

/**
 * Place of what a path names: its value; failing that (a missing key, an alias) the nearest parent that has a
 * place, by the key under which it stands.
 */
export function positionOf(document: Document, lines: LineCounter, path: readonly PropertyKey[]): Position {
  for (let length = path.length; length > 0; length--) {
    const node = document.getIn(path.slice(0, length), true);
    const whole = length === path.length;
    const place =
      whole && isNode(node) && isScalar(node) ? node : (keyNode(document, path.slice(0, length)) ?? node);
    if (isNode(place) && place.range) return at(lines, place.range[0]);
  }
  const { contents } = document;
  return at(lines, isNode(contents) && contents.range ? contents.range[0] : 0);
}

/** Place of a key itself, for a key that should not be there. */
export function positionOfKey(
  document: Document,
  lines: LineCounter,
  path: readonly PropertyKey[],
): Position {
  const key = keyNode(document, path);
  return key?.range ? at(lines, key.range[0]) : positionOf(document, lines, path.slice(0, -1));
}

function keyNode(document: Document, path: readonly PropertyKey[]): Node | undefined {
  const parent = path.length === 1 ? document.contents : document.getIn(path.slice(0, -1), true);
  if (!isMap(parent)) return undefined;
  const pair = parent.items.find(
    (item) => isPair(item) && isScalar(item.key) && String(item.key.value) === String(path.at(-1)),
  );
  return isScalar(pair?.key) ? pair.key : undefined;
}

export function at(lines: LineCounter, offset: number): Position {
  const { line, col } = lines.linePos(offset);
  return { line: Math.max(1, line), column: Math.max(1, col) };
}
