import {
  appendFileSync,
  copyFileSync,
  existsSync,
  readdirSync,
  readFileSync,
  symlinkSync,
  writeFileSync,
} from "node:fs";
import { join } from "node:path";
import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { BenchReport } from "../../src/study/readings.ts";
import { demo, oilskin, root, scenarioFile, shell, temporaryFolder, widest } from "./run.ts";

const folder = temporaryFolder();
const bench = join(root, "scenarios/bench-film.csv");
const [bareSweep, filmSweep] = ["bare", "film"].map((name) => join(root, `scenarios/bench-${name}.s1p`));
const flowing = (text: string) => text.replace(/\s+/g, " ");

function file(name: string, text: string | Uint8Array): string {
  const path = join(folder, name);
  writeFileSync(path, text);
  return path;
}

function textOf(...args: readonly string[]): string {
  const { status, stdout, stderr } = oilskin(["readings", ...args]);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  expect(widest(stdout)).toBeLessThanOrEqual(80);
  return flowing(stdout);
}

const rows = (covered: string, count = 5) =>
  `state,level dB\n${Array.from({ length: count }, (_, i) => (i % 2 ? `film,${covered}\n` : "bare,-40\n")).join("")}`;

describe("oilskin readings", () => {
  it("answers first, in plain words", () => {
    // Mean of the five bracketed differences of the demo: (0.22 + 0.225 + 0.21 + 0.215 + 0.22)/5 = 0.218 dB.
    expect(textOf(bench)).toContain("film: 0.22 dB ± 0.06 dB (95 %)");
    expect(textOf(bench)).toContain("film, match: return loss falls by 1.83 dB");
    expect(textOf(bench)).toContain("line 8: a gust");
    expect(textOf(bench, "--wanted", "0.03dB")).toContain("no number of pairs reaches ±0.03 dB");
    expect(textOf(bench, "--directivity", "35dB")).toContain("the coupler's leak can falsify it by up to");
    expect(textOf(file("same.csv", rows("-40.01")))).toContain(
      "film: indistinguishable from zero: below 0.06 dB (read 0.01 dB ±",
    );
    expect(textOf(file("gain.csv", rows("-39.5")))).toContain("film: retake: it seems to amplify");
  });

  it("tells outliers, unused readings and pairs still to take", () => {
    const levels = [
      -40.02, -40.19, -40.0, -40.24, -39.97, -40.21, -40.03, -40.18, -40.01, -41.2, -40.02, -40.2, -39.99,
    ];
    const text = `film,-40.2\n${levels.map((level, i) => `${i % 2 ? "film" : "bare"},${level}\n`).join("")}`;
    const said = textOf(file("odd.csv", `state,level dB\n${text}`), "--wanted", "0.2dB");
    expect(said).toContain("The reading in line 12 (film) stands out by -0.99 dB");
    expect(said).toContain("it is kept in all figures");
    expect(said).toContain("1 covered reading without a bare one on either side (line 2): not used.");
    expect(said).toMatch(/film: \d+ more pairs would reach ±0\.20 dB/);
  });

  it("--json holds all of it, --csv a row for each figure", () => {
    const report = JSON.parse(oilskin(["readings", bench, "--json"]).stdout) as BenchReport;
    expect(report.covers[0]!.loss!.valueDb).toBeCloseTo(0.218, 9);
    expect(report.runs.map(({ figure }) => figure)).toEqual(["level", "return loss"]);
    const table = csvParse(oilskin(["readings", bench, "--csv"]).stdout);
    expect(table.map(({ figure }) => figure)).toEqual(["insertion_loss", "return_loss_change"]);
    expect(Number(table[0]!["value_db"])).toBeCloseTo(0.218, 9);
  });

  it("--confidence and --repeatability widen the interval", () => {
    const expanded = (...args: readonly string[]) =>
      (JSON.parse(oilskin(["readings", bench, "--json", ...args]).stdout) as BenchReport).covers[0]!.loss!
        .expandedDb;
    expect(expanded("--confidence", "99%")).toBeGreaterThan(expanded());
    expect(expanded("--repeatability", "0.2dB")).toBeGreaterThan(3 * expanded());
  });

  it("reads a pair of sweeps at a frequency, that of a scenario too", () => {
    const pair = ["--bare", bareSweep!, "--covered", filmSweep!, "--cover", "film"];
    expect(textOf(...pair)).toContain("film by sweep, worst match at 10.6 GHz");
    expect(textOf(...pair, "--frequency", "10.3GHz")).toContain(
      "film by sweep, at 10.3 GHz: return loss 16.3 dB bare",
    );
    expect(textOf(...pair, "--scenario", demo)).toContain("at 10.368 GHz");
    expect(textOf(...pair, "--frequency", "24GHz")).toContain("24 GHz lies outside the sweeps");
    const table = csvParse(oilskin(["readings", ...pair, "--csv"]).stdout);
    expect(table).toHaveLength(42);
  });

  it("names the energy floor and the likelier culprit", () => {
    const text =
      "state,level dB,return loss dB\nbare,-40,13\nfilm,-40.05,9\nbare,-40,13\nfilm,-40.05,9\nbare,-40,13\n";
    expect(textOf(file("lie.csv", text))).toMatch(
      /film: retake: 0\.05 dB ± .* demands 0\.36 dB or more \(below_energy_floor\); likelier culprit: the (covered|bare) return loss/,
    );
  });

  it("marks the demo readings as invented in their first line", () => {
    const demos = readdirSync(join(root, "scenarios")).filter((name) => name.startsWith("bench-"));
    expect(demos.length).toBeGreaterThan(3);
    for (const name of demos) {
      expect(readFileSync(join(root, "scenarios", name), "utf8").split("\n")[0]).toMatch(
        /^[#!] Invented readings/,
      );
    }
  });
});

describe("oilskin readings --write", () => {
  const copy = (name: string) => {
    const path = join(folder, name);
    copyFileSync(demo, path);
    return path;
  };
  const tarpaulin = file("tarpaulin.csv", readFileSync(bench, "utf8").replaceAll("film", "tarpaulin"));

  it("adds a cover, its uncertainty and its source, and touches nothing else", () => {
    const path = copy("add.yaml");
    const { status, stdout } = oilskin(["readings", tarpaulin, "--write", path]);
    expect(status).toBe(0);
    expect(stdout).toContain(`${path}: cover tarpaulin written, insertion loss 0.22 dB +/- 0.03 dB`);
    const before = readFileSync(demo, "utf8").split("\n");
    const after = readFileSync(path, "utf8").split("\n");
    expect(after.filter((line) => !before.includes(line))).toEqual([
      "  tarpaulin:",
      "    measured: { insertion_loss: 0.22 dB +/- 0.03 dB, return_loss_change: 1.83 dB +/- 0.05 dB, source: tarpaulin.csv }",
    ]);
    expect(before.filter((line) => !after.includes(line))).toEqual([]);
    const covers = oilskin(["covers", path]);
    expect(covers.status).toBe(0);
    expect(covers.stdout).toContain("tarpaulin");
    expect(readdirSync(folder).filter((name) => name.endsWith(".part"))).toEqual([]);
  });

  it("keeps a cover that exists, unless forced", () => {
    const path = copy("force.yaml");
    const kept = oilskin(["readings", bench, "--write", path]);
    expect(kept.status).toBe(2);
    expect(kept.stderr).toContain("has a cover film already; --force");
    expect(readFileSync(path, "utf8")).toBe(readFileSync(demo, "utf8"));
    expect(oilskin(["readings", bench, "--write", path, "--force"]).status).toBe(0);
    expect(readFileSync(path, "utf8")).toContain("  film: # stretched over the mouth, held by a band\n");
  });

  it("leaves data on standard output data", () => {
    const { stdout, stderr } = oilskin(["readings", tarpaulin, "--write", copy("json.yaml"), "--json"]);
    expect((JSON.parse(stdout) as BenchReport).covers).toHaveLength(1);
    expect(stderr).toContain("cover tarpaulin written");
  });

  it("writes through a link", () => {
    const path = copy("target.yaml");
    const link = join(folder, "link.yaml");
    symlinkSync(path, link);
    expect(oilskin(["readings", tarpaulin, "--write", link]).status).toBe(0);
    expect(readFileSync(path, "utf8")).toContain("tarpaulin");
  });

  it.each<[why: string, args: () => readonly string[], said: RegExp]>([
    ["a result to retake", () => [file("gain2.csv", rows("-39.5"))], /should be retaken; --force/],
    [
      "several covers",
      () => [file("two.csv", `${rows("-40.2")}sheet,-40.3\nbare,-40\n`)],
      /choose one by --cover: film, sheet/,
    ],
    [
      "no insertion loss",
      () => ["--bare", bareSweep!, "--covered", filmSweep!],
      /hold no insertion loss of bench-film/,
    ],
  ])("refuses %s and leaves the scenario as it was", (_, args, said) => {
    const path = copy("kept.yaml");
    const { status, stderr } = oilskin(["readings", ...args(), "--write", path]);
    expect(status).toBe(2);
    expect(stderr).toMatch(said);
    expect(readFileSync(path, "utf8")).toBe(readFileSync(demo, "utf8"));
  });

  it("refuses a scenario with faults before it reads", () => {
    const { status, stdout, stderr } = oilskin([
      "readings",
      bench,
      "--write",
      file("bad.yaml", "title: x\n"),
    ]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(/bad\.yaml:1:\d+: missing key/);
  });
});

describe("a scenario that names a table", () => {
  it("is budgeted by it, and refused by the line of a fault in it", () => {
    const table = file("town.csv", readFileSync(bench, "utf8"));
    const path = file(
      "town.yaml",
      readFileSync(scenarioFile("hilltop-contest"), "utf8").replace(
        "measured: { insertion_loss: 0.22 dB +/- 0.04 dB, return_loss_change: 2.7 dB }",
        "measured: { readings: cloth.csv }",
      ),
    );
    file("cloth.csv", readFileSync(table, "utf8").replaceAll("film", "cloth"));
    expect(oilskin(["check", path]).status).toBe(0);
    file("cloth.csv", rows("much"));
    const { status, stderr } = oilskin(["check", path]);
    expect(status).toBe(2);
    expect(stderr).toMatch(/town\.yaml:37:27: \S*cloth\.csv:3: level: read "much"/);
  });
});

describe("a bad file of readings", () => {
  it.each<[what: string, content: string | Uint8Array, said: RegExp]>([
    ["missing pairs", rows("-40.2", 3), /bad\.csv:4: too few pairs/],
    ["no bare", "state,level dB\nfilm,-40\nfilm,-40\n", /bad\.csv:3: no reading of state bare/],
    ["units mixed", rows("-40.2 dBm"), /bad\.csv:3: level: read "-40.2 dBm"/],
    [
      "no number",
      rows("much"),
      /bad\.csv:3: level: read "much"[\s\S]*bad\.csv:5: [\s\S]*2 faults; nothing was computed/,
    ],
    [
      "an unsorted time",
      "time,state,level dB\n2,bare,-40\n1,film,-40\n",
      /bad\.csv:3: time: read "1", an earlier time/,
    ],
    ["a file cut off", `${rows("-40.2")}film,`, /bad\.csv:7: no level in this row; is the file cut off\?/],
    ["a binary file", Buffer.from([0x50, 0x4b, 3, 4, 0]), /bad\.csv:1: is a binary file/],
    ["an empty file", "", /bad\.csv:1: no readings/],
    ["control characters", rows("\u001b[2J"), /bad\.csv:3: level: read "\\\\?u.*001b/i],
  ])("%s is refused in one voice", (_, content, said) => {
    const { status, stdout, stderr } = oilskin(["readings", file("bad.csv", content)]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(said);
    expect(stderr).toMatch(/\d+ faults?; nothing was computed\n$/);
    expect(stderr).not.toMatch(/^ +at /m);
    expect(stderr).not.toContain("\u001b");
  });

  it.each<[args: () => readonly string[], said: RegExp]>([
    [() => [join(folder, "none.csv")], /none\.csv:1: no such file/],
    [() => [folder], /is a folder/],
    [
      () => [bench, "--cover", "flim"],
      /no cover "flim" in the readings; expected one of film \(did you mean film\?\)/,
    ],
    [() => [], /name a file of readings, or two sweeps/],
    [() => [bench, "--bare", bareSweep!, "--covered", filmSweep!], /name a file of readings, or two sweeps/],
    [() => ["--bare", bareSweep!], /--bare and --covered go together/],
    [() => [bareSweep!], /is a sweep; name it by --bare or --covered/],
    [() => ["--bare", bench, "--covered", filmSweep!], /expected a Touchstone file that ends in/],
    [
      () => ["--bare", bareSweep!, "--covered", file("cut.s1p", "# GHz S DB R 50\n10 -15 0\n11 -15\n")],
      /cut\.s1p:3: the last record is not complete/,
    ],
    [
      () => ["--bare", bareSweep!, "--covered", file("off.s1p", "# GHz S DB R 50\n24 -15 0\n")],
      /off\.s1p:1: 24000000000 to .* holds no frequency/,
    ],
    [() => [bench, "--wanted", "0.03"], /--wanted: read "0.03".*bare number/],
    [() => [bench, "--confidence", "20%"], /--confidence: read "20%", expected 50 to 99.99 %/],
    [() => [bench, "--json", "--csv"], /cannot be used with/],
  ])("refuses %s", (args, said) => {
    const { status, stdout, stderr } = oilskin(["readings", ...args()]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(said);
    expect(stderr).not.toMatch(/^ +at /m);
  });
});

describe("a long file of readings", () => {
  const long = join(folder, "long.csv");
  writeFileSync(long, "time s,state,level dB\n");
  for (let block = 0; block < 40; block++) {
    const from = 25_000 * block;
    const lines = Array.from({ length: 25_000 }, (_, i) => {
      const n = from + i;
      return `${n},${n % 2 ? "film" : "bare"},${(-40 - (n % 2 ? 0.2 : 0) - n * 1e-6 + 0.01 * ((n * 7919) % 11)).toFixed(4)}`;
    });
    appendFileSync(long, `${lines.join("\n")}\n`);
  }
  const peak = join(folder, "peak");
  const hook = file(
    "peak.cjs",
    `process.on("exit", () => require("node:fs").writeFileSync(${JSON.stringify(peak)}, String(process.resourceUsage().maxRSS)));`,
  );
  /** Most memory that a run held at once [MB]. */
  const memoryOf = (path: string) => {
    const { status, stderr, stdout } = oilskin(["readings", path], { node: ["--require", hook] });
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    return { stdout, megabytes: Number(readFileSync(peak, "utf8")) / 1024 };
  };

  it("of a million rows is reduced in little more memory than a short one", () => {
    const short = memoryOf(bench);
    const { stdout, megabytes } = memoryOf(long);
    expect(flowing(stdout)).toContain("film: 0.20 dB ±");
    expect(flowing(stdout)).toContain("Level: 1000000 readings");
    // The rows alone, held as texts, would take some hundred MB.
    expect(megabytes - short.megabytes).toBeLessThan(100);
  });

  it("has its last fault told by its line", () => {
    const path = join(folder, "longbad.csv");
    copyFileSync(long, path);
    appendFileSync(path, "1000000,bare,loud\n");
    const { status, stderr } = oilskin(["readings", path]);
    expect(status).toBe(2);
    expect(stderr).toContain("longbad.csv:1000002: level: read");
  });

  it.skipIf(!existsSync("/usr/bin/script"))("has its progress told on a terminal, and there alone", () => {
    const { stdout } = shell(`script -qec '"$NODE" "$OILSKIN" readings ${long}' /dev/null`, {
      TERM: "xterm",
    });
    expect(stdout).toMatch(/read \d+ % of \d+ MB/);
  });
});
