import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { geodesicPath } from "../../src/path/geodesic.ts";
import { locatorToPoint, pointToLocator, squareCentre } from "../../src/path/locator.ts";
import { describeReference, num } from "../reference.ts";

const length = fc.constantFrom(2, 4, 6, 8, 10);

describe("Maidenhead locator", () => {
  it.each([
    // Test points printed in many places (convention of the IARU)
    [48.14666, 11.60833, "JN58td"],
    [-34.91, -56.21166, "GF15vc"],
    [38.92, -77.065, "FM18lw"],
    [-41.28333, 174.745, "RE78ir"],
  ])("of %f, %f is %s", (latitude, longitude, locator) => {
    expect(pointToLocator({ latitude, longitude }, 6)).toBe(locator);
  });

  it("names the centre and the south-west corner", () => {
    // By the rule: J = 9, N = 13, so 0 deg E and 40 deg N; 47 adds 8 and 7 deg; gj adds 6 x 5' and 9 x 2.5'
    const cell = locatorToPoint("jn47GJ");
    expect(cell.southWest.longitude).toBeCloseTo(8.5, 10);
    expect(cell.southWest.latitude).toBeCloseTo(47.375, 10);
    expect(cell.longitude).toBeCloseTo(8.5 + 2.5 / 60, 10);
    expect(cell.latitude).toBeCloseTo(47.375 + 1.25 / 60, 10);
  });

  it("is 6.0 by 4.6 km large for six characters at 50 deg north", () => {
    // Half-size 3.0 km E-W and 2.3 km N-S (geometry of the ellipsoid, rounded)
    const cell = locatorToPoint("JO00aa");
    expect(cell.halfWidthKm).toBeCloseTo(3.0, 1);
    expect(cell.halfHeightKm).toBeCloseTo(2.3, 1);
  });

  it.each(["JN47", "JN47aa", "JN47aa00", "JN47aa00aa", "QF22le", "BP51", "JR09xx"])(
    "%s is as large as the radii of curvature of the ellipsoid say",
    (locator) => {
      // WGS84: a = 6378.137 km, 1/f = 298.257223563; radii in the prime vertical and in the meridian
      const cell = locatorToPoint(locator);
      const e2 = 0.0066943799901413;
      const phi = (cell.latitude * Math.PI) / 180;
      const w = Math.sqrt(1 - e2 * Math.sin(phi) ** 2);
      const halfDegrees = {
        east: cell.longitude - cell.southWest.longitude,
        north: cell.latitude - cell.southWest.latitude,
      };
      const eastKm = (6378.137 / w) * Math.cos(phi) * ((halfDegrees.east * Math.PI) / 180);
      const northKm = ((6378.137 * (1 - e2)) / w ** 3) * ((halfDegrees.north * Math.PI) / 180);
      expect(Math.abs(cell.halfWidthKm / eastKm - 1)).toBeLessThan(1e-4);
      expect(Math.abs(cell.halfHeightKm / northKm - 1)).toBeLessThan(1e-4);
    },
  );

  it("puts every place of a cell within the half diagonal of its centre", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -90, max: 90, noNaN: true }),
        fc.double({ min: -180, max: 180, noNaN: true }),
        fc.constantFrom(4, 6, 8, 10),
        (latitude, longitude, characters) => {
          const cell = locatorToPoint(pointToLocator({ latitude, longitude }, characters));
          fc.pre(latitude !== cell.latitude || longitude !== cell.longitude);
          const { distanceKm } = geodesicPath({ latitude, longitude }, cell);
          expect(distanceKm).toBeLessThanOrEqual(cell.halfDiagonalKm * (1 + 1e-4));
        },
      ),
    );
  });

  it("measures the half diagonal to the farthest of the four corners, in both hemispheres", () => {
    for (const locator of ["JP40", "JB49", "JJ00", "II99", "RE78ir"]) {
      const { southWest, halfDiagonalKm, ...centre } = locatorToPoint(locator);
      const opposite = {
        latitude: 2 * centre.latitude - southWest.latitude,
        longitude: 2 * centre.longitude - southWest.longitude,
      };
      const corners = [southWest.latitude, opposite.latitude].flatMap((latitude) =>
        [southWest.longitude, opposite.longitude].map((longitude) => ({ latitude, longitude })),
      );
      const farthest = Math.max(...corners.map((corner) => geodesicPath(centre, corner).distanceKm));
      expect(halfDiagonalKm).toBeCloseTo(farthest, 8);
    }
  });

  it("puts every border, however rounded, into the cell north and east of it", () => {
    for (let i = 0; i < 24; i++) {
      const letter = "abcdefghijklmnopqrstuvwx".charAt(i);
      for (const degree of [0, 8, 61, -56]) {
        const place = { latitude: degree + (i * 2.5) / 60, longitude: 2 * degree + (i * 5) / 60 };
        expect(pointToLocator(place, 8).slice(4)).toBe(`${letter}${letter}00`);
      }
    }
  });

  it("gives back the locator whose centre it is", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -90, max: 90, noNaN: true }),
        fc.double({ min: -400, max: 400, noNaN: true }),
        length,
        (latitude, longitude, characters) => {
          const locator = pointToLocator({ latitude, longitude }, characters);
          expect(locator).toHaveLength(characters);
          expect(pointToLocator(locatorToPoint(locator), characters)).toBe(locator);
          expect(pointToLocator(locatorToPoint(locator.toLowerCase()).southWest, characters)).toBe(locator);
        },
      ),
    );
  });

  it("grows from the left: a short locator is the head of the long one", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -90, max: 90, noNaN: true }),
        fc.double({ min: -180, max: 180, noNaN: true }),
        length,
        (latitude, longitude, characters) => {
          const long = pointToLocator({ latitude, longitude }, 10);
          expect(long.slice(0, characters)).toBe(pointToLocator({ latitude, longitude }, characters));
        },
      ),
    );
  });

  it("takes longitude 180 for -180, and the north pole into the last cell", () => {
    expect(pointToLocator({ latitude: 0, longitude: 180 }, 4)).toBe("AJ00");
    expect(pointToLocator({ latitude: 90, longitude: 0 }, 4)).toBe("JR09");
  });

  it.each([
    ["JN5", "3 characters"],
    ["", "0 characters"],
    ["JN58td01aa00", "12 characters"],
    ["SN58", 'character 1, "S", must be a letter from A to R'],
    ["J958", 'character 2, "9", must be a letter from A to R'],
    ["JNx8", 'character 3, "x", must be a digit'],
    ["JN58ty", 'character 6, "y", must be a letter from A to X'],
    ["JN58td0-", 'character 8, "-", must be a digit'],
    ["JN58td01a[", 'character 10, "[", must be a letter from A to X'],
  ])("refuses %s", (locator, message) => {
    expect(() => locatorToPoint(locator)).toThrow(message);
    expect(() => locatorToPoint(locator)).toThrow(RangeError);
  });

  it("refuses an odd length asked for, and a latitude beyond the pole", () => {
    expect(() => pointToLocator({ latitude: 0, longitude: 0 }, 5)).toThrow("5 characters");
    expect(() => pointToLocator({ latitude: 90.1, longitude: 0 }, 6)).toThrow("latitude");
  });
});

describeReference("terrain/maidenhead.csv", (row) => {
  const place = { latitude: num(row, "lat"), longitude: num(row, "lon") };
  const locator = row["locator"]!;
  expect(pointToLocator(place, num(row, "chars")).toLowerCase()).toBe(locator.toLowerCase());
  const cell = locatorToPoint(locator);
  expect(Math.abs(cell.southWest.latitude - num(row, "sw_lat"))).toBeLessThan(1e-9);
  expect(Math.abs(cell.southWest.longitude - num(row, "sw_lon"))).toBeLessThan(1e-9);
  expect(Math.abs(cell.latitude - num(row, "centre_lat"))).toBeLessThan(1e-9);
  expect(Math.abs(cell.longitude - num(row, "centre_lon"))).toBeLessThan(1e-9);
});

describe("the centre of the square that holds a place", () => {
  it("is the place that the square's locator names", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -90, max: 90, noNaN: true }),
        fc.double({ min: -180, max: 180, noNaN: true }),
        fc.constantFrom(2, 4, 6, 8, 10),
        (latitude, longitude, characters) => {
          const point = { latitude, longitude };
          const { latitude: north, longitude: east } = locatorToPoint(pointToLocator(point, characters));
          expect(squareCentre(point, characters)).toEqual({ latitude: north, longitude: east });
        },
      ),
    );
  });
});
