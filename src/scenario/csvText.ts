import { closeSync, createReadStream, openSync, readSync, statSync } from "node:fs";

/** Told of bytes read, of all; a 200 MB file takes a while. */
export type Progress = (bytes: number, ofBytes: number) => void;

const HEAD_BYTES = 65_536;
const PIECE_BYTES = 1 << 18;

/** The first lines of a file, as many as it takes to see its header; the last of them may be cut off. */
export function headLines(path: string): string[] {
  const head = Buffer.alloc(HEAD_BYTES);
  const descriptor = openSync(path, "r");
  const length = readSync(descriptor, head, 0, HEAD_BYTES, 0);
  closeSync(descriptor);
  return head
    .toString("utf8", 0, length)
    .replace(/^\ufeff/, "")
    .split(/\r\n?|\n/);
}

/** Whether a line of a table holds nothing to be read. */
export function isIdle(line: string): boolean {
  return line.startsWith("#") || line.trim() === "";
}

/** The separator of a header: comma, semicolon or tab, the one that occurs most outside quotes. */
export function separatorOf(header: string): string {
  const unquoted = header.replace(/"[^"]*"/g, "");
  const separators = [",", ";", "\t"];
  return separators.reduce((a, b) => (unquoted.split(b).length > unquoted.split(a).length ? b : a));
}

/**
 * The text of a file piece by piece.
 *
 * @param fatal  whether bytes that are no UTF-8 end it; otherwise they come as U+FFFD
 * @throws Error with code BINARY on a zero byte, ERR_ENCODING_INVALID_ENCODED_DATA where `fatal`
 */
export async function* textOf(path: string, fatal: boolean, progress?: Progress): AsyncGenerator<string> {
  const decoder = new TextDecoder("utf-8", { fatal, ignoreBOM: true });
  const { size } = statSync(path);
  let done = 0;
  for await (const chunk of createReadStream(path, { highWaterMark: PIECE_BYTES })) {
    const bytes = chunk as Buffer;
    if (bytes.includes(0)) throw Object.assign(new Error(), { code: "BINARY" });
    yield decoder.decode(bytes, { stream: true });
    done += bytes.length;
    progress?.(done, size);
  }
  yield decoder.decode();
}
