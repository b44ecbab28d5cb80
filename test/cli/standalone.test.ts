import { copyFileSync, cpSync, readdirSync, rmSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { demo, oilskin, root, temporaryFolder } from "./run.ts";

describe("a copy of the program without its arithmetic", () => {
  const copy = temporaryFolder();
  cpSync(join(root, "dist"), join(copy, "dist"), { recursive: true });
  copyFileSync(join(root, "package.json"), join(copy, "package.json"));
  const program = join(copy, "dist/oilskin.cjs");
  for (const file of readdirSync(join(copy, "dist"))) {
    if (file.startsWith("mathUnits.")) rmSync(join(copy, "dist", file));
  }

  it("still prints the demo: the plain report does not wait for it", () => {
    expect(oilskin(["budget", demo], { program })).toEqual(oilskin(["budget", demo]));
  });

  it("needs no other package beside it", () => {
    expect(oilskin(["materials"], { program })).toEqual(oilskin(["materials"]));
  });

  it("without its cache does the same, only later", () => {
    for (const bundle of ["program", "quick"]) rmSync(join(copy, `dist/${bundle}.cache`));
    expect(oilskin(["budget", demo], { program })).toEqual(oilskin(["budget", demo]));
  });
});
