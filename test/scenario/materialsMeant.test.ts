import { describe, expect, it } from "vitest";
import { materialHint, materialsMeant } from "../../src/scenario/materialsMeant.ts";

describe("the materials that a name may mean", () => {
  it.each<[written: string, ...meant: string[]]>([
    ["PE", "HDPE", "LDPE film or sheet", "UHMWPE"], // PE-HD, PE-LD, PE-UHMW; not PC, which is one letter away
    ["pe", "HDPE", "LDPE film or sheet", "UHMWPE"],
    ["polyethylene", "HDPE", "LDPE film or sheet", "UHMWPE"],
    ["snow", "dry snow 0.3 g/cm3", "wet snow 0.3 g/cm3 5 % water"],
    ["polycarb", "polycarbonate"],
    ["FEP flim", "FEP film"],
    ["policarbonate", "polycarbonate"],
    ["styren", "polystyrene (rigid, crosslinked)", "high-impact polystyrene sheet"],
  ])("%s", (written, ...meant) => {
    expect(materialsMeant(written).slice(0, meant.length)).toEqual(meant);
  });

  it("are none where nothing is like it", () => {
    expect(materialsMeant("cardboard")).toEqual([]);
    expect(materialsMeant(" ")).toEqual([]);
    expect(materialHint("cardboard")).toContain("`oilskin materials`");
  });

  it("are few, and signs in the name are taken as they stand", () => {
    expect(materialsMeant("film").length).toBe(6);
    expect(materialsMeant("(.*")).toEqual([]);
  });
});
