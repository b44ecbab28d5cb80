import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import { wavelengthM } from "../numeric/constants.ts";

export interface NearMouthInput {
  readonly frequencyGHz: number;
  readonly apertureMm: number;
  readonly gapMm: number;
}

export interface NearMouth {
  /** Uncertainty of the sheet's loss from taking the wave as plane [dB], 1 sigma. */
  readonly sigmaLossDb: number;
  /** The same of the change of return loss [dB]. */
  readonly sigmaReturnLossDb: number;
  /** True where even that is a guess, for the reason given. */
  readonly weak: boolean;
  readonly reason?: string;
}

/**
 * How far a plane-wave sheet may be trusted in front of a feed.
 *
 * Edge diffraction, clamping rings and the changed aperture field are what the plane wave leaves out; the
 * spread of incidence angles is the smaller part (`sheetOverBeam`).
 *
 * Source: 0.1 dB or 30 % of the loss, whichever is larger, and 2 dB of return loss: common practice, no source.
 *         Weak below two wavelengths of aperture and beyond a gap of one aperture: own choice.
 *
 * @param apertureMm    width of the mouth [mm], above 0
 * @param gapMm         mouth to sheet [mm], at least 0
 * @param sheetLossDb   loss of the sheet as computed [dB], at least 0
 * @throws RangeError on an argument outside these ranges
 */
export function nearMouth({
  frequencyGHz,
  apertureMm,
  gapMm,
  sheetLossDb,
}: NearMouthInput & { readonly sheetLossDb: number }): NearMouth {
  requireMouth({ frequencyGHz, apertureMm, gapMm });
  requireNotNegative("sheetLossDb", sheetLossDb);
  const sigma = { sigmaLossDb: Math.max(0.1, 0.3 * sheetLossDb), sigmaReturnLossDb: 2 };
  const wavelengths = apertureMm / (1e3 * wavelengthM(frequencyGHz));
  if (wavelengths < 2) {
    const reason = `the mouth is ${wavelengths.toFixed(1)} wavelengths wide: its wave is far from plane`;
    return { ...sigma, weak: true, reason };
  }
  if (gapMm > apertureMm) {
    return {
      ...sigma,
      weak: true,
      reason: "the gap exceeds the width of the mouth: the wave spreads before the sheet",
    };
  }
  return { ...sigma, weak: false };
}

/** Waist radius of the Gaussian beam nearest to the field of a horn's mouth, over its width (from memory). */
const WAIST_OVER_APERTURE = 0.35;

/**
 * Share of the amplitude sent back by a sheet that a feed collects again.
 *
 * The mouth's field is taken as the waist w = 0.35 a of a Gaussian beam. The sheet mirrors it, so that it returns
 * as if from a waist 2 s away; its overlap with the feed's own beam is 1/sqrt(1 + (s/z)^2), z = pi w^2/lambda.
 *
 * Source: own derivation from the coupling of two equal Gaussian beams along one axis (Goldsmith 1998,
 *         Quasioptical Systems, section 4.3, from memory)
 * Valid:  flat sheet across the axis; 1 on the mouth, falling as 1/gap far away; a rough figure
 *
 * @param frequencyGHz  [GHz], above 0
 * @param apertureMm    width of the mouth [mm], above 0
 * @param gapMm         mouth to sheet [mm], at least 0
 * @returns collectedShare, 0 to 1, as `coveredFeed` takes it
 * @throws RangeError on an argument outside these ranges
 */
export function collectedShare({ frequencyGHz, apertureMm, gapMm }: NearMouthInput): {
  collectedShare: number;
} {
  requireMouth({ frequencyGHz, apertureMm, gapMm });
  const waistMm = WAIST_OVER_APERTURE * apertureMm;
  const rayleighMm = (Math.PI * waistMm * waistMm) / (1e3 * wavelengthM(frequencyGHz));
  return { collectedShare: 1 / Math.hypot(1, gapMm / rayleighMm) };
}

function requireMouth({ frequencyGHz, apertureMm, gapMm }: NearMouthInput): void {
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("apertureMm", apertureMm);
  requireNotNegative("gapMm", gapMm);
}
