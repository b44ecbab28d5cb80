import { describe, expect, it } from "vitest";
import { textHash } from "../../src/numeric/textHash.ts";

describe("textHash", () => {
  it("gives the published test vectors of FNV-1a", () => {
    // Test suite of Fowler, Noll and Vo for 32 bits (from memory)
    for (const [text, hash] of [
      ["", 0x811c9dc5],
      ["a", 0xe40c292c],
      ["foobar", 0xbf9cf968],
    ] as const) {
      expect(textHash(text) >>> 0).toBe(hash);
    }
  });

  it("gives another number for another start", () => {
    expect(textHash("foobar", 1)).not.toBe(textHash("foobar"));
  });
});
