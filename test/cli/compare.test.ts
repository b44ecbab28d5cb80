import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { Comparison } from "../../src/study/compare.ts";
import type { MarginReport } from "../../src/study/marginReport.ts";
import { changedDemo, demo, oilskin, root, scenarioFile, temporaryFolder, widest } from "./run.ts";

const folder = temporaryFolder();
const stronger = changedDemo(folder, "stronger.yaml", "power: 10 mW", "power: 30 mW");
const coast = scenarioFile("coast-beacon");
const ridge = join(root, "scenarios/over-the-ridge.yaml");

function textOf(...args: readonly string[]): string {
  const { status, stdout, stderr } = oilskin(["compare", ...args]);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  expect(widest(stdout)).toBeLessThanOrEqual(80);
  return stdout;
}

/** Lines joined, so that a sentence is found wherever it is broken. */
const flowing = (text: string) => text.replace(/\s+/g, " ");

function comparisonOf(...args: readonly string[]): Comparison {
  return JSON.parse(oilskin(["compare", ...args, "--json"]).stdout);
}

function refused(...args: readonly string[]): string {
  const { status, stdout, stderr } = oilskin(["compare", ...args]);
  expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
  expect(stderr).not.toContain("    at ");
  return stderr;
}

describe("oilskin compare A B", () => {
  const text = textOf(demo, stronger);

  it("says first which is better, by how much and by what", () => {
    // 10 lg 3 = 4.77 dB; the margins of the demo are 0.9 dB in the thunderstorm, its reserve 3 dB.
    const answer = flowing(text.split("\n\n")[1]!);
    expect(answer).toContain(
      "Dry, shower and after the shower: both close; B is 4.8 dB better: power +4.8 dB.",
    );
    expect(answer).toContain("Thunderstorm: both are thin; B is 4.8 dB better: power +4.8 dB");
  });

  it("names what was typed differently, in the user's units, and nothing else", () => {
    expect(text).toContain("What differs in the files\n  transmitter.power: 10 mW -> 30 mW\n\n");
  });

  it("shows the entry that differs beside both margins, and no other entry", () => {
    expect(text).toMatch(/\n {2}transmitter power +10\.0 +14\.8 +\+4\.8 /);
    for (const same of ["free space", "line and joints", "290 K"]) expect(text).not.toContain(same);
  });

  it("tells the same margins as the margin report of each", () => {
    const report = (file: string): MarginReport =>
      JSON.parse(oilskin(["budget", file, "--cover", "film", "--mode", "fm", "--json"]).stdout);
    const [a, b] = [report(demo), report(stronger)];
    const { weathers } = comparisonOf(demo, stronger);
    expect(weathers).toHaveLength(4);
    for (const [i, { budget, differenceDb }] of weathers.entries()) {
      expect(budget.a.marginDb).toBe(a.budgets[i]!.marginDb);
      expect(budget.b.marginDb).toBe(b.budgets[i]!.marginDb);
      expect(differenceDb).toBeCloseTo(10 * Math.log10(3), 9);
    }
  });

  it("says so where nothing differs", () => {
    const same = textOf(demo, demo);
    expect(same).toContain("\n\nNothing differs.\n\n");
    expect(same).not.toContain("What differs");
    expect(same).not.toContain("How it comes about");
  });

  it("says so where no entry differs, and what changes the verdict all the same", () => {
    const careful = changedDemo(folder, "careful.yaml", "reserve: 3 dB", "reserve: 20 dB");
    const told = textOf(demo, careful);
    expect(told).toContain("Shower: B is thin where A closes; no entry differs.");
    expect(told).toContain("decision.reserve: 3 dB -> 20 dB");
  });

  it("calls less than a bench repeats to indistinguishable", () => {
    const hardly = changedDemo(folder, "hardly.yaml", "power: 10 mW", "power: 10.05 mW"); // 0.02 dB
    const told = textOf(demo, hardly);
    expect(told).toContain("indistinguishable at a bench's repeatability");
    expect(told).toMatch(/\ndry .* 0\.0 ±0\.0 +-\n/); // no word of which is better
  });

  it("names differences that cancel, and calls their sum indistinguishable", () => {
    const louder = readFileSync(demo, "utf8").replace(
      "power: 10 mW, line_loss: 0.2 dB",
      "power: 13 dBm, line_loss: 3.2 dB",
    );
    const file = join(folder, "cancel.yaml");
    writeFileSync(file, louder);
    expect(flowing(textOf(demo, file))).toMatch(
      /indistinguishable at a bench's repeatability: (power \+3\.0 dB and lines -3\.0 dB|lines -3\.0 dB and power \+3\.0 dB)/,
    );
  });

  it("leaves apart what has no part in the margins", () => {
    const other = changedDemo(folder, "lid.yaml", "1/16 in", "1/8 in");
    const told = textOf(demo, other);
    expect(told).toContain("Nothing differs.");
    expect(told).toContain("Without a part in this comparison: covers.lid.");
  });

  it("tells which way carries each, and the weathers that only one has", () => {
    const told = flowing(textOf(ridge, demo));
    expect(told).toContain("diffraction over terrain carries A, line of sight B.");
    expect(told).toContain("Only in B, not compared: after the shower.");
    expect(told).toContain("path.terrain: over-the-ridge.csv (151 points, 56 to 427 m) -> not given");
  });

  it("takes the first mode of each where they share none", () => {
    const told = textOf(coast, demo, "--weather", "dry");
    expect(told).toContain("; CW by ear;");
    expect(told).toContain("; narrow FM voice;");
    expect(told).toContain("  mode: cw -> fm\n");
  });

  it("sets long names and values within the line", () => {
    const name = "a weather with a name that goes on and on for some while";
    const long = changedDemo(folder, "long.yaml", "  shower: {", `  ${name}: {`);
    expect(flowing(textOf(long, stronger, "--weather", `${name}=shower`))).toContain(`${name.slice(1)} in A`);
    expect(flowing(textOf(long, long, "--weather", name))).toContain(
      "a weather with a name that goes on ...",
    );
  });
});

describe("pairs of names", () => {
  it("compare one scenario under two covers", () => {
    const told = textOf(demo, "--cover", "bare=lid", "--weather", "dry");
    expect(told).toContain("  cover on both feeds: bare -> lid\n");
    expect(told).toContain("covers.bare/lid");
    const { weathers } = comparisonOf(demo, "--cover", "bare=lid");
    const covers = JSON.parse(oilskin(["covers", demo, "--json"]).stdout).covers;
    const lid = covers.find(({ cover }: { cover: string }) => cover === "lid");
    for (const { weather, differenceDb } of weathers) {
      const row = lid.rows.find(
        (one: { weather: string; placing: string }) => one.weather === weather.a && one.placing === "both",
      );
      expect(differenceDb).toBeCloseTo(-row.costDb, 9);
    }
  });

  it("compare two weathers, in one file or two", () => {
    const told = textOf(demo, "--weather", "dry=shower");
    expect(told).toContain("Dry in A against shower in B: both close;");
    expect(told).toContain("  weather.dry/shower.rain: not given -> 16 mm/h\n");
    expect(
      comparisonOf(demo, coast, "--weather", "dry,shower=rain").weathers.map(({ weather }) => weather),
    ).toEqual([
      { a: "dry", b: "dry" },
      { a: "shower", b: "rain" },
    ]);
  });

  it("put what a file says of its own covers aside, but not a cover of that name", () => {
    const text = readFileSync(demo, "utf8").replaceAll("  lid:", "  cover:");
    const [one, other] = ["first.yaml", "second.yaml"].map((name) => join(folder, name));
    writeFileSync(one!, text);
    writeFileSync(
      other!,
      text.replace("gap: 4 mm", "gap: 6 mm").replaceAll("cover: film }", "cover: sheet }"),
    );
    const { inputs } = comparisonOf(one!, other!, "--cover", "cover", "--weather", "dry");
    expect(inputs.map(({ path, counts }) => [path.join("."), counts])).toEqual([
      ["transmitter.cover", false],
      ["receiver.cover", false],
      ["covers.cover.gap", true],
    ]);
  });

  it("count once", () => {
    const { weathers } = comparisonOf(demo, stronger, "--weather", "dry,dry=dry", "--weather", "dry");
    expect(weathers.map(({ weather }) => weather)).toEqual([{ a: "dry", b: "dry" }]);
  });

  it("compare two modes", () => {
    const { weathers } = comparisonOf(demo, "--mode", "fm=ssb", "--weather", "dry");
    expect(weathers[0]!.causes.map(({ cause }) => cause)).toEqual(["mode"]);
  });

  it("leave a name with their sign in it alone", () => {
    const file = changedDemo(folder, "equals.yaml", "  shower: {", "  wind=dry: {");
    const { weathers } = comparisonOf(file, "--weather", "wind=dry", file);
    expect(weathers.map(({ weather }) => weather)).toEqual([{ a: "wind=dry", b: "wind=dry" }]);
  });
});

describe("data", () => {
  it("the rows of the CSV add up to the difference of the margins, weather by weather", () => {
    const rows = csvParse(oilskin(["compare", ridge, demo, "--csv"]).stdout);
    for (const weather of ["dry", "shower", "thunderstorm"]) {
      const here = rows.filter((row) => row["weather_a"] === weather);
      const result = here.find(({ stage }) => stage === "result")!;
      const entries = here.filter(({ stage }) => stage !== "result");
      const total = entries.reduce((sum, row) => sum + Number(row["difference_db"]), 0);
      expect(total).toBeCloseTo(Number(result["difference_db"]), 7);
      expect(Number(result["b_db"]) - Number(result["a_db"])).toBeCloseTo(total, 7);
      for (const { a_db, b_db, difference_db } of entries) {
        expect(Number(b_db) - Number(a_db)).toBeCloseTo(Number(difference_db), 9);
      }
    }
    expect(rows.map((row) => row["weather_a"])).not.toContain("after the shower");
  });

  it("JSON holds what was typed, items of lists counted from 0", () => {
    const thicker = changedDemo(folder, "thicker.yaml", "5 mil", "1 mm");
    expect(comparisonOf(demo, thicker).inputs).toEqual([
      { path: ["covers", "film", "layers", 0, "thickness"], a: "5 mil", b: "1 mm", counts: true },
    ]);
    expect(textOf(demo, thicker)).toContain("  covers.film.layer 1.thickness: 5 mil -> 1 mm\n");
  });
});

describe("bad input", () => {
  it("tells all faults of both files at once", () => {
    const bad = changedDemo(folder, "bad.yaml", "power: 10 mW", "power: 10");
    const worse = changedDemo(folder, "worse.yaml", "polarization: horizontal", "polarisation: flat");
    const told = refused(bad, worse);
    expect(told).toContain("bad.yaml:9:23: read");
    expect(told).toContain('worse.yaml:7:1: unknown key "polarisation"');
    expect(told).toContain("2 faults; nothing was computed");
    expect(refused("none.yaml", worse)).toContain("none.yaml:1:1: no such file\n");
  });

  it("tells the faults of one file once", () => {
    const bad = changedDemo(folder, "once.yaml", "power: 10 mW", "power: 10");
    expect(refused(bad, bad)).toContain("1 fault; nothing was computed");
  });

  it("asks what to compare with", () => {
    expect(refused(demo)).toContain("is compared with nothing; name a second scenario, or a pair");
    expect(refused(demo, "--weather", "dry")).toContain("is compared with nothing");
    expect(refused()).toContain("missing required argument 'A'");
  });

  it("names the file that lacks a name, and the nearest one", () => {
    expect(refused(demo, coast, "--weather", "dry=rian")).toMatch(
      /no weather "rian" in \S*coast-beacon\.yaml; .*did you mean rain\?/,
    );
    expect(refused(demo, coast, "--weather", "showr=rain")).toMatch(
      /no weather "showr" in \S*hilltop-contest\.yaml; .*shower\?/,
    );
    expect(refused(demo, "--cover", "film=flim")).toContain("did you mean film?");
    expect(refused(demo, coast, "--mode", "slow tones")).toMatch(/no mode "slow tones" in \S*hilltop/);
  });

  it("asks for pairs where no weather has its name in both", () => {
    const text = readFileSync(demo, "utf8");
    const file = join(folder, "wetter.yaml");
    writeFileSync(file, text.replace(/weather:\n(.*\n)*?\n/, "weather: { rain: { rain: 5 mm/h } }\n\n"));
    expect(refused(file, demo)).toContain("pair them: --weather IN-A=IN-B");
  });
});
