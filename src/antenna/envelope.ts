import { requireFinite, requirePositive, requireWithin, type Validity } from "../numeric/check.ts";

export const envelopeValidity = { frequencyGHz: [1, 70] } as const satisfies Validity;

export interface EnvelopeInput {
  /** `peak` bounds single side lobes (F.699), `average` their mean (F.1245). */
  readonly kind: "peak" | "average";
  /** Gain on the axis [dBi]. */
  readonly maximumGainDbi: number;
  /** Diameter [wavelengths]; where unknown, see `diameterFromGain`. */
  readonly diameterWavelengths: number;
  /** Angle off the axis [deg], 0 to 180. */
  readonly offAxisDeg: number;
}

/**
 * Gain off the axis of a dish that no pattern is known of, by the envelopes used between fixed links.
 *
 * A main lobe, a shelf at G1 = 2 + 15 log(D/lambda), a fall with 25 log of the angle to 48 deg, a floor. Small
 * steps where the branches meet belong to the envelope.
 *
 * Source: Rec. ITU-R F.699-8 (peak) and F.1245-3 (average); formulas from memory
 * Valid:  1 to 70 GHz; a bound for a sound antenna, not its pattern
 *
 * @throws RangeError on a non-finite or impossible argument
 */
export function offAxisEnvelope({ kind, maximumGainDbi, diameterWavelengths, offAxisDeg }: EnvelopeInput): {
  gainDbi: number;
} {
  requireFinite("maximumGainDbi", maximumGainDbi);
  requirePositive("diameterWavelengths", diameterWavelengths);
  requireWithin("offAxisDeg", offAxisDeg, 0, 180);
  const size = Math.log10(diameterWavelengths);
  const shelf = 2 + 15 * size;
  const shelfFromDeg = (20 / diameterWavelengths) * Math.sqrt(Math.max(0, maximumGainDbi - shelf));
  const { shelfToDeg, fallDbi, floorDbi } = branches(kind, diameterWavelengths, size);

  if (offAxisDeg < shelfFromDeg) {
    return { gainDbi: maximumGainDbi - 2.5e-3 * (diameterWavelengths * offAxisDeg) ** 2 };
  }
  if (offAxisDeg < shelfToDeg) return { gainDbi: shelf };
  return { gainDbi: offAxisDeg < 48 ? fallDbi - 25 * Math.log10(offAxisDeg) : floorDbi };
}

/**
 * Diameter in wavelengths of a dish of known gain, 20 log(D/lambda) = G - 7.7.
 *
 * Source: Rec. ITU-R F.699-8 and F.1245-3 (from memory)
 */
export function diameterFromGain(gainDbi: number): number {
  requireFinite("gainDbi", gainDbi);
  return 10 ** ((gainDbi - 7.7) / 20);
}

/** Where the shelf ends, the fall at 1 deg, and the floor beyond 48 deg; `size` is log(D/lambda). */
function branches(kind: "peak" | "average", diameterWavelengths: number, size: number) {
  const large = diameterWavelengths > 100;
  if (kind === "peak") {
    return large
      ? { shelfToDeg: 15.85 * diameterWavelengths ** -0.6, fallDbi: 32, floorDbi: -10 }
      : { shelfToDeg: 100 / diameterWavelengths, fallDbi: 52 - 10 * size, floorDbi: 10 - 10 * size };
  }
  return large
    ? { shelfToDeg: 12.02 * diameterWavelengths ** -0.6, fallDbi: 29, floorDbi: -13 }
    : { shelfToDeg: 0, fallDbi: 39 - 5 * size, floorDbi: -3 - 5 * size };
}
