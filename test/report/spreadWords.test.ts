import { describe, expect, it } from "vitest";
import { scatterWords } from "../../src/report/spreadWords.ts";

describe("a distribution in a few words", () => {
  it("gives levels in dBm and how far they scatter in dB", () => {
    const flat = { kind: "flat", low: 9.03, high: 10.79 } as const;
    expect(scatterWords({ scatter: flat, unit: "dBm" })).toBe("flat, 9 to 10.8 dBm");
    expect(scatterWords({ scatter: { kind: "normal", sigma: 0.5 }, unit: "dBm" })).toBe("normal, 0.5 dB");
  });

  it("says of a part that scatters about what it does", () => {
    const parts = [
      { share: 0.96, value: 34.8, scatter: { kind: "normal", sigma: 0.3 } },
      { share: 0.04, value: 13 },
    ] as const;
    expect(scatterWords({ scatter: { kind: "mixture", parts }, unit: "dBm" })).toBe(
      "96 % 34.8 dBm, normal, 0.3 dB; 4 % 13 dBm",
    );
  });

  it("keeps the tenths of a rate typed in inches", () => {
    const rate = { kind: "flat", low: 5, high: 25.4 } as const;
    expect(scatterWords({ scatter: rate, unit: "rate" })).toBe("flat, 5 to 25.4 mm/h");
  });
});
