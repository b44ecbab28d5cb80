import { describe, expect, it } from "vitest";
import type { MarginReport } from "../../src/study/marginReport.ts";
import { changedDemo, demo, oilskin, temporaryFolder } from "./run.ts";

const folder = temporaryFolder();

describe("arithmetic in a scenario", () => {
  const entriesWith = (name: string, thickness: string) => {
    const file = changedDemo(folder, name, "5 mil", thickness);
    const { status, stdout, stderr } = oilskin(["budget", file, "--json", "--weather", "dry"]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    return (JSON.parse(stdout) as MarginReport).budgets[0]!.entries;
  };

  it("comes to the same budget as the result typed in", () => {
    // 2 x 3/32 in = 4.7625 mm
    expect(entriesWith("sum.yaml", "2 * 3/32 in")).toEqual(entriesWith("result.yaml", "4.7625 mm"));
  });

  it("with an unknown unit is refused by place", () => {
    const file = changedDemo(folder, "unit.yaml", "5 mil", "2 * 3/32 on");
    const { status, stdout, stderr } = oilskin(["budget", file]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain(`${file}:29:47: read "2 * 3/32 on"`);
    expect(stderr).not.toMatch(/^ +at /m);
  });
});

describe("typographic signs in a scenario", () => {
  it("are read by the built program as their plain ones", () => {
    const plain = changedDemo(folder, "plain.yaml", "dry: {}", "dry: { temperature: -5 degC }");
    const typographic = changedDemo(folder, "signs.yaml", "dry: {}", "dry: { temperature: \u22125 \u00b0C }");
    expect(oilskin(["budget", typographic])).toEqual(oilskin(["budget", plain]));
    const spread = changedDemo(folder, "spread.yaml", "0.22 dB +/- 0.04 dB", "0.22 dB \u00b1 0.04 dB");
    expect(oilskin(["budget", spread])).toEqual(oilskin(["budget", demo]));
  });
});
