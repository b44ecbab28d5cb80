import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import { rainWords } from "../../src/atmosphere/rainWords.ts";
import { prepare } from "../../src/budget/prepare.ts";
import { weatherCsv, weatherJson } from "../../src/report/weatherData.ts";
import { weatherText } from "../../src/report/weatherText.ts";
import type { Weather } from "../../src/scenario/types.ts";
import type { BreakEven } from "../../src/study/breakEven.ts";
import type { Rung } from "../../src/study/rung.ts";
import type { CoverLadder, WeatherLadder } from "../../src/study/weatherLadder.ts";
import { coverOf, scenarioOf, weatherOf } from "../budget/scenarios.ts";

const none: BreakEven = {
  zeroMmPerH: undefined,
  reserveMmPerH: undefined,
  closesMmPerH: undefined,
  zeroSpread: { lowMmPerH: undefined, highMmPerH: undefined },
  reserveSpread: { lowMmPerH: undefined, highMmPerH: undefined },
  zeroBack: [],
  reserveBack: [],
  closesBack: [],
};

const evenAt = (
  closesMmPerH: number | undefined,
  zeroMmPerH: number | undefined,
  change: Partial<BreakEven> = {},
): BreakEven => ({ ...none, closesMmPerH, zeroMmPerH, reserveMmPerH: closesMmPerH, ...change });

const rungsOf = (margins: readonly number[], change: Partial<Rung> = {}): Rung[] =>
  margins.map((marginDb, i) => ({
    rateMmPerH: [0, 5, 60][i]!,
    marginDb,
    marginSigmaDb: 2,
    holdProbability: 0.9,
    verdict: marginDb < 0 ? "fails" : "closes",
    mechanism: "line_of_sight",
    ...change,
  }));

/** A cover of figures typed by hand. */
const coverLadder = (name: string, both: BreakEven, change: Partial<CoverLadder> = {}): CoverLadder => ({
  transmitter: { feed: "stub", cover: name },
  receiver: { feed: "stub", cover: name },
  rungs: { path: rungsOf([20, 18, 4]), covers: rungsOf([20, 19, 17.5]), both: rungsOf([20, 17.2, 1.8]) },
  breakEven: { path: both, covers: none, both },
  curveDb: [20, 10, 0],
  ...change,
});

function ladderOf(covers: readonly CoverLadder[]): WeatherLadder {
  const { path, scenario } = prepare(scenarioOf());
  const { transmitter, receiver } = covers[0]!;
  return {
    title: scenario.title,
    frequencyGHz: 10.368,
    path,
    weather: "storm",
    reserveDb: 3,
    rates: [0, 5, 60].map((rateMmPerH) => ({
      rateMmPerH,
      words: rainWords({ rainRateMmPerH: rateMmPerH }),
    })),
    modes: [
      {
        mode: "cw",
        covers,
        curveMmPerH: [0, 30, 60],
        extents: {
          transmitter,
          receiver,
          columns: [
            { kind: "stated", extentKm: 5, isOwn: true, rungs: rungsOf([20, 15, -2.5]), breakEven: none },
            { kind: "whole", extentKm: 60, isOwn: false, rungs: rungsOf([20, 5, -70]), breakEven: none },
            {
              kind: "effective",
              extentKm: undefined,
              isOwn: false,
              rungs: rungsOf([20, 9, -40]),
              breakEven: none,
            },
          ],
          beyondKm: [70],
        },
      },
    ],
    warnings: [],
  };
}

function textOf(covers: readonly CoverLadder[], storm: Partial<Weather> = {}): string {
  const weather = {
    dry: weatherOf(),
    storm: weatherOf({ rainMmPerH: { value: 60 }, extentKm: 5, ...storm }),
  };
  return weatherText(
    ladderOf(covers),
    prepare(scenarioOf({ weather, covers: { bare: coverOf(), film: coverOf() } })),
  );
}

const flowing = (text: string) => text.replace(/\s+/g, " ");
const answerOf = (own: BreakEven, bare: BreakEven, change: Partial<CoverLadder> = {}) =>
  flowing(textOf([coverLadder("film", own, change), coverLadder("bare", bare)]).split("\n\n")[1]!);
const scattered = { fromMmPerH: 12.2, toMmPerH: 31, mechanism: "rain_scatter" } as const;

describe("the answer", () => {
  it("says how hard it may rain, in every authority's words, and what the cover takes of that", () => {
    expect(answerOf(evenAt(23.4, 34), evenAt(31, 42))).toBe(
      "CW by ear closes up to 23 mm/h (heavy by AMS, UK rain, UK showers and WMO) under film and has nothing left " +
        "from 34 mm/h on. Bare, it closes up to 31 mm/h and has nothing left from 42 mm/h on: till nothing is left the cover costs 8 " +
        "mm/h of rain.",
    );
  });

  it("subtracts the figures that it tells", () => {
    expect(answerOf(evenAt(1, 10.4), evenAt(1, 10.6))).toContain("the cover costs 1 mm/h of rain");
    expect(answerOf(evenAt(1, 10.1), evenAt(1, 10.4))).toContain(
      "the cover costs no rain that could be told",
    );
    expect(answerOf(evenAt(1, 6.02), evenAt(1, 8.44))).toContain("the cover costs 2.4 mm/h of rain");
    expect(answerOf(evenAt(1, 12.6), evenAt(1, 10.4))).toContain("the cover wins 3 mm/h of rain");
  });

  it.each([
    [evenAt(undefined, undefined), "closes in any rain under film."],
    [evenAt(50, undefined), "(heavy by AMS, UK rain, UK showers and WMO) under film and never loses all."],
    [
      evenAt(0, 7.4),
      "is thin without rain already under film (20.0 dB) and has nothing left from 7.4 mm/h (moderate by AMS, UK " +
        "showers and WMO, heavy by UK rain) on.",
    ],
    [
      evenAt(0, 3, { zeroBack: [scattered] }),
      "on and has something left again from 12 to 31 mm/h (by rain scatter). Bare,",
    ],
    [
      evenAt(0, 83, { closesBack: [scattered] }),
      "(20.0 dB), closes from 12 to 31 mm/h (by rain scatter) and has nothing left from 83 mm/h",
    ],
    [
      evenAt(5, 83, { closesBack: [scattered] }),
      "under film, closes again from 12 to 31 mm/h (by rain scatter)",
    ],
  ])("%o: %s", (own, text) => {
    expect(answerOf(own, evenAt(60, 80))).toContain(text);
  });

  it("of a path that fails dry says by how much, and whether rain helps", () => {
    const failing = { rungs: { path: rungsOf([-3]), covers: rungsOf([-3]), both: rungsOf([-3, -2, -9]) } };
    const fails = (change: Partial<BreakEven> = {}) =>
      answerOf(evenAt(0, 0, change), evenAt(0, 0), {
        ...failing,
        rungs: { ...failing.rungs, path: rungsOf([-3, -4, -9]), covers: rungsOf([-3, -4, -5]) },
      });
    expect(fails()).toContain("CW by ear fails without rain already under film, by 3.0 dB. Bare,");
    expect(fails({ zeroBack: [scattered] })).toContain(
      "by 3.0 dB and has something left from 12 to 31 mm/h (by rain scatter). Bare,",
    );
    expect(fails()).not.toContain("the cover costs");
  });

  it("of bare feeds compares them with nothing", () => {
    const text = flowing(textOf([coverLadder("bare", evenAt(23, 34))]).split("\n\n")[1]!);
    expect(text).toContain("with bare feeds and has nothing left");
    expect(text).not.toContain("Bare,");
  });

  it("goes on with what takes how much, in the rain of the weather", () => {
    const parts = (change: Partial<CoverLadder> = {}) =>
      flowing(
        textOf([coverLadder("film", evenAt(23, 34), change), coverLadder("bare", evenAt(23, 34))]),
      ).match(/At 60 mm\/h [^:]*?(?= Line of sight)/)![0];
    expect(parts()).toBe(
      "At 60 mm/h rain on the path takes 16.0 dB, water on the covers 2.5 dB and both together 18.2 dB.",
    );
    const both = rungsOf([20, 17.2, 1.8]);
    const dry = rungsOf([20, 20, 20]);
    expect(parts({ rungs: { path: both, covers: dry, both } })).toBe(
      "At 60 mm/h rain on the path takes 18.2 dB, water on the covers none that could be told.",
    );
    // Water that only counts with rain on the path beside it is not passed over.
    expect(parts({ rungs: { path: rungsOf([20, 18, 4]), covers: dry, both } })).toBe(
      "At 60 mm/h rain on the path takes 16.0 dB, water on the covers 0.0 dB and both together 18.2 dB.",
    );
  });
});

describe("rain that scatters a signal over a hill", () => {
  it("brings what it does not take", () => {
    const lifted = coverLadder("film", evenAt(30, 40), {
      rungs: {
        path: rungsOf([20, 20.1, 20.6]),
        covers: rungsOf([20, 19, 16.1]),
        both: rungsOf([20, 19, 17]),
      },
    });
    const text = flowing(textOf([lifted, coverLadder("bare", evenAt(31, 42))]));
    expect(text).toContain(
      "At 60 mm/h rain on the path brings 0.6 dB, water on the covers takes 3.9 dB, and both together take 3.0 dB.",
    );
  });
});

describe("below the answer", () => {
  const covers = [coverLadder("film", evenAt(23, 34)), coverLadder("bare", evenAt(31, 42))];

  it("stands what of the weather is kept", () => {
    const kept = (storm: Partial<Weather>) =>
      flowing(textOf(covers, storm)).match(/All but the rate.*?\. Rain in/)![0];
    expect(kept({})).toContain(
      "All but the rate stays as in storm: rain over 5 km of the path, the covers of both ends wet, wind 4 m/s.",
    );
    expect(kept({ wets: ["receiver"], extentKm: undefined })).toContain(
      "rain over the effective length of P.530, only the receiver's cover wet, wind 4 m/s.",
    );
    expect(
      kept({ wets: [], temperatureC: -1, fogGPerM3: 0.2, dewMm: { value: 0.1 }, iceMm: 2, windMPerS: 9 }),
    ).toContain(
      "no cover wet, wind 9 m/s, -1 degC, fog 0.2 g/m3, dew 0.1 mm on the covers, ice 2 mm on the covers.",
    );
  });

  it("stand every rung, and rungs by extent, with all that they hold", () => {
    const text = textOf(covers);
    const lines = text.split("\n").map((line) => line.replace(/\s+/g, " "));
    expect(lines).toContain("60 4.0 ±2.0 closes 17.5 ±2.0 closes 1.8 ±2.0 closes");
    expect(lines).toContain("60 -2.5 -70.0 -40.0");
    expect(lines).toContain("mm/h 5 km * all 60.0 P.530");
    expect(lines).toContain("60 heavy heavy violent violent");
    expect(lines).toContain("Rain over 70 km is all of the path.");
    expect(text).toContain("WMO: WMO-No. 8 (from memory)");
  });

  it("draw a curve of each cover, every one with a mark of its own", () => {
    const many = ["film", "bare", "foil", "fff", "f", "ff"].map((name) => coverLadder(name, evenAt(23, 34)));
    const legend = flowing(textOf(many).match(/dB over mm\/h: [\s\S]*?\n\n/)![0]);
    const marks = legend.split(/; | {3}/).join(" ");
    for (const mark of ["f film", "b bare", "o foil"]) expect(marks).toContain(mark);
    const letters = [...legend.matchAll(/(?:^dB over mm\/h: |; )(\S)/g)].map(([, mark]) => mark);
    expect(new Set(letters).size).toBe(letters.length);
  });
});

describe("the ladder as data", () => {
  const ladder = ladderOf([
    coverLadder("film, blue", evenAt(23, 34)),
    coverLadder("bare", evenAt(31, undefined)),
  ]);

  it("is a row a rung, a comma in a name notwithstanding, and an empty cell for a rate that is not reached", () => {
    const rows = csvParse(weatherCsv(ladder));
    expect(rows).toHaveLength(2 * 3 * 3 + 3 * 3);
    for (const row of rows) expect(Object.keys(row)).toHaveLength(rows.columns.length);
    const found = rows.find(
      (row) =>
        row["transmitter_cover"] === "film, blue" &&
        row["rain_on"] === "covers" &&
        row["rain_rate_mm_per_h"] === "60",
    )!;
    expect(found).toMatchObject({
      table: "ladder",
      mode: "cw",
      margin_db: "17.5",
      words_ams: "heavy",
      words_uk_showers: "violent",
    });
    const whole = rows.filter((row) => row["extent"] === "whole");
    expect(whole.map((row) => row["extent_km"])).toEqual(Array(3).fill(String(ladder.path.distanceKm)));
    const bare = rows.find((row) => row["receiver_cover"] === "bare" && row["rain_on"] === "both")!;
    expect(bare).toMatchObject({
      closes_to_mm_per_h: "31",
      zero_from_mm_per_h: "",
      rain_rate_mm_per_h: "0",
      words_wmo: "",
    });
  });

  it("is JSON to the last rung", () => {
    const read = JSON.parse(weatherJson(ladder)) as WeatherLadder;
    expect(read.modes[0]!.covers[1]!.breakEven.both.closesMmPerH).toBe(31);
    expect(read.modes[0]!.covers[1]!.breakEven.both).not.toHaveProperty("zeroMmPerH");
    expect(read.modes[0]!.extents.columns[2]!.rungs[2]!.marginDb).toBe(-40);
  });
});
