import { mkdirSync, readdirSync, readFileSync, symlinkSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { oilskin, temporaryFolder } from "./run.ts";

describe("oilskin new", () => {
  const folder = temporaryFolder();
  const file = join(folder, "path.yaml");
  const written = oilskin(["new", file]);

  it("writes the starter and says what to do next", () => {
    expect(written).toEqual({
      status: 0,
      stdout: `path.yaml written; now: oilskin budget ${file}\n`,
      stderr: "",
    });
    expect(readFileSync(file, "utf8")).toMatch(/^# .*\n[\s\S]*\ntitle: .*\nfrequency: /);
  });

  it("writes a starter that is sound", () => {
    const { status, stdout } = oilskin(["check", file]);
    expect(status).toBe(0);
    expect(stdout).toMatch(/: sound; 1 feed, 4 covers with bare, 4 weathers\n/);
  });

  it("writes a starter that has a budget", () => {
    const { status, stderr, stdout } = oilskin(["budget", file]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    expect(stdout).toContain("My hill to the far hill");
  });

  it("leaves no other file behind", () => {
    expect(readdirSync(folder)).toEqual(["path.yaml"]);
  });

  it("keeps a file that exists", () => {
    const mine = join(temporaryFolder(), "mine.yaml");
    writeFileSync(mine, "mine");
    const { status, stdout, stderr } = oilskin(["new", mine]);
    expect({ status, stdout, stderr }).toEqual({
      status: 2,
      stdout: "",
      stderr: `${mine} exists already; --force replaces it\n`,
    });
    expect(readFileSync(mine, "utf8")).toBe("mine");
  });

  it("replaces it where it is forced to, and leaves no draft", () => {
    const place = temporaryFolder();
    const old = join(place, "old.yaml");
    writeFileSync(old, "old");
    expect(oilskin(["new", old, "--force"]).status).toBe(0);
    expect(readFileSync(old, "utf8")).toBe(readFileSync(file, "utf8"));
    expect(readdirSync(place)).toEqual(["old.yaml"]);
  });

  it("does not follow a link that leads nowhere", () => {
    const place = temporaryFolder();
    symlinkSync(join(place, "elsewhere"), join(place, "link.yaml"));
    const { status, stderr } = oilskin(["new", join(place, "link.yaml")]);
    expect(status).toBe(2);
    expect(stderr).toContain("exists already");
    expect(readdirSync(place)).toEqual(["link.yaml"]);
  });

  it("tells of a folder that is not there", () => {
    const place = temporaryFolder();
    const lost = join(place, "nowhere", "path.yaml");
    expect(oilskin(["new", lost])).toEqual({
      status: 2,
      stdout: "",
      stderr: `${lost} cannot be written: no such folder\n`,
    });
    expect(readdirSync(place)).toEqual([]);
  });

  it("does not replace a folder, even where it is forced to", () => {
    const place = temporaryFolder();
    mkdirSync(join(place, "folder"));
    const { status, stdout, stderr } = oilskin(["new", join(place, "folder"), "--force"]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain("is a folder");
    expect(stderr).not.toContain("    at ");
    expect(readdirSync(place)).toEqual(["folder"]);
  });

  it("asks for a file name", () => {
    const { status, stdout, stderr } = oilskin(["new"]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain("missing required argument 'file'");
  });
});
