import { describe, expect, it } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import { loadScenario } from "../../src/scenario/load.ts";
import { breakEven } from "../../src/study/breakEven.ts";
import { type CoverJudgement, type CoverRow, coverVerdict, placings } from "../../src/study/coverVerdict.ts";
import { coverOf, feedOf, layerOf, scenarioOf, weatherOf } from "../budget/scenarios.ts";

const scenario = scenarioOf({
  title: "invented ridge",
  feeds: { stub: feedOf(), horn: feedOf({ returnLossDb: 18, gainDbi: { value: 17 } }) },
  transmitter: { feed: "horn", dish: undefined, powerDbm: { value: 15 } },
  receiver: { modes: ["ssb", "cw"] },
  covers: {
    soaked: coverOf({ layers: [layerOf(1, 3, 0.02)], surface: "wetting" }),
    bare: coverOf(),
    shedding: coverOf({ layers: [layerOf(0.127, 2.05)], surface: "beading" }),
    "half wave": coverOf({ layers: [layerOf(8.65, 2.8, 0.006)], gapMm: 4, surface: "mixed" }),
    read: coverOf({ measured: { insertionLossDb: { value: 0.2, sigma: 0.06 } } }),
  },
  weather: {
    dry: weatherOf(),
    shower: weatherOf({ rainMmPerH: { value: 16 }, extentKm: 8 }),
    dewy: weatherOf({ dewMm: { value: 0.25 } }),
    iced: weatherOf({ iceMm: 4, temperatureC: -2 }),
  },
});
const link = prepare(scenario);
const everyWeather = Object.keys(scenario.weather);
const verdict = coverVerdict(link, "ssb", everyWeather);

const judged = (name: string): CoverJudgement => verdict.covers.find(({ cover }) => cover === name)!;
const rowOf = ({ rows }: CoverJudgement, weather: string, placing: CoverRow["placing"] = "both") =>
  rows.find((row) => row.weather === weather && row.placing === placing)!;
const everyRow = verdict.covers.flatMap(({ cover, rows }) => rows.map((row) => ({ cover, row })));

describe("the cover verdict", () => {
  it("judges every cover in every weather at one end and at both", () => {
    expect(verdict.covers.map(({ cover }) => cover).toSorted()).toEqual(
      Object.keys(scenario.covers).toSorted(),
    );
    for (const { rows } of verdict.covers) {
      expect(rows.map(({ weather, placing }) => `${weather} ${placing}`).toSorted()).toEqual(
        everyWeather.flatMap((weather) => placings.map((placing) => `${weather} ${placing}`)).toSorted(),
      );
    }
  });

  it("puts the best first by the margin left in the worst weather, bare among them", () => {
    const left = verdict.covers.map((one) => rowOf(one, verdict.worstWeather).marginDb);
    expect(left).toEqual(left.toSorted((a, b) => b - a));
    expect(verdict.covers[0]!.cover).toBe("bare");
    const names = verdict.covers.map(({ cover }) => cover);
    expect(names.indexOf("soaked")).toBeGreaterThan(names.indexOf("shedding"));
  });

  it("calls that weather the worst in which a cover leaves least, though a bare feed minds no dew", () => {
    const least = (weather: string) => Math.min(...verdict.covers.map((one) => rowOf(one, weather).marginDb));
    for (const weather of everyWeather)
      expect(least(verdict.worstWeather)).toBeLessThanOrEqual(least(weather));
    expect(coverVerdict(link, "ssb", ["dry", "dewy"]).worstWeather).toBe("dewy");
    expect(coverVerdict(link, "ssb", ["dry", "iced"]).worstWeather).toBe("iced");
  });

  it("has each margin as the budget alone has it", () => {
    for (const { cover, row } of everyRow) {
      const at = (end: "transmitter" | "receiver") => ({
        feed: scenario[end].feed,
        cover: row.placing === "both" || row.placing === end ? cover : "bare",
      });
      const chosen = {
        weather: row.weather,
        mode: "ssb",
        transmitter: at("transmitter"),
        receiver: at("receiver"),
      };
      const budget = evaluate(link, chosen);
      expect(row.marginDb).toBe(budget.marginDb);
      expect(row.verdict).toBe(budget.verdict);
      expect(row.marginSigmaDb).toBe(budget.marginSigmaDb);
    }
  });

  it("adds up: dry, water and noise are the whole cost", () => {
    for (const { row } of everyRow) {
      const { dryCostDb, waterCostDb, noiseCostDb, costDb, bareMarginDb, marginDb } = row;
      expect(Math.abs(dryCostDb.nominal + waterCostDb.nominal + noiseCostDb - costDb)).toBeLessThan(1e-9);
      expect(bareMarginDb - marginDb).toBeCloseTo(costDb, 12);
    }
  });

  it("costs at both ends what it costs at the one and at the other", () => {
    for (const one of verdict.covers) {
      for (const weather of everyWeather) {
        const [both, sent, heard] = placings.map((placing) => rowOf(one, weather, placing)) as [
          CoverRow,
          CoverRow,
          CoverRow,
        ];
        expect(Math.abs(sent.costDb + heard.costDb - both.costDb)).toBeLessThan(1e-9);
        expect(sent.noiseAddedK).toBe(0);
        expect(heard.noiseAddedK).toBe(both.noiseAddedK);
      }
    }
  });

  it("tells noise in kelvin and in dB of the same two temperatures", () => {
    for (const { row } of everyRow.filter(({ row }) => Math.abs(row.noiseAddedK) > 1e-6)) {
      const bareK = row.noiseAddedK / (10 ** (row.noiseCostDb / 10) - 1);
      const bare = rowOf(judged("bare"), row.weather);
      expect(bareK).toBeGreaterThan(100);
      expect(bareK).toBeLessThan(700);
      expect(bare.noiseAddedK).toBe(0);
    }
    // The same bare temperature behind every cover of one weather.
    const inShower = ["soaked", "half wave"].map((name) => rowOf(judged(name), "shower"));
    const [a, b] = inShower.map((row) => row.noiseAddedK / (10 ** (row.noiseCostDb / 10) - 1));
    expect(a).toBeCloseTo(b!, 6);
  });

  it("leaves bare as it is", () => {
    for (const row of judged("bare").rows) {
      expect(row.costDb).toBe(0);
      expect(row.verdict).toBe(row.bareVerdict);
      expect(row.transmitter.returnLossDb.nominal).toBe(18);
    }
  });

  it("judges by the mode asked for", () => {
    const cw = coverVerdict(link, "cw", everyWeather);
    const soaked = cw.covers.find(({ cover }) => cover === "soaked")!;
    expect(rowOf(soaked, "dry").marginDb).toBeGreaterThan(rowOf(judged("soaked"), "dry").marginDb + 1);
    expect(rowOf(soaked, "dry").dryCostDb).toEqual(rowOf(judged("soaked"), "dry").dryCostDb);
  });

  it("has the break-even rain of each cover at both ends, in the rainiest weather", () => {
    expect(verdict.rainWeather).toBe("shower");
    for (const { cover, breakEven: found } of verdict.covers) {
      const at = (end: "transmitter" | "receiver") => ({ feed: scenario[end].feed, cover });
      const chosen = {
        weather: "shower",
        mode: "ssb",
        transmitter: at("transmitter"),
        receiver: at("receiver"),
      };
      expect(found).toEqual(breakEven(link, chosen));
    }
    expect(judged("soaked").breakEven.zeroMmPerH).toBeLessThan(judged("bare").breakEven.zeroMmPerH!);
  });

  // 0.05 dB of a bench, common practice, no source; two readings add by root-sum-square.
  it("holds the dry cost against the bench at two ends", () => {
    expect(judged("shedding").repeatabilityDb).toBeCloseTo(Math.SQRT2 * 0.05, 12);
    expect(judged("read").repeatabilityDb).toBeCloseTo(Math.SQRT2 * 0.12, 12);
  });

  it("tells the ripple over 2 % of the frequency, or over the band asked for, but of no reading", () => {
    expect(verdict.bandGHz).toBeCloseTo(0.20736, 9);
    expect(judged("read").rippleDb).toBeUndefined();
    expect(judged("bare").rippleDb).toEqual({ transmitter: 0, receiver: 0 });
    const ripple = (bandGHz: number) =>
      coverVerdict(link, "ssb", ["dry"], bandGHz).covers.find(({ cover }) => cover === "half wave")!
        .rippleDb!;
    expect(ripple(0).receiver).toBeCloseTo(0, 12);
    expect(ripple(1).receiver).toBeGreaterThan(ripple(0.2).receiver);
    // The feed of 14 dB swings more than that of 18 dB.
    expect(ripple(0.2).receiver).toBeGreaterThan(ripple(0.2).transmitter);
  });

  it("says each doubt once and loses none", () => {
    const said = verdict.warnings.map(({ code, where, message }) => `${code} ${where} ${message}`);
    expect(new Set(said).size).toBe(said.length);
    expect(said.some((text) => text.startsWith("bare_in_rain"))).toBe(true);
    expect(said.some((text) => text.startsWith("wet_model_range"))).toBe(true);
  });
});

describe("how covers last", () => {
  it("is told of every layer but air, and of the materials of the list only", async () => {
    const file = new URL("../../scenarios/town-link.yaml", import.meta.url).pathname;
    const { scenario: town } = await loadScenario(file);
    const { covers } = coverVerdict(prepare(town!), town!.receiver.modes[0]!, ["dry"]);
    const glassed = covers.find(({ cover }) => cover === "glassed")!;
    expect(glassed.durability.map(({ name, material }) => [name, material?.uvClass])).toEqual([
      ["epoxy/glass FR-4 or G10", "C"],
      ["extruded polystyrene foam 28-45 kg/m3", "D"],
      ["epoxy/glass FR-4 or G10", "C"],
    ]);
    expect(judged("soaked").durability).toMatchObject([{ name: "invented", material: undefined }]);
    expect(judged("bare").durability).toEqual([]);
  });
});

describe("a cover over a dish", () => {
  it("stands in every margin, and keeps what is judged on the feed behind it dry", () => {
    const shelled = scenarioOf({
      ...scenario,
      transmitter: { feed: "stub" },
      receiver: { dishCover: "soaked" },
    });
    const { covers } = coverVerdict(prepare(shelled), "cw", ["dry", "shower"]);
    const open = coverVerdict(
      prepare({ ...shelled, receiver: { ...shelled.receiver, dishCover: undefined } }),
      "cw",
      ["dry", "shower"],
    );
    const bare = covers.find(({ cover }) => cover === "bare")!;
    const openBare = open.covers.find(({ cover }) => cover === "bare")!;
    expect(rowOf(bare, "dry").marginDb).toBeLessThan(rowOf(openBare, "dry").marginDb - 0.05);
    const film = covers.find(({ cover }) => cover === "soaked")!;
    expect(rowOf(film, "shower", "receiver").waterCostDb.nominal).toBe(0);
    expect(rowOf(film, "shower", "transmitter").waterCostDb.nominal).toBeGreaterThan(0.1);
  });
});
