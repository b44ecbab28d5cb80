import { isMap, isScalar, type Node, type Pair, parseDocument, stringify, type YAMLMap } from "yaml";

/** What `measured` of a cover is to say, as typed. */
export interface MeasuredEntry {
  readonly insertion_loss: string;
  readonly return_loss_change?: string;
  readonly source: string;
}

/**
 * A scenario with the readings of one cover put in, every other character as it was.
 *
 * A cover that exists keeps its other keys; its `measured`, if it has one, is replaced.
 *
 * @param text  a sound scenario
 * @returns undefined where the file's form leaves no place for it, such as covers that are an alias
 */
export function withMeasuredCover(text: string, name: string, entry: MeasuredEntry): string | undefined {
  const crlf = /\r\n/.test(text);
  const plain = text.replace(/\r\n?/g, "\n");
  const edited = edit(plain, name, flow(entry));
  return crlf ? edited?.replaceAll("\n", "\r\n") : edited;
}

function edit(text: string, name: string, measured: string): string | undefined {
  // The byte-order mark is no part of the document, but the places in the text count it.
  const mark = text.startsWith("\ufeff") ? 1 : 0;
  const document = parseDocument(text.slice(mark), { schema: "failsafe" });
  if (!isMap(document.contents)) return undefined;
  const body = text.slice(mark);
  const covers = pairOf(document.contents, "covers");
  const inserted = (() => {
    if (covers === undefined) {
      return insert(
        body,
        document.contents,
        "covers",
        `\n  ${keyOf(name)}:\n    measured: ${measured}`,
        `{ ${keyOf(name)}: { measured: ${measured} } }`,
      );
    }
    if (!isMap(covers.value)) return undefined;
    const cover = pairOf(covers.value, name);
    if (cover === undefined) {
      const indent = " ".repeat(indentOf(body, covers.value) + 2);
      return insert(
        body,
        covers.value,
        name,
        `\n${indent}measured: ${measured}`,
        `{ measured: ${measured} }`,
      );
    }
    if (!isMap(cover.value)) return undefined;
    const old = pairOf(cover.value, "measured");
    if (old === undefined) return insert(body, cover.value, "measured", ` ${measured}`, measured);
    const [start, end] = (old.value as Node | null)?.range ?? [];
    if (start === undefined || end === undefined) return undefined;
    // A block ends behind its last line's break, which stays.
    const tail = body.slice(start, end).match(/\s*$/)![0];
    return body.slice(0, start) + measured + tail + body.slice(end);
  })();
  return inserted === undefined ? undefined : text.slice(0, mark) + inserted;
}

function pairOf(map: YAMLMap, key: string): Pair | undefined {
  return map.items.find((pair) => isScalar(pair.key) && String(pair.key.value) === key);
}

/** A name as a key: plain where it is made of words, else between quotes, which YAML takes from JSON as they are. */
function keyOf(name: string): string {
  const plain =
    /^\p{L}[\p{L}\p{N}_-]*( [\p{L}\p{N}_-]+)*$/u.test(name) &&
    !/^(null|true|false|yes|no|on|off)$/i.test(name);
  return plain ? name : JSON.stringify(name);
}

/** One line of YAML. */
function flow(value: MeasuredEntry): string {
  return stringify(value, { collectionStyle: "flow", lineWidth: 0 }).trimEnd();
}

/** Column of the first key of a group written in lines. */
function indentOf(text: string, map: YAMLMap): number {
  const start = map.range![0];
  return start - (text.lastIndexOf("\n", start - 1) + 1);
}

/** Puts a key behind the last one of a group: in a line of its own, or inside the braces. */
function insert(
  text: string,
  map: YAMLMap,
  key: string,
  inLines: string,
  inBraces: string,
): string | undefined {
  const last = map.items.at(-1);
  const [start, end] = map.range!;
  if (map.flow) {
    if (last === undefined) return `${text.slice(0, start)}{ ${keyOf(key)}: ${inBraces} }${text.slice(end)}`;
    const behind = endOf(last);
    return behind === undefined
      ? undefined
      : `${text.slice(0, behind)}, ${keyOf(key)}: ${inBraces}${text.slice(behind)}`;
  }
  const behind = last && endOf(last);
  if (behind === undefined) return undefined;
  const line = `${" ".repeat(indentOf(text, map))}${keyOf(key)}:${inLines}\n`;
  const ended = text[behind - 1] === "\n" ? behind : text.indexOf("\n", behind) + 1;
  return ended === 0 ? `${text}\n${line}` : text.slice(0, ended) + line + text.slice(ended);
}

/** Where the value of a pair ends; of a pair without a value, where its key does. */
function endOf({ key, value }: Pair): number | undefined {
  return (value as Node | null)?.range?.[1] ?? (key as Node).range?.[1];
}
