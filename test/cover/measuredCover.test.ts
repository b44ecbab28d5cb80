import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { coveredFeed } from "../../src/cover/coveredFeed.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { equivalentLayer, measuredCover } from "../../src/cover/measuredCover.ts";
import { abs, polar } from "../../src/numeric/complex.ts";

describe("a measured cover", () => {
  // Handbook table of mismatch losses: 12 dB return loss 0.2830 dB, 9 dB 0.5844 dB.
  it("0.5 dB with return loss from 12 to 9 dB is 0.3014 dB of mismatch and 0.1986 dB of heat", () => {
    const cover = measuredCover({ feedReturnLossDb: 12, insertionLossDb: 0.5, returnLossChangeDb: 3 });
    expect(cover.coveredReturnLossDb).toBe(9);
    expect(cover.mismatchChangeDb).toBeCloseTo(0.3014, 3);
    expect(cover.dissipationDb).toBeCloseTo(0.1986, 3);
    expect(cover.belowFloorDb).toBe(0);
  });

  it("0.2 dB with the same change lies 0.1014 dB below the floor and leaves no heat", () => {
    const cover = measuredCover({ feedReturnLossDb: 12, insertionLossDb: 0.2, returnLossChangeDb: 3 });
    expect(cover.dissipationDb).toBe(0);
    expect(cover.belowFloorDb).toBeCloseTo(0.1014, 3);
  });

  it("gives a computed cover's parts back, whatever the phase", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 3, max: 40, noNaN: true }),
        fc.double({ min: 0.01, max: 0.8, noNaN: true }),
        fc.double({ min: 0.2, max: 1, noNaN: true }),
        fc.double({ min: -180, max: 180, noNaN: true }),
        (feedReturnLossDb, a, passed, phaseDeg) => {
          const sheet = {
            reflection: polar(a, 0.2),
            transmission: polar(Math.sqrt((1 - a * a) * passed), 0),
          };
          const covered = coveredFeed({ feedReturnLossDb, sheet, phaseDeg });
          const cover = measuredCover({
            feedReturnLossDb,
            insertionLossDb: covered.insertionLossDb.nominal,
            returnLossChangeDb: feedReturnLossDb - covered.returnLossDb.nominal,
          });
          expect(cover.dissipationDb).toBeCloseTo(-10 * Math.log10(passed), 7);
          expect(cover.belowFloorDb).toBeCloseTo(0, 7);
          expect(cover.reflection.low).toBeLessThanOrEqual(a + 1e-9);
          expect(cover.reflection.high).toBeGreaterThanOrEqual(a - 1e-9);
        },
      ),
    );
  });

  it("finds the sheet whose mean return loss over the phase was read", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 3, max: 40, noNaN: true }),
        fc.double({ min: 0.01, max: 0.8, noNaN: true }),
        (feedReturnLossDb, a) => {
          const sheet = { reflection: polar(a, 0), transmission: polar(Math.sqrt(1 - a * a), 0) };
          const read = coveredFeed({ feedReturnLossDb, sheet }).returnLossDb.nominal;
          const returnLossChangeDb = feedReturnLossDb - read;
          const cover = measuredCover({ feedReturnLossDb, insertionLossDb: 1, returnLossChangeDb });
          expect(cover.reflection.nominal / a).toBeCloseTo(1, 6);
        },
      ),
    );
  });

  it("keeps nominal between the limits, also where the match improved", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 40, noNaN: true }),
        fc.double({ min: -20, max: 1, noNaN: true }),
        (feedReturnLossDb, returnLossChangeDb) => {
          fc.pre(returnLossChangeDb < feedReturnLossDb);
          const { low, nominal, high } = measuredCover({
            feedReturnLossDb,
            insertionLossDb: 0.1,
            returnLossChangeDb,
          }).reflection;
          expect(low).toBeLessThanOrEqual(nominal);
          expect(nominal).toBeLessThanOrEqual(high);
        },
      ),
    );
  });

  it("without a change of return loss takes all for heat", () => {
    const cover = measuredCover({ feedReturnLossDb: 14, insertionLossDb: 0.3 });
    expect(cover.dissipationDb).toBe(0.3);
    expect(cover.mismatchChangeDb).toBe(0);
    expect(cover.reflection.nominal).toBe(0);
  });

  it("refuses a change that would leave no return loss, and one from a perfect match", () => {
    const reading = { insertionLossDb: 0.3, returnLossChangeDb: 12 };
    expect(() => measuredCover({ ...reading, feedReturnLossDb: 12 })).toThrow(/coveredReturnLossDb/);
    expect(() => measuredCover({ ...reading, feedReturnLossDb: Infinity })).toThrow(/returnLossChangeDb/);
  });
});

describe("the layer that stands in", () => {
  it("reflects what was asked, by the matrices", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 0.95, noNaN: true }),
        fc.double({ min: 1, max: 50, noNaN: true }),
        (reflection, frequencyGHz) => {
          const layer = equivalentLayer({ reflection, frequencyGHz });
          const sheet = layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers: [layer] });
          expect(abs(sheet.reflection)).toBeCloseTo(reflection, 7);
          expect(layer.lossTangent).toBe(0);
        },
      ),
    );
  });

  // Thin sheet: |G| = k0 t (eps - 1)/2, so 0.05 at 10 GHz with 2.5 is 0.318 mm.
  it("is thin: 0.05 at 10 GHz takes 0.318 mm of 2.5", () => {
    const layer = equivalentLayer({ reflection: 0.05, frequencyGHz: 10 });
    expect(layer.permittivity).toBe(2.5);
    expect(layer.thicknessMm).toBeCloseTo(0.318, 2);
  });

  it("refuses what no layer reflects", () => {
    expect(() => equivalentLayer({ reflection: 1, frequencyGHz: 10 })).toThrow(/reflection/);
    expect(() => equivalentLayer({ reflection: 0.1, frequencyGHz: 0 })).toThrow(/frequencyGHz/);
  });
});
