import {
  type Document,
  isAlias,
  isMap,
  isNode,
  isScalar,
  isSeq,
  type Node,
  type Scalar,
  type YAMLMap,
} from "yaml";

/** Where something stands in a file, lines and columns from 1. */
export interface Position {
  readonly line: number;
  readonly column: number;
}

export type FaultPath = readonly PropertyKey[];

export interface Places {
  /**
   * Place of what a path names: a plain value by itself, a group or list by the key under which it stands; of
   * what is missing, the nearest parent that is there.
   */
  readonly ofValue: (path: FaultPath) => Position;
  /** Place of a key itself, for a key that should not be there. */
  readonly ofKey: (path: FaultPath) => Position;
}

interface Step {
  readonly key?: Scalar;
  readonly value: unknown;
}

/** Places in a document whose keys are plain words all. */
export function placesIn(document: Document, at: (offset: number) => Position): Places {
  const indexes = new WeakMap<YAMLMap, Map<string, Step>>();
  const indexOf = (map: YAMLMap) => {
    const known = indexes.get(map);
    if (known) return known;
    const index = new Map(
      map.items.map(({ key, value }) => [String((key as Scalar).value), { key: key as Scalar, value }]),
    );
    indexes.set(map, index);
    return index;
  };
  const step = (from: unknown, name: PropertyKey): Step | undefined => {
    const node = isAlias(from) ? from.resolve(document) : from;
    if (isMap(node)) return indexOf(node).get(String(name));
    return isSeq(node) && Number(name) in node.items ? { value: node.items[Number(name)] } : undefined;
  };
  const walk = (path: FaultPath): { steps: Step[]; last: Node | undefined } => {
    const steps: Step[] = [];
    let node: unknown = document.contents;
    let last = isNode(node) ? node : undefined;
    for (const name of path) {
      const next = step(node, name);
      if (!next) break;
      steps.push(next);
      node = next.value;
      const plain = isScalar(node) || isAlias(node);
      last = plain ? (node as Node) : (next.key ?? (isNode(node) ? node : last));
    }
    return { steps, last };
  };
  const place = (node: Node | undefined) => at(node?.range?.[0] ?? 0);
  return {
    ofValue: (path) => place(walk(path).last),
    ofKey: (path) => {
      const { steps, last } = walk(path);
      return place(steps.at(path.length - 1)?.key ?? last);
    },
  };
}

/** Line and column of an offset; what a file lacks at its end is told behind its last word. */
export function positionsIn(text: string): (offset: number) => Position {
  const starts = [0, ...[...text.matchAll(/\n/g)].map(({ index }) => index + 1)];
  const end = text.trimEnd().length;
  return (offset) => {
    const inside = Math.min(offset, end);
    const line = starts.findLastIndex((start) => start <= inside);
    return { line: line + 1, column: inside - starts[line]! + 1 };
  };
}
