import { describe, expect, it } from "vitest";
import { rainCellWidth, scatterAngle, scatterHeight, visibleHeight } from "../../src/path/scatterCell.ts";

describe("rain cell of P.452-18", () => {
  it("is 0.87 rho0 wide as a scatterer", () => {
    // By hand at 50 mm/h: rho0 = (10 - 1.5 x 1.69897) / ln 125 = 1.5433 km.
    expect(rainCellWidth({ rainRateMmPerH: 50 }).widthKm).toBeCloseTo(0.8664 * 1.5433, 3);
    expect(() => rainCellWidth({ rainRateMmPerH: 0.4 })).toThrow("rainRateMmPerH");
  });
  it("halves the reflectivity at half that width from its centre", () => {
    // Z falls as exp(-1.6 rho / rho0), so that 1/2 is reached at rho = rho0 ln 2 / 1.6.
    const { widthKm } = rainCellWidth({ rainRateMmPerH: 20 });
    const rho0 = (10 - 1.5 * Math.log10(20)) / Math.log(20 / 0.4);
    expect(Math.exp((-1.6 * (widthKm / 2)) / rho0)).toBeCloseTo(0.5, 12);
  });
});

describe("heights of a scatter path", () => {
  const over = { stationAmslM: 0, horizonMrad: 0, effectiveRadiusKm: 8500 };
  it("rise with the square of the distance over a level horizon", () => {
    // 59 m at 31.6 km, 590 m at 100 km, 2360 m at 200 km for a radius of 8500 km.
    expect(visibleHeight({ ...over, distanceKm: 100 }).heightAmslM).toBeCloseTo(588.2, 1);
    expect(visibleHeight({ ...over, distanceKm: 200 }).heightAmslM).toBeCloseTo(2352.9, 1);
    expect(
      visibleHeight({ ...over, horizonMrad: 5, stationAmslM: 40, distanceKm: 100 }).heightAmslM,
    ).toBeCloseTo(588.2 + 540, 1);
  });
  it("aim half-way to the rain height, or as low as both see above it", () => {
    const at = (visible1AmslM: number, visible2AmslM: number) =>
      scatterHeight({ visible1AmslM, visible2AmslM, rainHeightAmslM: 3000 });
    expect(at(600, 1000)).toEqual({ heightAmslM: 2000, overRainM: 0, iceOnly: false });
    expect(at(4200, 100)).toEqual({ heightAmslM: 4200, overRainM: 1200, iceOnly: false });
    expect(at(100, 5100).iceOnly).toBe(true);
  });
});

describe("scatter angle", () => {
  it.each([
    [90, 270, 0],
    [90, 90, 180],
    [350, 80, 90],
    [10, 340, 150],
  ])("stations at %d and %d deg from the cell: %d deg", (headingTo1Deg, headingTo2Deg, scatterDeg) => {
    expect(scatterAngle({ headingTo1Deg, headingTo2Deg }).scatterDeg).toBe(scatterDeg);
  });
});
