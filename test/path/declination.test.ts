import { expect, it } from "vitest";
import { declination } from "../../src/path/declination.ts";

// Test values of the World Magnetic Model 2025, NOAA NCEI and BGS: height, latitude, longitude, declination.
it.each([
  [28, 89, -121, -99.77],
  [48, 80, -96, -29.91],
  [54, 82, 87, 54.89],
  [65, 43, 93, 0.5],
  [39, -59, -8, -15.75],
  [94, -29, -110, 15.74],
])("%s km up at %s, %s the needle points %s deg east", async (heightKm, latitude, longitude, expected) => {
  const date = new Date("2025-01-01T00:00:00Z");
  const found = await declination({ latitude, longitude, heightKm, date });
  expect(found.declinationDeg).toBeGreaterThan(expected - 0.01);
  expect(found.declinationDeg).toBeLessThan(expected + 0.01);
  expect(found.model).toBe("WMM-2025");
});

it("refuses a date that no edition covers", async () => {
  const date = new Date("2045-01-01T00:00:00Z");
  await expect(declination({ latitude: 54, longitude: -2, heightKm: 0, date })).rejects.toThrow(
    /no edition .* 2045-01-01/,
  );
});
