import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { coveredFeed } from "../../src/cover/coveredFeed.ts";
import { type Layer, layeredSheet } from "../../src/cover/layeredSheet.ts";
import { findMaterial } from "../../src/cover/materials.ts";
import { wavelengthM } from "../../src/numeric/constants.ts";
import type { Scenario } from "../../src/scenario/types.ts";
import { materialThickness } from "../../src/study/materialThickness.ts";
import { type ThicknessQuestion, thickness } from "../../src/study/thickness.ts";
import { usualStock } from "../../src/study/thicknessStock.ts";
import { scenarioOf, spoiled } from "../scenario/sample.ts";

const FREQUENCY_GHZ = 10.368;
const WAVE_MM = 1e3 * wavelengthM(FREQUENCY_GHZ);
const WAVENUMBER = (2 * Math.PI) / WAVE_MM;
/** Of the sample's stub: 14 dB. */
const FEED_GAMMA = 10 ** (-14 / 20);

const filmLayers = "layers: [{ material: FEP film, thickness: 5 mil }]";
const stub = "stub: { return_loss: 14 dB, edge_taper: 10 dB, facing: level }";

/** The sample with other layers in its cover "film", perhaps before a feed of known phase. */
function withLayers(layers: string, feed = stub): Promise<Scenario> {
  return scenarioOf(spoiled([filmLayers, `layers: [${layers}]`], [stub, feed]));
}

const glassy = "{ material: glassy, permittivity: 4, thickness: 1 mm }";

function study(scenario: Scenario, question: Partial<ThicknessQuestion> = {}) {
  return thickness(scenario, { cover: "film", points: 50, costLimitDb: 0.1, ...question });
}

/** Reflection and loss of one layer by the closed form of Airy, written out in real arithmetic: no loss in the layer. */
function losslessSheet(permittivity: number, thicknessMm: number, frequencyGHz = FREQUENCY_GHZ) {
  const index = Math.sqrt(permittivity);
  const r = (1 - index) / (1 + index);
  const finesse = (4 * r * r) / (1 - r * r) ** 2;
  const phase = (WAVENUMBER * frequencyGHz * thicknessMm * index) / FREQUENCY_GHZ;
  const reflected = (finesse * Math.sin(phase) ** 2) / (1 + finesse * Math.sin(phase) ** 2);
  return { gamma: Math.sqrt(reflected), lossDb: -10 * Math.log10(1 - reflected) };
}

/** Cost in the worst phase: the feed's and the sheet's reflection meet. */
function worstPhaseDb({ gamma, lossDb }: { gamma: number; lossDb: number }): number {
  return lossDb + 20 * Math.log10(1 + FEED_GAMMA * gamma);
}

describe("cost by thickness", () => {
  it("is that of the closed form for a layer without loss, its bounds those of the phase", async () => {
    const { points } = study(await withLayers(glassy), { toMm: 12 });
    expect(points).toHaveLength(50);
    expect([points[0]!.thicknessMm, points.at(-1)!.thicknessMm]).toEqual([0, 12]);
    for (const { thicknessMm, costDb, sheetLossDb } of points) {
      const sheet = losslessSheet(4, thicknessMm);
      expect(sheetLossDb).toBeCloseTo(sheet.lossDb, 9);
      expect(costDb.nominal).toBeCloseTo(sheet.lossDb, 9);
      expect(costDb.high).toBeCloseTo(worstPhaseDb(sheet), 9);
      expect(costDb.low).toBeCloseTo(sheet.lossDb + 20 * Math.log10(1 - FEED_GAMMA * sheet.gamma), 9);
    }
  });

  it("at worst is exceeded by no phase, no material of the spread and no frequency of the band", async () => {
    const scenario = await withLayers(
      "{ material: PVDF film, thickness: 1 mm }, { material: PTFE, thickness: 0.5 mm }",
    );
    const { low, high } = findMaterial("PVDF film")!.permittivity;
    const loss = findMaterial("PVDF film")!.lossTangent;
    const ptfe = findMaterial("PTFE")!;
    const share = fc.double({ min: 0, max: 1, noNaN: true });
    fc.assert(
      fc.property(
        fc.record({
          mm: fc.double({ min: 0, max: 30, noNaN: true }),
          share,
          lossShare: share,
          band: share,
          phaseDeg: fc.double({ min: -180, max: 180, noNaN: true }),
        }),
        (draw) => {
          const { asBuilt } = study(
            {
              ...scenario,
              covers: {
                film: {
                  ...scenario.covers["film"]!,
                  layers: scenario.covers["film"]!.layers.map((layer, i) =>
                    i === 0 ? { ...layer, thicknessMm: draw.mm } : layer,
                  ),
                },
              },
            },
            { layer: 0, points: 2, toMm: 31, stock: [], bandGHz: 0.5 },
          );
          const within = (bounds: { low: number; high: number }, part: number) =>
            bounds.low + part * (bounds.high - bounds.low);
          const layers: Layer[] = [
            {
              permittivity: within({ low, high }, draw.share),
              lossTangent: within(loss, draw.lossShare),
              thicknessMm: draw.mm,
            },
            {
              permittivity: within(ptfe.permittivity, draw.share),
              lossTangent: within(ptfe.lossTangent, draw.lossShare),
              thicknessMm: 0.5,
            },
          ];
          const frequencyGHz = FREQUENCY_GHZ - 0.25 + 0.5 * draw.band;
          const sheet = layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
          const one = coveredFeed({ feedReturnLossDb: 14, sheet, phaseDeg: draw.phaseDeg });
          // The spread and the band are sampled, not searched.
          expect(one.insertionLossDb.nominal).toBeLessThanOrEqual(asBuilt.worstCostDb + 0.03);
          expect(one.insertionLossDb.nominal).toBeGreaterThanOrEqual(asBuilt.bestCostDb - 0.03);
          expect(one.returnLossDb.nominal).toBeGreaterThanOrEqual(asBuilt.worstReturnLossDb - 0.1);
        },
      ),
      { numRuns: 200 },
    );
  });

  it("has no bounds where the phase is known and the material too", async () => {
    const known = stub.replace("14 dB", "14 dB, phase: 40 deg");
    const { points, phaseKnown, thinLimit } = study(await withLayers(glassy, known));
    expect(phaseKnown).toBe(true);
    for (const { costDb } of points) expect(costDb.high).toBe(costDb.low);
    expect(thinLimit.nominalMm).toBe(thinLimit.worstPhaseMm);
  });
});

describe("thin limit", () => {
  // A thin sheet reflects k0 t (eps - 1)/2 (Born & Wolf, Principles of Optics, section 1.6, from memory) and then
  // loses 10 log10(1 + that squared).
  it("is that of the thin-sheet formula while the sheet is thin", async () => {
    const { thinLimit } = study(await withLayers(glassy), { costLimitDb: 0.002 });
    const reflected = Math.sqrt(10 ** (0.002 / 10) - 1);
    const thinMm = (2 * reflected) / (WAVENUMBER * 3);
    expect(thinLimit.nominalMm! / thinMm).toBeCloseTo(1, 3);
  });

  it("costs just the limit, on average and in the worst phase", async () => {
    const { nominalMm, worstPhaseMm, worstMm } = study(await withLayers(glassy)).thinLimit;
    expect(losslessSheet(4, nominalMm!).lossDb).toBeCloseTo(0.1, 9);
    expect(worstPhaseDb(losslessSheet(4, worstPhaseMm!))).toBeCloseTo(0.1, 9);
    expect(worstMm!).toBeLessThan(worstPhaseMm!);
    expect(worstPhaseMm!).toBeLessThan(nominalMm!);
  });

  it("is nothing where the other layers cost too much, and has no end in air", async () => {
    const thick = "{ material: FR-4, thickness: 1 mm }";
    const behind = await withLayers(`{ material: FEP, thickness: 2 mm }, ${thick}`);
    expect(study(behind, { layer: 0 }).thinLimit.nominalMm).toBe(0);
    const air = await withLayers("{ material: air, thickness: 3 mm }");
    expect(study(air).thinLimit).toEqual({
      nominalMm: undefined,
      worstPhaseMm: undefined,
      worstMm: undefined,
    });
  });
});

describe("half wave", () => {
  // Born & Wolf, Principles of Optics, section 1.6 (from memory): a half-wave layer leaves the wave alone.
  it("of a layer without loss reflects nothing, in every order", async () => {
    const { tuned } = study(await withLayers(glassy), { toMm: 30 });
    expect(tuned).toHaveLength(4);
    for (const [i, { thicknessMm, halfWaves, point }] of tuned.entries()) {
      expect(thicknessMm).toBeCloseTo(((i + 1) * WAVE_MM) / 4, 9);
      expect(halfWaves).toBeCloseTo(i + 1, 9);
      expect(point.sheetReturnLossDb).toBeGreaterThan(180);
    }
  });

  it("tolerates thickness, permittivity and frequency until the cost meets the limit", async () => {
    const [first, second] = study(await withLayers(glassy), { toMm: 16 }).tuned;
    const { thicknessMm, thicknessRangeMm, permittivityRange, frequencyRangeGHz } = first!;
    const cost = (permittivity = 4, mm = thicknessMm, frequency = FREQUENCY_GHZ) =>
      worstPhaseDb(losslessSheet(permittivity, mm, frequency));
    for (const end of ["low", "high"] as const) {
      expect(cost(4, thicknessRangeMm[end]!)).toBeCloseTo(0.1, 9);
      expect(cost(permittivityRange[end]!)).toBeCloseTo(0.1, 9);
      expect(cost(4, thicknessMm, frequencyRangeGHz[end]!)).toBeCloseTo(0.1, 9);
    }
    expect(thicknessRangeMm.low!).toBeLessThan(thicknessMm);
    expect(thicknessRangeMm.high!).toBeGreaterThan(thicknessMm);
    // The closed form is even in the thickness about each null, so the second order is half as tolerant.
    expect(first!.tolerancePercent! / second!.tolerancePercent!).toBeCloseTo(2, 6);
  });

  it("is judged against plates that are 5 to 10 % off", async () => {
    const verdict = async (material: string, costLimitDb: number) =>
      study(await withLayers(`{ material: own, ${material}, thickness: 1 mm }`), { costLimitDb, toMm: 20 })
        .tuned[0]!.plate;
    expect(await verdict("permittivity: 4", 0.1)).toBe("beyond");
    expect(await verdict("permittivity: 1.5", 0.1)).toBe("selected");
    expect(await verdict("permittivity: 1.5", 0.3)).toBe("usual");
    expect(await verdict("permittivity: 1.02", 0.3)).toBe("any");
    expect(await verdict("permittivity: 4, loss_tangent: 0.05", 0.1)).toBe("never");
  });

  it("becomes a tuned thickness between skins: there the stack reflects least", async () => {
    const skin = "{ material: FR-4, thickness: 0.4 mm }";
    const sandwich = await withLayers(`${skin}, { material: XPS, thickness: 5 mm }, ${skin}`);
    const { tuned, points, layer } = study(sandwich, { points: 3000 });
    expect(layer).toBe(1);
    expect(tuned[0]!.halfWaves).toBeLessThan(0.5);
    const most = Math.max(...points.map(({ sheetReturnLossDb }) => sheetReturnLossDb));
    expect(tuned[0]!.point.sheetReturnLossDb).toBeGreaterThanOrEqual(most);
  });
});

describe("stock", () => {
  it("knows mil and fractions of an inch in millimetres", () => {
    const sizes = new Map(usualStock.map(({ label, thicknessMm }) => [label, thicknessMm]));
    expect(sizes.get("5 mil")).toBeCloseTo(0.127, 12);
    expect(sizes.get("3/32 in")).toBeCloseTo(2.38125, 12);
    expect(sizes.get("0.175 mm")).toBe(0.175);
    expect(sizes.size).toBe(33);
  });

  it("is ranked by its worst cost, within the range or as it was given", async () => {
    const scenario = await withLayers(glassy);
    const ranked = study(scenario, { fromMm: 1, toMm: 8 }).stock;
    const worst = ranked.map(({ point }) => point.worstCostDb);
    expect(worst).toEqual(worst.toSorted((a, b) => a - b));
    expect(ranked.every(({ thicknessMm }) => thicknessMm >= 1 && thicknessMm <= 8)).toBe(true);
    expect(ranked.some(({ label }) => label === "1/4 in")).toBe(true);
    const own = [
      { label: "thick", thicknessMm: 3.6 },
      { label: "half wave", thicknessMm: WAVE_MM / 4 },
    ];
    const given = study(scenario, { stock: own }).stock;
    expect(given.map(({ label }) => label)).toEqual(["half wave", "thick"]);
  });
});

describe("gaps", () => {
  it("of two sheets widen the band against one, about the frequency", async () => {
    const { pair } = study(await withLayers(glassy));
    const { low, high } = pair!.betterBandGHz;
    expect(low!).toBeLessThan(FREQUENCY_GHZ);
    expect(high!).toBeGreaterThan(FREQUENCY_GHZ);
    const twenty = pair!.twentyDbBandGHz!;
    expect(twenty.low!).toBeGreaterThan(low!);
    expect(twenty.high!).toBeLessThan(high!);
    // One sheet by the closed form.
    expect(pair!.singleReturnLossDb).toBeCloseTo(-20 * Math.log10(losslessSheet(4, 1).gamma), 9);
  });

  it("before a feed of known phase beat every other gap of the first half wave", async () => {
    const known = stub.replace("14 dB", "14 dB, phase: 40 deg, aperture: 300 mm");
    const { feedGaps } = study(await withLayers(glassy, known));
    expect(feedGaps.phaseKnown).toBe(true);
    expect(feedGaps.gaps.map(({ fromMm, toMm }) => toMm - fromMm)).toEqual([0, 0]);
    const [first, second] = feedGaps.gaps;
    expect(second!.fromMm - first!.fromMm).toBeCloseTo(WAVE_MM / 2, 9);
    const layers = [{ permittivity: 4, lossTangent: 0, thicknessMm: 1 }];
    const sheet = layeredSheet({
      frequencyGHz: FREQUENCY_GHZ,
      incidenceDeg: 0,
      polarization: "te",
      layers,
    });
    for (let gapMm = 0; gapMm < WAVE_MM / 2; gapMm += 0.1) {
      const there = coveredFeed({
        feedReturnLossDb: 14,
        sheet,
        phaseDeg: 40,
        gapMm,
        frequencyGHz: FREQUENCY_GHZ,
      });
      // A mouth of ten wavelengths collects all but a thousandth.
      expect(there.insertionLossDb.nominal).toBeGreaterThan(first!.insertionLossDb.nominal - 0.002);
    }
    const { low, high } = first!.betterBandGHz!;
    expect([low! < FREQUENCY_GHZ, high! > FREQUENCY_GHZ]).toEqual([true, true]);
  });

  it("with the phase unknown span half waves and promise less the farther they lie", async () => {
    const small = stub.replace("14 dB", "14 dB, aperture: 30 mm");
    const { periodMm, gaps } = study(await withLayers(glassy, small)).feedGaps;
    expect(periodMm).toBeCloseTo(WAVE_MM / 2, 9);
    expect(gaps).toHaveLength(3);
    for (const [i, { fromMm, insertionLossDb, collectedShare }] of gaps.entries()) {
      expect(fromMm).toBeCloseTo(i * periodMm, 9);
      const nearer = gaps[i - 1];
      if (nearer === undefined) continue;
      expect(collectedShare).toBeLessThan(nearer.collectedShare);
      expect(insertionLossDb.low).toBeGreaterThan(nearer.insertionLossDb.low);
      expect(insertionLossDb.high).toBeLessThan(nearer.insertionLossDb.high);
    }
  });
});

describe("what is taken where nothing is said", () => {
  it("the thickest layer that is no air", async () => {
    const layers =
      "{ material: FEP, thickness: 1 mm }, { material: air, thickness: 9 mm }, { material: PC, thickness: 2 mm }";
    expect(study(await withLayers(layers)).layer).toBe(2);
    expect(study(await withLayers(layers), { layer: 0 }).layer).toBe(0);
  });

  it("the end that has the cover, then the transmitter", async () => {
    const scenario = await withLayers(glassy);
    expect(study(scenario)).toMatchObject({ end: "transmitter", feed: "stub", feedReturnLossDb: 14 });
    expect(study(scenario, { end: "receiver" })).toMatchObject({ end: "receiver", feed: "horn" });
    const swapped = {
      ...scenario,
      receiver: { ...scenario.receiver, cover: "film" },
      transmitter: { ...scenario.transmitter, cover: "sheet" },
    };
    expect(study(swapped)).toMatchObject({ end: "receiver", feed: "horn" });
  });

  it("a band of 2 %, and a range past the half wave and past the cover as it is", async () => {
    const { bandGHz, bandGiven, fromMm, toMm } = study(await withLayers(glassy));
    expect(bandGHz).toBeCloseTo(0.20736, 9);
    expect(bandGiven).toBe(false);
    expect(fromMm).toBe(0);
    expect(toMm).toBeGreaterThan(WAVE_MM / 4);
    const thick = await withLayers(glassy.replace("1 mm", "40 mm"));
    expect(study(thick).toMm).toBeGreaterThan(40);
  });
});

describe("warnings", () => {
  it("tell of a thickness beyond ten wavelengths, of unused readings and of an unknown mouth", async () => {
    const codes = (scenario: Scenario, question = {}) =>
      study(scenario, question).warnings.map(({ code }) => code);
    const scenario = await withLayers(glassy);
    expect(codes(scenario)).toEqual(["aperture_unknown"]);
    expect(codes(scenario, { toMm: 10.1 * WAVE_MM })).toContain("very_thick");
    const wide = await withLayers(glassy, stub.replace("14 dB", "14 dB, aperture: 80 mm"));
    expect(codes(wide)).toEqual([]);
    const read = await scenarioOf(
      spoiled([filmLayers, `${filmLayers}\n    measured: { insertion_loss: 0.1 dB }`]),
    );
    expect(codes(read)).toContain("readings_unused");
  });
});

describe("a material's own thicknesses", () => {
  it("half a wave is lambda over twice the index, and the thin limit costs just the limit", () => {
    const fep = findMaterial("FEP film")!;
    const { halfWaveMm, thinLimitMm } = materialThickness(fep, { frequencyGHz: 10.368, limitDb: 0.1 });
    expect(halfWaveMm.nominal).toBeCloseTo(WAVE_MM / 2 / Math.sqrt(2.05), 9);
    expect(halfWaveMm.thin).toBeCloseTo(WAVE_MM / 2 / Math.sqrt(2.1), 9);
    // The film's heat, 0.002 dB of the 0.1, is not in the closed form.
    expect(losslessSheet(2.05, thinLimitMm.nominal!).lossDb).toBeGreaterThan(0.097);
    expect(losslessSheet(2.05, thinLimitMm.nominal!).lossDb).toBeLessThan(0.1);
    expect(thinLimitMm.thin!).toBeLessThan(thinLimitMm.nominal!);
    expect(thinLimitMm.thick!).toBeGreaterThan(thinLimitMm.nominal!);
  });
});
