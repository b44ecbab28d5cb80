import { describe, expect, it } from "vitest";
import { type Mode, modes, requiredSnrInBandwidth } from "../../src/receiver/modes.ts";

describe("built-in modes", () => {
  // Bandwidth scaling by hand: -9 dB in 2500 Hz is 7 dB less noise away in 500 Hz, and so on.
  it.each([
    ["cw", -2.0103],
    ["ssb", 3],
    ["fm", 9.7185],
    ["wfm", 10],
  ] as const)("%s needs %f dB in its own filter", (name, snrDb) => {
    expect(requiredSnrInBandwidth(modes[name])).toBeCloseTo(snrDb, 4);
  });

  it("keeps both FM figures at the threshold of a discriminator", () => {
    // About 10 dB in the filter (common practice, no source)
    for (const mode of [modes.fm, modes.wfm]) {
      expect(Math.abs(requiredSnrInBandwidth(mode) - 10)).toBeLessThan(0.5);
    }
  });

  it("orders the modes by the signal they ask of the path", () => {
    const total = (mode: Mode) => mode.requiredSnrDb + 10 * Math.log10(mode.referenceBandwidthHz);
    const order = [modes.cw, modes.ssb, modes.fm, modes.wfm].map(total);
    expect(order).toEqual([...order].sort((a, b) => a - b));
  });

  it("files every mode under its own name", () => {
    for (const [name, mode] of Object.entries(modes)) expect(mode.name).toBe(name);
  });
});
