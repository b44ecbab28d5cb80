import { describe, expect, it } from "vitest";
import { loadScenario } from "../../src/scenario/load.ts";
import type { Weather } from "../../src/scenario/types.ts";
import { budgetOf, scenarioOf, weatherOf } from "./scenarios.ts";

/** Places of the inputs that a weather states for nothing. */
function idleIn(change: Partial<Weather>): string[] {
  const { warnings } = budgetOf(scenarioOf({ weather: { now: weatherOf(change) } }));
  return warnings.filter(({ code }) => code === "idle_input").map(({ where }) => where);
}

describe("a weather states for nothing", () => {
  it.each<[what: string, idle: Partial<Weather>, ...places: string[]]>([
    ["the length of rain where there is none", { extentKm: 8 }, "weather.now.extent"],
    ["the length of fog where there is none", { fogExtentKm: 8 }, "weather.now.fog_extent"],
    ["how long covers dried that no rain wetted", { driedForMin: 30 }, "weather.now.dried_for"],
    [
      "the same with dew, which does not dry",
      { driedForMin: 30, dewMm: { value: 0.1 } },
      "weather.now.dried_for",
    ],
    [
      "what lies on covers where it wets no end",
      { wets: [], coversWetAsAtMmPerH: 5, dewMm: { value: 0.1 } },
      "weather.now.covers_wet_as_at",
      "weather.now.dew",
    ],
    ["ice where it melts", { iceMm: 2, temperatureC: 4 }, "weather.now.ice"],
  ])("%s", (_, idle, ...places) => {
    expect(idleIn(idle)).toEqual(places);
  });

  it.each<[what: string, used: Partial<Weather>]>([
    ["the length of its rain", { rainMmPerH: { value: 5 }, extentKm: 8 }],
    ["the length of its fog", { fogGPerM3: 0.1, fogExtentKm: 8 }],
    ["how long its covers dried", { coversWetAsAtMmPerH: 5, driedForMin: 30 }],
    ["wind in the dry", { windMPerS: 12 }],
    ["that nothing gets wet in the rain", { rainMmPerH: { value: 5 }, wets: [] }],
    ["ice in the frost", { iceMm: 2, temperatureC: -3 }],
    ["ice at no temperature", { iceMm: 2 }],
  ])("but not %s", (_, used) => {
    expect(idleIn(used)).toEqual([]);
  });

  it.each(["hilltop-contest", "coast-beacon", "over-the-ridge", "town-link"])(
    "and nothing in the demonstration %s",
    async (name) => {
      const { scenario } = await loadScenario(
        new URL(`../../scenarios/${name}.yaml`, import.meta.url).pathname,
      );
      for (const weather of Object.keys(scenario!.weather)) {
        const { warnings } = budgetOf(scenario!, weather);
        expect(warnings.filter(({ code }) => code === "idle_input")).toEqual([]);
      }
    },
  );
});
