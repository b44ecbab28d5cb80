import { mkdirSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it, vi } from "vitest";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import { turned } from "../../src/budget/towards.ts";
import { modes } from "../../src/receiver/modes.ts";
import type { Station } from "../../src/scenario/rosterRow.ts";
import type { Scenario } from "../../src/scenario/types.ts";
import { type RosterRow, rosterStudy, scoreDistanceKm } from "../../src/study/roster.ts";
import {
  dishLike,
  driest,
  mostDemandingFirst,
  ownCoverFirst,
  patternOf,
  type RosterPlan,
  suitedDishes,
  wettest,
} from "../../src/study/rosterPlan.ts";
import { coverOf, dishOf, feedOf, layerOf, scenarioOf, siteOf, weatherOf } from "../budget/scenarios.ts";
import { temporaryFolder } from "../cli/run.ts";
import { writeTile } from "../scenario/terrain/tiles.ts";

const prepared = vi.hoisted(() => ({ count: 0, mouths: 0 }));
vi.mock("../../src/budget/prepare.ts", async (original) => {
  const real = await original<typeof import("../../src/budget/prepare.ts")>();
  return {
    ...real,
    prepare: (scenario: Scenario) => {
      prepared.count++;
      return real.prepare(scenario);
    },
  };
});
vi.mock("../../src/cover/coveredFeed.ts", async (original) => {
  const real = await original<typeof import("../../src/cover/coveredFeed.ts")>();
  return {
    ...real,
    coveredFeed: (input: Parameters<typeof real.coveredFeed>[0]) => {
      prepared.mouths++;
      return real.coveredFeed(input);
    },
  };
});

const film = coverOf({ layers: [layerOf(1, 2.5, 0.01)], surface: "wetting" });
const scenario = scenarioOf({
  covers: { bare: coverOf(), film, lid: coverOf({ layers: [layerOf(3, 3, 0.02)] }) },
  weather: {
    fog: weatherOf({ fogGPerM3: 0.1 }),
    clear: weatherOf(),
    drizzle: weatherOf({ rainMmPerH: { value: 1 } }),
    storm: weatherOf({ rainMmPerH: { value: 40 }, extentKm: 8 }),
  },
  receiver: { modes: ["cw", "ssb"] },
  path: {
    from: siteOf({ latitude: 53, longitude: -2, groundM: 400 }),
    to: siteOf({ latitude: 60, heightM: 5 }),
  },
});

function planOf(change: Partial<RosterPlan> = {}): RosterPlan {
  return {
    scenario,
    folder: ".",
    sites: [{ name: "own hill", site: scenario.path.from, declinationDeg: 2.5 }],
    weathers: ["clear", "storm"],
    modes: ["ssb", "cw"],
    covers: ["film", "bare", "lid"],
    bothWays: true,
    filter: {},
    ...change,
  };
}

function stationOf(change: Partial<Station> = {}): Station {
  return {
    line: 2,
    name: "there",
    latitude: 53.4,
    longitude: -1.5,
    locator: undefined,
    positionErrorKm: 0,
    groundM: 300,
    heightM: undefined,
    powerDbm: undefined,
    dish: undefined,
    noiseFigureDb: undefined,
    mode: undefined,
    ...change,
  };
}

async function rowOf(plan: RosterPlan, station: Station): Promise<RosterRow> {
  const { rows } = await (await rosterStudy(plan))(station);
  return rows[0]!;
}

describe("a station of a roster", () => {
  it("has the margins of its own scenario, both ways, under every cover in every mode", async () => {
    const station = stationOf({
      powerDbm: { value: 30 },
      noiseFigureDb: { value: 2 },
      dish: { diameterM: 1.2 },
    });
    const far = { ...siteOf(), latitude: 53.4, longitude: -1.5, groundM: 300, heightM: 5 };
    const own: Scenario = {
      ...scenario,
      path: { from: scenario.path.from, to: far },
      dish: { ...scenario.dish, theirs: dishOf({ diameterM: 1.2 }) },
      receiver: { ...scenario.receiver, dish: "theirs" },
    };
    const out = prepare({ ...own, receiver: { ...own.receiver, noiseFigureDb: { value: 2 } } });
    const back = prepare({
      ...turned(own),
      transmitter: { ...turned(own).transmitter, powerDbm: { value: 30 } },
    });
    const row = await rowOf(planOf(), station);
    expect(row.weathers.map(({ weather }) => weather)).toEqual(["clear", "storm"]);
    for (const { weather, way, covers } of row.weathers) {
      expect(covers.map(({ cover }) => cover)).toEqual(["film", "bare", "lid"]);
      for (const { cover, modes: rows } of covers) {
        expect(rows.map(({ mode }) => mode)).toEqual(["ssb", "cw"]);
        for (const one of rows) {
          const [near, there] = [
            { feed: "stub", cover },
            { feed: "stub", cover: "film" },
          ];
          const heard = evaluate(out, { weather, mode: one.mode, transmitter: near, receiver: there });
          const hears = evaluate(back, { weather, mode: one.mode, transmitter: there, receiver: near });
          expect(one.outDb).toBeCloseTo(heard.marginDb, 9);
          expect(one.backDb).toBeCloseTo(hears.marginDb, 9);
          expect(one.marginDb).toBeCloseTo(Math.min(heard.marginDb, hears.marginDb), 9);
          expect(way).toBe(heard.mechanisms[0]!.name);
        }
      }
    }
  });

  it("needs both ways to close", async () => {
    const [deaf, loud] = await Promise.all([
      rowOf(planOf(), stationOf({ powerDbm: { value: -130 } })),
      rowOf(planOf({ bothWays: false }), stationOf({ powerDbm: { value: -130 } })),
    ]);
    expect(deaf.weathers[0]!.covers[0]!.best).toBeUndefined();
    expect(loud.weathers[0]!.covers[0]!.best).toEqual({ mode: "ssb", verdict: "closes" });
    expect(loud.weathers[0]!.covers[0]!.modes[0]!.backDb).toBeUndefined();
  });

  it("is best by the most demanding mode that closes, and by a thin one where none does", async () => {
    const fading = async (powerDbm: number) => {
      const plan = planOf({
        bothWays: false,
        scenario: {
          ...scenario,
          transmitter: { ...scenario.transmitter, powerDbm: { value: powerDbm, sigma: 0 } },
        },
      });
      const { best, modes: rows } = (await rowOf(plan, stationOf())).weathers[0]!.covers[0]!;
      return { best, verdicts: rows.map(({ verdict }) => verdict) };
    };
    const seen = new Set<string>();
    for (let powerDbm = -130; powerDbm <= -30; powerDbm += 1) {
      const { best, verdicts } = await fading(powerDbm);
      const [ssb, cw] = verdicts;
      const wanted =
        ssb === "closes"
          ? "ssb"
          : cw === "closes"
            ? "cw"
            : ssb === "thin"
              ? "ssb"
              : cw === "thin"
                ? "cw"
                : undefined;
      expect(best?.mode).toBe(wanted);
      seen.add(`${best?.mode} ${best?.verdict}`);
    }
    expect([...seen].sort()).toEqual(["cw closes", "cw thin", "ssb closes", "undefined undefined"]);
  });

  it("is judged in its own mode alone where it names one", async () => {
    const row = await rowOf(planOf(), stationOf({ mode: "fm" }));
    for (const { covers } of row.weathers) {
      for (const { modes: rows } of covers) expect(rows.map(({ mode }) => mode)).toEqual(["fm"]);
    }
  });

  it("has its headings, the magnetic one less the declination, and its distance for scoring", async () => {
    // Due east along the equator: 1 deg is 111.3195 km on WGS84 (its radius 6378.137 km).
    const equator = { ...scenario, path: { ...scenario.path, from: siteOf() } };
    const plan = planOf({ scenario: equator, sites: [{ name: "own", site: siteOf(), declinationDeg: 100 }] });
    const row = await rowOf(plan, stationOf({ latitude: 0, longitude: 1 }));
    expect(row.distanceKm).toBeCloseTo(111.3195, 4);
    expect(row.headingDeg).toBeCloseTo(90, 9);
    expect(row.backHeadingDeg).toBeCloseTo(270, 9);
    expect(row.magneticDeg).toBeCloseTo(350, 9);
    expect(row.headingErrorDeg).toBe(0);
  });

  it("has no path from its own place, nor from the other end of the Earth", async () => {
    const study = await rosterStudy(planOf());
    const here = await study(stationOf({ latitude: 53, longitude: -2 }));
    const antipode = await study(stationOf({ latitude: -53, longitude: 178 }));
    expect([here.rows, antipode.rows]).toEqual([[], []]);
    expect(here.noPaths[0]!.message).toContain("the same place as own hill");
    expect(antipode.noPaths[0]!.message).toMatch(
      /^a path of (19|20)\d\d\d km from own hill, expected at most 10000/,
    );
  });

  it("stands at sea level where nothing is known of its ground, and that is said", async () => {
    const study = await rosterStudy(planOf());
    const { rows, assumed } = await study(stationOf({ groundM: undefined }));
    expect([rows[0]!.groundM, assumed.ground]).toEqual([0, true]);
    expect((await study(stationOf())).assumed.ground).toBe(false);
  });

  it("carries the doubts of its budget", async () => {
    const near = stationOf({ latitude: 53.0001, groundM: 400, longitude: -2, dish: { diameterM: 3 } });
    const { doubts } = await rowOf(planOf(), near);
    expect(doubts.map(({ code }) => code)).toContain("near_field");
    const far = await rowOf(planOf(), stationOf({ latitude: 57, positionErrorKm: 40 }));
    expect(far.doubts.map(({ code }) => code)).toEqual(
      expect.arrayContaining(["beyond_horizon", "locator_too_short"]),
    );
    expect((await rowOf(planOf(), stationOf({ groundM: 700 }))).doubts).toEqual([]);
  });

  it("is seen from every site", async () => {
    const second = siteOf({ latitude: 54, longitude: -2, groundM: 100 });
    const plan = planOf({
      sites: [...planOf().sites, { name: "second", site: second, declinationDeg: undefined }],
    });
    const { rows } = await (await rosterStudy(plan))(stationOf());
    expect(rows.map(({ from }) => from)).toEqual(["own hill", "second"]);
    const moved = planOf({
      scenario: { ...scenario, path: { ...scenario.path, from: second } },
      sites: [{ name: "second", site: second, declinationDeg: undefined }],
    });
    expect({ ...rows[1], site: 0 }).toEqual(await rowOf(moved, stationOf()));
  });
});

describe("the work of a roster", () => {
  it("prepares a link for each way once, and no mouth after that but for another dish", async () => {
    prepared.count = 0;
    const study = await rosterStudy(planOf());
    expect(prepared.count).toBe(2);
    const once = prepared.mouths;
    for (let i = 0; i < 50; i++) await study(stationOf({ longitude: -1 + i / 100, heightM: i }));
    expect([prepared.count, prepared.mouths]).toEqual([2, once]);
    for (let i = 0; i < 5; i++) await study(stationOf({ dish: { diameterM: 2 } }));
    const withDish = prepared.mouths;
    for (let i = 0; i < 5; i++) await study(stationOf({ dish: { diameterM: 2 } }));
    expect(prepared.mouths).toBe(withDish);
  });
});

describe("the distance for scoring", () => {
  const inSquare = { latitude: 53.001, longitude: -1.999 };

  it("runs between the centres of squares of six characters", () => {
    // Squares of 2.5 by 5 minutes: ten of them up are 25 minutes, some 46.4 km at 53 deg N on WGS84 (from memory).
    expect(scoreDistanceKm(inSquare, { latitude: 53.001 + 25 / 60, longitude: -1.999 })).toBe(46);
    expect(scoreDistanceKm(inSquare, { latitude: 53.04 + 25 / 60, longitude: -1.92 })).toBe(46);
  });

  it("is 1 within a square, and that of the shorter locator where one is shorter", () => {
    expect(scoreDistanceKm(inSquare, { latitude: 53.04, longitude: -1.92 })).toBe(1);
    // IO93 has its centre at 53.5 N, 1 W.
    const centre = { latitude: 53.5, longitude: -1 };
    const somewhere = { latitude: 53.1, longitude: -1.9, locator: "IO93" };
    expect(scoreDistanceKm({ ...inSquare, locator: "IO93aa" }, somewhere)).toBeCloseTo(
      scoreDistanceKm(inSquare, { ...centre, latitude: 53.4999 }),
      -1,
    );
    expect(scoreDistanceKm(inSquare, somewhere)).toBeGreaterThan(80);
  });
});

describe("terrain of a roster", () => {
  const folder = temporaryFolder();
  mkdirSync(join(folder, "dem"));
  // A wall of 1500 m along 53.5 N, all else 200 m.
  writeTile(join(folder, "dem"), "N53W002.hgt", 1201, (row) => (Math.abs(row - 600) <= 5 ? 1500 : 200));
  const from = siteOf({ latitude: 53.1, longitude: -1.5, groundM: 200 });
  const plan = planOf({
    scenario: { ...scenario, path: { ...scenario.path, from, terrain: "dem" } },
    folder,
    sites: [{ name: "own", site: { ...from, groundM: undefined }, declinationDeg: 0 }],
  });

  it("stands in the way, and tells the ground of those who do not", async () => {
    const study = await rosterStudy(plan);
    const behind = await study(stationOf({ latitude: 53.9, longitude: -1.5, groundM: undefined }));
    const before = await study(stationOf({ latitude: 53.13, longitude: -1.5, groundM: 210 }));
    expect([behind.rows[0]!.terrain, behind.rows[0]!.groundM, behind.assumed.ground]).toEqual([
      "whole",
      200,
      false,
    ]);
    expect(behind.rows[0]!.weathers[0]!.way).not.toBe("line_of_sight");
    expect([before.rows[0]!.weathers[0]!.way, before.rows[0]!.groundM]).toEqual(["line_of_sight", 210]);
  });

  it("does not reach a station beyond its tiles, which is kept and marked", async () => {
    const beyond = stationOf({ latitude: 54.5, longitude: -1.5, groundM: undefined });
    const { rows, assumed } = await (await rosterStudy(plan))(beyond);
    expect(rows[0]!.terrain).toBe("none");
    expect(assumed.noTerrain).toContain("no tile N54W002");
    const smooth = planOf({
      scenario: { ...scenario, path: { ...scenario.path, from } },
      sites: [{ name: "own", site: from, declinationDeg: 0 }],
    });
    const alone = await rowOf(smooth, beyond);
    expect(rows[0]!.weathers).toEqual(alone.weathers);
    expect(alone.terrain).toBeUndefined();
  });
});

describe("a broken tile", () => {
  it("costs no station", async () => {
    const folder = temporaryFolder();
    writeTile(folder, "N53W002.hgt", 5, () => 0);
    const from = siteOf({ latitude: 53.1, longitude: -1.5 });
    const study = await rosterStudy(
      planOf({
        scenario: { ...scenario, path: { ...scenario.path, from, terrain: folder } },
        sites: [{ name: "own", site: { ...from, groundM: undefined }, declinationDeg: 0 }],
      }),
    );
    const { rows, assumed } = await study(stationOf());
    expect([rows[0]!.terrain, rows[0]!.groundM]).toEqual(["none", 300]);
    expect(assumed.noTerrain).toMatch(/^N53W002\.hgt: tile of 50 bytes/);
  });
});

describe("the plan of a roster", () => {
  it("takes the first weather without rain or wet covers for dry, the one with the most rain for wet", () => {
    expect([driest(scenario), wettest(scenario)]).toEqual(["clear", "storm"]);
    const damp = {
      ...scenario,
      weather: { dew: weatherOf({ dewMm: { value: 0.1 } }), fog: weatherOf({ fogGPerM3: 1 }) },
    };
    expect([driest(damp), wettest(damp)]).toEqual(["dew", undefined]);
  });

  it("has voice before telegraphy", () => {
    expect(mostDemandingFirst({ ...scenario, modes }, ["cw", "ssb", "wfm", "fm", "cw"])).toEqual([
      "wfm",
      "fm",
      "ssb",
      "cw",
    ]);
  });

  it("has the own cover first", () => {
    expect(ownCoverFirst(scenario)).toEqual(["film", "bare", "lid"]);
  });

  it("knows which dishes the partner's feed can light", () => {
    const { edgeTaperDb: _, ...plain } = feedOf();
    const dish = { shaped: dishOf(), plain: dishOf({ focalRatio: undefined, efficiency: 0.5 }) };
    expect(suitedDishes({ ...scenario, dish })).toEqual(["shaped", "plain"]);
    expect(suitedDishes({ ...scenario, dish, feeds: { stub: plain } })).toEqual(["plain"]);
  });

  it("makes a dish of another size like the partner's, or a plain one where that is of no known shape", () => {
    expect(dishLike(scenario, { diameterM: 0.1 })).toEqual({ ...dishOf(), diameterM: 0.1, blockageM: 0.05 });
    expect(dishLike(scenario, { gainDbi: { value: 30 } })).toMatchObject({
      gainDbi: { value: 30 },
      pointingErrorDeg: 0.5,
    });
    const horn = { ...scenario, receiver: { ...scenario.receiver, dish: undefined } };
    expect(dishLike(horn, { diameterM: 0.6 })).toMatchObject({ diameterM: 0.6, efficiency: 0.5 });
  });

  it("leaves out what belongs to the scenario's far place", () => {
    const { path, weather } = patternOf(
      { ...scenario, path: { ...scenario.path, foliageM: { from: 5, to: 5 }, coastKm: { to: 3 }, k: 1.2 } },
      ["storm"],
    );
    expect(Object.keys(weather)).toEqual(["storm"]);
    expect([path.foliageM, path.coastKm, path.k]).toEqual([undefined, undefined, 1.2]);
  });
});
