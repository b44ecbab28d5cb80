import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { nearest } from "../../src/scenario/nearest.ts";

const keys = ["title", "frequency", "polarization", "transmitter", "receiver", "feeds", "covers", "path"];

describe("nearest", () => {
  it.each([
    ["frequncy", "frequency"], // a letter lost
    ["frequenccy", "frequency"], // a letter doubled
    ["freqeuncy", "frequency"], // neighbours swapped
    ["polarisation", "polarization"], // a letter replaced
    ["Receiver", "receiver"],
    ["recever", "receiver"],
    ["pth", "path"],
    ["cover", "covers"],
  ])("takes %s for %s", (typed, meant) => {
    expect(nearest(typed, keys)).toBe(meant);
  });

  it.each(["", "x", "wind", "antenna", "a very long word indeed"])("finds nothing close to %j", (typed) => {
    expect(nearest(typed, keys)).toBeUndefined();
  });

  it("takes a swap for one change, so that mli is nearer to mil than to ml or mi", () => {
    expect(nearest("mli", ["kmx", "mil"])).toBe("mil");
  });

  it("counts a swap as one change where two letters lie outside the threshold", () => {
    expect(nearest("ab", ["ba"])).toBe("ba"); // threshold of two letters: one change
    expect(nearest("ab", ["cd"])).toBeUndefined();
  });

  it("prefers the earlier of two equally close candidates", () => {
    expect(nearest("film", ["fill", "firm"])).toBe("fill");
    expect(nearest("film", ["firm", "fill"])).toBe("firm");
  });

  it("never gives one letter for another", () => {
    expect(nearest("q", ["m", "K", "W"])).toBeUndefined();
  });

  it("finds every word itself, whatever the case", () => {
    const word = fc.stringMatching(/^[a-z]{1,12}$/);
    fc.assert(
      fc.property(fc.uniqueArray(word, { minLength: 1 }), fc.nat(), (words, pick) => {
        const one = words[pick % words.length]!;
        expect(nearest(one.toUpperCase(), words)).toBe(one);
      }),
    );
  });

  it("finds a word of three letters or more after any one of the four slips", () => {
    const slips = [
      (w: string, i: number) => w.slice(0, i) + w.slice(i + 1),
      (w: string, i: number) => `${w.slice(0, i)}#${w.slice(i)}`,
      (w: string, i: number) => `${w.slice(0, i)}#${w.slice(i + 1)}`,
      (w: string, i: number) => w.slice(0, i) + w.slice(i + 1, i + 2) + w.slice(i, i + 1) + w.slice(i + 2),
    ];
    fc.assert(
      fc.property(
        fc.stringMatching(/^[a-z]{3,12}$/),
        fc.nat(),
        fc.constantFrom(...slips),
        (word, at, slip) => {
          expect(nearest(slip(word, at % word.length), [word])).toBe(word);
        },
      ),
    );
  });
});
