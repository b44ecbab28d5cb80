import { describe, expect, it } from "vitest";
import type { MarginReport } from "../../src/study/marginReport.ts";
import { changedDemo, demo, oilskin, scenarioFile, temporaryFolder } from "./run.ts";

function casesOf(file: string, ...options: readonly string[]) {
  const { status, stdout, stderr } = oilskin(["budget", file, "--json", ...options]);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  return (JSON.parse(stdout) as MarginReport).budgets.map((budget) => budget.case);
}

describe("picking cases", () => {
  it("--cover leaves one cover at both ends, in all weathers and modes", () => {
    const chosen = casesOf(demo, "--cover", "lid");
    expect(chosen).toHaveLength(4 * 2);
    for (const { transmitter, receiver } of chosen)
      expect([transmitter.cover, receiver.cover]).toEqual(["lid", "lid"]);
  });

  it("--cover bare is known to every scenario", () => {
    expect(casesOf(demo, "--cover", "bare")).toHaveLength(8);
  });

  it("--weather leaves one weather, with all covers and modes", () => {
    const chosen = casesOf(demo, "--weather", "after the shower");
    expect(chosen).toHaveLength(5 * 2);
    expect(new Set(chosen.map(({ weather }) => weather))).toEqual(new Set(["after the shower"]));
  });

  it("--mode takes any mode in place of the scenario's, even one that it does not ask for", () => {
    const chosen = casesOf(demo, "--mode", "cw");
    expect(chosen).toHaveLength(5 * 4);
    expect(new Set(chosen.map(({ mode }) => mode))).toEqual(new Set(["cw"]));
  });

  it("--mode knows the scenario's own modes", () => {
    const chosen = casesOf(
      scenarioFile("coast-beacon"),
      "--mode",
      "slow tones",
      "--weather",
      "dry",
      "--cover",
      "cap",
    );
    expect(chosen.map(({ mode }) => mode)).toEqual(["slow tones"]);
  });

  it("--feed takes a feed at both ends", () => {
    const file = changedDemo(
      temporaryFolder(),
      "two feeds.yaml",
      "  stub:",
      "  spare: { return_loss: 20 dB, edge_taper: 11 dB, gain: 8 dBi, aperture: 40 mm }\n  stub:",
    );
    for (const { transmitter, receiver } of casesOf(file, "--feed", "spare")) {
      expect([transmitter.feed, receiver.feed]).toEqual(["spare", "spare"]);
    }
  });

  it("a report of one case says what closes", () => {
    const { stdout } = oilskin(["budget", demo, "--weather", "dry", "--cover", "sheet", "--mode", "ssb"]);
    expect(stdout).toMatch(/\nSSB voice closes in dry \(\d+\.\d dB\)\./);
    expect(stdout).toContain("How it comes about: SSB voice, cover sheet\n");
  });
});

describe("a name that the scenario does not hold", () => {
  it.each([
    ["--feed", "stubb", 'no feed "stubb"', "horn, stub", "did you mean stub?"],
    ["--cover", "flim", 'no cover "flim"', "bare, film, sheet, lid, cloth", "did you mean film?"],
    ["--weather", "Shower", 'no weather "Shower"', "dry, shower", "did you mean shower?"],
    ["--mode", "sbb", 'no mode "sbb"', "ssb", "did you mean ssb?"],
  ])("%s %s is refused with the nearest one", (option, name, ...said) => {
    const { status, stdout, stderr } = oilskin(["budget", demo, option, name]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    for (const words of said) expect(stderr).toContain(words);
    expect(stderr.trimEnd().split("\n")).toHaveLength(1);
  });

  it("is not guessed at where none is near", () => {
    const { status, stderr } = oilskin(["budget", demo, "--cover", "cardboard"]);
    expect(status).toBe(2);
    expect(stderr).toBe(
      'no cover "cardboard" in the scenario; expected one of bare, film, sheet, lid, cloth\n',
    );
  });

  it("a word that every object knows is no name either", () => {
    const { status, stderr } = oilskin(["budget", demo, "--weather", "constructor"]);
    expect(status).toBe(2);
    expect(stderr).toContain('no weather "constructor"');
  });

  it("a feed that does not suit an end's dish is refused with the reason", () => {
    const { status, stdout, stderr } = oilskin(["budget", demo, "--feed", "stub"]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain('feed "stub" does not suit the transmitter');
  });
});

describe("--require", () => {
  const dry = ["--weather", "dry"];
  const storm = ["--weather", "thunderstorm", "--mode", "fm"];
  const weak = changedDemo(temporaryFolder(), "weak.yaml", "power: 10 mW", "power: -60 dBm");
  const statusOf = (...args: readonly string[]) => oilskin(["budget", ...args]).status;

  it("is content where all cases close", () => {
    expect(statusOf(demo, ...dry, "--require")).toBe(0);
    expect(statusOf(demo, ...dry, "--require", "closes")).toBe(0);
  });

  it("ends with 3 where a case is thin", () => {
    expect(statusOf(demo, ...storm, "--require")).toBe(3);
    expect(statusOf(demo, "--require", "closes")).toBe(3);
  });

  it("thin lets a thin case pass, and none that fails", () => {
    expect(statusOf(demo, ...storm, "--cover", "film", "--require", "thin")).toBe(0);
    expect(statusOf(demo, ...storm, "--cover", "sheet", "--require", "thin")).toBe(3);
    expect(statusOf(weak, ...dry, "--require", "thin")).toBe(3);
  });

  it("is not asked for unasked", () => {
    expect(statusOf(weak, ...dry)).toBe(0);
  });

  it("prints the report all the same", () => {
    const [plain, required] = [[], ["--require"]].map((more) => oilskin(["budget", demo, ...storm, ...more]));
    expect(required!.stdout).toBe(plain!.stdout);
    expect(required!.stderr).toBe("");
  });

  it("holds for JSON and CSV as well", () => {
    expect(statusOf(demo, ...storm, "--json", "--require")).toBe(3);
    expect(statusOf(demo, ...storm, "--csv", "--require")).toBe(3);
  });

  it("leaves the file that follows it alone", () => {
    const storming = [...storm, "--cover", "lid"];
    expect(statusOf("--require", demo)).toBe(3);
    expect(statusOf(...storming, "--require", demo)).toBe(3);
    expect(statusOf(...dry, "--require", demo)).toBe(0);
    expect(statusOf("--require", "thin", ...storming, demo)).toBe(3);
    expect(statusOf(...dry, "--require", "thin", demo)).toBe(0);
    expect(statusOf(...storming, demo, "--require")).toBe(3);
    expect(statusOf(...storm, "--cover", "bare", "--require", "thin", demo)).toBe(0); // 4.4 dB, thin
    expect(statusOf(...storm, "--cover", "bare", "--require", demo)).toBe(3);
  });

  it("asks for a file where none is named", () => {
    const { status, stderr } = oilskin(["budget", "--require", "thin"]);
    expect(status).toBe(2);
    expect(stderr).toContain("missing required argument 'file'");
  });

  it("refuses another word", () => {
    const { status, stdout, stderr } = oilskin(["budget", demo, "--require", "nonsense"]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain("closes, thin");
  });
});
