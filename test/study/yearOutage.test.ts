import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { zoneRainRate } from "../../src/atmosphere/rainZones.ts";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare, withWeather } from "../../src/budget/prepare.ts";
import { geodesicPath } from "../../src/path/geodesic.ts";
import { rainFade } from "../../src/path/rainFade.ts";
import type { Climate, Scenario, Site } from "../../src/scenario/types.ts";
import { type CoverYear, yearOutage } from "../../src/study/yearOutage.ts";
import {
  budgetOf,
  coverOf,
  eastOnEquator,
  layerOf,
  scenarioOf,
  siteOf,
  weatherOf,
} from "../budget/scenarios.ts";
import { describeReference, num } from "../reference.ts";

const climateOf = (rainRate001MmPerH: number, change: Partial<Climate> = {}): Climate => ({
  rain: { kind: "rate", rainRate001MmPerH },
  ...change,
});

const yearOf = (scenario: Scenario) => yearOutage(prepare(scenario), scenario.receiver.modes[0]!);
const withCover = (covers: readonly CoverYear[], name: string) =>
  covers.find(({ transmitter, receiver }) => transmitter.cover === name && receiver.cover === name)!;

/** Absorbing rain glows at 275 K (P.618-14): an antenna as warm as that hears no change. */
const deaf = { antennaTemperatureK: { value: 275 } };

/** A scenario whose bare margin in clear air is as wanted, whatever the path: the power makes up for it. */
function withMargin(marginDb: number, change: Omit<Partial<Scenario>, "transmitter" | "receiver">): Scenario {
  const bare = { cover: "bare" };
  const start = scenarioOf({
    climate: climateOf(30),
    covers: { bare: coverOf() },
    ...change,
    transmitter: bare,
    receiver: { ...bare, ...deaf },
  });
  const powerDbm = { value: start.transmitter.powerDbm.value + marginDb - budgetOf(start).marginDb };
  return { ...start, transmitter: { ...start.transmitter, powerDbm } };
}

const bareYear = (scenario: Scenario) => withCover(yearOf(scenario).covers, "bare");

describe("rain of the year", () => {
  it("takes the time for which P.530 has the margin exceeded: 0.01 % at 14.189 dB", () => {
    // Rec. ITU-R P.530-18 section 2.4.1 by an open implementation: 10.368 GHz, 30 mm/h, 30 km, horizontal
    const { dry } = bareYear(withMargin(14.1891869275, { path: { from: siteOf(), to: eastOnEquator(30) } }));
    expect(dry.rainPercent.low).toBeCloseTo(0.01, 8);
    expect(dry.rainPercent.high).toBe(dry.rainPercent.low);
    expect(dry.rainHours.low).toBeCloseTo(0.8766, 6); // 0.01 % of 365.25 days
    expect(dry.atRain!.rateMmPerH).toBeCloseTo(30, 4);
  });

  it("is bounded only where the model ends", () => {
    const path = { from: siteOf(), to: eastOnEquator(30) };
    const deepDb = rainFade({
      frequencyGHz: 10.368,
      rainRate001MmPerH: 30,
      distanceKm: 30,
      polarization: "horizontal",
      percent: 0.001,
    }).lossDb;
    expect(bareYear(withMargin(deepDb + 1, { path })).dry.rainPercent).toEqual({ low: 0, high: 0.001 });
    const shallow = bareYear(withMargin(0.1, { path })).dry;
    expect(shallow.rainPercent).toEqual({ low: 1, high: 100 });
    expect(shallow.availabilityPercent.low).toBe(0);
    expect(shallow.atRain).toBeUndefined();
  });

  it("is the whole year where clear air leaves nothing", () => {
    const { dry, wet } = bareYear(withMargin(-1, {}));
    for (const { yearPercent, multipathPercent, monthMinutes } of [dry, wet]) {
      expect(yearPercent).toEqual({ low: 100, high: 100 });
      expect(multipathPercent).toEqual({ low: 0, high: 0 });
      expect(monthMinutes.low).toBeCloseTo((365.25 / 12) * 1440, 6);
    }
  });

  it("is no more than the months have rain, where they are told", () => {
    const months = { monthlyRainfallMm: Array(12).fill(60), monthlyTemperatureC: Array(12).fill(10) };
    const climate: Climate = { rain: { kind: "monthly", ...months } };
    const { rainPercent } = bareYear(withMargin(0.01, { climate })).dry;
    // P.837-7 Annex 1 by hand: it rains at 0.5874 exp(0.883) = 1.420 mm/h; 720 mm a year take 506.9 of 8766 h.
    expect(rainPercent.low).toBe(1);
    expect(rainPercent.high).toBeCloseTo(5.783, 2);
  });

  it("wins from the worst month by P.841: 0.3 pw^1.15", () => {
    const { dry } = bareYear(withMargin(14.1891869275, { path: { from: siteOf(), to: eastOnEquator(30) } }));
    const worst = (100 * dry.rainMonthMinutes.low) / 43_830;
    expect(0.3 * worst ** 1.15).toBeCloseTo(dry.rainPercent.low, 9);
  });

  it("never comes where none falls", () => {
    expect(bareYear(withMargin(0.5, { climate: climateOf(0) })).wet.rainPercent).toEqual({
      low: 0,
      high: 0.001,
    });
  });
});

describeReference("terrain/p530-rain.csv", (row) => {
  const percent = num(row, "p_pct");
  const { dry } = bareYear(
    withMargin(num(row, "A_dB"), {
      frequencyGHz: num(row, "f_GHz"),
      polarization: row["pol"] === "H" ? "horizontal" : "vertical",
      path: { from: siteOf(), to: eastOnEquator(num(row, "d_km")) },
      climate: climateOf(num(row, "R001_mm_h")),
    }),
  );
  const { low, high } = dry.rainPercent;
  // At the ends of the model rounding decides whether the figure or its bound is told.
  const told = percent < 0.0011 ? high : low;
  expect(Math.abs(told / percent - 1), JSON.stringify(row)).toBeLessThan(5e-5);
  if (percent > 0.0011 && percent < 0.99) expect(high).toBe(low);
});

describe("rain and the water on the covers, solved together", () => {
  const film = coverOf({ layers: [layerOf(0.127, 2.05, 0.0007)] });
  const covers = { bare: coverOf(), film };
  const climate: Climate = { rain: { kind: "zone", zone: "H" } };

  it("leaves nothing at the rate that it names, which is the zone's at that time, as the fade is P.530's", () => {
    const scenario = withMargin(12, { covers, climate });
    const { transmitter, receiver, wet } = withCover(yearOf(scenario).covers, "film");
    const { rateMmPerH, pathFadeDb } = wet.atRain!;
    const percent = wet.rainPercent.low;
    expect(rateMmPerH).toBeCloseTo(zoneRainRate({ zone: "H", percent }).rainRateMmPerH, 9);
    const fade = rainFade({
      frequencyGHz: scenario.frequencyGHz,
      rainRate001MmPerH: 32, // PN.837-1, zone H at 0.01 %
      distanceKm: 60,
      polarization: scenario.polarization,
      percent,
    });
    expect(pathFadeDb).toBeCloseTo(fade.lossDb, 6);
    // The same rain as a weather of the user's own that fills just so much of the path.
    const rain = weatherOf({ rainMmPerH: { value: rateMmPerH }, rainFadeDb: pathFadeDb });
    const link = withWeather(prepare(scenario), "then", rain);
    const { marginDb, transmitterCover } = evaluate(link, {
      transmitter,
      receiver,
      weather: "then",
      mode: "cw",
    });
    expect(marginDb).toBeCloseTo(0, 4);
    expect(transmitterCover.waterCostDb.nominal).toBeGreaterThan(0.1);
    expect(pathFadeDb).toBeLessThan(12 - 0.2);
  });

  it("takes longer wet than dry, and bare feeds keep no water", () => {
    const { covers: all } = yearOf(withMargin(12, { covers, climate }));
    const [bare, covered] = [withCover(all, "bare"), withCover(all, "film")];
    expect(covered.wet.rainHours.low).toBeGreaterThan(1.05 * covered.dry.rainHours.low);
    expect(bare.wet).toEqual(bare.dry);
    expect(covered.costHours!.low).toBeCloseTo(covered.wet.yearHours.low - bare.wet.yearHours.low, 12);
    expect(bare.costHours).toBeUndefined();
  });

  it("grows with the reserve and with the rain, and shrinks with the margin", () => {
    const part = fc.integer({ min: 0, max: 1000 }).map((n) => n / 1000);
    fc.assert(
      fc.property(part, part, part, (margin, reserve, rain) => {
        const year = (extraDb: number, reserveDb: number, rate: number) => {
          const decision = { reserveDb, confidence: 0.9 };
          const scenario = withMargin(6 + 20 * margin, { covers, decision, climate: climateOf(rate) });
          const powerDbm = { value: scenario.transmitter.powerDbm.value + extraDb };
          const louder = { ...scenario, transmitter: { ...scenario.transmitter, powerDbm } };
          return withCover(yearOf(louder).covers, "film");
        };
        const rate = 15 + 60 * rain;
        const plain = year(0, 5 * reserve, rate);
        expect(plain.belowReserve.yearHours.high).toBeGreaterThanOrEqual(plain.wet.yearHours.high - 1e-9);
        const [kept, louder, wetter] = [
          year(0, 5 * reserve + 1, rate).belowReserve,
          year(1, 5 * reserve, rate).wet,
          year(0, 5 * reserve, 1.2 * rate).wet,
        ];
        for (const [less, more] of [
          [plain.belowReserve, kept],
          [louder, plain.wet],
          [plain.wet, wetter],
        ] as const) {
          expect(more.rainHours.low).toBeGreaterThanOrEqual(less.rainHours.low - 1e-9);
          expect(more.yearHours.high).toBeGreaterThanOrEqual(less.yearHours.high - 1e-9);
          expect(more.monthMinutes.high).toBeGreaterThanOrEqual(less.monthMinutes.high - 1e-6);
        }
      }),
      { numRuns: 6 },
    );
  });

  it("does not depend on the weathers beside the clear one, and frees one that is not clear", () => {
    const dry = weatherOf();
    const storm = weatherOf({ rainMmPerH: { value: 60 }, fogGPerM3: 1, iceMm: 2, dewMm: { value: 0.1 } });
    const marginWith = (weather: Scenario["weather"]) =>
      yearOf(scenarioOf({ climate, weather })).covers.map(({ wet, clearMarginDb }) => [wet, clearMarginDb]);
    expect(marginWith({ storm, dry })).toEqual(marginWith({ dry }));
    expect(marginWith({ storm })).toEqual(marginWith({ dry }));
  });
});

describe("climates that tell of the same rain", () => {
  const months = {
    // P.837-7, validation examples of ITU-R Study Group 3 (CG-3M3J-13-ValEx): 99.15117186 mm/h at 0.01 %
    monthlyRainfallMm: [
      152.763416, 149.898704, 221.929184, 263.519096, 211.805984, 129.48012, 140.308016, 158.009704,
      195.683696, 268.214608, 282.333768, 236.404568,
    ],
    monthlyTemperatureC: [
      25.9582781, 26.4754069, 26.793256, 26.9734941, 27.123524, 26.9777653, 26.5016453, 26.3638464,
      26.2731144, 26.2296664, 26.0075176, 25.803972,
    ],
  };
  const rate = 99.15117186;
  const dryPercent = (rain: Climate["rain"]) =>
    bareYear(withMargin(20, { path: { from: siteOf(), to: eastOnEquator(20) }, climate: { rain } })).dry
      .rainPercent.low;

  it("take the same from a path with dry covers: a rate, months and a map", () => {
    const byRate = dryPercent({ kind: "rate", rainRate001MmPerH: rate });
    expect(byRate).toBeGreaterThan(0.01);
    expect(byRate).toBeLessThan(1);
    expect(dryPercent({ kind: "map", folder: "x", rainRate001MmPerH: rate })).toBe(byRate);
    expect(Math.abs(dryPercent({ kind: "monthly", ...months }) / byRate - 1)).toBeLessThan(1e-4);
    // PN.837-1 Table 1: 95 mm/h in zone N
    expect(dryPercent({ kind: "zone", zone: "N" })).toBe(dryPercent({ kind: "rate", rainRate001MmPerH: 95 }));
  });

  it("wet the covers alike at 0.01 %, where all know the rate", () => {
    const rateAt = (rain: Climate["rain"]) => {
      const fade = {
        frequencyGHz: 10.368,
        distanceKm: 20,
        polarization: "horizontal",
        percent: 0.01,
      } as const;
      const { lossDb } = rainFade({ ...fade, rainRate001MmPerH: rate });
      const path = { from: siteOf(), to: eastOnEquator(20) };
      return bareYear(withMargin(lossDb, { path, climate: { rain } })).wet.atRain!.rateMmPerH;
    };
    expect(rateAt({ kind: "rate", rainRate001MmPerH: rate })).toBeCloseTo(rate, 3);
    expect(Math.abs(rateAt({ kind: "monthly", ...months }) / rate - 1)).toBeLessThan(1e-3);
  });

  it("are refused where there is none, or a map that nobody read", () => {
    expect(() => yearOf(scenarioOf())).toThrow("no climate");
    const rain = { kind: "map", folder: "maps", rainRate001MmPerH: undefined } as const;
    expect(() => yearOf(scenarioOf({ climate: { rain } }))).toThrow("has not been read");
  });
});

describe("wet snow on the path", () => {
  const path = { from: siteOf({ groundM: 500 }), to: eastOnEquator(30, { groundM: 500 }) };
  const hours = (meanRainHeightM: number | undefined) =>
    bareYear(withMargin(8, { path, climate: climateOf(30, { meanRainHeightM }) })).dry.rainHours.low;

  it("takes nothing more far below the rain height, more in the melting layer, less above it", () => {
    const rain = hours(undefined);
    expect(hours(6000)).toBeCloseTo(rain, 6);
    expect(hours(1000)).toBeGreaterThan(1.3 * rain);
    expect(hours(-1500)).toBeLessThan(0.7 * rain);
  });

  it("is no fade where all of it falls as dry snow", () => {
    expect(
      bareYear(withMargin(8, { path, climate: climateOf(30, { meanRainHeightM: -3000 }) })).dry.rainPercent,
    ).toEqual({ low: 0, high: 0.001 });
  });
});

/** Two sites on a meridian about a latitude, so far apart; one is higher by the inclination. */
function meridian(latitudeDeg: number, distanceKm: number, [lowerM, upperM]: readonly [number, number]) {
  const site = (latitude: number, groundM: number): Site => siteOf({ latitude, groundM, heightM: 0 });
  const at = (halfDeg: number) =>
    [site(latitudeDeg - halfDeg, lowerM), site(latitudeDeg + halfDeg, upperM)] as const;
  const guessDeg = distanceKm / 222;
  const [a, b] = at(guessDeg);
  const [from, to] = at((guessDeg * distanceKm) / geodesicPath(a, b).distanceKm);
  return { from, to };
}

describeReference("terrain/p530-17-multipath.csv", (row) => {
  const marginDb = num(row, "A_dB");
  const { wet } = bareYear(
    withMargin(marginDb, {
      frequencyGHz: num(row, "f_GHz"),
      path: {
        from: siteOf({ groundM: num(row, "he_m"), heightM: 0 }),
        to: eastOnEquator(num(row, "d_km"), { groundM: num(row, "hr_m"), heightM: 0 }),
      },
      climate: climateOf(30, { dN1: num(row, "dN1_N_km"), terrainRoughnessM: num(row, "sa_m") }),
    }),
  );
  const percent = (100 * wet.multipathMonthMinutes.low) / 43_830;
  expect(wet.multipathMonthMinutes.high).toBe(wet.multipathMonthMinutes.low);
  expect(Math.abs(percent / num(row, "pw_all_pct") - 1), JSON.stringify(row)).toBeLessThan(1e-6);
});

describeReference("terrain/p530-17-quick-annual.csv", (row) => {
  const distanceKm = num(row, "d_km");
  const lowerM = num(row, "hL_m");
  const scenario = withMargin(60, {
    frequencyGHz: num(row, "f_GHz"),
    path: meridian(num(row, "lat_deg"), distanceKm, [lowerM, lowerM + num(row, "eps_p_mrad") * distanceKm]),
    climate: climateOf(30, { dN1: num(row, "dN1_N_km") }),
  });
  const year = yearOf(scenario);
  expect(year.multipath.method).toBe("P.530-17 quick");
  // The law of deep fades: the notional share at 0 dB less a decade for every 10 dB.
  const notional = withCover(year.covers, "bare").wet.multipathPercent.low * 1e6;
  expect(Math.abs(notional / num(row, "Q0_annual_pct") - 1)).toBeLessThan(1e-4);
});

describe("multipath of the year", () => {
  it("takes -200 N/km where nobody knows better, and says so", () => {
    const { multipath } = yearOf(scenarioOf({ climate: climateOf(30) }));
    expect(multipath).toMatchObject({ dN1: -200, dN1Source: "usual inland, temperate" });
  });

  it("is none below 5 km", () => {
    const year = yearOf(
      scenarioOf({ climate: climateOf(30), path: { from: siteOf(), to: eastOnEquator(4.9) } }),
    );
    expect(year.multipath.occurrencePercent).toBe(0);
    expect(year.covers[0]!.wet.multipathHours).toEqual({ low: 0, high: 0 });
    expect(year.warnings.filter(({ message }) => message.startsWith("multipath"))).toEqual([]);
  });

  it("may be anything beyond the method, with a warning", () => {
    const far = { from: siteOf({ groundM: 100 }), to: eastOnEquator(500, { groundM: 100 }) };
    const year = yearOf(withMargin(10, { path: far, climate: climateOf(30, { dN1: -500 }) }));
    expect(withCover(year.covers, "bare").wet.multipathPercent).toEqual({ low: 0, high: 100 });
    expect(year.warnings.map(({ message }) => message).join("\n")).toMatch(
      /multipath by P\.530: occurrence [-\d.e]+ % lies outside/,
    );
  });

  it("adds to the time of the rain, up to all of it", () => {
    const { wet } = bareYear(withMargin(14, { climate: climateOf(30, { dN1: -400 }) }));
    expect(wet.yearHours.low).toBeCloseTo(wet.rainHours.low + wet.multipathHours.low, 9);
    expect(wet.availabilityPercent.low).toBeCloseTo(100 - wet.rainPercent.low - wet.multipathPercent.low, 9);
    expect(wet.multipathHours.low).toBeGreaterThan(0);
  });
});
