import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { YearOutage } from "../../src/study/yearOutage.ts";
import { demo, oilskin, scenarioFile, temporaryFolder, widest } from "./run.ts";

const folder = temporaryFolder();
const town = scenarioFile("town-link");

/** A scenario of the project with its climate replaced, or one put to it. */
function withClimate(name: string, file: string, climate: string): string {
  const text = readFileSync(file, "utf8").replace(/^climate:.*\n(?: .*\n)*/m, "");
  const path = join(folder, name);
  writeFileSync(path, text.replace(/^decision:/m, `climate: ${climate}\ndecision:`));
  return path;
}

const flowing = (text: string) => text.replace(/\s+/g, " ");

describe("oilskin year", () => {
  // Tropical rain on the roofs, so that the time lies within the model.
  const wet = withClimate("wet.yaml", town, "{ rain_zone: P }");
  const year = (...args: readonly string[]) => {
    const { status, stdout, stderr } = oilskin(["year", wet, ...args]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    return stdout;
  };

  it("answers first: what rain takes, bare and under the cover", () => {
    const answer = flowing(year().split("\n\n")[1]!);
    expect(answer).toMatch(
      /^Rain takes [\d.]+ (hours|minutes) a year from this path with bare feeds, [\d.]+ (hours|minutes) under laminate \([\d.]+ (hours|minutes) if that stayed dry\)\. Multipath takes no time/,
    );
    expect(answer).toMatch(/The cover \(laminate\) costs [\d.]+ (hours|minutes) a year\./);
    expect(answer).toMatch(/Data is available for 99\.\d+ % of an average year/);
  });

  it("names its sources, its limits and the cautions", () => {
    const text = flowing(year());
    for (const part of [
      "145.0 mm/h exceeded for 0.01 % of the year (zone P of ITU-R PN.837-1 (1994), withdrawn)",
      "Multipath by P.530-17 quick, dN1 -200 N/km (usual inland, temperate)",
      "beyond, only a bound is told, by < or >",
      "Switch the transmitter off",
    ])
      expect(text).toContain(part);
  });

  it("fits 80 columns and a printer, with every scenario that has a climate", () => {
    for (const file of [town, scenarioFile("coast-beacon"), wet]) {
      const { status, stdout } = oilskin(["year", file]);
      expect(status).toBe(0);
      expect(widest(stdout)).toBeLessThanOrEqual(80);
      expect(stdout).toMatch(/^[\n -~]*$/);
    }
  });

  it("--json and --csv tell the same, cover by cover", () => {
    const { covers, mode } = JSON.parse(year("--json")) as YearOutage;
    const rows = csvParse(year("--csv"));
    expect(mode).toBe("data");
    expect(covers.map(({ transmitter }) => transmitter.cover).sort()).toEqual([
      "bare",
      "bottle",
      "glassed",
      "laminate",
    ]);
    expect(rows).toHaveLength(3 * covers.length);
    for (const { transmitter, wet } of covers) {
      const row = rows.find(
        (one) =>
          one["transmitter_cover"] === transmitter.cover &&
          one["covers"] === "wet" &&
          one["below_margin_db"] === "0",
      )!;
      expect(Number(row["year_hours_low"])).toBe(wet.yearHours.low);
      expect(Number(row["month_minutes_high"])).toBe(wet.monthMinutes.high);
      expect(wet.yearHours.low).toBeGreaterThanOrEqual(
        covers.find((one) => one.transmitter.cover === "bare")!.wet.yearHours.low - 1e-9,
      );
    }
  });

  it("goes from rain under the model to rain beyond it", () => {
    const first = (climate: string) =>
      flowing(oilskin(["year", withClimate("other.yaml", town, climate)]).stdout.split("\n\n")[1]!);
    expect(first("{ rain_rate: 5 mm/h }")).toContain("Rain takes under 5.3 minutes a year");
    expect(first("{ rain_rate: 400 mm/h }")).toMatch(/Rain takes [\d.]+ hours a year/);
    const loud = readFileSync(town, "utf8").replace("power: 0 dBm", "power: -22 dBm");
    writeFileSync(join(folder, "faint.yaml"), loud);
    expect(
      flowing(
        oilskin(["year", withClimate("f.yaml", join(folder, "faint.yaml"), "{ rain_rate: 60 mm/h }")]).stdout,
      ),
    ).toContain("Rain takes over 88 hours a year from this path with bare feeds");
    writeFileSync(join(folder, "dead.yaml"), loud.replace("-22", "-40"));
    expect(flowing(oilskin(["year", join(folder, "dead.yaml")]).stdout)).toContain(
      "fails on this path in clear air already",
    );
  });

  it("warns where no line of sight carries the path, and not where one does", () => {
    const doubt = "P.530 holds for lines of sight, and diffraction over terrain carries this path";
    const ridge = join(folder, "ridge.csv");
    // A hill of 200 m half-way over the roofs.
    writeFileSync(ridge, "distance_km,height_m\n0,21\n0.9,200\n1.79,33\n");
    const text = readFileSync(town, "utf8").replace(/^path:/m, `path:\n  terrain: ${ridge}`);
    writeFileSync(join(folder, "hill.yaml"), text);
    const { stdout, stderr } = oilskin(["year", join(folder, "hill.yaml")]);
    expect(flowing(stderr + stdout)).toContain(doubt);
    expect(flowing(year())).not.toContain("lines of sight");
  });

  it("refuses a scenario without a climate, a climate with a fault, and a mode that is none", () => {
    const bare = oilskin(["year", demo]);
    expect(bare).toMatchObject({ status: 2, stdout: "" });
    expect(bare.stderr).toContain(`${demo}:1:1: missing key "climate", expected the rain of an average year`);
    const bad = oilskin(["year", withClimate("bad.yaml", town, "{ rain_zone: Z }")]);
    expect(bad).toMatchObject({ status: 2, stdout: "" });
    expect(bad.stderr).toMatch(/bad\.yaml:\d+:23: read "Z", expected a rain climatic zone/);
    const map = oilskin(["year", withClimate("map.yaml", town, "{ map: maps }")]);
    expect(map.stderr).toMatch(/map\.yaml:\d+:17: no folder ".*maps"/);
    const mode = oilskin(["year", town, "--mode", "dtaa"]);
    expect(mode).toMatchObject({ status: 2, stdout: "" });
    expect(mode.stderr).toContain("did you mean data?");
    expect(oilskin(["year", town, "--json", "--csv"]).status).toBe(2);
  });
});
