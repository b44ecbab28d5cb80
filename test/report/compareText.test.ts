import { describe, expect, it } from "vitest";
import { prepare } from "../../src/budget/prepare.ts";
import { compareText, labelOf } from "../../src/report/compareText.ts";
import type { Scenario } from "../../src/scenario/types.ts";
import { commonMode, commonWeathers, compare } from "../../src/study/compare.ts";
import { scenarioOf, weatherOf } from "../budget/scenarios.ts";

function textOf(a: Scenario, b: Scenario): string {
  const [linkA, linkB] = [prepare(a), prepare(b)];
  const choice = { mode: commonMode(linkA, linkB), weathers: commonWeathers(linkA, linkB) };
  return compareText(compare(linkA, linkB, choice), { a: "a.yaml", b: "b.yaml" }).replace(/[ \n]+/g, " ");
}

describe("one label for two entries", () => {
  it.each([
    ["rain, 8.0 km of it", "rain, 5.5 km of it", "rain, 8.0/5.5 km of it"],
    ["antenna at 200 K", "antenna at 255 K", "antenna at 200/255 K"],
    ["free space", "free space", "free space"],
    ["needed for CW by ear", "needed for SSB voice", "needed for CW by ear/SSB voice"],
    ["dish", "a horn", "dish/a horn"],
    ["trees", "trees, 6 m of them", "trees/trees, 6 m of them"],
    ["a b", "a b b", "a b/a b b"],
  ])("%s and %s", (a, b, told) => {
    expect(labelOf({ label: { a, b } })).toBe(told);
  });

  it("is that of the one that has the entry", () => {
    expect(labelOf({ label: { a: undefined, b: "rain" } })).toBe("rain");
    expect(labelOf({ label: { a: "fog", b: undefined } })).toBe("fog");
  });
});

describe("the answer", () => {
  it("wonders where the better margin has the worse verdict", () => {
    const a = scenarioOf({ decision: { reserveDb: 3, confidence: 0.5 } });
    const b = scenarioOf({
      transmitter: { powerDbm: { value: 36.8 } },
      decision: { reserveDb: 110, confidence: 0.99 },
    });
    expect(textOf(a, b)).toMatch(/Dry: B is thin where A closes although 2\.0 dB better: power \+2\.0 dB\./);
  });

  it("says where a difference is smaller than its own uncertainty", () => {
    const withPower = (value: number) => scenarioOf({ transmitter: { powerDbm: { value, sigma: 1 } } });
    expect(textOf(withPower(30), withPower(31))).toContain("within its standard deviation of 1.4 dB");
    expect(textOf(withPower(30), withPower(31.5))).not.toContain("within its standard deviation");
  });

  it("says which is surer, and shows the entry that is so", () => {
    const [a, b] = [0.5, 5].map((sigma) => scenarioOf({ transmitter: { powerDbm: { value: 30, sigma } } }));
    const told = textOf(a!, b!);
    expect(told).toMatch(
      /indistinguishable at a bench's repeatability; B is less sure, ±6\.0 dB against ±3\.4 dB\./,
    );
    expect(told).toContain("transmitter power 30.0 ±0.5 30.0 ±5.0 0.0 ");
    expect(textOf(b!, a!)).toContain("B is surer, ±3.4 dB against ±6.0 dB.");
  });

  it("takes weathers of the same answer together", () => {
    const weather = { dry: weatherOf(), "after rain": weatherOf({ coversWetAsAtMmPerH: 5 }) };
    const [a, b] = [30, 33].map((value) => scenarioOf({ weather, transmitter: { powerDbm: { value } } }));
    expect(textOf(a!, b!)).toContain("Dry and after rain: both close; B is 3.0 dB better: power +3.0 dB.");
  });

  it("speaks of noise as the budget shows it, and of the margin as it suffers", () => {
    const withFigure = (value: number) => scenarioOf({ receiver: { noiseFigureDb: { value } } });
    const told = textOf(withFigure(1), withFigure(3));
    expect(told).toMatch(/receiver's noise 1\.0 3\.0 -2\.0 /);
    expect(told).toMatch(/Dry: both close; B is \d\.\d dB worse: noise -\d\.\d dB\./);
  });
});
