import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import type { MarginReport } from "../../src/study/marginReport.ts";
import { demo, oilskin, temporaryFolder } from "./run.ts";

const folder = temporaryFolder();

/** The report of the demo with its power, line loss, feed and rain written otherwise. */
function reportOf(name: string, power: string, line: string, returnLoss: string, rain: string): MarginReport {
  const pieces = {
    "power: 10 mW": `power: ${power}`,
    "line_loss: 0.2 dB": `line_loss: ${line}`,
    "return_loss: 14 dB": `return_loss: ${returnLoss}`,
    "rain: 16 mm/h": `rain: ${rain}`,
  };
  let text = readFileSync(demo, "utf8");
  for (const [from, to] of Object.entries(pieces)) {
    expect(text.split(from)).toHaveLength(2);
    text = text.replace(from, to);
  }
  const file = join(folder, `${name}.yaml`);
  writeFileSync(file, text);
  const { status, stdout, stderr } = oilskin(["budget", file, "--json"]);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  return JSON.parse(stdout) as MarginReport;
}

function entry({ budgets }: MarginReport, id: string, weather = "dry") {
  const { entries } = budgets.find((one) => one.case.weather === weather)!;
  return entries.find((one) => one.id === id)!;
}

describe("the margin report of inputs that name a distribution", () => {
  it("is that of +/- where they are normal", () => {
    const named = reportOf(
      "named",
      "{ normal: 10 mW, sigma: 0.5 dB }",
      "{ normal: 0.2 dB, sigma: 0.05 dB }",
      "{ normal: 14 dB, sigma: 1 dB }",
      "{ normal: 16 mm/h, sigma: 3 mm/h }",
    );
    const typed = reportOf(
      "typed",
      "10 mW +/- 0.5 dB",
      "0.2 dB +/- 0.05 dB",
      "14 dB +/- 1 dB",
      "16 mm/h +/- 3 mm/h",
    );
    expect(entry(typed, "tx.power").sigma).toBe(0.5);
    expect(named).toEqual(typed);
  });

  it("takes value and standard deviation of any other", () => {
    const report = reportOf(
      "others",
      "{ mixture: [{ share: 50 %, of: 10 mW }, { share: 50 %, of: 1 mW }] }",
      "{ flat: [0 dB, 0.6 dB] }",
      "{ flat: [13 dB, 15 dB] }",
      "{ lognormal: 16 mm/h, factor: 1.6 }",
    );
    // Half 10 dBm and half 0 dBm: 5 dBm, each 5 dB off.
    expect(entry(report, "tx.power")).toMatchObject({ db: 5, sigma: 5 });
    expect(entry(report, "tx.line").db).toBeCloseTo(-0.3, 9);
    expect(entry(report, "tx.line").sigma).toBeCloseTo(0.6 / Math.sqrt(12), 9);
    // The median rain takes what the same rain takes when nobody doubts it, and is doubted more.
    const sure = reportOf("sure", "10 mW", "0.2 dB", "14 dB", "16 mm/h");
    const [doubted, plain] = [report, sure].map((one) => entry(one, "path.rain", "shower"));
    expect(doubted!.db).toBeCloseTo(plain!.db, 9);
    expect(doubted!.sigma).toBeGreaterThan(1.2 * plain!.sigma);
  });
});
