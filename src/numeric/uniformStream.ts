import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";
import { textHash } from "./textHash.ts";

/** A stream of random numbers, evenly spread and strictly inside (0, 1). */
export interface UniformStream {
  /** Fills an array with the numbers that come next. */
  readonly fill: (out: Float64Array) => void;
}

const STEP = 2 ** -32;

/**
 * The stream that belongs to a seed and a name: the same two give the same numbers on every machine. Streams of
 * different names are independent, so that one input more leaves the draws of the others as they were.
 *
 * Source: xoroshiro128+ of Blackman & Vigna 2018 by a library
 *
 * @param seed  a whole number, 0 to 2^32 - 1
 */
export function uniformStream(seed: number, name: string): UniformStream {
  const generator = xoroshiro128plus(textHash(name) ^ seed);
  // Seeds that differ in a few bits give like first numbers; 2^64 steps on nothing of that is left.
  generator.jump();
  return {
    fill: (out) => {
      for (let i = 0; i < out.length; i++) out[i] = ((generator.next() >>> 0) + 0.5) * STEP;
    },
  };
}
