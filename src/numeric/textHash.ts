/** Where FNV-1a begins (from memory). */
const OFFSET = 0x811c9dc5;

/**
 * A number for a text, the same on every machine: 32 bits, signed.
 *
 * Source: FNV-1a of Fowler, Noll and Vo (from memory), over UTF-16 code units
 *
 * @param start  another one gives another number for the same text
 */
export function textHash(text: string, start = OFFSET): number {
  let value = start;
  for (let i = 0; i < text.length; i++) value = Math.imul(value ^ text.charCodeAt(i), 0x01000193);
  return value;
}
