import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  geodesicPath,
  headingUncertaintyDeg,
  pointAlong,
  pointsAlong,
  pointsTowards,
  sphereDistanceKm,
} from "../../src/path/geodesic.ts";
import { describeReference, num } from "../reference.ts";

const place = fc.record({
  latitude: fc.double({ min: -89, max: 89, noNaN: true }),
  longitude: fc.double({ min: -180, max: 180, noNaN: true }),
});

/** Smallest turn between two headings [deg]. */
const turn = (a: number, b: number) => Math.abs(((a - b + 540) % 360) - 180);

describe("geodesic", () => {
  it("agrees with a published line over half the Pacific", () => {
    // C. F. F. Karney, GeodTest data (J. Geodesy 87, 43-55, 2013): azi1, azi2 and s12 of one line
    const path = geodesicPath(
      { latitude: 35.60777, longitude: -139.44815 },
      { latitude: -11.17491, longitude: -69.95921 },
    );
    expect(path.distanceKm).toBeCloseTo(8935.24456048183, 9);
    expect(path.headingDeg).toBeCloseTo(111.09874842956, 9);
    expect(path.backHeadingDeg).toBeCloseTo(129.289270889709 + 180, 9);
  });

  it("measures a minute of latitude near the equator as 1842.9 m and near the pole as 1861.6 m", () => {
    // Textbook figures for WGS84: nautical mile by latitude (from memory)
    const minute = (latitude: number) =>
      geodesicPath({ latitude, longitude: 5 }, { latitude: latitude + 1 / 60, longitude: 5 }).distanceKm;
    expect(Math.abs(minute(0) - 1.8429)).toBeLessThan(0.0001);
    expect(Math.abs(minute(89.9) - 1.8616)).toBeLessThan(0.0001);
  });

  it("has its points sought together where they are sought one by one", () => {
    const [from, to] = [
      { latitude: 50, longitude: 3 },
      { latitude: 58, longitude: -40 },
    ];
    const shares = [0, 0.1, 0.5, 1];
    expect(pointsAlong({ from, to, shares })).toEqual(shares.map((share) => pointAlong({ from, to, share })));
    expect(() => pointsAlong({ from, to, shares: [0.5, 1.1] })).toThrow(RangeError);
  });

  it("is as long as a great circle of the mean sphere, within 0.6 %", () => {
    fc.assert(
      fc.property(place, place, (a, b) => {
        fc.pre(Math.abs(a.latitude - b.latitude) > 1e-6);
        const { distanceKm } = geodesicPath(a, b);
        expect(Math.abs(sphereDistanceKm(a, b) - distanceKm)).toBeLessThan(0.006 * distanceKm);
      }),
    );
    // A quarter of the equator of that sphere: pi / 2 times its radius.
    expect(sphereDistanceKm({ latitude: 0, longitude: 170 }, { latitude: 0, longitude: -100 })).toBeCloseTo(
      10007.543,
      3,
    );
    expect(sphereDistanceKm({ latitude: 7, longitude: 8 }, { latitude: 7, longitude: 8 })).toBe(0);
  });

  it("is the same line from either end", () => {
    fc.assert(
      fc.property(place, place, (a, b) => {
        fc.pre(Math.abs(a.latitude - b.latitude) > 0.01);
        const there = geodesicPath(a, b);
        fc.pre(there.distanceKm < 19_000); // near the antipodes several lines are equally short
        const back = geodesicPath(b, a);
        expect(back.distanceKm).toBeCloseTo(there.distanceKm, 8);
        expect(turn(back.headingDeg, there.backHeadingDeg)).toBeLessThan(1e-7);
        expect(turn(back.backHeadingDeg, there.headingDeg)).toBeLessThan(1e-7);
      }),
    );
  });

  it("does not mind a longitude told the other way round", () => {
    const from = { latitude: 10, longitude: 170 };
    expect(geodesicPath(from, { latitude: 12, longitude: 190 })).toEqual(
      geodesicPath(from, { latitude: 12, longitude: -170 }),
    );
  });

  it("divides a line into parts that add up", () => {
    fc.assert(
      fc.property(place, place, fc.double({ min: 0.05, max: 0.95, noNaN: true }), (from, to, share) => {
        fc.pre(Math.abs(from.latitude - to.latitude) > 0.01);
        const whole = geodesicPath(from, to).distanceKm;
        fc.pre(whole < 19_000);
        const middle = pointAlong({ from, to, share });
        expect(geodesicPath(from, middle).distanceKm).toBeCloseTo(share * whole, 6);
        expect(geodesicPath(middle, to).distanceKm).toBeCloseTo((1 - share) * whole, 6);
      }),
    );
  });

  it("goes the same way by heading as towards a place", () => {
    const from = { latitude: 54.2, longitude: -3.1 };
    const to = { latitude: 51.9, longitude: 4.4 };
    const { distanceKm, headingDeg } = geodesicPath(from, to);
    const [start, half, end] = pointsTowards({
      from,
      headingDeg,
      distancesKm: [0, distanceKm / 2, distanceKm],
    });
    const expected = [from, pointAlong({ from, to, share: 0.5 }), to];
    for (const [i, point] of [start, half, end].entries()) {
      expect(point!.latitude).toBeCloseTo(expected[i]!.latitude, 9);
      expect(point!.longitude).toBeCloseTo(expected[i]!.longitude, 9);
    }
  });

  it("refuses one place given twice, and a latitude beyond the pole", () => {
    const here = { latitude: 47, longitude: 8 };
    expect(() => geodesicPath(here, { ...here })).toThrow("same point");
    expect(() => geodesicPath(here, { latitude: 47, longitude: 368 })).toThrow("same point");
    expect(() => geodesicPath(here, { latitude: 91, longitude: 8 })).toThrow("to.latitude");
    expect(() => geodesicPath({ latitude: 0, longitude: Number.NaN }, here)).toThrow("from.longitude");
  });
});

describe("heading uncertainty", () => {
  it("is 30 deg for a circle half as wide as it is far, and everything from inside the circle", () => {
    // sin 30 deg = 1/2
    expect(headingUncertaintyDeg({ halfDiagonalKm: 10, distanceKm: 20 })).toBeCloseTo(30, 12);
    expect(headingUncertaintyDeg({ halfDiagonalKm: 20, distanceKm: 20 })).toBe(180);
  });

  it("covers every place of the circle", () => {
    const from = { latitude: 50, longitude: 1 };
    const centre = { latitude: 50.3, longitude: 1.2 };
    const { distanceKm, headingDeg } = geodesicPath(from, centre);
    const bound = headingUncertaintyDeg({ halfDiagonalKm: 4, distanceKm });
    let worst = 0;
    for (let angle = 0; angle < 360; angle += 1) {
      // 111.25 km a degree north and 71.2 km east at latitude 50.3, rounded: a circle of just under 4 km
      const latitude = centre.latitude + (3.99 / 111.25) * Math.cos((angle * Math.PI) / 180);
      const longitude = centre.longitude + (3.99 / 71.2) * Math.sin((angle * Math.PI) / 180);
      worst = Math.max(worst, turn(geodesicPath(from, { latitude, longitude }).headingDeg, headingDeg));
    }
    expect(worst).toBeLessThanOrEqual(bound);
    expect(worst).toBeGreaterThan(0.98 * bound);
  });
});

describeReference("terrain/geodesic-geodtest.csv", (row) => {
  const path = geodesicPath(
    { latitude: num(row, "lat1"), longitude: num(row, "lon1") },
    { latitude: num(row, "lat2"), longitude: num(row, "lon2") },
  );
  expect(Math.abs(path.distanceKm * 1000 - num(row, "s12_m"))).toBeLessThan(1e-6);
  expect(turn(path.headingDeg, num(row, "azi1"))).toBeLessThan(1e-9);
  expect(turn(path.backHeadingDeg, num(row, "azi2") + 180)).toBeLessThan(1e-9);
});

describeReference("terrain/geodesic-links.csv", (row) => {
  const from = { latitude: num(row, "latA"), longitude: num(row, "lonA") };
  const to = { latitude: num(row, "latB"), longitude: num(row, "lonB") };
  const path = geodesicPath(from, to);
  expect(Math.abs(path.distanceKm - num(row, "dist_km"))).toBeLessThan(1e-6);
  expect(turn(path.headingDeg, num(row, "bearing_A_to_B_deg"))).toBeLessThan(1e-7);
  expect(turn(path.backHeadingDeg, num(row, "bearing_B_to_A_deg"))).toBeLessThan(1e-7);
  const middle = pointAlong({ from, to, share: 0.5 });
  expect(Math.abs(middle.latitude - num(row, "mid_lat"))).toBeLessThan(1e-7);
  expect(Math.abs(middle.longitude - num(row, "mid_lon"))).toBeLessThan(1e-7);
});
