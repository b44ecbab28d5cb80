import fc from "fast-check";
import { all, create, type MathType } from "mathjs";
import { describe, expect, it } from "vitest";
import { type Layer, layeredSheet, layerOf, type Sheet } from "../../src/cover/layeredSheet.ts";
import { abs2, type Complex } from "../../src/numeric/complex.ts";
import { wavelengthM } from "../../src/numeric/constants.ts";
import { describeReference, num } from "../reference.ts";
import { parseStack } from "./stack.ts";

const math = create(all!, {});

const layer = fc.record({
  permittivity: fc.double({ min: 1, max: 80, noNaN: true }),
  lossTangent: fc.double({ min: 0, max: 2, noNaN: true }),
  thicknessMm: fc.double({ min: 0, max: 20, noNaN: true }),
});
const wave = fc.record({
  frequencyGHz: fc.double({ min: 1, max: 50, noNaN: true }),
  incidenceDeg: fc.double({ min: 0, max: 85, noNaN: true }),
  polarization: fc.constantFrom("te" as const, "tm" as const),
});
const stack = fc.array(layer, { maxLength: 6 });

function expectSameComplex(actual: Complex, expected: Complex, tolerance: number): void {
  expect(Math.hypot(actual.re - expected.re, actual.im - expected.im)).toBeLessThan(tolerance);
}

function expectSameWave(actual: Sheet, expected: Sheet, tolerance: number): void {
  expectSameComplex(actual.reflection, expected.reflection, tolerance);
  expectSameComplex(actual.transmission, expected.transmission, tolerance);
}

/** The matrix product written out with the complex matrices of mathjs: shares no code and no rearrangement. */
function byMatrices(
  frequencyGHz: number,
  incidenceDeg: number,
  polarization: "te" | "tm",
  layers: readonly Layer[],
) {
  const k0 = math.divide(2 * Math.PI, wavelengthM(frequencyGHz) * 1e3) as number;
  const angle = (incidenceDeg * Math.PI) / 180;
  const y0 = polarization === "te" ? Math.cos(angle) : 1 / Math.cos(angle);
  const j = math.complex(0, 1);
  let product: MathType = math.identity(2) as MathType;
  for (const { permittivity, lossTangent, thicknessMm } of layers) {
    const eps = math.complex(permittivity, -permittivity * lossTangent);
    const q = math.sqrt(math.subtract(eps, Math.sin(angle) ** 2) as never) as never;
    const y = polarization === "te" ? q : (math.divide(eps, q) as never);
    const d = math.multiply(k0 * thicknessMm, q) as never;
    const js = math.multiply(j, math.sin(d));
    product = math.multiply(
      product as never,
      [
        [math.cos(d), math.divide(js, y)],
        [math.multiply(js, y), math.cos(d)],
      ] as never,
    );
  }
  const [b, c] = (
    math.multiply(product as never, [1, y0] as never) as unknown as { toArray(): never[] }
  ).toArray();
  const sum = math.add(math.multiply(y0, b!), c!) as never;
  const difference = math.subtract(math.multiply(y0, b!), c!) as never;
  const plain = (value: unknown): Complex => {
    const { re, im } = math.complex(value as never) as unknown as Complex;
    return { re, im };
  };
  return { reflection: plain(math.divide(difference, sum)), transmission: plain(math.divide(2 * y0, sum)) };
}

describe("published examples", () => {
  // Orfanidis, Electromagnetic Waves and Antennas, ch. 5 (from memory): quarter-wave slab of n = 1.5.
  it("a quarter-wave slab of index 1.5 reflects -0.3846, 14.79 % of the power", () => {
    const thicknessMm = (wavelengthM(10) * 1e3) / 6;
    const sheet = layeredSheet({
      frequencyGHz: 10,
      incidenceDeg: 0,
      polarization: "te",
      layers: [{ permittivity: 2.25, lossTangent: 0, thicknessMm }],
    });
    expect(sheet.reflection.re).toBeCloseTo(-0.3846, 4);
    expect(sheet.reflection.im).toBeCloseTo(0, 12);
    expect(100 * abs2(sheet.reflection)).toBeCloseTo(14.79, 2);
  });

  // Born & Wolf, Principles of Optics, section 1.6 (from memory): a half-wave layer has no effect on the reflected power.
  it("a half-wave slab reflects nothing", () => {
    const layers = [{ permittivity: 4, lossTangent: 0, thicknessMm: (wavelengthM(10) * 1e3) / 4 }];
    const sheet = layeredSheet({ frequencyGHz: 10, incidenceDeg: 0, polarization: "te", layers });
    expect(sheet.returnLossDb).toBeGreaterThan(300);
    expect(sheet.transmissionLossDb).toBeCloseTo(0, 12);
  });

  // Born & Wolf, section 1.5 (from memory): at Brewster's angle, tan theta = n, a TM wave passes whole.
  it("at Brewster's angle a TM wave passes at any thickness", () => {
    const incidenceDeg = (Math.atan(Math.sqrt(2.08)) * 180) / Math.PI;
    const layers = [{ permittivity: 2.08, lossTangent: 0, thicknessMm: 3.3 }];
    const sheet = layeredSheet({ frequencyGHz: 10.4, incidenceDeg, polarization: "tm", layers });
    expect(sheet.returnLossDb).toBeGreaterThan(280);
  });

  // Own closed form of two equal sheets, 2 k0 s = arg(G^2 - T^2), evaluated apart from this program.
  it("two 0.5 mm sheets cancel at a gap of 6.7256 mm, short of a quarter wave", () => {
    const skin = { permittivity: 2.08, lossTangent: 0, thicknessMm: 0.5 };
    const reflected = (gapMm: number) =>
      layeredSheet({
        frequencyGHz: 10,
        incidenceDeg: 0,
        polarization: "te",
        layers: [skin, { permittivity: 1, lossTangent: 0, thicknessMm: gapMm }, skin],
      }).returnLossDb;
    expect(reflected(6.7256)).toBeGreaterThan(75);
    expect(reflected(6.7256)).toBeGreaterThan(reflected(6.71));
    expect(reflected(6.7256)).toBeGreaterThan(reflected(6.74));
  });
});

describeReference("covers/check-slab.csv", (row) => {
  const sheet = layeredSheet({
    frequencyGHz: num(row, "f_ghz"),
    incidenceDeg: num(row, "theta_deg"),
    polarization: row["pol"] === "TE" ? "te" : "tm",
    layers: parseStack(row["stack"]!),
  });
  const tolerance = num(row, "tol");
  const near = (actual: number, column: string, within = tolerance) =>
    expect(Math.abs(actual - num(row, column)), `${row["id"]} ${column}`).toBeLessThanOrEqual(within);
  near(abs2(sheet.reflection), "refl_power");
  near(abs2(sheet.transmission), "trans_power");
  near(sheet.absorbedFraction, "absorbed_power");
  near(sheet.transmissionLossDb, "loss_db", 1e-3);
  if (row["gamma_re"] !== "") {
    near(sheet.reflection.re, "gamma_re");
    near(sheet.reflection.im, "gamma_im");
    near(sheet.transmission.re, "t_re");
    near(sheet.transmission.im, "t_im");
  }
});

describe("against an independent computation", () => {
  it("equals the product of complex matrices", () => {
    fc.assert(
      fc.property(wave, fc.array(layer, { minLength: 1, maxLength: 4 }), (input, layers) => {
        // Beyond some 200 neper the written-out cosines have no digits left for the comparison.
        fc.pre(layers.every((one) => one.thicknessMm * input.frequencyGHz < 300));
        const expected = byMatrices(input.frequencyGHz, input.incidenceDeg, input.polarization, layers);
        const sheet = layeredSheet({ ...input, layers });
        expectSameComplex(sheet.reflection, expected.reflection, 1e-9);
        expectSameComplex(sheet.transmission, expected.transmission, 1e-9);
      }),
      { numRuns: 300 },
    );
  });

  // Airy's closed form of one slab, Born & Wolf section 7.6.
  it("equals the Airy form of one slab", () => {
    const [frequencyGHz, permittivity, thicknessMm] = [10.368, 2.6, 2.3];
    const d = (2 * Math.PI * thicknessMm * 1e-3 * Math.sqrt(permittivity)) / wavelengthM(frequencyGHz);
    const r = (1 - Math.sqrt(permittivity)) / (1 + Math.sqrt(permittivity));
    const f = (4 * r * r) / (1 - r * r) ** 2;
    const reflected = (f * Math.sin(d) ** 2) / (1 + f * Math.sin(d) ** 2);
    const layers = [{ permittivity, lossTangent: 0, thicknessMm }];
    const sheet = layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "tm", layers });
    expect(abs2(sheet.reflection)).toBeCloseTo(reflected, 14);
    expect(abs2(sheet.transmission)).toBeCloseTo(1 - reflected, 14);
  });
});

describe("what every stack obeys", () => {
  it("keeps the energy: reflected, passed and absorbed make 1, none is negative", () => {
    fc.assert(
      fc.property(wave, stack, (input, layers) => {
        const { reflection, transmission, absorbedFraction, transmissionLossDb } = layeredSheet({
          ...input,
          layers,
        });
        const gone = 1 - abs2(reflection) - abs2(transmission);
        expect(gone).toBeGreaterThan(-1e-12);
        expect(absorbedFraction).toBeGreaterThanOrEqual(0);
        expect(absorbedFraction).toBeCloseTo(gone, 11);
        if (transmissionLossDb < 3000) {
          expect(transmissionLossDb).toBeCloseTo(-10 * Math.log10(abs2(transmission)), 7);
        }
      }),
    );
  });

  it("a lossless stack absorbs nothing", () => {
    fc.assert(
      fc.property(wave, stack, (input, layers) => {
        const lossless = layers.map((one) => ({ ...one, lossTangent: 0 }));
        expect(layeredSheet({ ...input, layers: lossless }).absorbedFraction).toBeLessThan(1e-11);
      }),
    );
  });

  it("is exactly air without layers and with layers of no thickness", () => {
    fc.assert(
      fc.property(wave, stack, (input, layers) => {
        for (const flat of [[], layers.map((one) => ({ ...one, thicknessMm: 0 }))]) {
          const sheet = layeredSheet({ ...input, layers: flat });
          expect(sheet).toEqual({
            reflection: { re: 0, im: 0 },
            transmission: { re: 1, im: 0 },
            transmissionLossDb: 0,
            returnLossDb: Infinity,
            absorbedFraction: 0,
          });
        }
      }),
    );
  });

  it("passes the same wave from either side", () => {
    fc.assert(
      fc.property(wave, stack, (input, layers) => {
        const there = layeredSheet({ ...input, layers });
        const back = layeredSheet({ ...input, layers: [...layers].reverse() });
        expectSameComplex(there.transmission, back.transmission, 1e-11);
      }),
    );
  });

  it("does not notice a layer cut in two", () => {
    fc.assert(
      fc.property(
        wave,
        stack,
        layer,
        fc.double({ min: 0, max: 1, noNaN: true }),
        (input, outer, whole, share) => {
          const cut = [share, 1 - share].map((part) => ({ ...whole, thicknessMm: part * whole.thicknessMm }));
          expectSameWave(
            layeredSheet({ ...input, layers: [...cut, ...outer] }),
            layeredSheet({ ...input, layers: [whole, ...outer] }),
            1e-11,
          );
        },
      ),
    );
  });

  it("has no difference of TE and TM straight on", () => {
    fc.assert(
      fc.property(wave, stack, (input, layers) => {
        const straight = { frequencyGHz: input.frequencyGHz, incidenceDeg: 0, layers };
        expectSameWave(
          layeredSheet({ ...straight, polarization: "te" }),
          layeredSheet({ ...straight, polarization: "tm" }),
          1e-12,
        );
      }),
    );
  });
});

describe("far corners", () => {
  it("keeps a finite loss where the wave itself is too small for a double", () => {
    const layers = [{ permittivity: 60, lossTangent: 0.8, thicknessMm: 2000 }];
    const one = layeredSheet({ frequencyGHz: 47, incidenceDeg: 30, polarization: "tm", layers });
    const two = layeredSheet({
      frequencyGHz: 47,
      incidenceDeg: 30,
      polarization: "tm",
      layers: [...layers, ...layers],
    });
    expect(one.transmission).toEqual({ re: 0, im: 0 });
    expect(one.transmissionLossDb).toBeGreaterThan(10_000);
    expect(two.transmissionLossDb / one.transmissionLossDb).toBeCloseTo(2, 3);
    expectSameComplex(one.reflection, two.reflection, 1e-14);
  });

  it("takes a permittivity eps' - j eps'' as a layer", () => {
    expect(layerOf({ real: 50, imaginary: 40 }, 0.1)).toEqual({
      permittivity: 50,
      lossTangent: 0.8,
      thicknessMm: 0.1,
    });
  });

  it.each([
    [{ permittivity: 0.9, lossTangent: 0, thicknessMm: 1 }],
    [{ permittivity: 2, lossTangent: -0.1, thicknessMm: 1 }],
    [{ permittivity: 2, lossTangent: 0, thicknessMm: -1 }],
    [{ permittivity: 2, lossTangent: 0, thicknessMm: Infinity }],
    [{ permittivity: Number.NaN, lossTangent: 0, thicknessMm: 1 }],
  ])("refuses %o and names it", (bad) => {
    const good = { permittivity: 2, lossTangent: 0, thicknessMm: 1 };
    const input = { frequencyGHz: 10, incidenceDeg: 0, polarization: "te" as const };
    expect(() => layeredSheet({ ...input, layers: [good, bad] })).toThrow(/layers\[1\]/);
  });

  it("refuses an angle along the sheet and a frequency of 0", () => {
    const input = { frequencyGHz: 10, incidenceDeg: 90, polarization: "te" as const, layers: [] };
    expect(() => layeredSheet(input)).toThrow(/incidenceDeg/);
    expect(() => layeredSheet({ ...input, incidenceDeg: 0, frequencyGHz: 0 })).toThrow(/frequencyGHz/);
  });
});
