import { describe, expect, it } from "vitest";
import { averagePower, modeDuty } from "../../src/safety/averagePower.ts";

describe("average power", () => {
  it("counts 22 units of key down in the 50 of PARIS", () => {
    // Morse: dot 1, dash 3, gaps 1, 3 and 7 units; the word with its gap is the unit of speed
    const letters = [".--.", ".-", ".-.", "..", "..."];
    const down = letters
      .join("")
      .split("")
      .reduce((sum, mark) => sum + (mark === "." ? 1 : 3), 0);
    const gaps = letters.reduce((sum, letter) => sum + letter.length - 1, 0) + 3 * (letters.length - 1) + 7;
    expect(modeDuty.cw).toBeCloseTo(down / (down + gaps), 12);
  });

  it("is 2.2 W for 10 W of telegraphy half of the time", () => {
    expect(averagePower({ powerW: 10, transmitFraction: 0.5, modeDuty: modeDuty.cw }).averageW).toBeCloseTo(
      2.2,
      12,
    );
  });

  it("refuses more than all of the time", () => {
    expect(() => averagePower({ powerW: 1, transmitFraction: 1.1, modeDuty: 1 })).toThrow("transmitFraction");
  });
});
