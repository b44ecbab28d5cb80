import { describe, expect, it } from "vitest";
import { fixingOf } from "../../src/cover/fixing.ts";
import { materials } from "../../src/cover/materials.ts";

/** Names of the list that a pattern fits; fails on none. */
function named(pattern: RegExp): string[] {
  const names = materials.map(({ name }) => name).filter((name) => pattern.test(name));
  expect(names).not.toEqual([]);
  return names;
}

// Common practice, no source, all of it.
describe("fixing", () => {
  it("warns of fumes and against etching at home for every fluoropolymer, and for no other", () => {
    const fluoropolymer = /PTFE|FEP|PVDF/; // ETFE holds TFE too
    for (const name of [...named(fluoropolymer), "ETFE film"]) {
      expect(fixingOf(name).caution).toMatch(/never heat it with a flame.*fumes make ill/);
    }
    for (const { name } of materials.filter((one) => !/PTFE|FEP|ETFE|PVDF/.test(one.name))) {
      expect(fixingOf(name).caution).not.toContain("fumes");
    }
    expect(fixingOf("FEP film").caution).toContain("industrial shop");
  });

  it("asks for a dust mask where there is glass fibre, and not for nylon", () => {
    for (const name of [...named(/FR-4|glass fabric/), "glass cloth"]) {
      expect(fixingOf(name).caution).toContain("dust mask");
    }
    for (const name of named(/nylon/)) {
      expect(fixingOf(name).caution).not.toMatch(/glass|dust/);
      expect(fixingOf(name).how).toContain("hoop");
    }
  });

  it("screws no film, no glue, no foam and no snow", () => {
    for (const name of named(/film|adhesive|hot-melt|foam|expanded polystyrene|snow|^ice$|^water$/)) {
      expect(fixingOf(name).how).not.toContain("screwed");
    }
    expect(fixingOf("polycarbonate").how).toContain("screwed");
  });

  it("clamps what no glue holds", () => {
    for (const name of named(/^(HDPE|LDPE.*|UHMWPE|polypropylene|FEP film|PTFE sheet)$/)) {
      expect(fixingOf(name).how).toMatch(/clamped/);
    }
  });

  it("keeps solvents off the foams that they dissolve", () => {
    for (const name of named(/(expanded|extruded) polystyrene/)) {
      expect(fixingOf(name)).toMatchObject({
        caution: expect.stringContaining("solvents dissolve it"),
        how: expect.stringContaining("no solvent"),
      });
    }
  });

  it("has a general word for a material of the user's own", () => {
    expect(fixingOf("whatever it may be").caution).toContain("data sheet");
    expect(fixingOf("").how).not.toBe("");
  });
});
