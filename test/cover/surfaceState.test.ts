import { describe, expect, it } from "vitest";
import { findMaterial } from "../../src/cover/materials.ts";
import { surfaceState } from "../../src/cover/surfaceState.ts";

const kinds = ["beading", "mixed", "wetting"] as const;
const cares = ["new", "treated", "weathered"] as const;

describe("how rain lies on a surface", () => {
  // Common practice, no source: fresh PTFE or silicone in rain 0.05 to 0.3 under water.
  it.each(["PTFE", "silicone rubber"])("fresh %s holds drops on 0.05 to 0.3", (name) => {
    const state = surfaceState({ wetting: findMaterial(name)!.wetting!, care: "new" });
    expect(state.form).toBe("beads");
    expect(state.coveredShare.low).toBe(0.05);
    expect(state.coveredShare.high).toBe(0.3);
  });

  it("acrylic wets, unless it is treated", () => {
    const { wetting } = findMaterial("acrylic")!;
    expect(surfaceState({ wetting: wetting!, care: "new" })).toEqual({
      form: "film",
      coveredShare: { low: 1, nominal: 1, high: 1 },
    });
    expect(surfaceState({ wetting: wetting!, care: "treated" }).form).toBe("beads");
  });

  it("weather and a wetting nature add water, a treatment takes it away", () => {
    const shareOf = (wetting: (typeof kinds)[number], care: (typeof cares)[number]) =>
      surfaceState({ wetting, care }).coveredShare.nominal;
    for (const wetting of kinds) {
      expect(shareOf(wetting, "weathered")).toBeGreaterThanOrEqual(shareOf(wetting, "new"));
      expect(shareOf(wetting, "treated")).toBeLessThanOrEqual(shareOf(wetting, "new"));
    }
    for (const care of cares) {
      expect(shareOf("beading", care)).toBeLessThanOrEqual(shareOf("mixed", care));
      expect(shareOf("mixed", care)).toBeLessThanOrEqual(shareOf("wetting", care));
    }
  });

  it("keeps its limits in order, and a weathered surface may always be under a film", () => {
    for (const wetting of kinds) {
      for (const care of cares) {
        const { low, nominal, high } = surfaceState({ wetting, care }).coveredShare;
        expect(0 <= low && low <= nominal && nominal <= high && high <= 1).toBe(true);
      }
      expect(surfaceState({ wetting, care: "weathered" }).coveredShare.high).toBe(1);
    }
  });

  it("refuses an unknown word", () => {
    expect(() => surfaceState({ wetting: "oily" as never, care: "new" })).toThrow(/oily/);
    expect(() => surfaceState({ wetting: "mixed", care: "old" as never })).toThrow(/old/);
  });
});
