import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { MarginReport } from "../../src/study/marginReport.ts";
import { oilskin, scenarioFile, scenarioNames } from "./run.ts";

/** Covers, weathers and modes of each scenario, the mixed ends counted as a cover; read off the files by eye. */
const shape = {
  "hilltop-contest": { choices: 5, weathers: 4, modes: 2 },
  "coast-beacon": { choices: 5, weathers: 6, modes: 2 },
  "town-link": { choices: 4, weathers: 6, modes: 1 },
} as const;

const sum = (values: readonly number[]) => values.reduce((a, b) => a + b, 0);
const verdicts = ["closes", "thin", "fails"];

describe.each(scenarioNames)("the data of %s", (name) => {
  const file = scenarioFile(name);
  const json = oilskin(["budget", file, "--json"]);
  const csv = oilskin(["budget", file, "--csv"]);
  const report = JSON.parse(json.stdout) as MarginReport;
  const rows = csvParse(csv.stdout);
  const { choices, weathers, modes } = shape[name];

  it("comes without a word beside, as JSON and as CSV", () => {
    expect({ status: json.status, stderr: json.stderr }).toEqual({ status: 0, stderr: "" });
    expect({ status: csv.status, stderr: csv.stderr }).toEqual({ status: 0, stderr: "" });
  });

  it("has the kept fields at the top", () => {
    expect(Object.keys(report)).toEqual(
      expect.arrayContaining(["title", "frequencyGHz", "path", "budgets", "warnings"]),
    );
    expect(report.path).toMatchObject({
      distanceKm: expect.any(Number),
      headingDeg: expect.any(Number),
      backHeadingDeg: expect.any(Number),
    });
    for (const warning of report.warnings) {
      expect(warning).toEqual({
        code: expect.stringMatching(/^[a-z0-9_]+$/),
        message: expect.any(String),
        where: expect.any(String),
      });
    }
  });

  it("has the kept fields in every budget", () => {
    for (const budget of report.budgets) {
      expect(budget).toMatchObject({
        case: {
          weather: expect.any(String),
          transmitter: { feed: expect.any(String), cover: expect.any(String) },
          receiver: { feed: expect.any(String), cover: expect.any(String) },
          mode: expect.any(String),
        },
        entries: expect.any(Array),
        receivedDbm: expect.any(Number),
        noiseDbm: expect.any(Number),
        snrDb: expect.any(Number),
        requiredSnrDb: expect.any(Number),
        marginDb: expect.any(Number),
        marginLowDb: expect.any(Number),
        marginHighDb: expect.any(Number),
        verdict: expect.toSatisfy((verdict) => verdicts.includes(verdict)),
      });
    }
  });

  it("has the kept fields in every entry", () => {
    for (const entry of report.budgets.flatMap(({ entries }) => entries)) {
      expect(entry).toEqual({
        id: expect.stringMatching(/^(tx|path|rx)\.[a-z_]+$/),
        stage: expect.stringMatching(/^(transmitter|path|receiver)$/),
        label: expect.any(String),
        db: expect.any(Number),
        low: expect.any(Number),
        high: expect.any(Number),
        sigma: expect.any(Number),
        source: expect.stringMatching(/\S/),
      });
      expect(entry.low).toBeLessThanOrEqual(entry.db);
      expect(entry.high).toBeGreaterThanOrEqual(entry.db);
    }
  });

  it("names no entry of a budget twice", () => {
    for (const { entries, noiseEntries } of report.budgets) {
      const ids = [...entries, ...noiseEntries].map(({ id }) => id);
      expect(new Set(ids).size).toBe(ids.length);
    }
  });

  it("adds up: entries to the level, level and noise to the ratio, ratio to the margin", () => {
    for (const budget of report.budgets) {
      expect(sum(budget.entries.map(({ db }) => db)) - budget.receivedDbm).toBeCloseTo(0, 9);
      expect(budget.receivedDbm - budget.noiseDbm - budget.snrDb).toBeCloseTo(0, 9);
      expect(budget.snrDb - budget.requiredSnrDb - budget.marginDb).toBeCloseTo(0, 9);
    }
  });

  it("bounds every margin", () => {
    for (const { marginLowDb, marginDb, marginHighDb } of report.budgets) {
      expect(marginLowDb).toBeLessThanOrEqual(marginDb + 1e-9);
      expect(marginHighDb).toBeGreaterThanOrEqual(marginDb - 1e-9);
    }
  });

  it("holds every cover in every weather and mode once, and nothing else", () => {
    const cases = report.budgets.map((budget) => JSON.stringify(budget.case));
    expect(cases).toHaveLength(choices * weathers * modes);
    expect(new Set(cases).size).toBe(cases.length);
  });

  it("has one row of CSV for each entry and five for each result", () => {
    const entries = report.budgets.flatMap((budget) => [
      ...budget.entries,
      ...budget.noiseEntries,
      budget.requirement,
    ]);
    expect(rows).toHaveLength(entries.length + 5 * report.budgets.length);
    expect(rows.filter(({ stage }) => stage !== "result").map(({ id, db }) => [id, Number(db)])).toEqual(
      entries.map(({ id, db }) => [id, db]),
    );
  });

  it("has a CSV whose columns add up to the results of the JSON", () => {
    for (const budget of report.budgets) {
      const { weather, mode, transmitter, receiver } = budget.case;
      const own = rows.filter(
        (row) =>
          row["weather"] === weather &&
          row["mode"] === mode &&
          row["transmitter_cover"] === transmitter.cover &&
          row["receiver_cover"] === receiver.cover,
      );
      const of = (pick: (stage: string) => boolean) =>
        sum(own.filter(({ stage }) => pick(stage!)).map(({ db }) => Number(db)));
      const result = (id: string) => Number(own.find((row) => row["id"] === `result.${id}`)!["db"]);
      expect(of((stage) => ["transmitter", "path", "receiver"].includes(stage))).toBeCloseTo(
        budget.receivedDbm,
        9,
      );
      expect(of((stage) => stage !== "result")).toBeCloseTo(budget.marginDb, 9);
      expect(result("received")).toBe(budget.receivedDbm);
      expect(result("noise")).toBe(budget.noiseDbm);
      expect(result("margin")).toBe(budget.marginDb);
    }
  });
});

describe("a name with a comma and a quote", () => {
  it("survives the CSV", () => {
    const file = scenarioFile("hilltop-contest");
    const { stdout } = oilskin(["budget", file, "--csv", "--weather", "dry", "--cover", "film"]);
    const labels = csvParse(stdout).map(({ label }) => label);
    expect(labels).toContain("cover, mismatch");
    expect(stdout).toContain('"cover, mismatch"');
  });
});
