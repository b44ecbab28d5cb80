import { requireNotNegative, requireWithin } from "../numeric/check.ts";

/**
 * Share of the time at full power while sending.
 *
 * Source: cw, the word PARIS has 22 units of key down in 50; fm and carrier, constant envelope; ssb, speech
 *         with heavy processing by OET Bulletin 65 Supplement B (from memory), plain speech less
 */
export const modeDuty = { cw: 0.44, ssb: 0.5, fm: 1, carrier: 1 } as const;

/**
 * Power averaged over the time in which a limit averages.
 *
 * A single long key-down may fill that time: no smaller share than it gives belongs here.
 *
 * Source: definition of the mean
 *
 * @param powerW            peak envelope power at the antenna [W], at least 0
 * @param transmitFraction  share of the averaging time spent sending, 0 to 1
 * @param modeDuty          share at full power while sending, 0 to 1: see `modeDuty`
 */
export function averagePower({
  powerW,
  transmitFraction,
  modeDuty: duty,
}: {
  powerW: number;
  transmitFraction: number;
  modeDuty: number;
}): { averageW: number } {
  requireNotNegative("powerW", powerW);
  requireWithin("transmitFraction", transmitFraction, 0, 1);
  requireWithin("modeDuty", duty, 0, 1);
  return { averageW: powerW * transmitFraction * duty };
}
