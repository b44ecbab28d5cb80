import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import { prepare } from "../../src/budget/prepare.ts";
import type { CoverState, Verdict } from "../../src/budget/types.ts";
import { exactly } from "../../src/cover/bounded.ts";
import { fixingOf } from "../../src/cover/fixing.ts";
import { findMaterial } from "../../src/cover/materials.ts";
import { coversCsv, coversJson } from "../../src/report/coversData.ts";
import { coversText } from "../../src/report/coversText.ts";
import { handsOnText } from "../../src/report/notes.ts";
import { plain } from "../../src/report/words.ts";
import type { Weather } from "../../src/scenario/types.ts";
import type { BreakEven } from "../../src/study/breakEven.ts";
import {
  type CoverJudgement,
  type CoverRow,
  type CoverVerdict,
  placings,
} from "../../src/study/coverVerdict.ts";
import { coverOf, scenarioOf, weatherOf } from "../budget/scenarios.ts";

const state = (returnLossDb: number): CoverState => ({
  dryCostDb: exactly(0),
  waterCostDb: exactly(0),
  bareReturnLossDb: 14,
  returnLossDb: exactly(returnLossDb),
  filmMm: 0,
});

const weathers = {
  dry: weatherOf(),
  storm: weatherOf({ rainMmPerH: { value: 16 } }),
};

/** A path that rain only hurts. */
const evenAt = (reserveMmPerH: number, zeroMmPerH: number | undefined): BreakEven => ({
  zeroMmPerH,
  reserveMmPerH,
  closesMmPerH: reserveMmPerH,
  zeroSpread: { lowMmPerH: zeroMmPerH, highMmPerH: undefined },
  reserveSpread: { lowMmPerH: reserveMmPerH, highMmPerH: undefined },
  zeroBack: [],
  reserveBack: [],
  closesBack: [],
});

/** A row of figures typed by hand. */
const row = (change: Partial<CoverRow>): CoverRow => ({
  weather: "storm",
  placing: "both",
  dryCostDb: exactly(0),
  waterCostDb: exactly(0),
  noiseAddedK: 0,
  noiseCostDb: 0,
  costDb: 0,
  transmitter: state(14),
  receiver: state(14),
  marginDb: 9,
  marginSigmaDb: 1,
  verdict: "closes",
  bareMarginDb: 9,
  bareVerdict: "closes",
  ...change,
});

function judgement(
  cover: string,
  change: Partial<CoverRow> = {},
  more: Partial<CoverJudgement> = {},
): CoverJudgement {
  const rows = Object.keys(weathers).flatMap((weather) =>
    placings.map((placing) => row({ ...change, weather, placing })),
  );
  return {
    cover,
    rows,
    durability: [],
    rippleDb: { transmitter: 0, receiver: 0 },
    repeatabilityDb: 0.07,
    breakEven: evenAt(22, 40),
    ...more,
  };
}

interface Told {
  readonly weather?: Partial<Weather>;
  readonly warnings?: CoverVerdict["warnings"];
}

function linkOf({ weather = {} }: Told = {}) {
  return prepare(scenarioOf({ weather: { ...weathers, storm: { ...weathers.storm, ...weather } } }));
}

function verdictOf(covers: readonly CoverJudgement[], told: Told = {}): CoverVerdict {
  return {
    title: "invented ridge",
    frequencyGHz: 10.368,
    path: linkOf().path,
    mode: "cw",
    weathers: ["dry", "storm"],
    worstWeather: "storm",
    rainWeather: "storm",
    bandGHz: 0.2,
    covers,
    warnings: told.warnings ?? [],
  };
}

const textOf = (covers: readonly CoverJudgement[], told: Told = {}) =>
  coversText(verdictOf(covers, told), linkOf(told));
const flowing = (text: string) => text.replace(/\s+/g, " ");
/** The numbered sentences. */
const said = (covers: readonly CoverJudgement[], told: Told = {}) =>
  flowing(textOf(covers, told).split("\n\n")[2]!);

describe("a cover's sentence", () => {
  it("says what it costs dry, what wet, and what that turns", () => {
    const film = judgement("film", {
      dryCostDb: { nominal: 0.06, low: 0, high: 0.2 },
      costDb: 3.4,
      marginDb: 5.6,
      verdict: "thin",
    });
    expect(said([film])).toBe(
      "1 film: costs 0.1 dB dry, indistinguishable from bare at a bench's repeatability; " +
        "3.4 dB wet at 16 mm/h, and that turns `closes` into `thin`; 5.6 dB left in storm.",
    );
  });

  it.each([
    [0.8, 0.3, 1.4, "costs 0.8 dB dry (0.3 to 1.4);"],
    [0.4, 0.4, 0.4, "costs 0.4 dB dry;"],
    [-0.3, -0.3, -0.3, "wins 0.3 dB dry, as it tunes the feed;"],
    [-0.06, -0.1, 0, "wins 0.1 dB dry, indistinguishable from bare"],
    [-0.01, -0.1, 0, "costs 0.0 dB dry, indistinguishable from bare"],
    [0.069, 0, 0.1, "costs 0.1 dB dry, indistinguishable from bare"],
    [0.071, 0, 0.1, "costs 0.1 dB dry (0.0 to 0.1);"],
  ])("of %d dB dry (%d to %d): %s", (nominal, low, high, words) => {
    expect(said([judgement("film", { dryCostDb: { nominal, low, high } })])).toContain(`film: ${words}`);
  });

  it("widens what a bench cannot tell by the doubt of a reading", () => {
    const read = (repeatabilityDb: number) =>
      said([judgement("cloth", { dryCostDb: exactly(0.15) }, { repeatabilityDb })]);
    expect(read(0.17)).toContain("indistinguishable");
    expect(read(0.14)).not.toContain("indistinguishable");
  });

  it("leaves at what it was what it does not turn", () => {
    expect(said([judgement("film")])).toContain("and that leaves it at `closes`; 9.0 dB left in storm.");
  });

  it.each<[Partial<Weather>, string]>([
    [{}, "; 1.2 dB wet at 16 mm/h, and"],
    [{ coversWetAsAtMmPerH: 5 }, "; 1.2 dB wet at 5 mm/h, and"],
    [{ coversWetAsAtMmPerH: 5, driedForMin: 20 }, "; 1.2 dB in storm, and"],
    [{ rainMmPerH: { value: 0 }, iceMm: 3 }, "; 1.2 dB in storm, and"],
    [{ rainMmPerH: { value: 0 }, dewMm: { value: 0.1 } }, "; 1.2 dB in storm, and"],
    [
      { rainMmPerH: { value: 0 }, snow: { depthMm: 9, dryDensityGcm3: 0.3, wetnessPercent: 5 } },
      "; 1.2 dB in storm, and",
    ],
  ])("names what lies on it: %o", (weather, words) => {
    expect(said([judgement("film", { costDb: 1.2 })], { weather })).toContain(words);
  });

  it.each<[Partial<Weather>]>([[{ wets: [] }], [{ rainMmPerH: { value: 0 } }]])(
    "calls no cover wet that is not: %o",
    (weather) => {
      expect(said([judgement("film", { costDb: 1.2 })], { weather })).not.toMatch(/wet|1\.2/);
    },
  );

  it("of a bare feed says what is not charged", () => {
    expect(said([judgement("bare")])).toBe(
      "1 bare: 9.0 dB left in storm, closes; rain, dust and insects enter the feed, and nothing is charged for that.",
    );
  });

  it("is numbered in the order of the verdict", () => {
    expect(said([judgement("b"), judgement("a"), judgement("c")])).toMatch(/^1 b: .* 2 a: .* 3 c: /);
  });
});

describe("the tables", () => {
  const lines = (text: string, start: string) =>
    text
      .split("\n")
      .find((line) => line.startsWith(start))!
      .split(/\s+/);

  it("hold the costs of both ends and the margins of one", () => {
    const covers = [
      {
        ...judgement("film"),
        rows: placings.flatMap((placing, i) =>
          Object.keys(weathers).map((weather) =>
            row({
              weather,
              placing,
              dryCostDb: exactly(0.3),
              waterCostDb: exactly(1.1),
              noiseCostDb: 0.2,
              noiseAddedK: 14.6,
              costDb: 1.6,
              marginDb: 5 + i,
              verdict: (["fails", "thin", "closes"] as const)[i]!,
            }),
          ),
        ),
      },
    ];
    expect(lines(textOf(covers), "film")).toEqual(
      "film 0.3 1.1 0.2 (15) 1.6 5.0 fails 6.0 thin 7.0 closes".split(" "),
    );
  });

  it("give return loss, its change and VSWR at both feeds", () => {
    // VSWR of 14 dB 1.50, of 10 dB 1.92 (standard table).
    const spoiled = judgement("film", { transmitter: state(10), receiver: state(14.04) });
    const table = textOf([spoiled]).split("Match at the feed")[1]!;
    expect(lines(table, "film").slice(0, 7)).toEqual("film 10.0 -4.0 1.92 14.0 0.0 1.50".split(" "));
    expect(
      lines(textOf([judgement("film", { receiver: state(15.2) })]).split("Match at")[1]!, "film"),
    ).toContain("+1.2");
  });

  it("say of the rain what uses the margin up, in words that cannot be taken the other way", () => {
    const rates = (breakEven: CoverJudgement["breakEven"]) =>
      textOf([judgement("film", {}, { breakEven })])
        .split("Rain that uses the margin up")[1]!
        .split("\n")
        .find((line) => line.startsWith("film"))!
        .replace(/\s+/g, " ");
    expect(rates(evenAt(4.26, 31.7))).toBe("film 4.3 mm/h 32 mm/h");
    expect(rates(evenAt(0, undefined))).toBe("film without rain not by 400 mm/h");
    // Below the table a line says where harder rain brings something back, and a path that rain only hurts has none.
    const text = (breakEven: BreakEven) => flowing(textOf([judgement("film", {}, { breakEven })]));
    const back = [{ fromMmPerH: 12.4, toMmPerH: 30.6, mechanism: "rain_scatter" }] as const;
    expect(text({ ...evenAt(0, 3), zeroBack: back })).toContain(
      "film: something is left from 12 to 31 mm/h (by rain scatter). Outdoors",
    );
    expect(text(evenAt(0, 3))).not.toContain("something is left");
  });

  it("tell of ripple but where it was measured, or bare", () => {
    const text = textOf([
      judgement("bare"),
      judgement("read", {}, { rippleDb: undefined }),
      judgement("film", {}, { rippleDb: { transmitter: 0.123, receiver: 0.3 } }),
    ]);
    expect(flowing(text)).toContain(
      "Ripple over a band of 200 MHz, dry, transmitter and receiver film 0.12 and 0.30 dB Rain",
    );
    expect(textOf([judgement("bare")])).not.toContain("Ripple");
  });

  it("title each weather by what falls and lies", () => {
    const weather: Partial<Weather> = {
      coversWetAsAtMmPerH: 5,
      driedForMin: 12,
      dewMm: { value: 0.1 },
      iceMm: 2,
      snow: { depthMm: 9, dryDensityGcm3: 0.3, wetnessPercent: 5 },
      wets: ["receiver"],
    };
    expect(flowing(textOf([judgement("film")], { weather }))).toContain(
      "storm: rain 16 mm/h, covers wet as at 5 mm/h, dried for 12 min, dew 0.1 mm, ice 2 mm, " +
        "snow 9 mm, 5 % water, wets the receiver",
    );
    expect(flowing(textOf([judgement("film")], { weather: { wets: [] } }))).toContain(
      "storm: rain 16 mm/h, wets no cover",
    );
  });

  it("stay within 80 columns under long names, and lose no figure by it", () => {
    const long = "polycarbonate dome of three millimetres";
    const text = textOf([judgement(long, { noiseAddedK: -123, costDb: 12.3 })]);
    for (const line of text.split("\n")) expect(line.length).toBeLessThanOrEqual(80);
    expect(text).toContain("down to nothing at");
    expect(text).toContain("(-123)");
    expect(text.match(/9\.0 closes {2}/g)!.length).toBeGreaterThanOrEqual(2);
  });
});

describe("outdoors", () => {
  const made = (...names: readonly string[]) =>
    judgement(
      "film",
      {},
      {
        durability: names.map((name) => ({ name, material: findMaterial(name), fixing: fixingOf(name) })),
      },
    );
  const outdoors = (one: CoverJudgement) => flowing(textOf([one]).split("Outdoors\n")[1]!.split("\n\n")[0]!);

  // Sun, water and heat of FEP: supplier guidance; -100 to 205 degC (common practice).
  it("stands sun, water, heat, beading, fixing and caution of each material", () => {
    const text = outdoors(made("FEP film"));
    for (const words of [
      "years outdoors",
      "of water in a day",
      "205 degC",
      "beading",
      "Held clamped",
      "fumes make ill",
    ]) {
      expect(text).toContain(words);
    }
  });

  it("names a material once, and says where nothing is known", () => {
    expect(outdoors(made("PETG", "PETG")).match(/PETG:/g)).toHaveLength(1);
    expect(outdoors(made("homebrew"))).toContain("homebrew: nothing known of it outdoors.");
    expect(outdoors(judgement("cloth"))).toContain("cloth: measured; its material is not known here");
  });
});

describe("cautions", () => {
  it("tell to switch off and take the key before hands go to a cover", () => {
    const text = flowing(textOf([judgement("film")]));
    expect(text).toContain(
      "Switch the transmitter off and take away its key before anyone touches the feed or its cover.",
    );
    expect(text).toContain("Never look into a feed");
    expect(handsOnText(plain).match(/^ {2}- /gm)).toHaveLength(3);
  });

  it("promise nobody that anything is harmless", () => {
    expect(textOf([judgement("film"), judgement("bare")])).not.toMatch(/\bsafe/i);
  });
});

describe("a cover over the dish", () => {
  const text = (receiver: { dishCover?: string }) =>
    flowing(
      coversText(
        verdictOf([judgement("film")]),
        prepare(
          scenarioOf({
            receiver,
            weather: weathers,
            covers: { bare: coverOf(), film: coverOf({ measured: { insertionLossDb: { value: 0.1 } } }) },
          }),
        ),
      ),
    );

  it("is named as standing in every margin", () => {
    expect(text({ dishCover: "film" })).toContain("Over the dish: film (receiver). It stays in every margin");
    expect(text({})).not.toContain("Over the dish");
    expect(text({ dishCover: "bare" })).not.toContain("Over the dish");
  });
});

describe("the verdict as data", () => {
  const verdicts: Verdict[] = ["closes", "thin"];
  const covers = verdicts.map((verdict, i) =>
    judgement(
      `cover, ${i}`,
      { verdict, costDb: 1.25, dryCostDb: { low: 0.1, nominal: 0.2, high: 0.3 } },
      {
        breakEven: evenAt(0, undefined),
      },
    ),
  );

  it("has a row for each cover, weather and placing, a comma in a name notwithstanding", () => {
    const rows = csvParse(coversCsv(verdictOf(covers)));
    expect(rows).toHaveLength(2 * 2 * 3);
    expect(rows[0]).toMatchObject({
      cover: "cover, 0",
      weather: "dry",
      covered_at: "both",
      mode: "cw",
      dry_cost_db: "0.2",
      dry_cost_low_db: "0.1",
      dry_cost_high_db: "0.3",
      cost_db: "1.25",
      verdict: "closes",
      bare_verdict: "closes",
      rain_to_reserve_mm_per_h: "0",
      rain_to_zero_mm_per_h: "",
    });
    expect(rows.columns).toHaveLength(22);
    for (const one of rows) expect(Object.keys(one)).toHaveLength(22);
  });

  it("is JSON to the last field, a perfect match being null", () => {
    const perfect = judgement("film", { receiver: state(Number.POSITIVE_INFINITY) });
    const read = JSON.parse(coversJson(verdictOf([perfect]))) as CoverVerdict;
    expect(read.covers[0]!.rows[0]!.receiver.returnLossDb.nominal).toBeNull();
    expect(read.worstWeather).toBe("storm");
    expect(read.covers[0]!.breakEven).toMatchObject({ zeroMmPerH: 40, reserveMmPerH: 22 });
  });
});
