import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { ElevationSource } from "../../src/scenario/terrain/types.ts";
import {
  type HorizonInput,
  type HorizonRow,
  horizonRound,
  horizonSectors,
} from "../../src/study/horizonRound.ts";

/** Kilometres a degree of latitude near 45 deg on WGS84: 111.1 (from memory), the sphere of the tests' geometry. */
const KM_PER_DEGREE = 111.13;
const AT = { latitude: 45, longitude: 10, name: "hill", heightM: 0 };
/** Effective radius for k = 4/3 [km]: 6371 times 4/3. */
const RADIUS_KM = 8494.667;

/** Terrain whose height is a function of kilometres north and east of the place; NaN is a void. */
function ground(heightM: (northKm: number, eastKm: number) => number, stepM = 100): ElevationSource {
  return {
    name: "made",
    stepM,
    heightsAt: async (latitudes, longitudes) => {
      const heightsM = Float64Array.from(latitudes, (latitude, i) => {
        const eastKm = (longitudes[i]! - AT.longitude) * 78.85; // at 45 deg on WGS84 (from memory)
        return heightM((latitude - AT.latitude) * KM_PER_DEGREE, eastKm);
      });
      const voids = [...heightsM].flatMap((value, i) => (Number.isNaN(value) ? [i] : []));
      return {
        heightsM,
        unknown: new Map(voids.map((i) => [i, { reason: "void" as const, source: "made" }])),
      };
    },
  };
}

async function round(source: ElevationSource, changes: Partial<HorizonInput> = {}) {
  const input = {
    source,
    at: { ...AT, heightM: 100 },
    kFactor: 4 / 3,
    azimuths: 36,
    reachKm: 60,
    ...changes,
  };
  return (await horizonRound(input))!;
}

const inDegrees = (slope: number) => (Math.atan(slope) * 180) / Math.PI;

describe("the horizon round a place", () => {
  it("dips by sqrt(2 h / ae) at sqrt(2 ae h) over a smooth sea, everywhere", async () => {
    const { rows, groundM, heightAmslM, open } = await round(ground(() => 0));
    expect([groundM, heightAmslM]).toEqual([0, 100]);
    expect(rows).toHaveLength(36);
    for (const { elevationDeg, distanceKm, atReach } of rows) {
      expect(elevationDeg).toBeCloseTo((-180 / Math.PI) * Math.sqrt(0.2 / RADIUS_KM), 4);
      expect(Math.abs(distanceKm! - Math.sqrt(0.2 * RADIUS_KM))).toBeLessThan(0.2);
      expect(atReach).toBe(false);
    }
    expect(open[0]).toEqual({ belowDeg: 0.5, share: 1 });
  });

  it("says where the last point looked at is the horizon", async () => {
    const { rows } = await round(
      ground(() => 0),
      { reachKm: 30 },
    ); // the sea's own horizon lies 41 km off
    expect(rows.every((row) => row.atReach && row.distanceKm === 30)).toBe(true);
  });

  it("sees the top of a cone under the angle of a triangle on the curved Earth", async () => {
    // 800 m high, 6 km from its middle to its foot, 20 km off to the east.
    const cone = ground((north, east) => Math.max(0, 800 * (1 - Math.hypot(north, east - 20) / 6)));
    const { rows, highest } = await round(cone);
    const expected = inDegrees((800 - 100) / 20_000 - 20 / (2 * RADIUS_KM));
    expect(highest!.azimuthDeg).toBe(90);
    expect(Math.abs(highest!.elevationDeg! - expected)).toBeLessThan(0.02);
    expect(Math.abs(highest!.distanceKm! - 20)).toBeLessThan(0.2);
    expect(rows.filter(({ elevationDeg }) => elevationDeg! > 0)).toHaveLength(3); // 17.5 deg to either side from here
  });

  it("follows a straight ridge farther and lower as it runs away", async () => {
    // 500 m high, 10 km to the north, running east and west.
    const { rows } = await round(ground((north) => (Math.abs(north - 10) < 0.2 ? 500 : 0)));
    for (const azimuthDeg of [0, 30, 60, 330]) {
      const km = (10 - 0.2) / Math.cos((azimuthDeg * Math.PI) / 180);
      const row = rows.find((one) => one.azimuthDeg === azimuthDeg)!;
      expect(Math.abs(row.elevationDeg! - inDegrees(400 / (1000 * km) - km / (2 * RADIUS_KM)))).toBeLessThan(
        0.03,
      );
      expect(Math.abs(row.distanceKm! - km)).toBeLessThan(0.25);
      expect(row.groundM).toBe(500);
    }
    expect(rows.find((one) => one.azimuthDeg === 180)!.elevationDeg).toBeLessThan(0);
  });

  it("counts unknown ground, tells the nearest of it, and lets it hide nothing", async () => {
    const source = ground((north, east) => (north > 10 && Math.abs(east) < 50 ? Number.NaN : 0));
    const { rows, gaps } = await round(source);
    expect(rows[0]!.unknownKm).toBeCloseTo(50, 0);
    expect(rows[18]!.unknownKm).toBe(0);
    expect(rows[0]!.elevationDeg).toBeLessThan(0);
    expect(gaps).toMatchObject([{ reason: "void", source: "made", nearestAzimuthDeg: 0 }]);
    expect(gaps[0]!.nearestKm).toBeCloseTo(10, 0);
    const concerned = rows.filter(({ unknownKm }) => unknownKm > 0);
    expect(gaps[0]!.azimuths).toBe(concerned.length);
  });

  it("knows nothing where no height is known, and stands on the stated ground", async () => {
    const nothing = ground(() => Number.NaN);
    expect(
      await horizonRound({ source: nothing, at: AT, kFactor: 1, azimuths: 4, reachKm: 5 }),
    ).toBeUndefined();
    const { rows, highest, heightAmslM } = await round(nothing, { at: { ...AT, heightM: 5, groundM: 400 } });
    expect(heightAmslM).toBe(405);
    expect(highest).toBeUndefined();
    expect(new Set(rows.map((row) => row.elevationDeg))).toEqual(new Set([undefined]));
  });

  it("looks along the line to another place too", async () => {
    const ridge = ground((north) => (Math.abs(north - 10) < 0.2 ? 500 : 0));
    const { towards } = await round(ridge, { towards: { latitude: 45.5, longitude: 10, name: "far" } });
    expect(towards).toMatchObject({ name: "far", azimuthDeg: 0, groundM: 500 });
  });

  it("rises with k and with the ground", async () => {
    const hills = (scale: number) =>
      ground((north, east) => scale * (300 + 200 * Math.sin(north) * Math.cos(east / 2)), 500);
    const few = { azimuths: 8, reachKm: 40, at: { ...AT, heightM: 0, latitude: 45 } };
    const k = fc.double({ min: 0.4, max: 4, noNaN: true });
    await fc.assert(
      fc.asyncProperty(k, k, async (a, b) => {
        const [low, high] = [Math.min(a, b), Math.max(a, b)];
        const below = await round(hills(1), { ...few, kFactor: low });
        const above = await round(hills(1), { ...few, kFactor: high });
        for (const [i, row] of below.rows.entries()) {
          expect(above.rows[i]!.elevationDeg!).toBeGreaterThanOrEqual(row.elevationDeg! - 1e-9);
        }
      }),
      { numRuns: 10 },
    );
    const flat = await round(
      ground(() => 0),
      few,
    );
    const raised = await round(
      ground((north, east) => (Math.hypot(north, east) < 1 ? 0 : 50)),
      few,
    );
    for (const [i, row] of flat.rows.entries()) {
      expect(raised.rows[i]!.elevationDeg!).toBeGreaterThan(row.elevationDeg!);
    }
  });

  it("tells of its progress, line by line", async () => {
    const told: number[][] = [];
    await round(
      ground(() => 0, 1000),
      { azimuths: 4, progress: (done, of) => told.push([done, of]) },
    );
    expect(told).toEqual([
      [1, 4],
      [2, 4],
      [3, 4],
      [4, 4],
    ]);
  });
});

describe("sectors of a horizon", () => {
  const row = (azimuthDeg: number, elevationDeg: number | undefined): HorizonRow => {
    return { azimuthDeg, elevationDeg, distanceKm: 1, groundM: 1, atReach: false, unknownKm: 0 };
  };

  it("hold their highest and lowest line, unknown ones left out", async () => {
    const base = await round(
      ground(() => 0),
      { azimuths: 4 },
    );
    const rows = [row(0, 3), row(45, 1), row(90, undefined), row(135, 2), row(180, undefined), row(270, -1)];
    const sectors = horizonSectors({ ...base, rows }, 4);
    expect(sectors.map(({ highest, lowest }) => [highest?.elevationDeg, lowest?.elevationDeg])).toEqual([
      [3, 1],
      [2, 2],
      [undefined, undefined],
      [-1, -1],
    ]);
  });

  it("narrower than the lines take the last line before them", async () => {
    const base = await round(
      ground(() => 0),
      { azimuths: 4 },
    );
    const sectors = horizonSectors({ ...base, rows: [row(0, 3), row(180, 1)] }, 4);
    expect(sectors.map(({ highest }) => highest?.elevationDeg)).toEqual([3, 3, 1, 1]);
  });
});
