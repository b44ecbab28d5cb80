import { textHash } from "../numeric/textHash.ts";
import type { Point } from "../path/geodesic.ts";

/** Places nearer than this in either coordinate are one [deg]: some metres. */
const SAME_PLACE_DEG = 1e-4;

/** A number for name and place together, in two halves of 32 bits, by which a station is told from all others. */
export type StationKey = readonly [number, number];

/** The key of a station: capitals and small letters are alike, and metres do not matter. */
export function stationKey({ name, latitude, longitude }: Point & { readonly name: string }): StationKey {
  const cell = [latitude, longitude].map((degrees) => Math.round(degrees / SAME_PLACE_DEG));
  const text = `${name.toLowerCase()}\n${cell.join(" ")}`;
  return [mixed(text), mixed(text, 0x2f0b4c47)];
}

/** With an end that mixes (murmur3's, from memory): 64 bits of two are alike once in some 10^7 rosters of a million. */
function mixed(text: string, start?: number): number {
  let h = textHash(text, start);
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return (h ^ (h >>> 16)) >>> 0;
}

/** Remembers stations by their keys: 24 to 48 bytes each, whatever their names. */
export function seenStations(slots = 4096) {
  let size = slots;
  let count = 0;
  let high = new Uint32Array(size);
  let low = new Uint32Array(size);
  /** 0 where the slot is free: lines count from 1. */
  let lines = new Uint32Array(size);
  const slotOf = ([a, b]: StationKey): number => {
    let slot = a & (size - 1);
    while (lines[slot] !== 0 && !(high[slot] === a && low[slot] === b)) slot = (slot + 1) & (size - 1);
    return slot;
  };
  const put = (key: StationKey, line: number): void => {
    const slot = slotOf(key);
    [high[slot], low[slot]] = key;
    lines[slot] = line;
  };
  const grow = (): void => {
    const [a, b, old] = [high, low, lines];
    size *= 2;
    high = new Uint32Array(size);
    low = new Uint32Array(size);
    lines = new Uint32Array(size);
    for (let i = 0; i < old.length; i++) if (old[i] !== 0) put([a[i]!, b[i]!], old[i]!);
  };
  return {
    /** The line on which the station stood first; undefined where this is the first time, which is remembered. */
    firstLineOf: (key: StationKey, line: number): number | undefined => {
      const known = lines[slotOf(key)]!;
      if (known !== 0) return known;
      if (++count > size / 2) grow();
      put(key, line);
      return undefined;
    },
  };
}
