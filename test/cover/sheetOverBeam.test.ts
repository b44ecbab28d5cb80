import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type Layer, layeredSheet } from "../../src/cover/layeredSheet.ts";
import { sheetOverBeam } from "../../src/cover/sheetOverBeam.ts";
import { abs2 } from "../../src/numeric/complex.ts";

const acrylic = { permittivity: 2.6, lossTangent: 0.007, thicknessMm: 2 };
const horn = { exponent: 4, halfAngleDeg: 40 };

/** Mean of |T|^2 by a plain midpoint sum over theta, the incidence at each theta from outside. */
function meanPower(layers: readonly Layer[], incidenceRad: (theta: number) => number): number {
  const steps = 4000;
  let sum = 0;
  let whole = 0;
  for (let i = 0; i < steps; i++) {
    const theta = ((i + 0.5) / steps) * ((horn.halfAngleDeg * Math.PI) / 180);
    const weight = Math.cos(theta) ** horn.exponent * Math.sin(theta);
    for (const polarization of ["te", "tm"] as const) {
      const incidenceDeg = (incidenceRad(theta) * 180) / Math.PI;
      sum +=
        weight * abs2(layeredSheet({ frequencyGHz: 10.4, incidenceDeg, polarization, layers }).transmission);
      whole += weight;
    }
  }
  return sum / whole;
}

describe("a flat sheet over the beam", () => {
  // Evaluated apart from this program: 0 to 40 deg, cos^4, both polarisations, moves the power passed by under 0.03 dB.
  it.each([
    [1.5, 2],
    [1.5, 4],
    [3, 2],
    [3, 4],
    [2.2, 3],
  ])("%d mm of %d passes the same power within 0.03 dB as straight on", (thicknessMm, permittivity) => {
    const layers = [{ permittivity, lossTangent: 0.002, thicknessMm }];
    const beam = sheetOverBeam({ frequencyGHz: 10.4, layers, ...horn });
    const straightOn = layeredSheet({ frequencyGHz: 10.4, incidenceDeg: 0, polarization: "te", layers });
    const moved = -10 * Math.log10(beam.meanPowerTransmission) - straightOn.transmissionLossDb;
    expect(Math.abs(moved)).toBeLessThan(0.03);
    expect(Math.abs(beam.spreadDb)).toBeLessThan(0.1);
  });

  it("equals a plain sum over the angles", () => {
    const beam = sheetOverBeam({ frequencyGHz: 10.4, layers: [acrylic], ...horn });
    expect(beam.meanPowerTransmission).toBeCloseTo(
      meanPower([acrylic], (theta) => theta),
      7,
    );
  });

  it("is the sheet straight on for a pencil beam", () => {
    const beam = sheetOverBeam({ frequencyGHz: 10.4, layers: [acrylic], exponent: 4, halfAngleDeg: 0.01 });
    const straightOn = layeredSheet({
      frequencyGHz: 10.4,
      incidenceDeg: 0,
      polarization: "te",
      layers: [acrylic],
    });
    expect(beam.transmission.re).toBeCloseTo(straightOn.transmission.re, 7);
    expect(beam.transmission.im).toBeCloseTo(straightOn.transmission.im, 7);
    expect(beam.reflection.re).toBeCloseTo(straightOn.reflection.re, 7);
    expect(beam.spreadDb).toBeCloseTo(0, 7);
  });

  it("air of any thickness is no sheet at all", () => {
    const air = { permittivity: 1, lossTangent: 0, thicknessMm: 50 };
    const beam = sheetOverBeam({ frequencyGHz: 10.4, layers: [air], ...horn });
    expect(beam.transmissionLossDb).toBeCloseTo(0, 10);
    expect(beam.returnLossDb).toBeGreaterThan(250);
  });

  it("stays passive, and no coherent mean passes more than the mean of the power", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 30, noNaN: true }),
        fc.double({ min: 0, max: 0.5, noNaN: true }),
        fc.double({ min: 0, max: 20, noNaN: true }),
        fc.double({ min: 1, max: 85, noNaN: true }),
        (permittivity, lossTangent, thicknessMm, halfAngleDeg) => {
          const layers = [{ permittivity, lossTangent, thicknessMm }];
          const beam = sheetOverBeam({ frequencyGHz: 10.4, layers, exponent: 3, halfAngleDeg });
          expect(abs2(beam.transmission)).toBeLessThanOrEqual(beam.meanPowerTransmission + 1e-12);
          const accounted = abs2(beam.reflection) + abs2(beam.transmission) + beam.absorbedFraction;
          expect(accounted).toBeLessThanOrEqual(1 + 1e-10);
        },
      ),
      { numRuns: 60 },
    );
  });
});

describe("a dome", () => {
  it("around the phase centre is met straight on everywhere", () => {
    const dome = { radiusMm: 60, centreBehindMm: 0 };
    const beam = sheetOverBeam({ frequencyGHz: 10.4, layers: [acrylic], ...horn, dome });
    expect(beam.spreadDb).toBeCloseTo(0, 10);
  });

  it("takes the incidence that a traced ray finds", () => {
    const dome = { radiusMm: 80, centreBehindMm: 50 };
    // Ray from the origin along (sin, cos); sphere of the radius around (0, -50): point hit, then angle to its normal.
    const traced = (theta: number) => {
      const [x, z] = [Math.sin(theta), Math.cos(theta)];
      const way = -50 * z + Math.sqrt((50 * z) ** 2 - (50 ** 2 - 80 ** 2));
      const normal = [(way * x) / 80, (way * z + 50) / 80] as const;
      return Math.acos(Math.min(1, x * normal[0] + z * normal[1]));
    };
    const beam = sheetOverBeam({ frequencyGHz: 10.4, layers: [acrylic], ...horn, dome });
    expect(beam.meanPowerTransmission).toBeCloseTo(meanPower([acrylic], traced), 7);
  });

  it("of great radius, its centre far behind, is the flat sheet", () => {
    const flat = sheetOverBeam({ frequencyGHz: 10.4, layers: [acrylic], ...horn });
    const dome = { radiusMm: 1e9, centreBehindMm: 1e9 };
    const wide = sheetOverBeam({ frequencyGHz: 10.4, layers: [acrylic], ...horn, dome });
    expect(wide.spreadDb).toBeCloseTo(flat.spreadDb, 10);
  });
});

describe("refusals", () => {
  it.each([
    [{ exponent: -1 }, /exponent/],
    [{ halfAngleDeg: 0 }, /halfAngleDeg/],
    [{ halfAngleDeg: 90 }, /halfAngleDeg/],
    [{ dome: { radiusMm: 50, centreBehindMm: 60 } }, /centreBehindMm/],
    [{ dome: { radiusMm: 0, centreBehindMm: 0 } }, /radiusMm/],
  ])("%o", (change, named) => {
    expect(() => sheetOverBeam({ frequencyGHz: 10.4, layers: [acrylic], ...horn, ...change })).toThrow(named);
  });
});
