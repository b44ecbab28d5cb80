import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Budget } from "../../src/budget/types.ts";
import type { Profile } from "../../src/path/profile.ts";
import type { ScenarioPath } from "../../src/scenario/types.ts";
import { budgetOf, codesOf, eastOnEquator, entryOf, scenarioOf, siteOf, weatherOf } from "./scenarios.ts";

const dry = weatherOf();
const pouring = weatherOf({ rainMmPerH: { value: 50 }, extentKm: 5 });

/** Sixty kilometres between two hills of 500 m with antennas at 502 m, on the equator. */
function over(profile: Profile | undefined, change: Partial<ScenarioPath> = {}, weather = dry): Budget {
  const path = { from: siteOf(), to: eastOnEquator(60), profile, ...change };
  return budgetOf(scenarioOf({ path, weather: { now: weather } }));
}

/** Low ground between the hills, points a kilometre apart, with bumps by kilometre. */
function valley(bumps: Readonly<Record<number, number>>, coverM?: readonly number[]): Profile {
  const distancesKm = Array.from({ length: 61 }, (_, km) => km);
  return { distancesKm, heightsM: distancesKm.map((km) => bumps[km] ?? (km % 60 === 0 ? 500 : 0)), coverM };
}

const onPath = ({ entries }: Budget) => entries.filter(({ stage }) => stage === "path").map(({ id }) => id);
const names = ({ mechanisms }: Budget) => mechanisms.map(({ name }) => name);

describe("line of sight", () => {
  it("is all that is known without terrain, within the horizon", () => {
    const budget = over(undefined);
    expect(names(budget)).toEqual(["line_of_sight"]);
    expect(onPath(budget)).toEqual(["path.free_space", "path.gas"]);
  });

  it("costs nothing over low terrain, and gives the margin that no terrain gives", () => {
    const budget = over(valley({}));
    expect(names(budget)).toEqual(["line_of_sight"]);
    expect(budget.marginDb).toBe(over(undefined).marginDb);
  });
});

describe("diffraction over one ridge", () => {
  // By hand: half-way the Earth (8494.7 km) rises 500 * 30 * 30 / 8494.7 = 52.97 m, so that a top at 479.03 m stands
  // 30 m over the ray. nu = 30 sqrt(2 * 60000 / (0.028916 * 30000^2)) = 2.0372, J = 6.9 + 20 log 4.1172 = 19.192 dB
  // (P.526-15, equation 31), and for the whole profile 19.192 + (1 - exp(-19.192 / 6)) (10 + 0.02 * 60) = 29.935 dB
  // (P.452-18, equation 22). The ground below the hills is too deep for a rounded Earth to add to that.
  const ridge = over(valley({ 30: 479.03 }));

  it("is an entry of the path with the loss worked out by hand", () => {
    expect(names(ridge)[0]).toBe("diffraction");
    expect(entryOf(ridge, "path.diffraction").db).toBeCloseTo(-29.935, 2);
    expect(over(valley({})).marginDb - ridge.marginDb).toBeCloseTo(29.935, 2);
  });

  // Common practice, no source: 3 dB for a single bare ridge, 8 for woods or several obstacles.
  it("is known to 3 dB, with trees on it or a second ridge to 8", () => {
    const trees = Array.from({ length: 61 }, (_, km) => (km === 30 ? 10 : 0));
    const sigma = (profile: Profile) => entryOf(over(profile), "path.diffraction").sigma;
    expect(entryOf(ridge, "path.diffraction").sigma).toBe(3);
    expect(sigma(valley({ 30: 479.03 }, trees))).toBe(8);
    expect(sigma(valley({ 30: 479.03, 40: 500 }))).toBe(8);
  });

  it("grows as rays bend less", () => {
    const loss = (k: number) => -entryOf(over(valley({ 30: 479.03 }), { k }), "path.diffraction").db;
    expect(loss(1)).toBeGreaterThan(loss(4 / 3));
    expect(loss(4 / 3)).toBeGreaterThan(loss(3));
  });
});

describe("troposcatter", () => {
  /** Antennas at 20 m by the sea, so far apart that diffraction is out of the question. */
  const far = (distanceKm: number) => {
    const site = { groundM: 10, heightM: 10 };
    return budgetOf(
      scenarioOf({
        path: { from: siteOf(site), to: eastOnEquator(distanceKm, site) },
        weather: { now: dry },
      }),
    );
  };

  // By hand for 300 km over the sea: the horizon of 20 m lies sqrt(2 * 8494.7 * 0.02) = 18.43 km off, so that theta is
  // 1000 (300 - 36.87) / 8494.7 = 30.98 mrad. P.617-5 with N0 = 325 and dN = 39.25:
  // F = 0.18 * 325 - 0.23 * 39.25 = 49.47; 22 log 10368 = 88.35; 35 log 30.98 = 52.19; 17 log 300 = 42.11: 232.12 dB,
  // and 162.30 dB in free space (P.525-4). What is left to add is the coupling of the two gains.
  it("carries a path far past the horizon, by the sum worked out by hand", () => {
    const budget = far(300);
    expect(names(budget)[0]).toBe("troposcatter");
    const gains = budget.entries.filter(({ id }) =>
      /^(tx|rx)\.(aperture|spillover|illumination|blockage|surface|pointing|gain|other)/.test(id),
    );
    const coupling = 0.07 * Math.exp(0.055 * gains.reduce((total, { db }) => total + db, 0));
    expect(-entryOf(budget, "path.troposcatter").db).toBeCloseTo(232.12 - 162.3 + coupling, 0);
    expect(entryOf(budget, "path.troposcatter").sigma).toBe(7);
    expect(codesOf(budget)).toContain("beyond_horizon");
  });

  it("gives way to diffraction where the other end is just below the horizon", () => {
    expect(names(far(40))[0]).toBe("diffraction");
  });
});

describe("rain scatter", () => {
  const blocked = valley({ 30: 1500 });

  it("is a way in rain alone", () => {
    expect(names(over(blocked))).not.toContain("rain_scatter");
    expect(names(over(blocked, {}, weatherOf({ rainMmPerH: { value: 0.4 } })))).not.toContain("rain_scatter");
    expect(names(over(blocked, {}, pouring))).toContain("rain_scatter");
  });

  it("is told to smear the signal where it carries the path, and there alone", () => {
    const carried = over(valley({ 30: 3500 }), {}, pouring);
    expect(carried.mechanisms[0]!.name).toBe("rain_scatter");
    expect(codesOf(carried)).toContain("scatter_spreads");
    const other = over(undefined, {}, pouring);
    expect(other.mechanisms[0]!.name).toBe("line_of_sight");
    expect(codesOf(other)).not.toContain("scatter_spreads");
  });

  // Bistatic radar equation by hand, 50 mm/h at 30 km from both ends: Z = 200 * 50^1.6 (Marshall and Palmer 1948);
  // eta = pi^5 * 0.93 * Z 1e-18 / lambda^4; the cell is 2 ln 2 / 1.6 * (10 - 1.5 log 50) / ln(50 / 0.4) km wide
  // (P.452-18); beams of 3.43 deg are 1.80 km wide there. The rain of the tropics reaches 5 km; the ridge at 1500 m,
  // seen at 33.3 mrad from either end, hides the lowest 1.5 km.
  it("has the loss of the radar equation", () => {
    const budget = over(blocked, {}, pouring);
    const rate = 50;
    const lambda = 0.299792458 / 10.368;
    const eta = (Math.PI ** 5 * 0.93 * 200 * rate ** 1.6 * 1e-18) / lambda ** 4;
    const cellKm = ((2 * Math.LN2) / 1.6) * ((10 - 1.5 * Math.log10(rate)) / Math.log(rate / 0.4));
    const perBeam = (30 * ((3.43 * Math.PI) / 180)) ** -2;
    const across = Math.sqrt(cellKm ** -2 * (2 * perBeam + cellKm ** -2) * (2 * perBeam + 3.5 ** -2));
    const volumeKm3 = (Math.PI / (4 * Math.LN2)) ** 1.5 / across;
    const lossDb = 73.4399 + 20 * Math.log10(10.368) - 10 * Math.log10((eta * volumeKm3) / 30 ** 4);
    const found = budget.mechanisms.find(({ name }) => name === "rain_scatter")!;
    expect(Math.abs(found.lossDb - lossDb)).toBeLessThan(0.2);
  });
});

describe("trees near the ends", () => {
  // 0.2 * 10368^0.3 * 20^0.6 = 19.34 dB and 1.33 * 10.368^0.284 * 20^0.588 = 15.04 dB (CCIR Report 236-2 as in OET
  // Bulletin 70; Weissberger 1982): 17.19 dB, and 40 % of it are 6.9 dB.
  it("are an entry by both rules of thumb", () => {
    const { db, low, high, sigma } = entryOf(
      over(undefined, { foliageM: { from: 20, to: 0 } }),
      "path.foliage",
    );
    expect(db).toBeCloseTo(-17.19, 1);
    expect(high).toBeCloseTo(-15.04, 1);
    expect(low).toBeCloseTo(-19.34, 1);
    expect(sigma).toBeCloseTo(6.9, 1);
  });

  it("count at either end alike, and not at all where there are none", () => {
    const at = (from: number, to: number) => over(undefined, { foliageM: { from, to } }).marginDb;
    expect(at(12, 0)).toBeCloseTo(at(0, 12), 9);
    expect(at(0, 0)).toBe(over(undefined).marginDb);
  });
});

describe("any ground", () => {
  const anyProfile = fc
    .array(fc.integer({ min: 0, max: 900 }), { minLength: 3, maxLength: 60 })
    .map((heightsM): Profile => {
      return { distancesKm: heightsM.map((_, i) => (60 * i) / (heightsM.length - 1)), heightsM };
    });

  it("leaves a budget that adds up, by the way of least loss, with gas charged once", () => {
    fc.assert(
      fc.property(anyProfile, fc.constantFrom(dry, pouring), (profile, weather) => {
        const budget = over(profile, {}, weather);
        const { entries, receivedDbm, mechanisms } = budget;
        const total = entries.reduce((sum, { db }) => sum + db, 0);
        expect(Math.abs(total - receivedDbm)).toBeLessThan(1e-9);
        const excess = mechanisms.map(({ excessDb }) => excessDb);
        expect(excess[0]).toBe(Math.min(...excess));
        expect(onPath(budget).filter((id) => id === "path.gas")).toHaveLength(1);
        const open = over(undefined, {}, weather);
        expect(Math.abs(open.marginDb - excess[0]! - budget.marginDb)).toBeLessThan(1e-9);
        expect(entryOf(budget, "path.gas")).toEqual(entryOf(open, "path.gas"));
      }),
      { numRuns: 60 },
    );
  });
});

describe("doubts about terrain", () => {
  it("name ground that the site and the profile have apart", () => {
    const warnings = over(valley({ 0: 440 })).warnings.filter(({ code }) => code === "ground_differs");
    expect(warnings).toMatchObject([{ where: "path.from.ground" }]);
    expect(warnings[0]!.message).toMatch(/440 m where the site says 500 m/);
  });

  it("name stretches without heights", () => {
    const at = { latitude: 0, longitude: 0.1 };
    const gap = { reason: "void", source: "N00E000", fromKm: 11, toKm: 12.5, at, points: 4 } as const;
    const { warnings } = over(valley({}), { gaps: [gap] });
    expect(warnings.find(({ code }) => code === "terrain_gap")?.message).toMatch(/11\.0 to 12\.5 km/);
  });

  it("do not call a path with terrain past its horizon", () => {
    const low = { groundM: 5, heightM: 5 };
    const change = { from: siteOf(low), to: eastOnEquator(60, low) };
    expect(codesOf(over(undefined, change))).toContain("beyond_horizon");
    expect(codesOf(over(valley({ 0: 5, 60: 5 }), change))).not.toContain("beyond_horizon");
  });
});
