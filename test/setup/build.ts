import { execFileSync } from "node:child_process";
import { existsSync, readdirSync, statSync } from "node:fs";

const root = new URL("../..", import.meta.url).pathname;

/**
 * Builds program and library before the tests, so that the tests of the command line run what a user runs.
 * Where nothing has changed since the last build it is left in peace: another run may be using it.
 */
export default function build(): void {
  if (isFresh()) return;
  for (const part of ["program", "library"]) {
    execFileSync("npm", ["run", "--silent", `build:${part}`], { cwd: root, stdio: "inherit" });
  }
}

/** Whether the oldest thing built is younger than the newest thing that it is built from. */
function isFresh(): boolean {
  const built = ["oilskin.cjs", "program.cjs", "program.cache", "rosterWorker.cjs", "index.js"].map(
    (name) => `${root}dist/${name}`,
  );
  if (!built.every(existsSync)) return false;
  const sources = readdirSync(`${root}src`, { recursive: true, encoding: "utf8" }).map(
    (name) => `src/${name}`,
  );
  const changed = ["package.json", "package-lock.json", ...sources].map((name) => modifiedMs(root + name));
  return Math.min(...built.map(modifiedMs)) > Math.max(...changed);
}

function modifiedMs(file: string): number {
  return statSync(file).mtimeMs;
}
