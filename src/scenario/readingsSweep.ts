import { readFileSync, statSync } from "node:fs";
import { abs } from "../numeric/complex.ts";
import { readTouchstone, type SweepPoint } from "../readings/touchstone.ts";
import { TouchstoneFault } from "../readings/touchstoneFault.ts";
import type { FileFault } from "./readingsFaults.ts";
import { shown, visible } from "./wording.ts";

/** A sweep of more is no bench's [bytes]. */
const LARGEST = 50_000_000;

/** A sweep of the bare feed or of one cover before it. */
export interface SweepFile {
  readonly file: string;
  readonly ports: 1 | 2;
  readonly points: readonly SweepPoint[];
}

/** Reads a Touchstone file, .s1p or .s2p; never throws. */
function readSweep(path: string, file: string): SweepFile | FileFault {
  const fault = (code: string, message: string, line = 1): FileFault => {
    return { code, message: visible(message), file, line };
  };
  const ports = portsOf(path);
  if (ports === undefined) {
    return fault("bad_sweep", `read ${shown(file)}, expected a Touchstone file that ends in .s1p or .s2p`);
  }
  try {
    const { size } = statSync(path);
    if (size > LARGEST)
      return fault("too_large", `is ${size} bytes long, expected a sweep of at most ${LARGEST}`);
    const bytes = readFileSync(path);
    if (bytes.includes(0)) return fault("not_text", "is a binary file, expected Touchstone text");
    // Latin-1 never fails: comments may hold letters of any code, and the data are plain.
    const { points } = readTouchstone(bytes.toString("latin1").replace(/^\xef\xbb\xbf/, ""), ports);
    const total = points.find(({ s11 }) => !(abs(s11) < 1 && abs(s11) > 0));
    if (total) {
      const what = `|S11| of ${abs(total.s11)} at ${total.frequencyHz} Hz`;
      return fault(
        "out_of_range",
        `${what}, expected more than 0 and less than 1; is the calibration right?`,
      );
    }
    const dead = points.find(({ s21 }) => s21 !== undefined && abs(s21) === 0);
    if (dead) return fault("out_of_range", `no transmission at ${dead.frequencyHz} Hz: S21 is 0`);
    return { file, ports, points };
  } catch (error) {
    if (error instanceof TouchstoneFault) return fault("bad_sweep", error.message, error.line);
    return fault("unreadable", unreadable(error));
  }
}

/** Sweeps of bare and of covers, by file; every fault of them. */
export function readSweeps(files: Readonly<Record<string, string>>): {
  readonly sweeps: Readonly<Record<string, SweepFile>>;
  readonly faults: readonly FileFault[];
} {
  const faults: FileFault[] = [];
  const sweeps: Record<string, SweepFile> = {};
  for (const [state, path] of Object.entries(files)) {
    const sweep = readSweep(path, path);
    if ("message" in sweep) faults.push(sweep);
    else sweeps[state] = sweep;
  }
  const { bare, ...covered } = sweeps;
  if (bare) faults.push(...Object.values(covered).flatMap((sweep) => apart(bare, sweep)));
  return { sweeps, faults };
}

/** A covered sweep that holds none of the frequencies of the bare one. */
function apart(bare: SweepFile, covered: SweepFile): FileFault[] {
  const [low, high] = [covered.points[0]!.frequencyHz, covered.points.at(-1)!.frequencyHz];
  if (bare.points.some(({ frequencyHz }) => frequencyHz >= low && frequencyHz <= high)) return [];
  const band = ({ points }: SweepFile) => `${points[0]!.frequencyHz} to ${points.at(-1)!.frequencyHz} Hz`;
  const message = `${band(covered)} holds no frequency of ${bare.file}, ${band(bare)}`;
  return [{ code: "no_overlap", message, file: covered.file, line: 1 }];
}

export function portsOf(path: string): 1 | 2 | undefined {
  const ports = /\.s([12])p$/i.exec(path)?.[1];
  return ports === undefined ? undefined : ports === "1" ? 1 : 2;
}

/** Why a file cannot be read. */
export function unreadable(error: unknown): string {
  const { code, message } = error as NodeJS.ErrnoException;
  if (code === "ENOENT" || code === "ENOTDIR") return "no such file";
  if (code === "EACCES" || code === "EPERM") return "no permission to read the file";
  return code === "EISDIR" ? "is a folder, expected a file" : `cannot be read (${code ?? message})`;
}
