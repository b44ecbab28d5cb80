import { existsSync, readFileSync } from "node:fs";
import { isBuiltin } from "node:module";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { root } from "./run.ts";

interface Manifest {
  readonly bin: Readonly<Record<string, string>>;
  readonly exports: Readonly<Record<string, { readonly import: string }>>;
  readonly imports: Readonly<Record<string, { readonly require: string; readonly default: string }>>;
  readonly dependencies: Readonly<Record<string, string>>;
}

const manifest = JSON.parse(readFileSync(join(root, "package.json"), "utf8")) as Manifest;

describe("the package", () => {
  it("has built what it names", () => {
    const named = [
      manifest.bin["oilskin"]!,
      manifest.exports["."]!.import,
      manifest.imports["#math-units"]!.require,
      manifest.imports["#math-units"]!.default,
      "dist/rosterWorker.cjs", // a thread's file, found beside the program
    ];
    expect(named.filter((file) => !existsSync(join(root, file)))).toEqual([]);
  });

  it("is plain ASCII where the program is read as such: a sign in a pattern would match nothing", () => {
    for (const bundle of ["program", "quick"]) {
      const text = readFileSync(join(root, `dist/${bundle}.cjs`), "utf8");
      expect([...text.matchAll(/.{0,30}[^\0-\x7f]/g)].map(([place]) => place)).toEqual([]);
    }
  });

  it("declares every package that the library loads", () => {
    const text = readFileSync(join(root, manifest.exports["."]!.import), "utf8");
    const loaded = [...text.matchAll(/^(?:import|export) .*from "([^"]+)"|import\("([^"]+)"\)/gm)]
      .map((match) => match[1] ?? match[2]!)
      .filter((name) => !isBuiltin(name) && !name.startsWith("#"));
    expect(loaded.length).toBeGreaterThan(0);
    const declared = Object.keys(manifest.dependencies);
    const packageOf = (name: string) => /^(@[^/]+\/)?[^/]+/.exec(name)![0];
    expect(new Set(loaded.filter((name) => !declared.includes(packageOf(name))))).toEqual(new Set());
  });
});
