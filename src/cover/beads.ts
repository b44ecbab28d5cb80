import { requireWithin } from "../numeric/check.ts";
import { abs, abs2, add, type Complex, divide, ONE, scale, subtract } from "../numeric/complex.ts";
import { amplitudeToDb } from "../numeric/decibels.ts";
import { type Bounded, bounded } from "./bounded.ts";
import type { SheetScattering } from "./layeredSheet.ts";

/** Height of the drops on a surface that beads [mm]: middle of the usual 0.5 to 1 mm; common practice, no source. */
export const BEAD_HEIGHT_MM = 0.75;

/**
 * A cover on which water stands in drops, from its dry and its wet parts.
 *
 * Coherent over the mouth: T = (1 - C) T_dry + C T_wet with C the covered share of the area, reflection alike; the
 * excess over dry is -20 log10|1 - C (1 - T_wet/T_dry)|. It need not grow with C all the way: the
 * waves of both parts can cancel in between, and the bounds count that.
 *
 * Source: own form; a loss in proportion to the covered area is what a drop-counting model of the University
 *         of Augsburg finds (abstract, 2025). Covered shares: `surfaceState`.
 * Valid:  drops far smaller than the mouth; what they scatter elsewhere counts as absorbed
 *
 * @param dry           the cover without water
 * @param wet           the cover under a water layer of the drops' height
 * @param coveredShare  share of the area under drops with its limits, 0 to 1
 * @returns reflection and transmission at the nominal share, and excessDb over the dry cover
 * @throws RangeError on a share outside its range
 */
export function beadedSheet({
  dry,
  wet,
  coveredShare,
}: {
  readonly dry: SheetScattering;
  readonly wet: SheetScattering;
  readonly coveredShare: Bounded;
}): SheetScattering & { readonly excessDb: Bounded } {
  const { low, nominal, high } = coveredShare;
  requireWithin("coveredShare.low", low, 0, 1);
  requireWithin("coveredShare.high", high, low, 1);
  requireWithin("coveredShare.nominal", nominal, low, high);

  const lack = subtract(ONE, divide(wet.transmission, dry.transmission));
  const excessAt = (share: number) => 0 - amplitudeToDb(abs(subtract(ONE, scale(lack, share))));
  // |1 - C lack| is convex in C: least where C = Re lack/|lack|^2, greatest at an end.
  const deepest = Math.min(Math.max(lack.re / (abs2(lack) || 1), low), high);
  return {
    reflection: mix(dry.reflection, wet.reflection, nominal),
    transmission: mix(dry.transmission, wet.transmission, nominal),
    excessDb: bounded(Math.min(excessAt(low), excessAt(high)), excessAt(nominal), excessAt(deepest)),
  };
}

function mix(dry: Complex, wet: Complex, share: number): Complex {
  return add(scale(dry, 1 - share), scale(wet, share));
}
