import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { InferReport } from "../../src/study/inferReadings.ts";
import { oilskin, root, temporaryFolder, widest } from "./run.ts";

const folder = temporaryFolder();
const bench = join(root, "scenarios/bench-infer.yaml");
const flowing = (text: string) => text.replace(/\s+/g, " ");

function infer(...args: readonly string[]): string {
  const { status, stdout, stderr } = oilskin(["infer", bench, ...args]);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  return stdout;
}

function inferring(text: string) {
  const file = join(folder, "infer.yaml");
  writeFileSync(file, text);
  return { file, ...oilskin(["infer", file]) };
}

describe("oilskin infer", () => {
  it("answers first: the feed, then the unknown sheet, within 80 columns", () => {
    const text = infer();
    expect(widest(text)).toBeLessThanOrEqual(80);
    // The demo was made from a feed of 15 dB at 60 degrees and a plate of 2.6, then rounded.
    expect(flowing(text)).toMatch(
      /Feed: reflection 0\.1\d\d ± 0\.\d+ \(return loss 15\.\d dB\), phase (5\d|6\d) deg/,
    );
    expect(flowing(text)).toMatch(
      /grey plate, 2\.4 mm: permittivity 2\.\d\d \(2\.\d\d to 2\.\d\d\), loss tangent/,
    );
  });

  it("--json holds all of it, --csv a row for each solution", () => {
    const report = JSON.parse(infer("--json")) as InferReport;
    expect(report.feed!.feeds).toHaveLength(1);
    expect(report.phaseFrom).toBe("sheets");
    const rows = csvParse(infer("--csv"));
    expect(rows.map((row) => row["what"])).toEqual(["feed", "sheet"]);
    expect(Number(rows[0]!["phase_deg"])).toBeCloseTo(report.feed!.feeds[0]!.phaseDeg, 9);
  });

  it("says plainly when the readings cannot decide, and which reading would", () => {
    const { status, stdout } = inferring(
      "frequency: 10.4 GHz\nfeed: { return_loss: 15.2 dB }\nreturn_loss_uncertainty: 0.1 dB\nsheets:\n" +
        "  one: { material: mine, permittivity: 2.75, loss_tangent: 0.006, thickness: 2.5 mm, return_loss: 6.62 dB }\n",
    );
    expect(status).toBe(0);
    expect(widest(stdout)).toBeLessThanOrEqual(80);
    expect(flowing(stdout)).toContain("Feed: the readings cannot decide between 2 solutions:");
    expect(flowing(stdout)).toMatch(/next: .* would tell them apart: return loss [\d.]+ dB and [\d.]+ dB/);
  });

  it.each([
    [
      "frequency: 10.4 GHz\nsheets:\n  a: { material: plastik, thickness: 1 mm, return_loss: 3 dB }\n",
      /:3:18: read "plastik"/,
    ],
    ["sheets: [", /infer\.yaml:1:\d+: /],
    [
      "frequency: 10.4\nunknown:\n  a: { thickness: 1, return_loss: 3 dB }\n",
      /:1:12: .*\n.*:3:19: [\s\S]*2 faults; nothing was computed/,
    ],
  ])("refuses %j with place and status 2", (text, said) => {
    const { status, stdout, stderr } = inferring(text);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(said);
    expect(stderr).not.toMatch(/^ +at /m);
  });

  it("refuses a file that is not there", () => {
    const { status, stderr } = oilskin(["infer", join(folder, "none.yaml")]);
    expect(status).toBe(2);
    expect(stderr).toContain("none.yaml:1:1: no such file");
  });
});
