import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { join } from "node:path";
import { Script } from "node:vm";

/** The whole program, and the part of it that must start fast. */
export type Bundle = "program" | "quick";

/** Which bundle has a command. */
export function bundleFor(command: string | undefined): Bundle {
  return command === "budget" || command === "check" ? "quick" : "program";
}

/**
 * Runs a bundle from V8's code cache, which is written when the package is built: reading it takes half the
 * time of compiling. V8 refuses the cache of another version, and then compiles. Code from a cache cannot
 * `import()`, so the bundler turns what the program loads late into `require()`.
 *
 * @param folder  where the bundles and their caches lie
 * @returns the compiled script, from which the cache can be written
 */
export function runBundle(folder: string, bundle: Bundle): Script {
  const filename = join(folder, `${bundle}.cjs`);
  const cachedData = bytesOf(cacheFile(folder, bundle));
  // The bundle is pure ASCII, and already wrapped as a function of a module's arguments.
  const source = readFileSync(filename, "latin1");
  const script = new Script(source, { filename, ...(cachedData && { cachedData }) });
  const module = { exports: {} };
  script.runInThisContext()(createRequire(filename), module, module.exports, folder);
  return script;
}

export function cacheFile(folder: string, bundle: Bundle): string {
  return join(folder, `${bundle}.cache`);
}

function bytesOf(file: string): Buffer | undefined {
  try {
    return readFileSync(file);
  } catch {
    return undefined;
  }
}
