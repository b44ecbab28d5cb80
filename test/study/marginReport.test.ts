import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { cases, prepare } from "../../src/index.ts";
import { marginReport } from "../../src/study/marginReport.ts";
import { coverOf, layerOf, scenarioOf, weatherOf } from "../budget/scenarios.ts";

const link = prepare(
  scenarioOf({
    title: "invented ridge",
    covers: { bare: coverOf(), film: coverOf({ layers: [layerOf(0.127, 2.05)], wetModel: "merceret2000" }) },
    weather: {
      dry: weatherOf(),
      wet: weatherOf({ rainMmPerH: { value: 10 }, extentKm: 5 }),
      wetter: weatherOf({ rainMmPerH: { value: 20 }, extentKm: 5 }),
    },
  }),
);
const chosen = cases(link);
const report = marginReport(link, chosen);

describe("the margin report", () => {
  it("names the path", () => {
    expect(report.title).toBe("invented ridge");
    expect(report.frequencyGHz).toBe(10.368);
    expect(report.path.distanceKm).toBeCloseTo(60, 3);
  });

  it("has the cases in the order asked for, each as it comes out alone", () => {
    const backwards = [...chosen].reverse();
    const alone = backwards.map((one) => evaluate(link, one).marginDb);
    const { budgets } = marginReport(link, backwards);
    expect(budgets.map((budget) => budget.case)).toEqual(backwards);
    expect(budgets.map(({ marginDb }) => marginDb)).toEqual(alone);
  });

  it("says a doubt once that several cases share", () => {
    const raised = chosen.flatMap((one) => evaluate(link, one).warnings.map(({ message }) => message));
    const said = report.warnings.map(({ where, message }) => `${where}: ${message}`);
    expect(raised.filter((message) => message.includes("merceret2000")).length).toBeGreaterThan(1);
    expect(said.filter((text) => text.includes("merceret2000"))).toHaveLength(1);
    expect(new Set(said).size).toBe(said.length);
  });

  it("loses no doubt of any case", () => {
    const said = new Set(report.warnings.map(({ message }) => message));
    const raised = chosen.flatMap((one) => evaluate(link, one).warnings);
    expect(raised.filter(({ message }) => !said.has(message))).toEqual([]);
  });

  it("keeps the doubts out of the single budgets", () => {
    for (const budget of report.budgets) expect(budget).not.toHaveProperty("warnings");
  });

  it("of no case is empty, not an error", () => {
    expect(marginReport(link, [])).toMatchObject({ budgets: [], warnings: [] });
  });
});
