import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  type Profile,
  requireProfile,
  smoothSurface,
  withoutWideSteps,
  type Zone,
  zoneLengths,
} from "../../src/path/profile.ts";

const level: Profile = { distancesKm: [0, 1, 2, 3], heightsM: [5, 5, 5, 5] };

describe("a profile is refused", () => {
  it.each<[string, Partial<Profile>]>([
    ["at least 3 points", { distancesKm: [0, 1], heightsM: [0, 0] }],
    ["heightsM holds 3 values", { heightsM: [1, 2, 3] }],
    ["coverM holds 1 values", { coverM: [1] }],
    ["start at 0", { distancesKm: [1, 2, 3, 4] }],
    ["point 2 does not", { distancesKm: [0, 1, 1, 3] }],
    ["distancesKm", { distancesKm: [0, 1, 2, Infinity] }],
    ["rise", { distancesKm: [0, Number.NaN, 2, 3] }],
    ["heightsM must hold finite", { heightsM: [1, Number.NaN, 3, 4] }],
    ["coverM must hold finite", { coverM: [0, -1, 0, 0] }],
    ["unknown zone swamp", { zones: ["sea", "swamp" as Zone, "sea", "sea"] }],
  ])("with a message that says %s", (message, change) => {
    expect(() => requireProfile({ ...level, ...change })).toThrow(message);
  });
  it("not when whole", () => {
    expect(() => requireProfile({ ...level, distancesKm: new Float64Array([0, 1, 2, 3]) })).not.toThrow();
  });
});

describe("wide steps of a profile", () => {
  it("are filled straight, without trees, in the zone of the nearer end", () => {
    const profile: Profile = {
      distancesKm: [0, 0.5, 4.5, 5],
      heightsM: [10, 20, 60, 0],
      coverM: [1, 2, 3, 4],
      zones: ["inland", "sea", "coastal", "inland"],
    };
    expect(withoutWideSteps(profile)).toEqual({
      distancesKm: [0, 0.5, 1.5, 2.5, 3.5, 4.5, 5],
      heightsM: [10, 20, 30, 40, 50, 60, 0],
      coverM: [1, 2, 0, 0, 0, 3, 4],
      zones: ["inland", "sea", "sea", "coastal", "coastal", "coastal", "inland"],
    });
  });
  it("are none where the points stand close", () => {
    expect(withoutWideSteps(level)).toBe(level);
  });
});

describe("zones of a profile", () => {
  it("reach half a step beyond their outer points", () => {
    const zones: Zone[] = ["sea", "sea", "coastal", "inland", "inland", "coastal", "sea", "inland"];
    const distancesKm = [0, 1, 2, 4, 6, 8, 9, 10];
    const lengths = zoneLengths({ distancesKm, heightsM: distancesKm, zones });
    // By hand, P.452-18 section 3.2: land 1.5 to 8.5 and 9.5 to 10, inland 3 to 7, sea 1.5 + 1 of 10 km.
    expect(lengths.longestLandKm).toBeCloseTo(7, 12);
    expect(lengths.longestInlandKm).toBeCloseTo(4, 12);
    expect(lengths.seaFraction).toBeCloseTo(0.25, 12);
  });
  it("are inland where none are given", () => {
    expect(zoneLengths(level)).toEqual({ longestLandKm: 3, longestInlandKm: 3, seaFraction: 0 });
  });
  it("sum to the path, sea and land", () => {
    const zone = fc.constantFrom<Zone>("sea", "coastal", "inland");
    fc.assert(
      fc.property(fc.array(zone, { minLength: 3, maxLength: 40 }), (zones) => {
        const distancesKm = zones.map((_, i) => i * (1 + i / 7));
        const total = distancesKm[zones.length - 1]!;
        const swapped = zones.map((z): Zone => (z === "sea" ? "inland" : "sea"));
        const sea = zoneLengths({ distancesKm, heightsM: distancesKm, zones }).seaFraction;
        const land = zoneLengths({ distancesKm, heightsM: distancesKm, zones: swapped });
        expect(sea + land.seaFraction).toBeCloseTo(1, 12);
        expect(land.longestLandKm).toBeLessThanOrEqual(sea * total + 1e-9);
      }),
    );
  });
});

const anyProfile = fc
  .array(
    fc.tuple(fc.double({ min: 0.1, max: 5, noNaN: true }), fc.double({ min: 0, max: 900, noNaN: true })),
    {
      minLength: 3,
      maxLength: 40,
    },
  )
  .map((points): Profile => {
    const distancesKm = [0];
    for (const [step] of points.slice(1)) distancesKm.push(distancesKm.at(-1)! + step);
    return { distancesKm, heightsM: points.map(([, height]) => height) };
  });

describe("smooth surface", () => {
  it("is the ground itself where that is straight", () => {
    const distancesKm = [0, 0.5, 2, 7, 10];
    const heightsM = distancesKm.map((d) => 300 - 12 * d);
    const surface = smoothSurface({ distancesKm, heightsM }, 330, 210);
    expect(surface.fitTxM).toBeCloseTo(300, 9);
    expect(surface.fitRxM).toBeCloseTo(180, 9);
    expect(surface.diffractionTxM).toBeCloseTo(300, 9);
    expect(surface.diffractionRxM).toBeCloseTo(180, 9);
  });

  it("leaves a remainder without mean and without slope: least squares over the broken line", () => {
    fc.assert(
      fc.property(anyProfile, (profile) => {
        const { distancesKm, heightsM } = profile;
        const last = distancesKm.length - 1;
        const total = distancesKm[last]!;
        const { fitTxM, fitRxM } = smoothSurface(profile, 2000, 2000);
        const rest = (i: number) => heightsM[i]! - fitTxM - ((fitRxM - fitTxM) * distancesKm[i]!) / total;
        let mean = 0;
        let moment = 0;
        for (let i = 1; i <= last; i++) {
          const [a, b] = [distancesKm[i - 1]!, distancesKm[i]!];
          const middle = (rest(i - 1) + rest(i)) / 2;
          mean += (b - a) * middle;
          // Simpson's rule: exact for the product of two straight lines.
          moment += ((b - a) / 6) * (rest(i - 1) * a + 2 * middle * (a + b) + rest(i) * b);
        }
        expect(Math.abs(mean / total)).toBeLessThan(1e-8);
        expect(Math.abs(moment / total ** 2)).toBeLessThan(1e-8);
      }),
    );
  });

  it("mirrors with the path and stays at or below the ground under each antenna", () => {
    fc.assert(
      fc.property(anyProfile, fc.double({ min: 1, max: 1000, noNaN: true }), (profile, tx) => {
        const { distancesKm, heightsM } = profile;
        const last = distancesKm.length - 1;
        const mirrored: Profile = {
          distancesKm: Array.from(distancesKm, (_, i) => distancesKm[last]! - distancesKm[last - i]!),
          heightsM: Array.from(heightsM).reverse(),
        };
        const there = smoothSurface(profile, tx, 450);
        const back = smoothSurface(mirrored, 450, tx);
        expect(back.fitRxM).toBeCloseTo(there.fitTxM, 6);
        expect(back.diffractionRxM).toBeCloseTo(there.diffractionTxM, 6);
        expect(back.diffractionTxM).toBeCloseTo(there.diffractionRxM, 6);
        expect(there.diffractionTxM).toBeLessThanOrEqual(heightsM[0]!);
        expect(there.diffractionRxM).toBeLessThanOrEqual(heightsM[last]!);
      }),
    );
  });

  it("sinks under a ridge in the middle by half of its height over the ray", () => {
    // By hand, equations 161 to 167: a triangle of 200 km m spread over 20 km is 10 m; 10 - 90 / 2 = -35 m.
    const ridge = { distancesKm: [0, 8, 10, 12, 20], heightsM: [0, 0, 100, 0, 0] };
    const surface = smoothSurface(ridge, 10, 10);
    expect(surface.fitTxM).toBeCloseTo(10, 9);
    expect(surface.fitRxM).toBeCloseTo(10, 9);
    expect(surface.diffractionTxM).toBeCloseTo(-35, 9);
    expect(surface.diffractionRxM).toBeCloseTo(-35, 9);
    // Cleared by the ray, it only lifts the fit, which the ground at the ends then limits.
    expect(smoothSurface(ridge, 110, 110).diffractionTxM).toBe(0);
  });
});
