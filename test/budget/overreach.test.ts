import { describe, expect, it } from "vitest";
import { overreachWarning } from "../../src/budget/overreach.ts";

describe("a model asked beyond its range", () => {
  it.each([
    ["distanceKm", 514.816, "distance 514.8 km lies outside 0 to 60 km,"],
    ["frequencyGHz", 122.25, "frequency 122.3 GHz lies outside 0 to 60 GHz,"],
    ["lowerAntennaM", 2500, "lower antenna 2500 m lies outside 0 to 60 m,"],
    ["pathInclinationMrad", 70, "path inclination 70 mrad lies outside 0 to 60 mrad,"],
    ["temperatureC", -3, "temperature -3 degC lies outside 0 to 60 degC,"],
    ["dryDensityGcm3", 61, "dry density 61 g/cm^3 lies outside 0 to 60 g/cm^3,"],
    ["percent", 70, "70 % lies outside 0 to 60 %,"],
  ])("is told in words and units, not by the name of a field: %s", (field, value, words) => {
    const { message } = overreachWarning("a model", "path")({ field, value, low: 0, high: 60 });
    expect(message).toBe(`a model: ${words} where it was tested`);
  });
});
