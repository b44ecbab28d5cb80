import { describe, expect, it } from "vitest";
import { prepare } from "../../src/budget/prepare.ts";
import type { Scenario, SpreadSettings } from "../../src/scenario/types.ts";
import { spreadRanking } from "../../src/study/spreadRanking.ts";
import { caseOf, coverOf, scenarioOf } from "../budget/scenarios.ts";

const bare = { transmitter: { cover: "bare" }, receiver: { cover: "bare" }, covers: { bare: coverOf() } };

function mattersOf(scenario: Scenario, spread: SpreadSettings = {}) {
  const link = prepare({ ...scenario, spread: { tiltLossDb: { value: 0 }, ...spread } });
  return spreadRanking(link, [caseOf(scenario, Object.keys(scenario.weather)[0]!)], 1)[0]!.matters;
}

describe("what a matter moves the mean by", () => {
  it("is its own doing: not that of a mixture beside it, whose mean no draw has", () => {
    const { transmitter, ...rest } = scenarioOf(bare);
    const scatter = {
      kind: "mixture",
      parts: [
        { share: 0.9, value: 30 },
        { share: 0.1, value: -10 },
      ],
    } as const;
    const powerDbm = { value: 26, sigma: 12, scatter };
    const matters = mattersOf({ ...rest, transmitter: { ...transmitter, powerDbm } });
    for (const { matter, shiftDb } of matters) expect(Math.abs(shiftDb), matter).toBeLessThan(0.6);
    const aim = matters.find(({ matter }) => matter === "aim")!;
    expect(Math.abs(aim.shiftDb)).toBeLessThan(0.05);
  });

  it("is its own doing: not that of a tilt that never is none", () => {
    const tiltLossDb = { value: 1, sigma: 0.1, scatter: { kind: "flat", low: 0.9, high: 1.1 } } as const;
    const matters = mattersOf(scenarioOf(bare), { tiltLossDb });
    for (const { matter, shiftDb } of matters) {
      expect(Math.abs(shiftDb - (matter === "tilt" ? -1 : 0)), matter).toBeLessThan(0.1);
    }
  });
});
