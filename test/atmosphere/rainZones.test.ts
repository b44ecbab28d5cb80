import { describe, expect, it } from "vitest";
import { type RainZone, rainZoneNames, zoneRainRate } from "../../src/atmosphere/rainZones.ts";
import { describeReference, num } from "../reference.ts";
import { expectRelative } from "./relative.ts";

describe("rain climatic zones", () => {
  // ITU-R PN.837-1 (08/1994) Table 1, withdrawn.
  it.each([
    ["E", 0.01, 22],
    ["F", 0.01, 28],
    ["K", 0.001, 100],
    ["Q", 1, 24],
  ] as const)("zone %s at %d %%", (zone, percent, rate) => {
    const result = zoneRainRate({ zone, percent });
    expectRelative(result.rainRateMmPerH, rate, 1e-12);
    expect(result.source).toMatch(/withdrawn/);
  });

  it("runs straight in logarithms between the percentages", () => {
    // Geometric means of 0.01 and 0.03 %, and of the rates 22 and 12 mm/h.
    const { rainRateMmPerH } = zoneRainRate({ zone: "E", percent: Math.sqrt(0.01 * 0.03) });
    expectRelative(rainRateMmPerH, Math.sqrt(22 * 12), 1e-12);
  });

  it("knows 15 zones, no I and no O, and nothing beyond its percentages", () => {
    expect(rainZoneNames.join("")).toBe("ABCDEFGHJKLMNPQ");
    expect(() => zoneRainRate({ zone: "I" as RainZone, percent: 0.01 })).toThrow(/zone/);
    expect(() => zoneRainRate({ zone: "toString" as RainZone, percent: 0.01 })).toThrow(/zone/);
    expect(() => zoneRainRate({ zone: "E", percent: 2 })).toThrow(/percent/);
    expect(() => zoneRainRate({ zone: "E", percent: 0.0005 })).toThrow(/percent/);
  });
});

describeReference("atmosphere/p837-1-rain-zones.csv", (row) => {
  for (const zone of rainZoneNames) {
    const { rainRateMmPerH } = zoneRainRate({ zone, percent: num(row, "p_percent") });
    expectRelative(rainRateMmPerH, num(row, zone), 1e-12, `zone ${zone}, ${row["p_percent"]} %`);
  }
});
