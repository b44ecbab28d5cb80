import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { analysePath } from "../../src/path/pathAnalysis.ts";
import { type Profile, smoothSurface } from "../../src/path/profile.ts";

function analyse(profile: Profile, txHeightAmslM: number, rxHeightAmslM: number) {
  const surface = smoothSurface(profile, txHeightAmslM, rxHeightAmslM);
  const ends = { txHeightAmslM, rxHeightAmslM, effectiveRadiusKm: 8500 };
  return analysePath({ profile, surface, frequencyGHz: 10, ...ends });
}

describe("analysis of a path", () => {
  it("finds the two horizons of two ridges", () => {
    const profile = { distancesKm: [0, 5, 10, 30, 35, 40], heightsM: [100, 300, 120, 90, 250, 60] };
    const path = analyse(profile, 110, 80);
    // By hand, P.452-18 equation 152: 190 m over 5 km and 170 m over 5 km, less d / 2a.
    expect(path.pathType).toBe("trans-horizon");
    expect(path.txHorizonMrad).toBeCloseTo(1000 * Math.atan(0.038 - 5 / 17000), 9);
    expect(path.rxHorizonMrad).toBeCloseTo(1000 * Math.atan(0.034 - 5 / 17000), 9);
    expect([path.txHorizonKm, path.rxHorizonKm]).toEqual([5, 5]);
    expect(path.angularDistanceMrad).toBeCloseTo(40 / 8.5 + path.txHorizonMrad + path.rxHorizonMrad, 9);
    // Ray 110 to 80 m over 40 km: -0.75 m/km before both fall below the horizontal by curvature.
    expect(path.terrainExcessMPerKm).toBeCloseTo(38 - 500 * (5 / 8500) + 0.75 + 500 * (40 / 8500), 9);
  });

  it("measures roughness between the horizons over the smooth surface", () => {
    // Straight ground but for two horizons of 80 m and a peak of 70 m between them; ends at height 0.
    const profile = { distancesKm: [0, 10, 20, 30, 40], heightsM: [0, 80, 70, 80, 0] };
    const path = analyse(profile, 5, 5);
    expect([path.txHorizonKm, path.rxHorizonKm]).toEqual([10, 10]);
    // The fit lies above the ends, so the surface is the ground of the ends: level 0.
    expect(path.roughnessM).toBeCloseTo(80, 9);
    expect(path.txEffectiveHeightM).toBeCloseTo(5, 9);
  });

  it("names the point of least clearance on a clear path", () => {
    const profile = { distancesKm: [0, 4, 8, 12, 16], heightsM: [50, 0, 0, 45, 50] };
    const path = analyse(profile, 80, 80);
    expect(path.pathType).toBe("los");
    expect([path.txHorizonKm, path.rxHorizonKm]).toEqual([12, 4]);
    expect(path.txHorizonMrad).toBeCloseTo(1000 * Math.atan(-16 / 17000), 9);
    expect(path.angularDistanceMrad).toBeCloseTo(0, 5);
    expect(path.terrainExcessMPerKm).toBeLessThan(0);
  });

  it("mirrors with the path", () => {
    const heights = fc.array(fc.integer({ min: 0, max: 500 }), { minLength: 4, maxLength: 40 });
    fc.assert(
      fc.property(heights, fc.integer({ min: 500, max: 700 }), (heightsM, rx) => {
        const last = heightsM.length - 1;
        // Whole numbers, so that distances from either end are exact; unequal, so that few horizons tie.
        const distancesKm = heightsM.map((_, i) => i * (i + 3));
        const mirrored = {
          distancesKm: distancesKm.map((_, i) => distancesKm[last]! - distancesKm[last - i]!),
          heightsM: heightsM.toReversed(),
        };
        const there = analyse({ distancesKm, heightsM }, heightsM[0]! + 3, rx);
        const back = analyse(mirrored, rx, heightsM[0]! + 3);
        expect(back.pathType).toBe(there.pathType);
        expect(back.txHorizonMrad).toBeCloseTo(there.rxHorizonMrad, 9);
        expect(back.angularDistanceMrad).toBeCloseTo(there.angularDistanceMrad, 9);
        expect(back.txEffectiveHeightM).toBeCloseTo(there.rxEffectiveHeightM, 6);
      }),
    );
  });
});
