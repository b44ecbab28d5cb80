import { beforeEach, describe, expect, it, vi } from "vitest";
import { cases } from "../../src/budget/cases.ts";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare, withWeather } from "../../src/budget/prepare.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { caseOf, coverOf, layerOf, scenarioOf, weatherOf } from "./scenarios.ts";

vi.mock("../../src/cover/layeredSheet.ts", async (original) => {
  const actual = await original<typeof import("../../src/cover/layeredSheet.ts")>();
  return { ...actual, layeredSheet: vi.fn(actual.layeredSheet) };
});

const scenario = scenarioOf({
  receiver: { modes: ["cw", "ssb"] },
  covers: {
    bare: coverOf(),
    film: coverOf({ layers: [layerOf(0.127, 2.05, 0.0007)] }),
    plate: coverOf({ layers: [layerOf(2, 2.8, 0.006)], surface: "beading" }),
  },
  weather: { dry: weatherOf(), wet: weatherOf({ rainMmPerH: { value: 10 } }) },
});

describe("the work", () => {
  beforeEach(() => {
    vi.mocked(layeredSheet).mockClear();
  });

  it("with covers is all done once, before any case is evaluated", () => {
    const link = prepare(scenario);
    expect(layeredSheet).toHaveBeenCalled();
    vi.mocked(layeredSheet).mockClear();
    for (const choice of cases(link)) evaluate(link, choice);
    expect(layeredSheet).not.toHaveBeenCalled();
  });

  it("of another weather is that of one weather only", () => {
    const link = prepare(scenario);
    const forTwo = vi.mocked(layeredSheet).mock.calls.length;
    vi.mocked(layeredSheet).mockClear();
    withWeather(link, "later", weatherOf({ rainMmPerH: { value: 3 } }));
    expect(vi.mocked(layeredSheet).mock.calls.length).toBeLessThan(forTwo);
  });
});

describe("the cases of a link", () => {
  it("are the scenario as written, then each other cover on both ends, by mode and weather", () => {
    const told = cases(prepare(scenario)).map(
      ({ transmitter, receiver, mode, weather }) =>
        `${transmitter.cover}/${receiver.cover} ${mode} ${weather}`,
    );
    const each = (covers: string) => [
      `${covers} cw dry`,
      `${covers} cw wet`,
      `${covers} ssb dry`,
      `${covers} ssb wet`,
    ];
    expect(told).toEqual([...each("film/film"), ...each("bare/bare"), ...each("plate/plate")]);
  });

  it("keep a scenario of two different covers and every cover beside it", () => {
    const mixed = { ...scenario, transmitter: { ...scenario.transmitter, cover: "plate" } };
    const told = cases(prepare(mixed)).map(({ transmitter, receiver }) => [
      transmitter.cover,
      receiver.cover,
    ]);
    expect(told[0]).toEqual(["plate", "film"]);
    expect(new Set(told.map(String)).size).toBe(4);
  });

  it.each(["weather", "mode", "transmitter", "receiver"] as const)(
    "are refused for an unknown %s",
    (what) => {
      const link = prepare(scenario);
      const choice = caseOf(scenario, "dry");
      const strange =
        what === "weather" || what === "mode" ? "toString" : { feed: "stub", cover: "toString" };
      expect(() => evaluate(link, { ...choice, [what]: strange })).toThrow(RangeError);
    },
  );
});
