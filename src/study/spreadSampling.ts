import type { Drawing } from "../budget/drawing.ts";
import { proportionInterval } from "../numeric/proportion.ts";
import { type UniformStream, uniformStream } from "../numeric/uniformStream.ts";

/** Fewer draws than this leave the 5 % margin uncertain by more than a tenth of a dB, so that no precision stops before. */
const FEWEST_DRAWS = 16_384;

export interface Sampling {
  /** Most draws, at least 1. */
  readonly draws: number;
  /** A whole number, 0 to 2^32 - 1. */
  readonly seed: number;
  /** Half-width of the 95 % interval of each probability of closing at which enough is known, above 0. */
  readonly precision: number;
  /** Told of draws done, of the most. */
  readonly progress?: ((done: number, of: number) => void) | undefined;
}

export interface Sample {
  readonly draws: number;
  /** By case [dB]. */
  readonly margins: readonly Float64Array[];
  /** Widest half-width of the 95 % intervals of the probabilities of closing. */
  readonly halfWidth: number;
}

/**
 * Draws the cases of a drawing together, so that they differ by themselves alone (common random numbers), until
 * each probability of a margin above 0 is known well enough or all draws are spent.
 */
export function sampleOf(drawing: Drawing, { draws, seed, precision, progress }: Sampling): Sample {
  const { block, causes, uniforms, margins, work } = drawing;
  const streams = causes.map(({ id }) => uniformStream(seed, id));
  let kept = margins.map(() => new Float64Array(Math.min(draws, FEWEST_DRAWS)));
  const hits = new Uint32Array(margins.length);
  let done = 0;
  let halfWidth = 1;
  while (done < draws) {
    fill(streams, uniforms);
    work();
    const taken = Math.min(block, draws - done);
    if (done + taken > kept[0]!.length) kept = kept.map((some) => grown(some, draws));
    for (const [k, drawn] of margins.entries()) {
      const into = kept[k]!;
      for (let i = 0; i < taken; i++) {
        into[done + i] = drawn[i]!;
        if (drawn[i]! > 0) hits[k]!++;
      }
    }
    done += taken;
    progress?.(done, draws);
    const widths = Array.from(hits, (some) => proportionInterval({ hits: some, trials: done }).halfWidth);
    halfWidth = Math.max(...widths);
    if (done >= FEWEST_DRAWS && halfWidth <= precision) break;
  }
  progress?.(draws, draws);
  return { draws: done, margins: kept.map((some) => some.subarray(0, done)), halfWidth };
}

export function fill(streams: readonly UniformStream[], uniforms: readonly Float64Array[]): void {
  for (const [i, stream] of streams.entries()) stream.fill(uniforms[i]!);
}

function grown(some: Float64Array, most: number): Float64Array<ArrayBuffer> {
  const larger = new Float64Array(Math.min(most, 2 * some.length));
  larger.set(some);
  return larger;
}
