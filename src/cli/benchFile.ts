import type { FileFault } from "../index.ts";
import { UserError } from "./terminal.ts";

/** All faults of the files read, as one error. */
export function faultsError(faults: readonly FileFault[]): UserError {
  const lines = faults.map(({ file, line, column, message }) => {
    return `${file}:${line}:${column === undefined ? "" : `${column}:`} ${message}`;
  });
  const count = faults.length === 1 ? "1 fault" : `${faults.length} faults`;
  return new UserError(`${lines.join("\n")}\n${count}; nothing was computed`);
}

/** Least time between two words on progress [ms]. */
const BEAT_MS = 200;

/** Words on the progress of a long file, on standard error and only where that is a terminal. */
export function progressOf(stream: NodeJS.WriteStream): {
  readonly tell: ((bytes: number, ofBytes: number) => void) | undefined;
  readonly clear: () => void;
} {
  if (!stream.isTTY) return { tell: undefined, clear: () => {} };
  let told = Date.now();
  let shown = false;
  return {
    tell: (bytes, ofBytes) => {
      if (Date.now() - told < BEAT_MS) return;
      told = Date.now();
      shown = true;
      stream.write(`\rread ${Math.floor((100 * bytes) / ofBytes)} % of ${Math.ceil(ofBytes / 1e6)} MB`);
    },
    clear: () => {
      if (shown) stream.write("\r\u001b[K");
    },
  };
}
