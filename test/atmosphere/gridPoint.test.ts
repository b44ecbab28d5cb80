import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bilinear } from "../../src/atmosphere/gridPoint.ts";

const grid = [
  [10, 20, 40],
  [12, 26, 44],
];
const axes = {
  rows: { firstDeg: 52, lastDeg: 53, count: 2 },
  columns: { firstDeg: 0, lastDeg: 1, count: 3 },
} as const;
const valueAt = (row: number, column: number) => grid[row]![column]!;
const at = (latitude: number, longitude: number) => bilinear({ ...axes, latitude, longitude, valueAt });

describe("a map between its points", () => {
  it("is the map on them, edges included", () => {
    for (const [row, latitude] of [52, 53].entries()) {
      for (const [column, longitude] of [0, 0.5, 1].entries()) {
        expect(at(latitude, longitude)).toBeCloseTo(grid[row]![column]!, 12);
      }
    }
  });

  it("weighs four points as ITU-R P.1144 section 1b does", () => {
    // By hand at r = 0.25, c = 0.5: 10 x 0.375 + 12 x 0.125 + 20 x 0.375 + 26 x 0.125
    expect(at(52.25, 0.25)).toBeCloseTo(16, 12);
  });

  it("gives back a plane, whichever way the rows run", () => {
    const share = fc.double({ min: 0, max: 1, noNaN: true });
    fc.assert(
      fc.property(share, share, fc.boolean(), (down, along, northFirst) => {
        const rows = { firstDeg: northFirst ? 60 : 50, lastDeg: northFirst ? 50 : 60, count: 11 };
        const columns = { firstDeg: -180, lastDeg: 180, count: 73 };
        const [latitude, longitude] = [50 + 10 * down, 360 * along - 180];
        const plane = (lat: number, lon: number) => 3 + 0.2 * lat - 0.01 * lon;
        const value = bilinear({
          rows,
          columns,
          latitude,
          longitude,
          valueAt: (row, column) => plane(northFirst ? 60 - row : 50 + row, -180 + 5 * column),
        });
        expect(value).toBeCloseTo(plane(latitude, longitude), 9);
      }),
    );
  });

  it("refuses a place beyond it", () => {
    expect(() => at(53.01, 0.5)).toThrow("latitude");
    expect(() => at(52.5, -0.1)).toThrow("longitude");
  });
});
