const WIDTH = 40;

/** Told of work done, of all. */
export type Progress = (done: number, of: number) => void;

/**
 * A bar that fills on a terminal and goes away when all is done; undefined where nobody watches.
 *
 * @param label  what is being done, a word or two
 */
export function progressBar(stream: NodeJS.WriteStream, label: string): Progress | undefined {
  if (!stream.isTTY || process.env["TERM"] === "dumb") return undefined;
  let shown = -1;
  return (done, of) => {
    const filled = Math.floor((WIDTH * done) / of);
    if (filled === shown && done < of) return;
    shown = filled;
    const bar = `${"#".repeat(filled)}${" ".repeat(WIDTH - filled)}`;
    const percent = `${Math.floor((100 * done) / of)} %`;
    // Carriage return to draw over the last state; "erase in line" leaves a clean line behind the last one.
    stream.write(done < of ? `\r${label} [${bar}] ${percent}` : "\r\u001b[K");
  };
}
