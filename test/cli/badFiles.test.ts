import { chmodSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import type { MarginReport } from "../../src/study/marginReport.ts";
import { changedDemo, demo, oilskin, scenarioFile, scenarioNames, shell, temporaryFolder } from "./run.ts";

const folder = temporaryFolder();

/** Slips in the demo, each with its place (line and column) and what must be said of it. */
const slips: readonly [name: string, piece: string | RegExp, by: string, place: string, ...said: string[]][] =
  [
    [
      "unknown key",
      "    return_loss: 18 dB",
      "    retrun_loss: 18 dB",
      "14:5",
      '"retrun_loss"',
      "return_loss?",
    ],
    ["missing key", "frequency: 10.368 GHz\n", "", "5:1", 'missing key "frequency"', "10.368 GHz"],
    ["wrong unit", "10.368 GHz", "10.368 mm", "6:12", '"10.368 mm"', "is a length"],
    ["bare number", "10.368 GHz", "10.368", "6:12", '"10.368"', "bare number; write 10.368 GHz"],
    ["unknown cover", "cover: film }", "cover: flim }", "9:68", '"flim"', "did you mean film?"],
    ["unknown feed", "feed: horn", "feed: hron", "9:55", '"hron"', "did you mean horn?"],
    ["unknown material", "FEP film", "FEP flim", "29:26", '"FEP flim"', "did you mean FEP film?"],
    ["negative thickness", "5 mil", "-5 mil", "29:47", '"-5 mil"', "from 0"],
    ["no number", "power: 10 mW", "power: .nan", "9:23", '".nan"', "a power"],
    ["no number in words", "power: 10 mW", "power: NaN W", "9:23", '"NaN W"', "a power"],
    ["a number past all bounds", "power: 10 mW", "power: 1e400 W", "9:23", '"1e400 W"', "too large"],
    ["a word for a quantity", "power: 10 mW", "power: plenty", "9:23", '"plenty"', "a power"],
    ["a key twice", "polarization: horizontal", "frequency: 10 GHz", "7:1", "twice"],
    ["a tab", "polarization: horizontal", "\tpolarization: horizontal", "7:1", "tab"],
    ["a bracket left open", "wind: 8 m/s }", "wind: 8 m/s", "", "nothing was computed"],
  ];

const bomb = ["a: &a [x, x, x, x, x, x, x, x, x]"]
  .concat([..."bcdefgh"].map((to, i) => `${to}: &${to} [${`*${"abcdefg"[i]}, `.repeat(9)}]`))
  .join("\n");

/** Files that are no scenario at all. */
const strangers: readonly [name: string, content: string | Buffer, said: string][] = [
  ["an empty file", "", "empty"],
  ["nothing but remarks", "# later\n", "empty"],
  ["a list", "- a\n- b\n", "expected a scenario"],
  ["a sentence", "hello there\n", "expected a scenario"],
  ["a binary file", Buffer.from([0x7f, 0x45, 0x4c, 0x46, 0, 1, 2, 3]), "binary"],
  ["a text in another code", Buffer.from([0x74, 0x3a, 0x20, 0xe9, 0xff, 0x0a]), "UTF-8"],
  ["aliases that multiply", bomb, "alias"],
  ["brackets without end", "[".repeat(50_000), "deeper"],
  ["a very long file", "title: a\n# ".padEnd(200_000, "x"), "long"],
];

/** Refused by status, in one voice: place and fault on stderr, nothing on stdout, no stack. */
function expectRefused(args: readonly string[], file: string, place: string, ...said: readonly string[]) {
  const { status, stdout, stderr } = oilskin(args);
  expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
  expect(stderr).toContain(`${file}:${place}`);
  expect(stderr).toMatch(/:\d+:\d+: \S.*\n\d+ faults?; nothing was computed\n$/);
  for (const words of said) expect(stderr).toContain(words);
  expect(stderr).not.toMatch(/^ +at /m);
}

describe("a scenario with a slip", () => {
  it.each(slips)("%s: `budget` names place, reading and expectation", (name, piece, by, place, ...said) => {
    const file = changedDemo(folder, `${name}.yaml`, piece, by);
    expectRefused(["budget", file], file, place, ...said);
  });

  it("is refused in the same words by `check`", () => {
    const file = changedDemo(folder, "same.yaml", "10.368 GHz", "10.368 mm");
    const [byBudget, byCheck] = ["budget", "check"].map((command) => oilskin([command, file]));
    expect(byCheck).toEqual(byBudget);
    expect(byCheck!.status).toBe(2);
  });

  it("has all its faults told at once, in order", () => {
    const first = changedDemo(folder, "first.yaml", "10.368 GHz", "10.368 mm");
    const file = join(folder, "three.yaml");
    writeFileSync(
      file,
      readFileSync(first, "utf8").replace("5 mil", "-5 mil").replace("extent: 8 km", "extnet: 8 km"),
    );
    const { stderr } = oilskin(["check", file]);
    const lines = stderr.split("\n").map((line) => Number(line.slice(file.length + 1).split(":")[0]));
    expect(lines.slice(0, 3)).toEqual([6, 29, 55]);
    expect(stderr).toContain("3 faults; nothing was computed");
  });

  it("has its line breaks of another system counted as one", () => {
    const file = join(folder, "crlf.yaml");
    writeFileSync(
      file,
      readFileSync(demo, "utf8").replace("10.368 GHz", "10.368 mm").replaceAll("\n", "\r\n"),
    );
    expectRefused(["check", file], file, "6:12: ");
  });
});

describe("a file that is no scenario", () => {
  it.each(strangers)("%s is refused", (name, content, said) => {
    const file = join(folder, `${name}.yaml`);
    writeFileSync(file, content);
    expectRefused(["budget", file], file, "", said);
  });

  it("a folder is refused", () => {
    const file = join(folder, "a folder");
    mkdirSync(file);
    expectRefused(["budget", file], file, "1:1: ", "is a folder");
  });

  it("a missing file is refused", () => {
    const file = join(folder, "nowhere.yaml");
    expectRefused(["budget", file], file, "1:1: ", "no such file");
  });

  const canStepDown = process.getuid?.() === 0 && shell("command -v setpriv").status === 0;
  it.skipIf(!canStepDown && process.getuid?.() === 0)("a file that may not be read is refused", () => {
    const place = temporaryFolder();
    chmodSync(place, 0o755);
    const file = changedDemo(place, "closed.yaml", "10 mW", "20 mW");
    chmodSync(file, 0o000);
    const nobody = canStepDown ? "setpriv --reuid 65534 --regid 65534 --clear-groups " : "";
    const { status, stdout, stderr } = shell(`${nobody}"$NODE" "$OILSKIN" budget '${file}'`);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toBe(`${file}:1:1: no permission to read the file\n1 fault; nothing was computed\n`);
  });

  it("leaves nothing in the folder where the program runs", () => {
    const place = temporaryFolder();
    const file = changedDemo(place, "bad.yaml", "10.368 GHz", "10.368 mm");
    for (const command of ["budget", "check"]) oilskin([command, file, "--"], { folder: place });
    expect(readdirSync(place)).toEqual(["bad.yaml"]);
  });
});

describe("oilskin check", () => {
  it.each(scenarioNames)("finds %s sound, and tells its doubts", (name) => {
    const file = scenarioFile(name);
    const { status, stdout, stderr } = oilskin(["check", file]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    const [first, ...rest] = stdout.trimEnd().split("\n");
    expect(first).toMatch(/: sound; \d feeds?, \d covers with bare, \d weathers$/);
    expect(rest.length).toBeGreaterThan(0);
    expect(rest[0]).toBe("Warnings");
    for (const line of rest.slice(1)) {
      expect(line).toMatch(/^( {2}- | {4})\S/);
      expect(line.length).toBeLessThanOrEqual(80);
    }
  });

  it("tells the doubts that the budget tells", () => {
    const { warnings } = JSON.parse(oilskin(["budget", demo, "--json"]).stdout) as MarginReport;
    const [, ...items] = oilskin(["check", demo]).stdout.split("\n  - ");
    const told = items.map((item) => item.trim().replace(/\s+/g, " "));
    expect(told).toEqual(warnings.map(({ where, message }) => `${where}: ${message}`));
  });

  it("tells of what is stated for nothing, and finds the scenario sound; so does the budget", () => {
    const file = changedDemo(folder, "idle.yaml", "dry: {}", "dry: { extent: 5 km }");
    for (const command of ["check", "budget"]) {
      const { status, stdout, stderr } = oilskin([command, file]);
      expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
      expect(stdout).toContain("  - weather.dry.extent: does nothing without rain\n");
    }
  });

  it("counts one as one", () => {
    const file = join(folder, "plain.yaml");
    const text = readFileSync(demo, "utf8");
    writeFileSync(file, text.slice(0, text.indexOf("weather:")));
    const [first] = oilskin(["check", file]).stdout.split("\n");
    expect(first).toBe(`${file}: sound; 2 feeds, 5 covers with bare, 1 weather`);
  });
});
