import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { MarginReport } from "../../src/study/marginReport.ts";
import type { PathStudy } from "../../src/study/pathStudy.ts";
import { demo, oilskin, root, temporaryFolder, widest } from "./run.ts";

const folder = temporaryFolder();
const ridgeFile = join(root, "scenarios/over-the-ridge.yaml");
const onTheDay = ["--date", "2026-07-01"] as const;

function textOf(...args: readonly string[]): string {
  const { status, stdout, stderr } = oilskin(args);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  return stdout;
}

/** Lines joined, so that a sentence may break anywhere. */
const flowing = (text: string) => text.replace(/\s+/g, " ");

/** The ridge scenario with a piece replaced, its terrain beside it. */
function changed(name: string, piece: string, by: string): string {
  const text = readFileSync(ridgeFile, "utf8");
  expect(text.split(piece)).toHaveLength(2);
  const file = join(folder, name);
  writeFileSync(join(folder, "over-the-ridge.csv"), readFileSync(join(root, "scenarios/over-the-ridge.csv")));
  writeFileSync(file, text.replace(piece, by));
  return file;
}

describe("oilskin path", () => {
  it("answers first: what carries the path in each weather, and what cuts the ray", () => {
    const answer = flowing(textOf("path", ridgeFile, ...onTheDay).split("\n\n")[1]!);
    expect(answer).toMatch(/^Dry: diffraction over terrain carries the path, \d+\.\d dB beyond free space;/);
    expect(answer).toMatch(/next best troposcatter, -?\d+\.\d dB left\./);
    expect(answer).toContain("Thunderstorm: rain scatter at mid-path carries the path");
    expect(answer).toMatch(/The ray is cut: it passes \d+ m below the top at 43\.\d km/);
  });

  it("has all that was promised, in 80 columns, with cautions for those who climb", () => {
    const text = textOf("path", ridgeFile, ...onTheDay);
    for (const said of [
      "Headings on 2026-07-01, magnetic ones by WMM-2025",
      "Obstacles: clearance in metres and in first Fresnel zones",
      "cut by",
      "troposcatter",
      "normal day, 50 %",
      "lift, 0.1 %",
      "ducting",
      "# ground on the curved Earth",
      "Climb only trained",
    ]) {
      expect(flowing(text)).toContain(said);
    }
    expect(widest(text)).toBeLessThanOrEqual(80);
    expect(widest(textOf("path", demo, ...onTheDay))).toBeLessThanOrEqual(80);
  });

  it("says that no terrain is known where none is given", () => {
    expect(flowing(textOf("path", demo, ...onTheDay))).toContain(
      "No terrain is given: hills, trees and buildings may stand in the way.",
    );
  });

  it("gives the same margins as oilskin budget", () => {
    const study = JSON.parse(textOf("path", ridgeFile, "--json", ...onTheDay)) as PathStudy;
    const { budgets } = JSON.parse(textOf("budget", ridgeFile, "--json")) as MarginReport;
    expect(study.weathers.map(({ weather }) => weather)).toEqual(["dry", "shower", "thunderstorm"]);
    for (const { weather, ways } of study.weathers) {
      const budget = budgets.find(({ case: chosen }) => chosen.weather === weather && chosen.mode === "cw")!;
      expect(ways[0]!.marginDb).toBeCloseTo(budget.marginDb, 9);
      expect(budget.entries.map(({ id }) => id)).toContain(`path.${ways[0]!.name}`);
    }
  });

  it("writes the profile as CSV, a row a point of the terrain", () => {
    const rows = csvParse(textOf("path", ridgeFile, "--csv", ...onTheDay));
    expect(rows).toHaveLength(151);
    expect(rows[0]).toMatchObject({ distance_km: "0", ground_m: "305" });
    const least = Math.min(...rows.map((row) => Number(row["clearance_m"])));
    expect(least).toBeLessThan(-200);
  });

  it("is said by oilskin budget too", () => {
    const text = flowing(textOf("budget", ridgeFile));
    expect(text).toMatch(/Diffraction over terrain carries the path in dry and shower, \d+\.\d dB beyond/);
    expect(text).toContain("next best troposcatter in dry");
    expect(text).not.toContain("Line of sight is taken");
    expect(text).not.toContain("terrain file is not read");
  });
});

describe("bad input to oilskin path", () => {
  it.each([
    [["--date", "2026-06-31"], /--date: read "2026-06-31", expected a day/],
    [["--date", "soon"], /--date: read "soon"/],
    [["--weather", "drj"], /no weather "drj" .*did you mean dry/],
    [["--mode", "cww"], /no mode "cww"/],
  ])("%j", (args, message) => {
    const { status, stdout, stderr } = oilskin(["path", ridgeFile, ...args]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(message);
  });

  it.each([
    ["terrain: over-the-ridge.csv", "terrain: nowhere.csv", /nowhere\.csv/],
    ["k_low: 0.8", "k_low: 0", /expected .* from 0\.3 to 20/],
    ["k_low: 0.8", "k: 1\n  k_low: 1.2", /k_low is above k, expected at most 1/],
    ["dN: 40", "dN: 200", /expected .* from -100 to 150/],
    ["foliage: { to: 6 m }", "foliage: { to: 6 }", /6/],
  ])("%s -> %s is named with its line", (piece, by, message) => {
    const { status, stdout, stderr } = oilskin(["path", changed("bad.yaml", piece, by)]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(/bad\.yaml:\d+:\d+: /);
    expect(stderr).toMatch(message);
  });
});
