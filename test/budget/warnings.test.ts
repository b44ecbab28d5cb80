import { describe, expect, it } from "vitest";
import { loadScenario } from "../../src/scenario/load.ts";
import type { Weather } from "../../src/scenario/types.ts";
import {
  budgetOf,
  codesOf,
  coverOf,
  dishOf,
  eastOnEquator,
  feedOf,
  layerOf,
  scenarioOf,
  siteOf,
  weatherOf,
} from "./scenarios.ts";

const inWeather = (change: Partial<Weather>) =>
  codesOf(budgetOf(scenarioOf({ weather: { now: weatherOf(change) } })));

describe("a budget warns", () => {
  it("of nothing on a plain path in dry weather", () => {
    expect(codesOf(budgetOf(scenarioOf()))).toEqual([]);
  });

  it("of nothing in the dry case of the demonstration", async () => {
    const { scenario } = await loadScenario(
      new URL("../../scenarios/hilltop-contest.yaml", import.meta.url).pathname,
    );
    // Its dish has a feed of 46 mm: 1.6 wavelengths.
    expect(codesOf(budgetOf(scenario!, "dry"))).toEqual(["plane_wave_weak"]);
  });

  it("of nothing on a plain path in rain on covers that water runs over", () => {
    expect(inWeather({ rainMmPerH: { value: 16 }, extentKm: 8 })).toEqual([]);
  });

  // Smooth Earth, k = 4/3: 4.12 (sqrt(25) + sqrt(16)) = 37.1 km (usual rule).
  it("of the horizon where the path reaches past it", () => {
    const at = (distanceKm: number) =>
      codesOf(
        budgetOf(
          scenarioOf({
            path: {
              from: siteOf({ groundM: 20, heightM: 5 }),
              to: eastOnEquator(distanceKm, { groundM: 10, heightM: 6 }),
            },
          }),
        ),
      );
    expect(at(37)).toEqual([]);
    expect(at(37.3)).toEqual(["beyond_horizon"]);
  });

  // A cell of six characters at 50 deg north is 3.0 by 2.3 km from its middle, of eight a tenth; a dish of 0.6 m
  // has a beam of 3.4 deg (common practice).
  it("of a short locator, at both ends, where the beam is finer than it tells", () => {
    const known = (positionErrorKm: number, distanceKm: number) => {
      const to = eastOnEquator(distanceKm, { positionErrorKm });
      return codesOf(budgetOf(scenarioOf({ path: { from: siteOf({ positionErrorKm }), to } })));
    };
    const sixCharacters = Math.hypot(3.0, 2.3);
    expect(known(sixCharacters, 20)).toEqual(["locator_too_short", "locator_too_short"]);
    expect(known(sixCharacters / 10, 60)).toEqual([]);
    expect(known(0, 20)).toEqual([]);
    // A quarter of the beam, 0.843 deg, is 0.883 km at 60 km, both ends together.
    expect(known(0.44, 60)).toEqual([]);
    expect(known(0.443, 60)).toEqual(["locator_too_short", "locator_too_short"]);
  });

  it("of models beyond their range", () => {
    const at60 = codesOf(
      budgetOf(scenarioOf({ frequencyGHz: 60, weather: { now: weatherOf({ rainMmPerH: { value: 5 } }) } })),
    );
    expect(at60).toContain("model_range"); // P.530's length was tried to 40 GHz
    expect(inWeather({ rainMmPerH: { value: 5 }, extentKm: 3 })).toEqual([]);
  });

  it("of rain said to be longer than the path", () => {
    expect(inWeather({ rainMmPerH: { value: 5 }, extentKm: 61 })).toEqual(["extent_beyond_path"]);
  });

  it("of a wet-antenna model away from its measurements", () => {
    const under = (wetModel: "merceret2000" | "film", frequencyGHz: number) =>
      codesOf(
        budgetOf(
          scenarioOf({
            frequencyGHz,
            covers: { film: coverOf({ layers: [layerOf(0.1, 2)], wetModel }) },
            weather: { now: weatherOf({ coversWetAsAtMmPerH: 5 }) },
          }),
        ),
      );
    expect(under("merceret2000", 10.368)).toContain("wet_model_range"); // fitted from 2 to 8 GHz
    expect(under("merceret2000", 5.76)).not.toContain("wet_model_range");
    expect(under("film", 10.368)).toEqual([]);
  });

  it("of more vapour than the air can hold, only where the user said so", () => {
    // At 10 degC air is saturated by 9.4 g/m3 (handbook value, from memory).
    expect(inWeather({ temperatureC: 10, vapourDensityGPerM3: 9 })).toEqual([]);
    expect(inWeather({ temperatureC: 10, vapourDensityGPerM3: 10 })).toEqual(["supersaturated"]);
    expect(inWeather({ temperatureC: 10, dewPointC: 12 })).toEqual(["supersaturated"]);
    expect(inWeather({ temperatureC: 10, humidityPercent: 100 })).toEqual([]);
    expect(inWeather({ temperatureC: -20 })).toEqual([]);
  });

  it("of a far end within the near field", () => {
    // 2 D^2/lambda of 3 m at 10.368 GHz is 622 m.
    const at = (distanceKm: number) =>
      codesOf(
        budgetOf(
          scenarioOf({
            dish: { tripod: dishOf({ diameterM: 3 }) },
            path: { from: siteOf(), to: eastOnEquator(distanceKm) },
          }),
        ),
      );
    expect(at(0.6)).toEqual(["near_field", "near_field"]);
    expect(at(0.65)).toEqual([]);
  });

  it("of water that stands on a mouth that looks straight up", () => {
    const facing = (facingDeg: number) =>
      codesOf(
        budgetOf(
          scenarioOf({
            feeds: { stub: feedOf({ facingDeg }) },
            weather: { now: weatherOf({ coversWetAsAtMmPerH: 5 }) },
          }),
        ),
      );
    expect(facing(45)).toEqual([]);
    expect(facing(88)).toEqual(["standing_water", "standing_water"]);
  });
});
