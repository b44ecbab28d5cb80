import { execFileSync } from "node:child_process";
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { beforeEach, describe, expect, it, vi } from "vitest";
import { openDraft, writeWhole } from "../../src/cli/wholeFile.ts";
import { temporaryFolder } from "./run.ts";

/** The codes with which the calls of the system are to fail, or what is to happen before them. */
const broken = vi.hoisted(() => ({ link: "", rename: "", beforeLink: () => {} }));

vi.mock("node:fs", async (original) => {
  const real = await original<typeof import("node:fs")>();
  const fail = (code: string) => {
    if (code !== "") throw Object.assign(new Error(code), { code });
  };
  return {
    ...real,
    linkSync: (from: string, to: string) => {
      broken.beforeLink();
      fail(broken.link);
      real.linkSync(from, to);
    },
    renameSync: (from: string, to: string) => {
      fail(broken.rename);
      real.renameSync(from, to);
    },
  };
});

describe("writing a file whole", () => {
  const parent = temporaryFolder();
  let count = 0;
  let folder = "";
  let file = "";
  beforeEach(() => {
    Object.assign(broken, { link: "", rename: "", beforeLink: () => {} });
    folder = join(parent, String(count++));
    mkdirSync(folder);
    file = join(folder, "path.yaml");
  });

  it("leaves the text and nothing beside it", () => {
    writeWhole(file, "new", false);
    expect(readFileSync(file, "utf8")).toBe("new");
    expect(readdirSync(folder)).toEqual(["path.yaml"]);
  });

  it("keeps a file that came into being while it wrote", () => {
    broken.beforeLink = () => writeFileSync(file, "theirs");
    expect(() => writeWhole(file, "new", false)).toThrow("exists already; --force replaces it");
    expect(readFileSync(file, "utf8")).toBe("theirs");
    expect(readdirSync(folder)).toEqual(["path.yaml"]);
  });

  it.each([false, true])("puts nothing in the place of a folder or a pipe, force %j", (force) => {
    execFileSync("mkfifo", [file]);
    expect(() => openDraft(file, force)).toThrow("is no plain file");
    expect(readdirSync(folder)).toEqual(["path.yaml"]);
    expect(() => openDraft(folder, force)).toThrow("is a folder");
    expect(readdirSync(parent).filter((name) => name.includes(".part"))).toEqual([]);
  });

  // FAT answers EPERM to a link, Android EACCES (from memory).
  it.each(["EPERM", "EACCES"])("writes where the file system refuses links with %s", (code) => {
    broken.link = code;
    writeWhole(file, "new", false);
    expect(readFileSync(file, "utf8")).toBe("new");
    expect(readdirSync(folder)).toEqual(["path.yaml"]);
  });

  it("leaves the old file and no draft where the last step fails", () => {
    writeFileSync(file, "old");
    broken.rename = "EIO";
    expect(() => writeWhole(file, "new", true)).toThrow("cannot be written (EIO)");
    expect(readFileSync(file, "utf8")).toBe("old");
    expect(readdirSync(folder)).toEqual(["path.yaml"]);
  });
});

describe("a file that is written piece by piece", () => {
  const folder = temporaryFolder();

  it("has its name only when it is whole", () => {
    const file = join(folder, "whole.csv");
    const draft = openDraft(file, false);
    draft.write("a");
    draft.write(Buffer.from("\u00e4"));
    expect(readdirSync(folder)).toEqual([expect.stringMatching(/^whole\.csv\.\d+\.part$/)]);
    draft.keep();
    draft.drop();
    expect(readFileSync(file, "utf8")).toBe("a\u00e4");
    expect(readdirSync(folder)).toEqual(["whole.csv"]);
  });

  it("leaves nothing where it is given up", () => {
    const before = readdirSync(folder);
    const draft = openDraft(join(folder, "given up.csv"), false);
    draft.write("a");
    draft.drop();
    expect(readdirSync(folder)).toEqual(before);
  });

  it("is refused at once where there is one already, or no such folder", () => {
    const file = join(folder, "mine.csv");
    writeFileSync(file, "mine");
    expect(() => openDraft(file, false)).toThrow("exists already; --force replaces it");
    expect(() => openDraft(join(folder, "none", "x.csv"), false)).toThrow("no such folder");
    expect(readFileSync(file, "utf8")).toBe("mine");
  });
});
