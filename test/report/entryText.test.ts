import { describe, expect, it } from "vitest";
import type { Entry, Stage } from "../../src/budget/entry.ts";
import { cases, prepare } from "../../src/index.ts";
import { entryDetail, entryTable } from "../../src/report/entryText.ts";
import { marginReport } from "../../src/study/marginReport.ts";
import { scenarioOf } from "../budget/scenarios.ts";

const entry = (id: string, stage: Stage, db: number, more: Partial<Entry> = {}): Entry => ({
  id,
  stage,
  label: id.split(".")[1]!,
  db,
  low: db,
  high: db,
  sigma: 0,
  source: "typed in",
  ...more,
});

const link = prepare(scenarioOf());
const [worked] = marginReport(link, cases(link)).budgets;

/** A budget of a few round entries, as another weather might have them. */
function budgetIn(weather: string, entries: readonly Entry[]) {
  const noiseEntries = [entry("noise.thermal", "noise", 140), entry("noise.receiver", "noise", -2)];
  return {
    ...worked!,
    case: { ...worked!.case, weather },
    entries,
    noiseEntries,
    requirement: entry("mode.required", "mode", -5, { sigma: 1 }),
    snrDb: 20,
    requiredSnrDb: 5,
    marginDb: 15,
    marginSigmaDb: 2,
    marginLowDb: 14,
    marginHighDb: 16,
    holdProbability: 0.5,
    verdict: "thin" as const,
  };
}

const dry = budgetIn("dry", [
  entry("tx.power", "transmitter", 30),
  entry("path.space", "path", -150),
  entry("rx.line", "receiver", -1),
]);
const wet = budgetIn("wet", [
  entry("tx.power", "transmitter", 30),
  entry("tx.water", "transmitter", -3),
  entry("path.space", "path", -150),
  entry("path.rain", "path", -4.04, { low: -6, high: -2, sigma: 0.5 }),
  entry("rx.line", "receiver", -1),
]);

/** Words and figures of a row. */
const rowOf = (table: string, label: string) =>
  table
    .split("\n")
    .find((line) => line.startsWith(`  ${label} `))!
    .trim()
    .split(/ {2,}/);

describe("the table of entries", () => {
  const table = entryTable([dry, wet]);

  it("keeps a running level for each weather", () => {
    expect(rowOf(table, "power")).toEqual(["power", "30.0", "30.0"]);
    expect(rowOf(table, "space")).toEqual(["space", "-150.0", "-120.0", "-150.0", "-123.0"]);
    expect(rowOf(table, "line")).toEqual(["line", "-1.0", "-121.0", "-1.0", "-128.0"]);
  });

  it("has a dash where a weather lacks an entry, in the place where the other has it", () => {
    expect(rowOf(table, "rain")).toEqual(["rain", "-", "-4.0", "-127.0"]);
    const labels = table.split("\n").map((line) => line.trim().split(/ {2,}/)[0]);
    expect(labels.indexOf("water")).toBe(labels.indexOf("power") + 1);
    expect(labels.indexOf("rain")).toBe(labels.indexOf("space") + 1);
  });

  it("tells figures of a label that differ between weathers as a range, and not those of the first", () => {
    const rain = (weather: string, label: string) =>
      budgetIn(weather, [entry("path.rain", "path", -4, { label })]);
    const labelOf = (...labels: readonly string[]) =>
      entryTable([dry, ...labels.map((label, i) => rain(`rain ${i}`, label))])
        .split("\n")
        .find((line) => line.startsWith("  rain"))!
        .trim()
        .split(/ {2,}/)[0];
    expect(labelOf("rain, 16.1 km of it", "rain, 5.0 km of it")).toBe("rain, 5.0-16.1 km of it");
    expect(labelOf("rain, 8.0 km of it", "rain, 8.0 km of it")).toBe("rain, 8.0 km of it");
    expect(labelOf("rain, 8.0 km", "rain, all km")).toBe("rain, 8.0/all km");
  });

  it("raises the noise where the receiver adds to it", () => {
    expect(rowOf(table, "thermal")).toEqual(["thermal", "-140.0", "-140.0"]);
    expect(rowOf(table, "receiver")).toEqual(["receiver", "2.0", "-138.0", "2.0", "-138.0"]);
  });

  it("ends with the results of each weather", () => {
    expect(rowOf(table, "margin")).toEqual(["margin", "15.0", "15.0"]);
    expect(rowOf(table, "holds with")).toEqual(["holds with", "50 %", "50 %"]);
    expect(rowOf(table, "verdict")).toEqual(["verdict", "thin", "thin"]);
  });
});

describe("the detail of a budget", () => {
  it("gives bounds and deviation only where there are any", async () => {
    const rows = (await entryDetail(wet)).split("\n");
    expect(rows[0]).toMatch(/^entry +dB +low +high +sigma +source$/);
    expect(rows.find((row) => row.startsWith("path.rain"))).toMatch(
      /^path\.rain +-4\.04 +-6\.00 +-2\.00 +0\.50 +typed in$/,
    );
    expect(rows.find((row) => row.startsWith("path.space"))).toMatch(/^path\.space +-150\.00 +typed in$/);
  });

  it("ends with what the mode asks for", async () => {
    expect((await entryDetail(wet)).split("\n").at(-1)).toMatch(/^mode\.required +-5\.00 +1\.00 +typed in$/);
  });
});
