import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import { rosterCsvHead, rosterCsvLines, rosterJsonLine, rosterLine } from "../../src/report/rosterData.ts";
import { type RosterTable, rosterText } from "../../src/report/rosterText.ts";
import type { CoverRow, ModeRow, RosterRow } from "../../src/study/roster.ts";
import type { RosterPlan } from "../../src/study/rosterPlan.ts";
import { coverOf, scenarioOf, siteOf, weatherOf } from "../budget/scenarios.ts";
import { widest } from "../cli/run.ts";

const scenario = scenarioOf({
  title: "invented hill",
  covers: { bare: coverOf(), "old lid": coverOf() },
  transmitter: { cover: "old lid" },
  weather: { clear: weatherOf(), storm: weatherOf({ rainMmPerH: { value: 30 } }) },
});
const plan: RosterPlan = {
  scenario,
  folder: ".",
  sites: [{ name: "own hill", site: siteOf(), declinationDeg: -1.25 }],
  weathers: ["clear", "storm"],
  modes: ["ssb", "cw"],
  covers: ["old lid", "bare"],
  bothWays: true,
  filter: {},
};

const mode = (name: string, outDb: number, backDb: number, verdict: ModeRow["verdict"]): ModeRow => {
  return { mode: name, outDb, backDb, marginDb: Math.min(outDb, backDb), marginSigmaDb: 2, verdict };
};
const under = (cover: string, modes: readonly ModeRow[], best: CoverRow["best"]): CoverRow => ({
  cover,
  modes,
  best,
});

/** Closes with SSB in the dry; in the wet thin with CW under the lid, closing with CW when bare. */
const row: RosterRow = {
  line: 4,
  name: "Plover, Edge",
  site: 0,
  from: "own hill",
  locator: "IO93fk",
  latitude: 53.5,
  longitude: -1.9000004,
  groundM: 402,
  distanceKm: 123.4567,
  scoreKm: 123,
  headingDeg: 63.14159,
  magneticDeg: 64.39159,
  backHeadingDeg: 244.9,
  headingErrorDeg: 0,
  terrain: undefined,
  doubts: [{ code: "near_field", message: "the far field begins at 200 m" }],
  weathers: [
    {
      weather: "clear",
      way: "line_of_sight",
      covers: [
        under("old lid", [mode("ssb", 20, 25, "closes"), mode("cw", 30, 35, "closes")], {
          mode: "ssb",
          verdict: "closes",
        }),
        under("bare", [mode("ssb", 21, 26, "closes"), mode("cw", 31, 36, "closes")], {
          mode: "ssb",
          verdict: "closes",
        }),
      ],
    },
    {
      weather: "storm",
      way: "rain_scatter",
      covers: [
        under("old lid", [mode("ssb", -8.04, -9.5, "fails"), mode("cw", 2, 0.5, "thin")], {
          mode: "cw",
          verdict: "thin",
        }),
        under("bare", [mode("ssb", -5, -4.5, "fails"), mode("cw", 5, 5.5, "closes")], {
          mode: "cw",
          verdict: "closes",
        }),
      ],
    },
  ],
};

function textOf(rows: readonly RosterRow[], change: Partial<RosterTable> = {}): string {
  const lines = rows.map((one) => rosterLine(one, plan));
  return rosterText({ plan, lines: [lines], sort: "heading", notes: [], date: "2026-07-01", ...change });
}

const lineOf = (text: string, start: string) => text.split("\n").find((line) => line.startsWith(start))!;
const flowing = (text: string) => text.replace(/\s+/g, " ");

describe("the table of a roster", () => {
  it("has a line for each station: km, headings, ways, margins, cost and best modes", () => {
    const cells = lineOf(textOf([row]), "Plover").split(/ {2,}/);
    expect(cells).toEqual([
      "Plover, Edge",
      "123",
      "63.1",
      "64",
      "S/R",
      "20.0",
      "-9.5",
      "back",
      "4.5",
      "ssb",
      "(cw)*",
    ]);
  });

  it("says what its letters mean, and no others", () => {
    const text = flowing(textOf([row]));
    expect(text).toContain("Way: S in sight and R rain scatter; two letters, dry/wet.");
    expect(text).toContain("in brackets, thin");
    expect(text).toContain("*: a bare mouth would do better.");
    expect(text).toContain("magnetic heading = true + 1.3 deg on 2026-07-01"); // west of north is added
    expect(text).not.toContain("~:");
    expect(text).not.toContain("tiles");
  });

  it("says that magnetic headings are the true ones where a compass shows no difference", () => {
    const at = (declinationDeg: number) =>
      flowing(textOf([row], { plan: { ...plan, sites: [{ ...plan.sites[0]!, declinationDeg }] } }));
    for (const small of [0.04, -0.04, 0]) {
      expect(at(small)).toContain("magnetic heading = the true one on 2026-07-01");
    }
    expect(at(0.06)).toContain("magnetic heading = true - 0.1 deg on 2026-07-01");
  });

  it("marks a heading that a short locator leaves open, and terrain that is not whole", () => {
    const text = textOf([
      { ...row, name: "vague", headingErrorDeg: 2 },
      { ...row, name: "far", terrain: "none" },
      { ...row, name: "holed", terrain: "gaps" },
      { ...row, name: "good", terrain: "whole" },
    ]);
    expect(lineOf(text, "vague")).toContain("~63.1");
    expect(lineOf(text, "far")).toContain("!S/R");
    expect(lineOf(text, "holed")).toContain("?S/R");
    expect(lineOf(text, "good")).toContain(" S/R");
    for (const said of ["~: a short locator", "!: beyond the terrain's tiles", "?: the tiles have gaps"]) {
      expect(flowing(text)).toContain(said);
    }
  });

  it("cuts long names so that it keeps to 80 columns", () => {
    const long = {
      ...row,
      name: "A hill with a name that goes on and on for more than a line of any report has",
    };
    const text = textOf([long, row]);
    expect(widest(text)).toBeLessThanOrEqual(80);
    expect(text).toMatch(/^A hill with[^…]*… {2}/m);
  });

  it("has no column for what there is none of", () => {
    const dryPlan = { ...plan, weathers: ["clear"], covers: ["bare"] };
    const dry = {
      ...row,
      magneticDeg: undefined,
      weathers: [{ ...row.weathers[0]!, covers: [row.weathers[0]!.covers[1]!] }],
    };
    const text = rosterText({
      plan: { ...dryPlan, sites: [{ ...plan.sites[0]!, declinationDeg: undefined }] },
      lines: [[rosterLine(dry, dryPlan)]],
      sort: "name",
      notes: ["one note"],
      date: "2026-07-01",
    });
    expect(lineOf(text, "Plover").split(/ {2,}/)).toEqual([
      "Plover, Edge",
      "123",
      "63.1",
      "S",
      "21.0",
      "out",
      "ssb",
    ]);
    expect(flowing(text)).toContain("no magnetic headings");
    expect(text).toContain("  - one note");
  });

  it("tells every doubt about the paths once, but those that it shows", () => {
    const beyond = { code: "beyond_horizon", message: "past the horizon" };
    const text = flowing(textOf([row, { ...row, name: "Second", doubts: [...row.doubts, beyond] }]));
    expect(text).toContain("- Plover, Edge and 1 more: the far field begins at 200 m");
    expect(text).not.toContain("past the horizon");
  });

  it("says that no station is left", () => {
    expect(textOf([])).toContain("From own hill: 0 stations");
  });

  it("never calls anything safe, and reminds of the hazards", () => {
    expect(textOf([row])).not.toMatch(/\bsafe\b/i);
    expect(textOf([row])).toContain("Caution");
  });
});

describe("a roster as data", () => {
  it("has a row for each own cover and mode, dry beside wet", () => {
    const rows = csvParse(rosterCsvHead + rosterCsvLines(row));
    expect(rows.map(({ cover, mode: one }) => [cover, one])).toEqual([
      ["old lid", "ssb"],
      ["old lid", "cw"],
      ["bare", "ssb"],
      ["bare", "cw"],
    ]);
    expect({ ...rows[1] }).toEqual({
      from: "own hill",
      name: "Plover, Edge",
      row: "4",
      locator: "IO93fk",
      latitude: "53.5",
      longitude: "-1.9",
      ground_m: "402",
      distance_km: "123.457",
      score_km: "123",
      heading_true_deg: "63.14",
      heading_magnetic_deg: "64.39",
      heading_error_deg: "0",
      back_heading_true_deg: "244.9",
      terrain: "",
      doubts: "near_field",
      cover: "old lid",
      mode: "cw",
      dry_weather: "clear",
      dry_way: "line_of_sight",
      dry_out_db: "30",
      dry_back_db: "35",
      dry_margin_db: "30",
      dry_margin_sigma_db: "2",
      dry_verdict: "closes",
      dry_best_mode: "ssb",
      wet_weather: "storm",
      wet_way: "rain_scatter",
      wet_out_db: "2",
      wet_back_db: "0.5",
      wet_margin_db: "0.5",
      wet_margin_sigma_db: "2",
      wet_verdict: "thin",
      wet_best_mode: "cw",
    });
  });

  it("leaves the wet half empty where there is no rain", () => {
    const [first] = csvParse(rosterCsvHead + rosterCsvLines({ ...row, weathers: [row.weathers[0]!] }));
    expect(first).toMatchObject({
      dry_verdict: "closes",
      wet_weather: "",
      wet_verdict: "",
      wet_best_mode: "",
    });
  });

  it("is a line of JSON, rounded to what anybody can use", () => {
    const text = rosterJsonLine(row);
    expect(text.endsWith("}\n") && text.indexOf("\n") === text.length - 1).toBe(true);
    const found = JSON.parse(text);
    expect(found).toMatchObject({
      name: "Plover, Edge",
      row: 4,
      headingDeg: 63.142,
      scoreKm: 123,
      doubts: ["near_field"],
    });
    expect(found.weathers[1].covers[0]).toMatchObject({
      cover: "old lid",
      best: { mode: "cw", verdict: "thin" },
      modes: [{ mode: "ssb", outDb: -8.04, backDb: -9.5, marginDb: -9.5, verdict: "fails" }, { mode: "cw" }],
    });
  });
});
