import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { CLEAR_ZONE_SHARE, obstacles, passing, raiseToClear, type Sight } from "../../src/path/obstacles.ts";

/** Points a kilometre apart. */
function sightOver(heightsM: readonly number[], change: Partial<Sight> = {}): Sight {
  return {
    profile: { distancesKm: heightsM.map((_, i) => i), heightsM },
    frequencyGHz: 10,
    txHeightAmslM: 100,
    rxHeightAmslM: 100,
    effectiveRadiusKm: 1e9, // a flat Earth
    ...change,
  };
}

/** Twenty kilometres of low ground with something in the way. */
const ground = (bumps: Readonly<Record<number, number>>) =>
  Array.from({ length: 21 }, (_, km) => bumps[km] ?? 0);

describe("how the ray passes a point", () => {
  // By hand: half-way over 20 km at 10 GHz the zone is sqrt(0.029979 * 10000 * 10000 / 20000) = 12.243 m wide; the
  // Earth rises 500 * 10 * 10 / 8500 = 5.882 m.
  it("is metres and zones over the top, the Earth's bulge and the cover taken off", () => {
    const sight = sightOver(ground({ 10: 60 }), { effectiveRadiusKm: 8500 });
    const coverM = ground({ 10: 15 });
    const found = passing({ ...sight, profile: { ...sight.profile, coverM } }, 10);
    expect(found.topM).toBe(75);
    expect(found.fresnelM).toBeCloseTo(12.243, 3);
    expect(found.clearanceM).toBeCloseTo(100 - 75 - 5.882, 3);
    expect(found.zones).toBeCloseTo(19.118 / 12.243, 3);
  });
});

describe("obstacles", () => {
  it("are stretches, each by its worst point, in order", () => {
    const found = obstacles(sightOver(ground({ 5: 120, 12: 101, 13: 130, 14: 100 })));
    expect(found.map(({ distanceKm, widthKm }) => [distanceKm, widthKm])).toEqual([
      [5, 1],
      [13, 3],
    ]);
    expect(found[0]!.clearanceM).toBeCloseTo(-20, 3);
    expect(found[1]!.clearanceM).toBeCloseTo(-30, 3);
  });

  it("are the nearest miss where all is clear", () => {
    const found = obstacles(sightOver(ground({ 7: 40 })));
    expect(found).toMatchObject([{ distanceKm: 7, widthKm: 0 }]);
  });
});

describe("obstacles of any profile", () => {
  const anyBumps = fc.array(fc.integer({ min: 0, max: 160 }), { minLength: 3, maxLength: 30 });

  it("are found as by looking at each point by itself", () => {
    fc.assert(
      fc.property(anyBumps, anyBumps, fc.integer({ min: 50, max: 200 }), (heightsM, trees, txHeightAmslM) => {
        const bare = sightOver(heightsM, { txHeightAmslM, effectiveRadiusKm: 8500 });
        const coverM = heightsM.map((_, i) => trees[i] ?? 0);
        const sight = { ...bare, profile: { ...bare.profile, coverM } };
        const points = heightsM.slice(2).map((_, i) => passing(sight, i + 1));
        const worst = points.reduce((a, b) => (b.zones < a.zones ? b : a));
        const cut = points.filter(({ zones }) => zones < CLEAR_ZONE_SHARE);
        const found = obstacles(sight);
        if (cut.length === 0) expect(found).toEqual([{ ...worst, widthKm: 0 }]);
        else {
          // Points a kilometre apart: as many kilometres as points are cut.
          expect(found.reduce((sum, { widthKm }) => sum + widthKm, 0)).toBe(cut.length);
          expect(Math.min(...found.map(({ zones }) => zones))).toBe(worst.zones);
          for (const { widthKm, ...one } of found) expect(cut).toContainEqual(one);
        }
      }),
    );
  });
});

describe("raising antennas", () => {
  const anySight = fc
    .tuple(
      fc.array(fc.integer({ min: 0, max: 300 }), { minLength: 3, maxLength: 40 }),
      fc.integer({ min: 4000, max: 20000 }),
    )
    .map(([heightsM, effectiveRadiusKm]) => sightOver(heightsM, { effectiveRadiusKm }));
  const least = (sight: Sight) =>
    Math.min(
      ...Array.from(sight.profile.distancesKm, (_, i) => i)
        .slice(1, -1)
        .map((i) => passing(sight, i).zones),
    );

  it("by what it says clears the zone, and by less does not", () => {
    fc.assert(
      fc.property(anySight, (sight) => {
        const { txM, rxM, bothM } = raiseToClear(sight);
        const raised = (tx: number, rx: number) =>
          least({ ...sight, txHeightAmslM: 100 + tx, rxHeightAmslM: 100 + rx });
        for (const [tx, rx] of [
          [txM, 0],
          [0, rxM],
          [bothM, bothM],
        ] as const) {
          expect(raised(tx, rx)).toBeGreaterThan(CLEAR_ZONE_SHARE - 1e-6);
          if (tx + rx > 0.01) expect(raised(0.99 * tx, 0.99 * rx)).toBeLessThan(CLEAR_ZONE_SHARE);
        }
      }),
    );
  });

  it("is nothing where all is clear", () => {
    expect(raiseToClear(sightOver(ground({})))).toEqual({ txM: 0, rxM: 0, bothM: 0 });
  });
});
