import { requireFinite, requirePositive } from "../numeric/check.ts";
import { dbToPower, powerToDb } from "../numeric/decibels.ts";
import { fresnelIntegrals } from "../numeric/fresnelIntegrals.ts";
import { bisect } from "../numeric/roots.ts";

/** Sizes of a horn, all in wavelengths; A is across the H plane, B across the E plane. */
export interface PyramidalHornInput {
  readonly guideA: number;
  readonly guideB: number;
  readonly apertureA1: number;
  readonly apertureB1: number;
  /** From the apex of the flare to the aperture, in the E plane. */
  readonly rhoE: number;
  /** The same in the H plane. */
  readonly rhoH: number;
}

export interface PyramidalHorn {
  readonly directivityDbi: number;
  /** Of the horn flared in the E plane only, a ratio. */
  readonly directivityE: number;
  /** Of the horn flared in the H plane only, a ratio. */
  readonly directivityH: number;
}

/**
 * Directivity of a pyramidal horn from the quadratic phase over its aperture.
 *
 *     D_E = (64 a rhoE / (pi b1)) [C^2(x) + S^2(x)],                      x = b1 / sqrt(2 rhoE)
 *     D_H = (4 pi b rhoH / a1) {[C(u) - C(v)]^2 + [S(u) - S(v)]^2},       u, v = (sqrt(rhoH)/a1 +- a1/sqrt(rhoH)) / sqrt 2
 *     D_P = (pi / 32) (D_E / a) (D_H / b)
 *
 * Source: C. A. Balanis, Antenna Theory, 3rd ed., sections 13.2 to 13.4
 * Valid:  apertures above about one wavelength; a lossless, matched horn, so directivity and gain are one
 */
export function pyramidalHorn(input: PyramidalHornInput): PyramidalHorn {
  for (const [name, value] of Object.entries(input)) requirePositive(name, value);
  const { guideA, guideB, apertureA1, apertureB1, rhoE, rhoH } = input;
  const e = fresnelIntegrals(apertureB1 / Math.sqrt(2 * rhoE));
  const directivityE = ((64 * guideA * rhoE) / (Math.PI * apertureB1)) * (e.c ** 2 + e.s ** 2);

  const inner = Math.sqrt(rhoH) / apertureA1;
  const u = fresnelIntegrals((inner + 1 / inner) / Math.SQRT2);
  const v = fresnelIntegrals((inner - 1 / inner) / Math.SQRT2);
  const directivityH = ((4 * Math.PI * guideB * rhoH) / apertureA1) * ((u.c - v.c) ** 2 + (u.s - v.s) ** 2);

  const directivity = (Math.PI / 32) * (directivityE / guideA) * (directivityH / guideB);
  return { directivityDbi: powerToDb(directivity), directivityE, directivityH };
}

export interface OptimumHorn extends PyramidalHornInput {
  /** From the guide to the aperture, along the axis; the same in both planes, so the horn can be built. */
  readonly lengthE: number;
}

/**
 * Sizes of the shortest pyramidal horn for a gain on a given guide, in wavelengths.
 *
 *     (sqrt(2 chi) - b)^2 (2 chi - 1) = (G/(2 pi) sqrt(3/(2 pi chi)) - a)^2 (G^2/(6 pi^3 chi) - 1)
 *     rhoE = chi,  rhoH = G^2/(8 pi^3 chi),  a1 = G/(2 pi) sqrt(3/(2 pi chi)),  b1 = sqrt(2 chi)
 *
 * Source: C. A. Balanis, Antenna Theory, 3rd ed., section 13.4.2
 * Valid:  aperture larger than the guide; the horn turns out within about 0.1 dB of the gain asked for
 *
 * @throws RangeError where no such horn exists for this gain and guide
 */
export function optimumHorn({
  gainDbi,
  guideA,
  guideB,
}: {
  gainDbi: number;
  guideA: number;
  guideB: number;
}): OptimumHorn {
  requireFinite("gainDbi", gainDbi);
  requirePositive("guideA", guideA);
  requirePositive("guideB", guideB);
  const gain = dbToPower(gainDbi);
  const a1 = (chi: number) => (gain / (2 * Math.PI)) * Math.sqrt(3 / (2 * Math.PI * chi));
  const lengthMismatch = (chi: number) =>
    (Math.sqrt(2 * chi) - guideB) ** 2 * (2 * chi - 1) -
    (a1(chi) - guideA) ** 2 * (gain ** 2 / (6 * Math.PI ** 3 * chi) - 1);
  const start = gain / (2 * Math.PI * Math.sqrt(2 * Math.PI));
  const chi = bisect(lengthMismatch, start / 2, start * 2);
  if (chi === undefined || a1(chi) <= guideA || Math.sqrt(2 * chi) <= guideB) {
    throw new RangeError(
      `no optimum horn of ${gainDbi} dBi fits a guide of ${guideA} x ${guideB} wavelengths`,
    );
  }
  const b1 = Math.sqrt(2 * chi);
  return {
    guideA,
    guideB,
    apertureA1: a1(chi),
    apertureB1: b1,
    rhoE: chi,
    rhoH: gain ** 2 / (8 * Math.PI ** 3 * chi),
    lengthE: (b1 - guideB) * Math.sqrt((chi / b1) ** 2 - 0.25),
  };
}
