import { describe, expect, it } from "vitest";
import { inferFeed, type KnownSheet } from "../../src/readings/inferFeed.ts";
import { inferFeedPhase, wrapped } from "../../src/readings/inferFeedPhase.ts";
import { foretell } from "../../src/readings/sheetOnFeed.ts";
import { randomSource } from "./bench.ts";

const frequencyGHz = 10.368;
const layers = [
  { permittivity: 2.1, lossTangent: 0.0004, thicknessMm: 1.5 },
  { permittivity: 2.6, lossTangent: 0.006, thicknessMm: 3 },
  { permittivity: 3.3, lossTangent: 0.008, thicknessMm: 4.2 },
  { permittivity: 2.34, lossTangent: 0.0002, thicknessMm: 6 },
];

/** What the sheets would read on a feed, with noise of the given size in standard uncertainties. */
function readings(returnLossDb: number, phaseDeg: number, noise: () => number, u: readonly [number, number]) {
  return layers.map((layer, i): KnownSheet => {
    const read = foretell({ frequencyGHz, feedReturnLossDb: returnLossDb, phaseDeg, layer, gapMm: 0 });
    return {
      name: `sheet ${i + 1}`,
      layer,
      coveredReturnLossDb: read.returnLossDb + u[0] * noise(),
      insertionLossDb: read.insertionLossDb + u[1] * noise(),
    };
  });
}

const quiet = () => 0;
const u = { returnLossStandardDb: 0.2, lossStandardDb: 0.03 };

describe("a feed from several known sheets", () => {
  it.each([-160, -75, 0, 10, 95, 180])("has its magnitude and its phase of %d degrees", (phaseDeg) => {
    const { outcome, solutions } = inferFeed({
      frequencyGHz,
      sheets: readings(13, phaseDeg, quiet, [0, 0]),
      ...u,
    });
    expect(outcome).toBe("decided");
    expect(solutions[0]!.returnLossDb).toBeCloseTo(13, 4);
    expect(wrapped(solutions[0]!.phaseDeg - phaseDeg)).toBeCloseTo(0, 3);
    expect(solutions[0]!.chiSquared).toBeLessThan(1e-6);
  });

  it("lies in the stated intervals, with noise in all readings", () => {
    const { normal, uniform } = randomSource(51);
    const trials = 150;
    let gammaHeld = 0;
    let phaseHeld = 0;
    for (let trial = 0; trial < trials; trial++) {
      const phaseDeg = 360 * uniform() - 180;
      const gamma = 10 ** (-13 / 20);
      const { solutions } = inferFeed({
        frequencyGHz,
        feedReturnLossDb: 13 + 0.2 * normal(),
        sheets: readings(13, phaseDeg, normal, [0.2, 0.03]),
        ...u,
      });
      if (solutions.some((one) => Math.abs(one.gamma - gamma) <= one.gammaExpanded)) gammaHeld++;
      if (solutions.some((one) => Math.abs(wrapped(one.phaseDeg - phaseDeg)) <= one.phaseExpandedDeg))
        phaseHeld++;
    }
    // at least 95.45 %, for intervals only grow with the residuals; random error 1.7 %
    expect(gammaHeld / trials).toBeGreaterThan(0.91);
    expect(phaseHeld / trials).toBeGreaterThan(0.91);
  });

  it("stays in doubt about the sign with one sheet, as the closed form does", () => {
    const [, sheet] = readings(13, 70, quiet, [0, 0]);
    const { coveredReturnLossDb } = sheet as { coveredReturnLossDb: number };
    const one = { name: "one", layer: layers[1]!, coveredReturnLossDb };
    const found = inferFeed({
      frequencyGHz,
      feedReturnLossDb: 13,
      sheets: [one],
      returnLossStandardDb: 0.05,
    });
    const closed = inferFeedPhase({
      frequencyGHz,
      ...layers[1]!,
      feedReturnLossDb: 13,
      coveredReturnLossDb,
      returnLossStandardDb: 0.05,
    });
    expect(found.outcome).toBe("ambiguous");
    const phases = (list: readonly { phaseDeg: number }[]) =>
      list.map((x) => x.phaseDeg).sort((a, b) => a - b);
    phases(found.solutions).forEach((phaseDeg, i) => {
      expect(phaseDeg).toBeCloseTo(phases(closed.solutions)[i]!, 2);
    });
    expect(found.advice[0]!.decides).toBe(true);
  });

  it("names the sheet that does not fit, and keeps it", () => {
    const { normal } = randomSource(61);
    const good = readings(13, 70, normal, [0.2, 0.03]);
    expect(inferFeed({ frequencyGHz, feedReturnLossDb: 13, sheets: good, ...u }).outlier).toBeUndefined();
    const bad = good.map((sheet, i) =>
      i === 2 ? { ...sheet, coveredReturnLossDb: sheet.coveredReturnLossDb! + 3 } : sheet,
    );
    const found = inferFeed({ frequencyGHz, feedReturnLossDb: 13, sheets: bad, ...u });
    expect(found.outlier?.name).toBe("sheet 3");
    expect(found.residuals).toHaveLength(4);
    expect(found.degreesOfFreedom).toBe(7);
    expect(found.outlier!.chiSquaredWithout).toBeLessThan(found.solutions[0]!.chiSquared);
  });

  it("seldom names a sheet where all are good", () => {
    const { normal } = randomSource(71);
    let named = 0;
    for (let trial = 0; trial < 100; trial++) {
      const sheets = readings(13, 70, normal, [0.2, 0.03]);
      if (inferFeed({ frequencyGHz, feedReturnLossDb: 13 + 0.2 * normal(), sheets, ...u }).outlier) named++;
    }
    expect(named).toBeLessThanOrEqual(12); // 5 expected, random error 2.2
  });

  it("says when a sheet that does nothing leaves the phase open", () => {
    const film = { permittivity: 2.1, lossTangent: 0, thicknessMm: 0.01 };
    const read = foretell({ frequencyGHz, feedReturnLossDb: 13, phaseDeg: 40, layer: film, gapMm: 0 });
    const found = inferFeed({
      frequencyGHz,
      feedReturnLossDb: 13,
      sheets: [{ name: "film", layer: film, coveredReturnLossDb: read.returnLossDb }],
      ...u,
    });
    expect(found.outcome).not.toBe("decided");
  });

  it("refuses too few readings", () => {
    const sheets = [{ name: "one", layer: layers[0]!, coveredReturnLossDb: 10 }];
    expect(() => inferFeed({ frequencyGHz, sheets })).toThrow(/at least two/);
    expect(() => inferFeed({ frequencyGHz, sheets, feedReturnLossDb: 13, lossStandardDb: 0 })).toThrow(
      RangeError,
    );
  });
});
