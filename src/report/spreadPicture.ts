import type { SpreadRow } from "../study/spread.ts";
import { coverName } from "./marginText.ts";
import { LINE_WIDTH, lengthOf } from "./words.ts";

/** Narrowest picture that still shows something [characters]. */
const LEAST_WIDTH = 20;

/** A bar a cover from its 5 to its 95 % margin, the median an o, on one scale with the lines of 0 and of the reserve. */
export function rangePicture(rows: readonly SpreadRow[], reserveDb: number): string {
  const names = rows.map(coverName);
  const head = Math.max(...names.map(lengthOf)) + 2;
  const width = Math.max(LEAST_WIDTH, LINE_WIDTH - head - 1);
  const ends = rows.flatMap(({ marginDb: { lowDb, highDb } }) => [lowDb, highDb]);
  const [low, high] = [Math.min(0, ...ends), Math.max(reserveDb, ...ends)];
  const span = Math.max(1, high - low);
  const place = (db: number) => Math.round(((db - low) / span) * (width - 1));
  const lines = rows.map(({ marginDb: { lowDb, medianDb, highDb } }, i) => {
    const bar = Array<string>(width).fill(" ");
    bar[place(0)] = "|";
    if (reserveDb > 0 && place(reserveDb) > place(0)) bar[place(reserveDb)] = ":";
    for (let at = place(lowDb); at <= place(highDb); at++) bar[at] = bar[at] === " " ? "-" : "+";
    bar[place(medianDb)] = "o";
    return `${names[i]!.padEnd(head)}${bar.join("")}`.trimEnd();
  });
  const axis = Array<string>(width).fill(" ");
  const write = (text: string, at: number) => {
    const from = Math.max(0, Math.min(width - text.length, at));
    for (const [i, character] of [...text].entries()) axis[from + i] = character;
  };
  const most = `${Math.round(high)} dB`;
  const roomAbove = place(0) + 1 < width - most.length;
  if (roomAbove) write(most, width);
  const least = roomAbove ? `${Math.round(low)}` : `${Math.round(low)} dB`;
  if (low < 0 && place(0) > least.length) write(least, 0);
  write("0", place(0));
  return [...lines, `${" ".repeat(head)}${axis.join("")}`.trimEnd()].join("\n");
}
