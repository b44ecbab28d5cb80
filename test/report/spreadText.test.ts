import { describe, expect, it } from "vitest";
import { cases } from "../../src/budget/cases.ts";
import { prepare } from "../../src/budget/prepare.ts";
import { rangePicture } from "../../src/report/spreadPicture.ts";
import { chance, spreadText } from "../../src/report/spreadText.ts";
import type { Scenario, SpreadSettings } from "../../src/scenario/types.ts";
import { type SpreadRow, spreadOf } from "../../src/study/spread.ts";
import { coverOf, dishOf, layerOf, scenarioOf, weatherOf } from "../budget/scenarios.ts";

function textOf(scenario: Scenario, draws = 2000): string {
  const link = prepare(scenario);
  const study = spreadOf(link, cases(link), { draws, seed: 1, precision: 0.005 });
  return spreadText(study, link).replace(/\s+/g, " ");
}

const onlyBare = { transmitter: { cover: "bare" }, receiver: { cover: "bare" }, covers: { bare: coverOf() } };
const storm = { storm: weatherOf({ rainMmPerH: { value: 50 }, extentKm: 10 }) };
const film = { bare: coverOf(), film: coverOf({ layers: [layerOf(0.127, 2.05)], surface: "beading" }) };
const weak = (powerDbm: number) => ({ transmitter: { powerDbm: { value: powerDbm } } });

const quiet: SpreadSettings = {
  tiltLossDb: { value: 0, sigma: 0 },
  blunder: { chance: 0, lossDb: { value: 0 } },
  feedReturnLossDb: 0,
  gasShare: 0,
};

describe("words of a spread that follow from the figures", () => {
  it("name no cover where there is none", () => {
    expect(textOf(scenarioOf(onlyBare))).toMatch(/Dry: the feeds are bare; .* leads\./);
  });

  it("say that nothing scatters, where all is exact", () => {
    const exact = { value: 0, sigma: 0 };
    const stated = { diameterM: undefined, focalRatio: undefined, gainDbi: { value: 34, sigma: 0 } };
    const { modes, ...rest } = scenarioOf(onlyBare);
    const text = textOf({
      ...rest,
      transmitter: { ...rest.transmitter, powerDbm: { value: 30, sigma: 0 }, lineLossDb: exact },
      receiver: {
        ...rest.receiver,
        lineLossDb: exact,
        noiseFigureDb: { value: 1, sigma: 0 },
        antennaTemperatureK: { value: 200, sigma: 0 },
      },
      dish: { tripod: dishOf({ ...stated, pointingErrorDeg: 0 }) },
      modes: { cw: { ...modes["cw"]!, sigmaDb: 0 } },
      spread: quiet,
    });
    expect(text).toContain("Nothing: no input scatters.");
    expect(text).toContain("the verdict agrees, the median to 0.3 dB");
    expect(text).not.toMatch(/NaN|Infinity|undefined/);
  });

  it("count few draws in plain numbers and claim no more than they hold", () => {
    const one = textOf(scenarioOf(weak(-60)), 1);
    expect(one).toMatch(/: 1 draw, chances good to \d\d points, where 0\.5 were asked for/);
    expect(one).toMatch(/holds in (all|none) of the draws/);
    expect(one).not.toMatch(/e\+|over 99\.9 % of|under 0\.1 % of/);
  });

  it("bound a chance only by as many draws as bear the bound out", () => {
    expect(chance({ share: 0, low: 0, high: 0.0002 })).toBe("under 0.1 %");
    expect(chance({ share: 0, low: 0, high: 0.03 })).toBe("none");
    expect(chance({ share: 1, low: 0.9998, high: 1 })).toBe("over 99.9 %");
    expect(chance({ share: 1, low: 0.9, high: 1 })).toBe("all");
    expect(chance({ share: 0.5, low: 0.49, high: 0.51 })).toBe("50.0 %");
  });

  it("give a loss of chance with its own sign: certainty takes the hope of a path that fails", () => {
    const text = textOf(
      scenarioOf({ ...onlyBare, transmitter: { cover: "bare", ...weak(-72).transmitter } }),
    );
    expect(text).toMatch(/the chance to close by -\d+ points? \(dry\)/);
    expect(text).toContain("1 case differs by more than 0.3 dB or 2 points; the verdict is the same.");
  });

  it("call water tied only where both ends have some and the scenario ties it", () => {
    const wet = (wets: readonly ("transmitter" | "receiver")[], spread: SpreadSettings = {}) =>
      textOf(
        scenarioOf({
          ...weak(-40),
          covers: film,
          weather: { storm: { ...storm.storm, wets } },
          spread,
        }),
      );
    const claim = "water at both ends is tied";
    expect(wet(["transmitter", "receiver"])).toContain(claim);
    expect(wet(["receiver"])).not.toContain(claim);
    expect(wet(["transmitter", "receiver"], { correlation: { water: 0 } })).not.toContain(claim);
  });

  it("say why another cover parts from the budget, where the scenario's own does not", () => {
    const plate = coverOf({ layers: [layerOf(3, 2.8, 0.05)], surface: "wetting" });
    const text = textOf(
      scenarioOf({
        ...weak(-40),
        transmitter: { cover: "bare", powerDbm: { value: -20 } },
        receiver: { cover: "bare" },
        covers: { bare: coverOf(), plate },
        weather: { storm: weatherOf({ rainMmPerH: { value: 5, sigma: 0 }, extentKm: 1 }) },
        spread: { ...quiet, waterShare: 1, correlation: { water: 1 } },
      }),
    );
    expect(text).toMatch(/1 of 2 cases differs by more than/);
    expect(text).toMatch(/- storm, plate: median .* because .*water at both ends is tied/);
  });

  it("warn that an open mouth takes in rain wherever covers are held against one", () => {
    const link = prepare(scenarioOf({ covers: film, weather: storm }));
    const own = cases(link).filter(({ transmitter }) => transmitter.cover === "film");
    const { warnings } = spreadOf(link, own, { draws: 200, seed: 1, precision: 0.005 });
    expect(warnings.map(({ code }) => code)).toContain("bare_in_rain");
  });
});

describe("the picture's axis", () => {
  const rowOf = (lowDb: number, medianDb: number, highDb: number) =>
    ({
      case: { transmitter: { cover: "film" }, receiver: { cover: "film" } },
      marginDb: { lowDb, medianDb, highDb },
    }) as unknown as SpreadRow;

  it("has no figure written over another one, wherever nought lies", () => {
    for (const [low, high] of [
      [-214, -103],
      [-85, -57],
      [-54, -43],
      [-19, -4],
      [-2, 60],
      [5, 9],
    ] as const) {
      const axis = rangePicture([rowOf(low, (low + high) / 2, high)], 3)
        .split("\n")
        .at(-1)!;
      expect(axis.length, axis).toBeLessThanOrEqual(80);
      const figures = axis
        .trim()
        .split(/\s+/)
        .filter((word) => word !== "dB");
      expect(figures, axis).toContain("0");
      for (const figure of figures) expect([0, low, high, 3].map(String), axis).toContain(figure);
      expect(axis, axis).toMatch(/\d dB\b/);
    }
  });
});
