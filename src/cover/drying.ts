import { requireNotNegative, requirePositive } from "../numeric/check.ts";
import type { Bounded } from "./bounded.ts";

/** Time constants of drying [min]: minutes to tens of minutes; common practice, no source. */
const dryingMinutes: Bounded = { low: 5, nominal: 15, high: 40 };

/**
 * Water left on a cover some time after the rain, falling exponentially.
 *
 * Source: exponential course and its span of minutes to tens of minutes are common practice with microwave
 *         links, no source; 5, 15 and 40 min are own choices within it
 * Valid:  one shower; sun and wind speed it up, fog and frost stop it
 *
 * @param thicknessMm         mean film when the rain stopped [mm], at least 0
 * @param minutesSinceRain    [min], at least 0
 * @param timeConstantMinutes where it is known [min], above 0; then all three results are equal
 * @returns thicknessMm with its limits [mm]
 * @throws RangeError on an argument outside these ranges
 */
export function filmAfterRain({
  thicknessMm,
  minutesSinceRain,
  timeConstantMinutes,
}: {
  readonly thicknessMm: number;
  readonly minutesSinceRain: number;
  readonly timeConstantMinutes?: number | undefined;
}): { thicknessMm: Bounded } {
  requireNotNegative("thicknessMm", thicknessMm);
  requireNotNegative("minutesSinceRain", minutesSinceRain);
  if (timeConstantMinutes !== undefined) requirePositive("timeConstantMinutes", timeConstantMinutes);
  const left = (minutes: number) =>
    thicknessMm * Math.exp(-minutesSinceRain / (timeConstantMinutes ?? minutes));
  return {
    thicknessMm: {
      nominal: left(dryingMinutes.nominal),
      low: left(dryingMinutes.low),
      high: left(dryingMinutes.high),
    },
  };
}

/**
 * Film of a clear night's dew [mm]: a tenth of a millimetre, seldom beyond three tenths.
 *
 * Source: yields of dew collectors, from memory
 */
export const dewFilmMm: Bounded = { low: 0.02, nominal: 0.1, high: 0.3 };
