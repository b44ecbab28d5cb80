import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { cautions } from "../../src/safety/cautions.ts";

describe("cautions", () => {
  it("promise nothing: the word safe stands nowhere in the folder", () => {
    const folder = new URL("../../src/safety/", import.meta.url);
    for (const file of readdirSync(folder)) {
      expect(readFileSync(new URL(file, folder), "utf8")).not.toMatch(/\b(un)?safe(ly)?\b/i);
    }
  });

  it("are short whole sentences", () => {
    for (const { hazard, sentences } of cautions) {
      expect(sentences.length, hazard).toBeGreaterThan(0);
      for (const sentence of sentences) {
        expect(sentence).toMatch(/^[A-Z].*\.$/);
        expect(sentence.length).toBeLessThanOrEqual(120);
      }
    }
  });

  it("cover every hazard once", () => {
    const hazards = cautions.map(({ hazard }) => hazard);
    expect(new Set(hazards).size).toBe(hazards.length);
    for (const word of ["radio", "mast", "lightning", "power lines", "solvents", "sun"]) {
      expect(
        hazards.some((hazard) => hazard.includes(word)),
        word,
      ).toBe(true);
    }
  });
});
