import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import { dbToPower, powerToDb } from "../numeric/decibels.ts";
import { type CoveredFeedInput, coveredFeed } from "./coveredFeed.ts";

export interface CoverNoiseInput extends Omit<CoveredFeedInput, "collectedShare"> {
  readonly skyK: number;
  readonly coverK: number;
  readonly receiverK: number;
  readonly isolatorK?: number | undefined;
}

export interface CoverNoise {
  /** Available gain from the sky to the throat, the share that is not turned to heat. */
  readonly availableGain: number;
  /** Available noise temperature at the throat. */
  readonly availableNoiseK: number;
  /** Carrier to noise lost against a matched feed without cover, receiver noise independent of its source [dB]. */
  readonly carrierToNoiseChangeDb: number;
  /** The same with a matched isolator between throat and receiver, which radiates back at the mismatch [dB]. */
  readonly carrierToNoiseChangeIsolatorDb: number;
}

/**
 * What a cover costs a receiver: less signal, and the noise of its own warmth.
 *
 * Available gain G_A = |T|^2/(1 - |G|^2), whatever the feed's match and phase, since reflection does not
 * absorb; noise T_av = G_A T_sky + (1 - G_A) T_cover. With an isolator the throat's reflection also counts:
 * G_T = (1 - |Gin|^2) G_A and T = G_T T_sky + (1 - |Gin|^2 - G_T) T_cover + |Gin|^2 T_isolator. With the phase
 * unknown |Gin|^2 is its mean over the phase.
 *
 * Source: Bosma 1967, Philips Res. Rep. suppl. (noise waves of a passive two-port), and Pozar, Microwave
 *         Engineering (available gain), both from memory
 * Valid:  all that the sheet returns is collected by the feed, the sky is one temperature
 *
 * @param skyK        noise temperature seen through the cover [K], at least 0
 * @param coverK      physical temperature of the cover and the water on it [K], at least 0
 * @param receiverK   noise temperature of the receiver [K], above 0
 * @param isolatorK   physical temperature of the isolator [K], default 290
 * @throws RangeError on an argument outside these ranges, and as `coveredFeed` does
 */
export function coverNoise({
  skyK,
  coverK,
  receiverK,
  isolatorK = 290,
  ...feed
}: CoverNoiseInput): CoverNoise {
  requireNotNegative("skyK", skyK);
  requireNotNegative("coverK", coverK);
  requirePositive("receiverK", receiverK);
  requireNotNegative("isolatorK", isolatorK);
  const covered = coveredFeed(feed);
  const bareK = skyK + receiverK;

  const availableGain = dbToPower(-covered.dissipationDb.nominal);
  const availableNoiseK = availableGain * skyK + (1 - availableGain) * coverK;

  const reflected = dbToPower(-covered.returnLossDb.nominal);
  const isolatedGain = (1 - reflected) * availableGain;
  const isolatedNoiseK = (1 - reflected) * availableNoiseK + reflected * isolatorK;
  return {
    availableGain,
    availableNoiseK,
    carrierToNoiseChangeDb: powerToDb((availableNoiseK + receiverK) / bareK / availableGain),
    carrierToNoiseChangeIsolatorDb: powerToDb((isolatedNoiseK + receiverK) / bareK / isolatedGain),
  };
}
