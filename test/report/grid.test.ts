import { describe, expect, it } from "vitest";
import { grid } from "../../src/report/grid.ts";

describe("a grid", () => {
  it("breaks long cells at words and sets figures to the right", async () => {
    const text = await grid(
      [
        ["name", "dB", "source"],
        ["a", "-1.5", "plane wave through layers"],
        ["bb", "10.0", "short"],
      ],
      [
        { align: "left", width: 4 },
        { align: "right", width: 5 },
        { align: "left", width: 12 },
      ],
    );
    expect(text).toBe(
      [
        "name     dB  source",
        "-------------------------",
        "a      -1.5  plane wave",
        "             through",
        "             layers",
        "bb     10.0  short",
      ].join("\n"),
    );
  });

  it("breaks a word that is wider than its column, and loses none of it", async () => {
    const text = await grid([["a"], ["abcdefghij"]], [{ align: "left", width: 4 }]);
    expect(text.split("\n").slice(2).join("")).toBe("abcdefghij");
    expect(Math.max(...text.split("\n").map(({ length }) => length))).toBe(4);
  });
});
