import { requirePositive, requireWithin } from "../numeric/check.ts";
import { coveredFeed } from "./coveredFeed.ts";
import type { SheetScattering } from "./layeredSheet.ts";

/** Frequencies of the sweep, the ends among them; an odd number, so that the middle is one. */
const FREQUENCIES = 21;
/** Phases tried where that of the feed is not known. */
const PHASES = 24;

/**
 * How much a cover's loss swings over a band: largest less smallest insertion loss of feed and cover.
 *
 * The feed's own reflection is taken as the same at every frequency; what turns is the sheet and the gap. With the
 * feed's phase unknown the swing is that of the worst phase.
 *
 * Source: the cascade of `coveredFeed`, swept
 * Valid:  bands over which the feed itself stays as it is, a few per cent
 *
 * @param frequencyGHz      middle of the band [GHz], above 0
 * @param bandGHz           its width [GHz], 0 to frequencyGHz
 * @param sheetAt           the sheet at a frequency [GHz]
 * @param feedReturnLossDb  [dB], above 0
 * @param phaseDeg          of the feed at its mouth [deg]; absent: unknown
 * @param gapMm             mouth to sheet [mm]
 * @param collectedShare    share of the returned amplitude that the feed takes in again, 0 to 1
 * @returns rippleDb, peak to peak [dB]
 */
export function bandRipple({
  frequencyGHz,
  bandGHz,
  sheetAt,
  feedReturnLossDb,
  phaseDeg,
  gapMm,
  collectedShare,
}: {
  readonly frequencyGHz: number;
  readonly bandGHz: number;
  readonly sheetAt: (frequencyGHz: number) => SheetScattering;
  readonly feedReturnLossDb: number;
  readonly phaseDeg?: number | undefined;
  readonly gapMm: number;
  readonly collectedShare: number;
}): { rippleDb: number } {
  requirePositive("frequencyGHz", frequencyGHz);
  requireWithin("bandGHz", bandGHz, 0, frequencyGHz);
  const sweep = Array.from({ length: FREQUENCIES }, (_, i) => {
    const swept = frequencyGHz + bandGHz * (i / (FREQUENCIES - 1) - 0.5);
    return { frequencyGHz: swept, sheet: sheetAt(swept) };
  });
  const phases =
    phaseDeg === undefined ? Array.from({ length: PHASES }, (_, i) => (360 * i) / PHASES) : [phaseDeg];
  const swings = phases.map((phase) => {
    const losses = sweep.map(
      (one) =>
        coveredFeed({ feedReturnLossDb, phaseDeg: phase, gapMm, collectedShare, ...one }).insertionLossDb
          .nominal,
    );
    return Math.max(...losses) - Math.min(...losses);
  });
  return { rippleDb: Math.max(...swings) };
}
