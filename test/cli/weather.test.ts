import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { MarginReport } from "../../src/study/marginReport.ts";
import type { WeatherLadder } from "../../src/study/weatherLadder.ts";
import {
  changedDemo,
  demo,
  oilskin,
  root,
  scenarioFile,
  scenarioNames,
  temporaryFolder,
  widest,
} from "./run.ts";

const folder = temporaryFolder();
const ridge = join(root, "scenarios/over-the-ridge.yaml");

/** A ladder takes a second, so that none is climbed twice. */
const climbed = new Map<string, string>();
function textOf(...args: readonly string[]): string {
  const key = JSON.stringify(args);
  const known = climbed.get(key);
  if (known !== undefined) return known;
  const { status, stdout, stderr } = oilskin(["weather", ...args]);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  climbed.set(key, stdout);
  return stdout;
}
const ladderOf = (file: string, ...args: readonly string[]) =>
  JSON.parse(textOf(file, ...args, "--json")) as WeatherLadder;
const flowing = (text: string) => text.replace(/\s+/g, " ");

describe("oilskin weather", () => {
  it.each([...scenarioNames.map((name) => scenarioFile(name)), ridge])(
    "climbs the ladder of %s on pages of 80 columns",
    (file) => {
      const text = textOf(file);
      expect(widest(text)).toBeLessThanOrEqual(80);
      expect(text).toMatch(/^[\n -~±]*$/);
      expect(text).not.toMatch(/NaN|undefined|Infinity|-0\.0\b/);
      expect(text).not.toMatch(/\bsafe/i);
      for (const part of [
        "Rain in words",
        "uses the margin up",
        "by extent of the rain",
        "How to read it",
        "Caution",
      ]) {
        expect(text).toContain(part);
      }
    },
  );

  it("keeps to 80 columns in the heaviest rain", () => {
    const text = textOf(ridge, "--rates", "399.5,400", "--extents", "33.25,44.5", "--mode", "cw");
    expect(text).toMatch(/-\d\d\.\d ±\d\d\.\d fails/);
    expect(widest(text)).toBeLessThanOrEqual(80);
  });

  it("answers first, in figures and words that are those of the data", () => {
    const [, answer] = textOf(demo).split("\n\n").map(flowing) as [string, string];
    const { modes, weather } = ladderOf(demo);
    expect(weather).toBe("thunderstorm");
    const [own, bare] = modes[0]!.covers.map(({ breakEven }) => breakEven.both);
    const told = (rate: number) => `${rate.toFixed(0)} mm/h`;
    expect(answer).toContain(`Narrow FM voice closes up to ${told(own!.closesMmPerH!)} (heavy by AMS`);
    expect(answer).toContain(`has nothing left from ${told(own!.zeroMmPerH!)} on. Bare, it`);
    expect(answer).toContain(`closes up to ${told(bare!.closesMmPerH!)}`);
    const cost = Math.round(bare!.zeroMmPerH!) - Math.round(own!.zeroMmPerH!);
    expect(cost).toBeGreaterThan(0);
    expect(answer).toContain(`the cover costs ${cost} mm/h of rain.`);
  });

  it("has on the weather's own rung the margins of `oilskin budget`", () => {
    const { stdout } = oilskin(["budget", demo, "--weather", "thunderstorm", "--json"]);
    const { budgets } = JSON.parse(stdout) as MarginReport;
    const { mode, covers } = ladderOf(demo).modes[0]!;
    expect(covers).toHaveLength(5);
    for (const { transmitter, receiver, rungs } of covers) {
      const same = budgets.find(
        ({ case: chosen }) =>
          chosen.mode === mode &&
          chosen.transmitter.cover === transmitter.cover &&
          chosen.receiver.cover === receiver.cover,
      )!;
      const rung = rungs.both.find(({ rateMmPerH }) => rateMmPerH === 50)!;
      expect(rung.marginDb).toBeCloseTo(same.marginDb, 9);
      expect(rung.verdict).toBe(same.verdict);
    }
  });

  it("ends `closes`, reserve and margin where `oilskin budget` does, in files rewritten to those rates", () => {
    const { closesMmPerH, reserveMmPerH, zeroMmPerH } = ladderOf(demo).modes[0]!.covers[0]!.breakEven.both;
    const reportAt = (rate: number) => {
      const file = changedDemo(folder, `rain-${rate.toFixed(3)}.yaml`, "rain: 50 mm/h", `rain: ${rate} mm/h`);
      const { stdout } = oilskin(["budget", file, "--weather", "thunderstorm", "--mode", "fm", "--json"]);
      return (JSON.parse(stdout) as MarginReport).budgets[0]!;
    };
    expect(reportAt(closesMmPerH! - 0.05).verdict).toBe("closes");
    expect(reportAt(closesMmPerH! + 0.05).verdict).toBe("thin");
    expect(reportAt(reserveMmPerH!).marginDb).toBeCloseTo(3, 2);
    expect(reportAt(zeroMmPerH!).marginDb).toBeCloseTo(0, 2);
    expect(reportAt(zeroMmPerH! + 0.05).verdict).toBe("fails");
  });

  it("--csv holds the figures of --json", () => {
    const rows = csvParse(textOf(demo, "--csv"));
    const { covers, extents } = ladderOf(demo).modes[0]!;
    const flat = [
      ...covers.flatMap(({ receiver, rungs }) =>
        (["path", "covers", "both"] as const).flatMap((on) =>
          rungs[on].map((rung) => ({ ...rung, on, cover: receiver.cover })),
        ),
      ),
      ...extents.columns.flatMap(({ rungs }) =>
        rungs.map((rung) => ({ ...rung, on: "both", cover: extents.receiver.cover })),
      ),
    ];
    expect(rows).toHaveLength(flat.length);
    for (const [i, row] of rows.entries()) {
      const { on, cover, rateMmPerH, marginDb, verdict } = flat[i]!;
      expect([row["rain_on"], row["receiver_cover"], row["verdict"]]).toEqual([on, cover, verdict]);
      expect([row["rain_rate_mm_per_h"], row["margin_db"]].map(Number)).toEqual([rateMmPerH, marginDb]);
    }
  });

  it("--mode may be repeated: a paragraph and tables each", () => {
    const text = textOf(demo, "--mode", "ssb", "--mode", "fm", "--mode", "ssb");
    expect(flowing(text.split("\n\n")[1]!)).toMatch(/^SSB voice closes/);
    expect(flowing(text.split("\n\n")[2]!)).toMatch(/^Narrow FM voice closes/);
    expect(text.match(/SSB voice: rain rate in mm\/h/g)).toHaveLength(1);
    expect(text.match(/Narrow FM voice: rain rate in mm\/h/g)).toHaveLength(1);
    expect(widest(text)).toBeLessThanOrEqual(80);
  });

  it("--rates and --extents take lists, bare or with units, the unit of the next for those without", () => {
    const { rates, modes } = ladderOf(
      demo,
      "--rates",
      "20,2",
      "--rates",
      "0.1, 0.5in/h",
      "--extents",
      "3, 5 mi",
    );
    const asked = rates.map(({ rateMmPerH }) => rateMmPerH);
    expect(asked.map((rate) => Number(rate.toFixed(6)))).toEqual([0, 2, 2.54, 12.7, 20]);
    const extents = modes[0]!.extents.columns.map(({ extentKm }) => extentKm && Number(extentKm.toFixed(6)));
    expect(extents.slice(0, 2)).toEqual([4.828032, 8.04672]);
    expect(textOf(demo, "--rates", "0,5")).toMatch(/^5 +moderate/m);
  });

  it("--extents beyond the path are told to be all of it", () => {
    const text = textOf(demo, "--extents", "1,300,500", "--rates", "5");
    expect(text).toContain("Rain over 300 and 500 km is all of the path.");
    expect(text).toMatch(/^mm\/h +1 km +all 124\.0 +P\.530$/m);
    expect(textOf(scenarioFile("town-link"))).not.toContain("is all of the path");
  });

  it("--cover chooses that of the table of extents, --weather the rain that is varied", () => {
    const { weather, modes } = ladderOf(demo, "--cover", "lid", "--weather", "shower", "--extents", "8");
    expect(weather).toBe("shower");
    const { extents, covers } = modes[0]!;
    const lid = covers.find(({ receiver }) => receiver.cover === "lid")!;
    expect(extents.columns[0]!.isOwn).toBe(true);
    expect(extents.columns[0]!.rungs).toEqual(lid.rungs.both);
  });

  it("shows rain scatter taking over, and where it brings back what rain took", () => {
    const text = textOf(ridge);
    expect(flowing(text)).toContain(
      "Diffraction carries the path up to 25 mm/h and rain scatter from 50 mm/h on.",
    );
    expect(text).toMatch(/^25 .*diffraction$/m);
    expect(text).toMatch(/^50 .*rain scatter$/m);
    // The moor raised to two walls, and so little power that diffraction hardly carries the path.
    const ground = readFileSync(join(root, "scenarios/over-the-ridge.csv"), "utf8").replace(
      /^(3[01]|4[56])(\.\d+),\d+/gm,
      "$1$2,900",
    );
    writeFileSync(join(folder, "walls.csv"), ground);
    const weak = readFileSync(ridge, "utf8").replace("over-the-ridge.csv", "walls.csv");
    const file = join(folder, "walls.yaml");
    writeFileSync(file, weak.replace("power: 3 W", "power: 0.6 dBm"));
    expect(flowing(textOf(file))).toMatch(
      /has nothing left from [\d.]+ mm\/h \([^)]*\) on and has something left again from [\d.]+ to \d+ mm\/h \(by rain scatter\)/,
    );
    const { stdout } = oilskin(["covers", file]);
    expect(flowing(stdout)).toMatch(/film: something is left from [\d.]+ to \d+ mm\/h \(by rain scatter\)/);
    expect(oilskin(["covers", ridge]).stdout).not.toContain("something is left");
  });

  it.each([
    [["--rates", "0"], "no rain is always the lowest rung"],
    [["--rates", "-2"], 'read "-2 mm/h", expected 0 to 400 mm/h'],
    [["--rates", "heavy"], 'read "heavy", expected a rain rate with a unit'],
    [["--rates", "450"], "expected 0 to 400 mm/h"],
    [["--rates", "5,,7"], 'read ""'],
    [["--rates", "5 km"], "is a length"],
    [["--rates", Array.from({ length: 41 }, (_, i) => i + 1).join(",")], "41 values, expected 40 at most"],
    [["--extents", "0 km"], 'read "0 km", expected 0.01 to 1000 km'],
    [["--extents", "-1"], "expected 0.01 to 1000 km"],
    [["--extents", "far"], "expected a distance with a unit"],
    [
      ["--cover", "flim"],
      'no cover "flim" in the scenario; expected one of bare, film, sheet, lid, cloth (did you mean film?)',
    ],
    [["--weather", "thunder storm"], "did you mean thunderstorm?"],
    [["--mode", "ssb", "--mode", "sbs"], "did you mean ssb?"],
    [["--json", "--csv"], "cannot be used with"],
  ])("refuses %j, and prints nothing else", (args, hint) => {
    const { status, stdout, stderr } = oilskin(["weather", demo, ...args]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(flowing(stderr)).toContain(hint);
    expect(stderr).not.toMatch(/^ +at /m);
  });

  it("names all faults of a list at once", () => {
    const { stderr } = oilskin(["weather", demo, "--rates", "-2,heavy,7,5km"]);
    expect(stderr.trim().split("\n")).toHaveLength(3);
    for (const read of ["-2", "heavy", "5km"]) expect(stderr).toContain(read);
  });

  it("tells each doubt once", () => {
    const { warnings } = ladderOf(demo);
    const said = warnings.map(({ code, where }) => `${code} ${where}`);
    expect(new Set(said).size).toBe(said.length);
    expect(said).toContain("bare_in_rain covers.bare");
  });

  it("climbs for a dish behind a cover, whose feed stays dry", () => {
    const file = changedDemo(
      folder,
      "shell.yaml",
      "feed: stub, cover: film }",
      "feed: stub, cover: film, dish_cover: cloth }",
    );
    expect(flowing(textOf(file))).toContain("Over the dish: cloth (receiver).");
    const bare = ladderOf(file).modes[0]!.covers.find(({ receiver }) => receiver.cover === "bare")!;
    expect(bare.rungs.covers.at(-1)!.marginDb).toBeLessThan(bare.rungs.covers[0]!.marginDb - 1);
  });
});
