import { expect, it } from "vitest";
import { rainHeight } from "../../src/path/rainHeight.ts";

// ITU-R P.839-2, from memory: 5 km in the tropics, 5 - 0.075 (lat - 23) in the north, 5 + 0.1 (lat + 21) in the south.
it.each([
  [0, 5],
  [-21, 5],
  [43, 3.5],
  [53, 2.75],
  [-51, 2],
  [90, 0],
  [-80, 0],
])("at %s deg the rain begins at %s km", (latitudeDeg, heightKm) => {
  expect(rainHeight({ latitudeDeg }).heightKm).toBeCloseTo(heightKm, 9);
});

it("refuses a latitude beyond a pole", () => {
  expect(() => rainHeight({ latitudeDeg: 91 })).toThrow(RangeError);
});
