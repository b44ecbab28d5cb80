import fc from "fast-check";
import { all, create } from "mathjs";
import { describe, expect, it } from "vitest";
import { findMaterial } from "../../src/cover/materials.ts";
import { mixture } from "../../src/cover/mixture.ts";

const math = create(all!, {});

describe("solid mixed with air", () => {
  // Ulaby & Long 2014, section 4-6 (from memory): dense dry snow (1 + 0.4759 v)^3, the same rule for ice.
  it("dense snow of ice 1.4759^3 is 2.1246 at 60 %", () => {
    expect(mixture({ permittivity: 1.4759 ** 3, lossTangent: 0, solidShare: 0.6 }).permittivity).toBeCloseTo(
      2.1246,
      3,
    );
  });

  // Polystyrene 2.54, 1050 kg/m3; published for foam of about 30 kg/m3: 1.03 (Pozar after von Hippel, from memory).
  it("polystyrene foam of 15 to 30 kg/m3 lies in the range of the table of materials", () => {
    const { low, high } = findMaterial("expanded polystyrene")!.permittivity;
    for (const density of [15, 30]) {
      const foam = mixture({ permittivity: 2.54, lossTangent: 0.0005, solidShare: density / 1050 });
      expect(foam.permittivity).toBeGreaterThan(low);
      expect(foam.permittivity).toBeLessThan(high);
    }
  });

  it("equals the cube of the complex mean of cube roots", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 80, noNaN: true }),
        fc.double({ min: 0, max: 2, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (permittivity, lossTangent, solidShare) => {
          const solid = math.complex(permittivity, -permittivity * lossTangent);
          const root = math.pow(solid, 1 / 3);
          const mean = math.add(1 - solidShare, math.multiply(solidShare, root));
          const expected = math.complex(math.pow(mean as never, 3) as never) as unknown as {
            re: number;
            im: number;
          };
          const mixed = mixture({ permittivity, lossTangent, solidShare });
          expect(mixed.permittivity / expected.re).toBeCloseTo(1, 9);
          expect(mixed.lossTangent).toBeCloseTo(-expected.im / expected.re, 9);
        },
      ),
    );
  });

  it("is air without solid and the solid without air", () => {
    const solid = { permittivity: 3.01, lossTangent: 0.02 };
    expect(mixture({ ...solid, solidShare: 0 }).permittivity).toBe(1);
    expect(mixture({ ...solid, solidShare: 0 }).lossTangent).toBeCloseTo(0, 15);
    const whole = mixture({ ...solid, solidShare: 1 });
    expect(whole.permittivity).toBeCloseTo(3.01, 12);
    expect(whole.lossTangent).toBeCloseTo(0.02, 12);
  });

  it("refuses a share above 1", () => {
    expect(() => mixture({ permittivity: 2, lossTangent: 0, solidShare: 1.2 })).toThrow(/solidShare/);
  });
});
