const WIDTH = 40;

/** Told of work done, of all. */
export type Progress = (done: number, of: number) => void;

/** Least time between two states of a bar that tells a rate [ms]. */
const BEAT_MS = 200;

/**
 * A bar that fills on a terminal and goes away when all is done; undefined where nobody watches.
 *
 * @param label  what is being done, a word or two
 */
export function progressBar(stream: NodeJS.WriteStream, label: string): Progress | undefined {
  if (!isWatched(stream)) return undefined;
  let shown = -1;
  return (done, of) => {
    const filled = Math.floor((WIDTH * done) / of);
    if (filled === shown && done < of) return;
    shown = filled;
    // Carriage return to draw over the last state; "erase in line" leaves a clean line behind the last one.
    stream.write(done < of ? `\r${label} ${barOf(done / of)}` : CLEAR);
  };
}

/** A bar that tells its rate and the time left. */
export interface RateBar {
  /**
   * @param share  of all, 0 to 1
   * @param count  things done
   */
  readonly tell: (share: number, count: number) => void;
  readonly clear: () => void;
}

/**
 * The same for work that is counted: how many a second, and how long it will still take.
 *
 * @param noun  what is counted, in the plural
 * @param now   the clock [ms]
 */
export function rateBar(
  stream: NodeJS.WriteStream,
  label: string,
  noun: string,
  now: () => number = Date.now,
): RateBar {
  if (!isWatched(stream)) return { tell: () => {}, clear: () => {} };
  const start = now();
  let told = start;
  let shown = false;
  return {
    tell: (share, count) => {
      const time = now();
      if (time - told < BEAT_MS || share <= 0) return;
      told = time;
      shown = true;
      const seconds = (time - start) / 1000;
      const rate = Math.round(count / seconds);
      const left = Math.ceil((seconds * (1 - share)) / share);
      const bar = barOf(share, 20);
      stream.write(`\r${label} ${bar}, ${rate} ${noun}/s, ${duration(left)} left\u001b[K`);
    },
    clear: () => {
      if (shown) stream.write(CLEAR);
      shown = false;
    },
  };
}

const CLEAR = "\r\u001b[K";

function isWatched(stream: NodeJS.WriteStream): boolean {
  return stream.isTTY && process.env["TERM"] !== "dumb";
}

function barOf(share: number, width = WIDTH): string {
  const filled = Math.floor(width * share);
  return `[${"#".repeat(filled)}${" ".repeat(width - filled)}] ${Math.floor(100 * share)} %`;
}

function duration(seconds: number): string {
  if (seconds < 100) return `${seconds} s`;
  const minutes = Math.round(seconds / 60);
  return minutes < 100 ? `${minutes} min` : `${(minutes / 60).toFixed(1)} h`;
}
