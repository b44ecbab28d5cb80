import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  abreast,
  capital,
  hertz,
  hundredth,
  listed,
  metres,
  paragraph,
  percent,
  plain,
  signed,
  tenth,
} from "../../src/report/words.ts";

describe("figures in words", () => {
  it.each([
    [24.34, "24.3"],
    [-0.04, "0.0"],
    [0, "0.0"],
    [-0.06, "-0.1"],
    [-154.631, "-154.6"],
  ])("%d dB to a tenth is %s", (db, text) => {
    expect(tenth(db)).toBe(text);
  });

  it.each([
    [-0.004, "0.00"],
    [-0.006, "-0.01"],
    [1.499, "1.50"],
  ])("%d dB to a hundredth is %s", (db, text) => {
    expect(hundredth(db)).toBe(text);
  });

  it.each([
    [1.25, "+1.3"],
    [-0.04, "0.0"],
    [0.04, "0.0"],
    [-2, "-2.0"],
  ])("a change of %d dB is %s", (db, text) => {
    expect(signed(db)).toBe(text);
  });

  it.each([
    [0.9, "90 %"],
    [0.644, "64 %"],
    [0.99, "99 %"],
    [0.9901, "over 99 %"],
    [1, "over 99 %"],
    [0.01, "1 %"],
    [0.0099, "under 1 %"],
    [0, "under 1 %"],
  ])("a share of %d is %s", (share, text) => {
    expect(percent(share)).toBe(text);
  });

  it.each([
    [3, "3 Hz"],
    [500, "500 Hz"],
    [2500, "2.5 kHz"],
    [15_000, "15 kHz"],
    [28e6, "28 MHz"],
    [1e6, "1 MHz"],
  ])("a bandwidth of %d Hz is %s", (bandwidthHz, text) => {
    expect(hertz(bandwidthHz)).toBe(text);
  });

  // A keep-out distance is never rounded towards the antenna.
  it.each([
    [0.11, "0.2 m"],
    [0.1, "0.1 m"],
    [9.95, "10.0 m"],
    [12.01, "13 m"],
    [1500, "1.5 km"],
    [1520, "1.6 km"],
  ])("a distance of %d m is %s", (distanceM, text) => {
    expect(metres(distanceM)).toBe(text);
  });

  it.each([
    [[], ""],
    [["a"], "a"],
    [["a", "b"], "a and b"],
    [["a", "b", "c"], "a, b and c"],
  ])("%j is listed as %j", (words, text) => {
    expect(listed(words)).toBe(text);
  });

  it("lists words that hold a comma themselves", () => {
    expect(listed(["rain, then hail", "dry, at last"])).toBe("rain, then hail and dry, at last");
  });

  it("begins a sentence with a capital and leaves the rest", () => {
    expect(capital("narrow FM voice")).toBe("Narrow FM voice");
    expect(capital("")).toBe("");
  });

  it("plain paint leaves the text", () => {
    expect(plain("bad", "fails")).toBe("fails");
  });
});

describe("a paragraph", () => {
  it("breaks at words and hangs under its text", () => {
    expect(paragraph("one two three four", "  - ", 13)).toBe("  - one two\n    three\n    four");
  });

  it("may fill the width to the last column", () => {
    expect(paragraph("one two", "", 7)).toBe("one two");
  });

  it("leaves a word that is wider than the line whole", () => {
    expect(paragraph("a merciless b", "", 5)).toBe("a\nmerciless\nb");
  });

  it("counts characters, not code units", () => {
    expect(paragraph("𝛆𝛆𝛆 b", "", 5)).toBe("𝛆𝛆𝛆 b");
  });

  it("never exceeds the width, and keeps every word in order", () => {
    const word = fc.stringMatching(/^[a-z0-9.,±]{1,12}$/);
    fc.assert(
      fc.property(
        fc.array(word),
        fc.integer({ min: 0, max: 6 }),
        fc.integer({ min: 20, max: 80 }),
        (words, hang, width) => {
          const lines = paragraph(words.join(" "), " ".repeat(hang), width).split("\n");
          for (const line of lines) expect([...line].length).toBeLessThanOrEqual(width);
          expect(lines.flatMap((line) => line.split(/\s+/).filter(Boolean))).toEqual(words);
        },
      ),
    );
  });
});

describe("tables abreast", () => {
  const side = (some: readonly string[]) => some.join(" ");

  it("puts as many columns side by side as fit on a line", () => {
    const names = ["a", "b", "c"].map((letter) => letter.repeat(39));
    expect(abreast(names, side).split("\n\n")).toEqual([`${names[0]} ${names[1]}`, names[2]]);
  });

  it("puts all on one line where they fit", () => {
    expect(abreast(["dry", "wet", "fog"], side)).toBe("dry wet fog");
  });

  it("gives what is too wide a line by itself", () => {
    const wide = "w".repeat(90);
    expect(abreast(["a", wide], side)).toBe(`a\n\n${wide}`);
  });

  it("measures without colour and prints with it", () => {
    const colour = "\u001b[32m";
    const text = abreast(
      ["x".repeat(40), "y".repeat(39)],
      (some, measured) => (measured ? "" : colour) + side(some),
    );
    expect(text.split(colour)).toHaveLength(2);
  });

  it("of nothing is nothing", () => {
    expect(abreast([], side)).toBe("");
  });
});
