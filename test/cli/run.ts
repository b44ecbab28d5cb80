/** Runs the built program as a user does: by its file, in a process of its own, with a bare environment. */
import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll } from "vitest";

export const root = new URL("../..", import.meta.url).pathname;
export const programFile = join(root, "dist/oilskin.cjs");

export const scenarioNames = ["hilltop-contest", "coast-beacon", "town-link"] as const;
export const scenarioFile = (name: (typeof scenarioNames)[number]) => join(root, `scenarios/${name}.yaml`);
export const demo = scenarioFile("hilltop-contest");

export interface Ended {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

export interface RunOptions {
  readonly environment?: Readonly<Record<string, string>>;
  readonly folder?: string;
  /** Options of Node itself. */
  readonly node?: readonly string[];
  /** Another copy of the program. */
  readonly program?: string;
}

export function oilskin(args: readonly string[], options: RunOptions = {}): Ended {
  const { environment = {}, folder = root, node = [], program = programFile } = options;
  return ended(
    spawnSync(process.execPath, [...node, program, ...args], {
      cwd: folder,
      encoding: "utf8",
      maxBuffer: 64e6,
      env: { PATH: process.env["PATH"], ...environment },
    }),
  );
}

/** Runs a line of shell in which `"$NODE" "$OILSKIN"` is the program. */
export function shell(line: string, environment: Readonly<Record<string, string>> = {}): Ended {
  return ended(
    spawnSync("/bin/bash", ["--norc", "-c", line], {
      cwd: root,
      encoding: "utf8",
      maxBuffer: 64e6,
      env: { PATH: process.env["PATH"], NODE: process.execPath, OILSKIN: programFile, ...environment },
    }),
  );
}

function ended({ status, stdout, stderr }: Ended): Ended {
  return { status, stdout, stderr };
}

/** A folder that goes away after the tests of the file. */
export function temporaryFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), "oilskin-"));
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}

/** The demo with a piece of its text replaced, in a file of that name. */
export function changedDemo(folder: string, name: string, piece: string | RegExp, by: string): string {
  const text = readFileSync(demo, "utf8");
  const changed = text.replace(piece, by);
  if (changed === text) throw new Error(`the demo holds no ${piece}`);
  const file = join(folder, name);
  writeFileSync(file, changed);
  return file;
}

/** Width as a terminal of one column a character has it. */
export function widest(text: string): number {
  return Math.max(...text.split("\n").map((line) => [...line].length));
}
