import { requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { abs, abs2, multiply, polar } from "../numeric/complex.ts";
import { RADIANS_PER_DEGREE, wavelengthM } from "../numeric/constants.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import { gaussRule } from "../numeric/quadrature.ts";
import { type Layer, layeredSheet, type Sheet } from "./layeredSheet.ts";

/** Rays over the beam: the loss of a sheet of three wavelengths then holds to 2e-5 dB, that of ten to 0.04 dB. */
const NODES = 16;

export interface SheetOverBeamInput {
  readonly frequencyGHz: number;
  readonly layers: readonly Layer[];
  readonly exponent: number;
  readonly halfAngleDeg: number;
  readonly dome?: { readonly radiusMm: number; readonly centreBehindMm: number } | undefined;
}

export interface SheetOverBeam extends Sheet {
  /** Mean of |T|^2 over the beam, whatever the phases. */
  readonly meanPowerTransmission: number;
  /** Transmission loss over the beam less that straight on [dB]. */
  readonly spreadDb: number;
}

/**
 * A sheet seen by the whole beam of a feed instead of straight on.
 *
 * Averages over the feed's power pattern cos^n(theta) up to a half angle, TE and TM in equal shares, since a
 * linear wave meets both as the azimuth goes round. Reflection and transmission are complex averages: what the
 * sheet returns into, or passes on in, the feed's own pattern, which is what the match and the dish see. Both
 * being projections on one pattern, |R|^2 + |T|^2 never exceeds 1 and `coveredFeed` may use them as any sheet;
 * the reflection straight on beside an averaged T would break that. T of a ray counts against the air that the
 * sheet replaces, for only a difference of phase across the beam does harm. `absorbedFraction` is the mean
 * over the beam; what |R|^2, |T|^2 and it leave of 1 goes into other directions.
 *
 * Flat sheet: incidence = theta. Dome: spherical cap of radius r, its centre d behind the phase centre; by the
 * sine rule in the triangle of both centres and the point hit, sin(incidence) = (d/r) sin(theta). A cap around
 * the phase centre (d = 0) is met straight on everywhere.
 *
 * Source: own derivation; plane-wave sheet at each angle by `layeredSheet`
 * Valid:  locally flat sheet, plane wave along each ray; `nearMouth` says how far that may be trusted
 *
 * @param frequencyGHz  [GHz], above 0
 * @param layers        feed side first
 * @param exponent      n of the feed's power pattern, at least 0
 * @param halfAngleDeg  edge of the beam from its axis [deg], above 0 to 89
 * @param dome          radiusMm above 0; centreBehindMm 0 to radiusMm; absent: flat
 * @returns the fields of a sheet, meanPowerTransmission, spreadDb
 * @throws RangeError on an argument outside these ranges
 */
export function sheetOverBeam({
  frequencyGHz,
  layers,
  exponent,
  halfAngleDeg,
  dome,
}: SheetOverBeamInput): SheetOverBeam {
  requireNotNegative("exponent", exponent);
  requirePositive("halfAngleDeg", halfAngleDeg);
  requireWithin("halfAngleDeg", halfAngleDeg, 0, 89);
  const bend = dome === undefined ? 1 : bendOf(dome);
  const thicknessMm = layers.reduce((sum, layer) => sum + layer.thicknessMm, 0);
  const airPhase = (2e-3 * Math.PI * thicknessMm) / wavelengthM(frequencyGHz);

  const { nodes, weights } = gaussRule(NODES);
  const half = (halfAngleDeg * RADIANS_PER_DEGREE) / 2;
  // Sums of real and imaginary parts, not of complex objects: this runs for every cover at every start.
  let whole = 0;
  let reflectedRe = 0;
  let reflectedIm = 0;
  let passedRe = 0;
  let passedIm = 0;
  let power = 0;
  let absorbed = 0;
  for (let i = 0; i < NODES; i++) {
    const theta = half * (1 + nodes[i]!);
    const weight = weights[i]! * Math.cos(theta) ** exponent * Math.sin(theta);
    const incidence = Math.asin(bend * Math.sin(theta));
    const incidenceDeg = incidence / RADIANS_PER_DEGREE;
    const te = layeredSheet({ frequencyGHz, layers, incidenceDeg, polarization: "te" });
    const tm = layeredSheet({ frequencyGHz, layers, incidenceDeg, polarization: "tm" });
    // TE and TM in equal shares; the transmission against the air that the sheet replaces.
    reflectedRe += weight * (te.reflection.re + tm.reflection.re);
    reflectedIm += weight * (te.reflection.im + tm.reflection.im);
    const air = airPhase * Math.cos(incidence);
    const re = te.transmission.re + tm.transmission.re;
    const im = te.transmission.im + tm.transmission.im;
    passedRe += weight * (re * Math.cos(air) - im * Math.sin(air));
    passedIm += weight * (re * Math.sin(air) + im * Math.cos(air));
    power += weight * (abs2(te.transmission) + abs2(tm.transmission));
    absorbed += weight * (te.absorbedFraction + tm.absorbedFraction);
    whole += 2 * weight;
  }
  const reflection = { re: reflectedRe / whole, im: reflectedIm / whole };
  const transmission = multiply({ re: passedRe / whole, im: passedIm / whole }, polar(1, -airPhase));
  const transmissionLossDb = 0 - amplitudeToDb(abs(transmission));
  const straightOn = layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
  return {
    reflection,
    transmission,
    transmissionLossDb,
    returnLossDb: 0 - amplitudeToDb(abs(reflection)),
    absorbedFraction: absorbed / whole,
    meanPowerTransmission: power / whole,
    spreadDb: transmissionLossDb - straightOn.transmissionLossDb,
  };
}

/** sin(incidence)/sin(theta) of a dome. */
function bendOf({ radiusMm, centreBehindMm }: { radiusMm: number; centreBehindMm: number }): number {
  requirePositive("dome.radiusMm", radiusMm);
  requireWithin("dome.centreBehindMm", centreBehindMm, 0, radiusMm);
  return centreBehindMm / radiusMm;
}
