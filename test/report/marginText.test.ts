import { describe, expect, it } from "vitest";
import type { Verdict } from "../../src/budget/types.ts";
import { cases, prepare } from "../../src/index.ts";
import { answer, marginMatrix, pathLines } from "../../src/report/marginText.ts";
import { plain } from "../../src/report/words.ts";
import { type MarginReport, marginReport } from "../../src/study/marginReport.ts";
import { scenarioOf, siteOf, weatherOf } from "../budget/scenarios.ts";

type Outcome = readonly [cover: string, weather: string, marginDb: number, verdict: Verdict];

/** A link of one cover, and a report on it whose outcomes are written by hand. */
function written(outcomes: readonly Outcome[]) {
  const names = [...new Set(outcomes.map(([, weather]) => weather))];
  const link = prepare(scenarioOf({ weather: Object.fromEntries(names.map((name) => [name, weatherOf()])) }));
  const { budgets: worked, ...rest } = marginReport(link, cases(link).slice(0, 1));
  const budgets = outcomes.map(([cover, weather, marginDb, verdict]) => ({
    ...worked[0]!,
    case: { weather, mode: "cw", transmitter: { feed: "stub", cover }, receiver: { feed: "stub", cover } },
    marginDb,
    marginSigmaDb: 2,
    holdProbability: marginDb === 1 ? 0.69 : 0.99,
    verdict,
  }));
  const report: MarginReport = { ...rest, budgets };
  return { link, report };
}

describe("the answer", () => {
  const answerTo = (...outcomes: readonly Outcome[]) => {
    const { link, report } = written(outcomes);
    return answer(report, link).replace(/\s+/g, " ").trim();
  };

  const granted = "Line of sight is taken: no hill, tree or building in the way.";

  it("groups the weathers by verdict, the bad news first", () => {
    expect(
      answerTo(
        ["film", "storm", -3.21, "fails"],
        ["film", "dry", 20.04, "closes"],
        ["film", "drizzle", 9.5, "closes"],
        ["film", "rain", 1, "thin"],
      ),
    ).toBe(
      "CW by ear fails in storm (-3.2 dB), is thin in rain (1.0 dB, holds with 69 %) and closes in dry (20.0 dB) " +
        `and drizzle (9.5 dB). ${granted}`,
    );
  });

  it("says what the cover takes against the bare mouth of the same weather", () => {
    expect(
      answerTo(
        ["film", "dry", 19.9, "closes"],
        ["film", "rain", 5, "closes"],
        ["bare", "rain", 7.5, "closes"],
        ["bare", "dry", 20, "closes"],
      ),
    ).toMatch(/ The cover \(film\) takes 0\.1 dB in dry and 2\.5 dB in rain, both ends together\. Line/);
  });

  it("has no cost to tell of a bare mouth", () => {
    expect(answerTo(["bare", "dry", 19.9, "closes"])).toBe(`CW by ear closes in dry (19.9 dB). ${granted}`);
  });

  it("says where nothing was asked", () => {
    const { link, report } = written([["film", "dry", 1, "thin"]]);
    expect(answer({ ...report, budgets: [] }, link)).toBe("No case was asked for.");
  });
});

describe("the matrix", () => {
  it("has a row a cover, a column a weather, a dash where a case was not asked for", () => {
    const { link, report } = written([
      ["film", "dry", 19.94, "closes"],
      ["film", "rain", -0.3, "fails"],
      ["bare", "dry", 20.02, "closes"],
    ]);
    expect(marginMatrix(report, link, "cw")).toBe(
      [
        "cover                dry              rain",
        "------------------------------------------",
        "film *  19.9 ±2.0 closes  -0.3 ±2.0 fails",
        "bare    20.0 ±2.0 closes                 -",
      ].join("\n"),
    );
  });

  it("stars and names covers that differ from end to end", () => {
    const { link, report } = written([["film", "dry", 3, "closes"]]);
    const [budget] = report.budgets;
    const mixed = { ...budget!, case: { ...budget!.case, receiver: { feed: "stub", cover: "bare" } } };
    expect(marginMatrix({ ...report, budgets: [mixed] }, link, "cw")).toContain("film / bare");
  });
});

describe("the lines on the path", () => {
  const linesOf = (title: string, errorKm = 0) => {
    const path = {
      from: siteOf({ name: "Scar", positionErrorKm: errorKm }),
      to: siteOf({ name: "Fell", longitude: 1 }),
    };
    const link = prepare(scenarioOf({ title, path }));
    return pathLines(marginReport(link, []), link, plain).split("\n");
  };

  it("knows no elevation of minus nothing", () => {
    const link = prepare(scenarioOf());
    const level = { ...link.path, elevationDeg: -0.04, backElevationDeg: -0.06 };
    const lines = pathLines({ ...marginReport(link, []), path: level }, link, plain).split("\n");
    expect(lines).toContain("elevation 0.0 deg out, -0.1 deg back");
  });

  it("gives distance, frequency, headings and elevations", () => {
    // A degree of the equator is 111.32 km.
    expect(linesOf("Scar to Fell").slice(0, 3)).toEqual([
      "Scar to Fell",
      "111.3 km at 10.368 GHz, horizontal",
      "heading 90.0 deg TRUE out, 270.0 deg TRUE back",
    ]);
  });

  it("names the ends where the title does not", () => {
    expect(linesOf("Contest")[1]).toBe("Scar to Fell: 111.3 km at 10.368 GHz, horizontal");
    expect(linesOf("Scar in August")[1]).toBe("Scar to Fell: 111.3 km at 10.368 GHz, horizontal");
  });

  it("takes a name in the title for the same in small letters", () => {
    expect(linesOf("From Scar to the fell")[1]).toBe("111.3 km at 10.368 GHz, horizontal");
  });

  it("says how good the heading is where a locator leaves it open", () => {
    // 2 km across 111.3 km: 1.03 deg
    expect(linesOf("Scar to Fell", 2)[2]).toBe(
      "heading 90.0 deg TRUE out, 270.0 deg TRUE back, good to 1.0 deg",
    );
  });
});
