import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { SpreadStudy } from "../../src/study/spread.ts";
import {
  changedDemo,
  demo,
  oilskin,
  root,
  scenarioFile,
  scenarioNames,
  shell,
  temporaryFolder,
  widest,
} from "./run.ts";

const folder = temporaryFolder();
const quick = ["--draws", "2000"] as const;

function textOf(file: string, ...args: readonly string[]): string {
  const { status, stdout, stderr } = oilskin(["spread", file, ...args]);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  return stdout;
}

const studyOf = (file: string, ...args: readonly string[]) =>
  JSON.parse(textOf(file, ...args, "--json")) as SpreadStudy;
const flowing = (text: string) => text.replace(/\s+/g, " ");

describe("oilskin spread", () => {
  it.each(scenarioNames)("tells the spread of %s on a page of 80 columns", (name) => {
    const text = textOf(scenarioFile(name), ...quick, "--detail");
    expect(widest(text)).toBeLessThanOrEqual(80);
    expect(text).not.toMatch(/NaN|undefined|Infinity|-0\.0\b/);
    expect(text).not.toMatch(/\bsafe/i);
    for (const part of [
      "margin in dB",
      "What the spread hangs on",
      "Against `oilskin budget`",
      "What was drawn",
      "Caution",
      "Not drawn",
    ]) {
      expect(text).toContain(part);
    }
  });

  it("answers first, in words that follow from the figures", () => {
    const text = flowing(textOf(demo, ...quick));
    const { rows } = studyOf(demo, ...quick);
    const row = rows.find(
      ({ case: one }) => one.weather === "thunderstorm" && one.transmitter.cover === "film",
    )!;
    expect(text).toContain(`film is thin and holds in ${(100 * row.closes.share).toFixed(1)} % of the draws`);
    expect(text).toContain(`${row.marginDb.medianDb.toFixed(1)} dB in the middle`);
    expect(text).toContain(`the cover loses ${(100 * row.lost).toFixed(0)} of a hundred draws`);
    expect(text).toMatch(
      /Thunderstorm: the (rain rate|extent of the rain) matters [a-z ]+ times as much as the cover and its water/,
    );
  });

  it("gives the same text for the same seed, another one for another seed", () => {
    const one = textOf(demo, ...quick);
    expect(textOf(demo, ...quick)).toBe(one);
    expect(textOf(demo, ...quick, "--seed", "2")).not.toBe(one);
  });

  it("stops early at a coarse precision, and says what it reached where the draws do not suffice", () => {
    const coarse = studyOf(demo, "--precision", "2 %");
    expect(coarse.draws).toBeLessThan(coarse.mostDraws);
    expect(coarse.halfWidth).toBeLessThan(0.02);
    expect(flowing(textOf(demo, "--draws", "1000", "--precision", "0.1 %"))).toContain(
      "where 0.1 were asked for",
    );
  });

  it("takes some weathers and covers, keeps the scenario's own, and another mode", () => {
    const { rows, mode } = studyOf(
      demo,
      ...quick,
      ...["--weather", "shower", "--weather", "dry", "--cover", "lid", "--mode", "ssb"],
    );
    expect(mode).toBe("ssb");
    expect(new Set(rows.map(({ case: one }) => one.weather))).toEqual(new Set(["dry", "shower"]));
    expect(new Set(rows.map(({ case: one }) => one.transmitter.cover))).toEqual(new Set(["film", "lid"]));
  });

  it("gives the same figures as CSV and JSON", () => {
    const { rows } = studyOf(demo, ...quick);
    const lines = csvParse(textOf(demo, ...quick, "--csv"));
    expect(lines).toHaveLength(rows.length);
    for (const [i, line] of lines.entries()) {
      expect(line["weather"]).toBe(rows[i]!.case.weather);
      expect(Number(line["margin_median_db"])).toBe(rows[i]!.marginDb.medianDb);
      expect(Number(line["closes"])).toBe(rows[i]!.closes.share);
    }
  });

  it("draws what a scenario states: a wide power widens the margin by it", () => {
    const wide = changedDemo(folder, "wide.yaml", "power: 10 mW,", "power: 10 mW +/- 8 dB,");
    const sigma = (file: string) => studyOf(file, "--draws", "20000", "--weather", "dry").rows[0]!.sigmaDb;
    expect(sigma(wide)).toBeCloseTo(Math.hypot(sigma(demo), Math.sqrt(8 ** 2 - 0.7 ** 2)), 0);
    const mixed = changedDemo(
      folder,
      "mixed.yaml",
      "power: 10 mW,",
      "power: { mixture: [{ share: 50 %, of: 10 mW +/- 0.1 dB }, { share: 50 %, of: 1 uW }] },",
    );
    const { closes } = studyOf(mixed, "--draws", "20000", "--weather", "dry").rows[0]!;
    expect(closes.share).toBeCloseTo(0.5, 1);
  });

  it("agrees with the budget where all inputs are normal, and says so", () => {
    const normal = changedDemo(
      folder,
      "normal.yaml",
      "decision:",
      "spread: { tilt: 0 dB, blunder: { chance: 0 % }, feed_return_loss: 0 dB }\ndecision:",
    );
    const text = flowing(textOf(normal, "--weather", "dry", "--cover", "bare"));
    expect(text).toMatch(/verdicts of all 2 cases agree/);
  });

  it("says why it parts from the budget", () => {
    const text = flowing(textOf(demo, "--weather", "thunderstorm"));
    for (const reason of [
      /blunders, which a budget leaves out, cost some 15\.0 dB in 3\.5 % of the draws/,
      /the rain rate, which a budget takes as written, is drawn with a deviation of a factor of 1\.15/,
      /water on the covers has its long tail towards loss/,
      /water at both ends is tied/,
    ]) {
      expect(text).toMatch(reason);
    }
  });

  it("speaks of few draws and of likely answers in plain numbers", () => {
    const one = flowing(textOf(demo, "--draws", "1", "--weather", "dry"));
    expect(one).toMatch(/: 1 draw, chances good to \d\d points/);
    const few = flowing(textOf(demo, "--draws", "10", "--weather", "dry"));
    expect(few).toMatch(/: 10 draws, chances good to \d\d points/);
    const all = flowing(textOf(demo, ...quick));
    expect(all).not.toMatch(/chance 100/);
    expect(all).toMatch(/chance over 99 % (in both|for)/);
  });

  it("tells of a cover over the dish, which bare feeds have before them as well", () => {
    const roofed = changedDemo(folder, "roofed.yaml", "dish: tripod,", "dish: tripod, dish_cover: sheet,");
    expect(flowing(textOf(roofed, ...quick))).toContain(
      "Over the dish: sheet (receiver). It stays in every margin",
    );
    expect(textOf(demo, ...quick)).not.toContain("Over the dish");
  });

  it("says that the cover loses what its table has as lost, however few", () => {
    const ridge = `${root}scenarios/over-the-ridge.yaml`;
    const { rows } = studyOf(ridge, "--weather", "thunderstorm");
    expect(100 * rows[0]!.lost).toBeCloseTo(0.1, 1);
    const text = flowing(textOf(ridge, "--weather", "thunderstorm"));
    expect(text).toContain(`the cover loses ${(100 * rows[0]!.lost).toFixed(1)} of a hundred draws`);
    const weak = changedDemo(folder, "weak.yaml", "power: 10 mW,", "power: 0.05 mW,");
    const weakly = flowing(textOf(weak, "--draws", "20000", "--weather", "dry"));
    expect(weakly).toMatch(/the cover (loses|wins) \d/);
    expect(weakly).not.toMatch(/(loses|wins) 0\.0 /);
  });

  it.each([
    [["--draws", "0"], /--draws: read "0", expected a whole number from 1 to 1000000/],
    [["--draws", "-5"], /--draws: read "-5"/],
    [["--draws", "1e9"], /--draws: read "1e9"/],
    [["--draws", "12.5"], /--draws: read "12\.5"/],
    [["--draws", "many"], /--draws: read "many"/],
    [["--seed", "-1"], /--seed: read "-1", expected a whole number from 0 to 4294967295/],
    [["--precision", "0 %"], /--precision: read "0 %", expected 0\.001 to 50 %/],
    [["--precision", "0.01"], /--precision: .*bare number; write 1 %/],
    [["--weather", "shwer"], /no weather "shwer".*did you mean shower\?/],
    [["--cover", "flm"], /no cover "flm".*did you mean film\?/],
    [["--mode", "cww"], /no mode "cww".*did you mean cw\?/],
  ])("refuses %j with a plain message", (args, message) => {
    const { status, stdout, stderr } = oilskin(["spread", demo, ...args]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(message);
    expect(stderr).not.toMatch(/ {2}at /);
  });

  it("refuses a correlation outside -1 to 1 and a distribution that cannot be, with line and column", () => {
    const file = changedDemo(
      folder,
      "impossible.yaml",
      "decision:",
      "spread: { correlation: { water: 1.5 }, tilt: { flat: [0.3 dB, 0 dB] } }\ndecision:",
    );
    const { status, stdout, stderr } = oilskin(["spread", file]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(/impossible\.yaml:\d+:\d+: .*1\.5.*-1 to 1/);
    expect(stderr.split("\n").filter((line) => line.includes("impossible.yaml:")).length).toBe(2);
  });

  it("stops without a word where the reader goes away", () => {
    const { stderr } = shell(
      `"$NODE" "$OILSKIN" spread ${root}scenarios/hilltop-contest.yaml --draws 2000 --json | head -1`,
    );
    expect(stderr).toBe("");
  });
});
