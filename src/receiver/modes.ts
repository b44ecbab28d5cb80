import { snrInBandwidth } from "./noise.ts";

/** A way of signalling, with the signal to noise ratio that its reader needs. */
export interface Mode {
  readonly name: string;
  readonly label: string;
  /** Noise bandwidth of the receiver in this mode [Hz]. */
  readonly noiseBandwidthHz: number;
  /** Signal to noise ratio needed, stated in `referenceBandwidthHz` [dB]. */
  readonly requiredSnrDb: number;
  /** Bandwidth in which `requiredSnrDb` is stated [Hz]; a ratio without one means nothing. */
  readonly referenceBandwidthHz: number;
  /** Spread of the threshold between operators and days, one standard deviation [dB]. */
  readonly sigmaDb: number;
  readonly source: string;
}

/** Amateur figures are commonly stated in this bandwidth [Hz], whatever filter is in use. */
export const AMATEUR_REFERENCE_BANDWIDTH_HZ = 2500;

const source = "common practice, no source";

/**
 * Built-in modes.
 *
 * The filter widths are the usual ones: 500 Hz for telegraphy, 2.5 kHz for single sideband, 15 kHz for
 * 5 kHz deviation, 250 kHz for 75 kHz deviation. The ear narrows telegraphy further, which is why its
 * threshold in 500 Hz may lie below 0 dB. Both FM figures are the threshold of the discriminator, about
 * 10 dB in the filter, so they do not get better with a narrower reference.
 *
 * Source: common practice, no source
 */
export const modes = {
  cw: {
    name: "cw",
    label: "CW by ear",
    noiseBandwidthHz: 500,
    requiredSnrDb: -9,
    referenceBandwidthHz: AMATEUR_REFERENCE_BANDWIDTH_HZ,
    sigmaDb: 3,
    source,
  },
  ssb: {
    name: "ssb",
    label: "SSB voice",
    noiseBandwidthHz: 2500,
    requiredSnrDb: 3,
    referenceBandwidthHz: AMATEUR_REFERENCE_BANDWIDTH_HZ,
    sigmaDb: 2,
    source,
  },
  fm: {
    name: "fm",
    label: "narrow FM voice",
    noiseBandwidthHz: 15_000,
    requiredSnrDb: 17.5,
    referenceBandwidthHz: AMATEUR_REFERENCE_BANDWIDTH_HZ,
    sigmaDb: 1.5,
    source,
  },
  wfm: {
    name: "wfm",
    label: "wide FM",
    noiseBandwidthHz: 250_000,
    requiredSnrDb: 30,
    referenceBandwidthHz: AMATEUR_REFERENCE_BANDWIDTH_HZ,
    sigmaDb: 2,
    source,
  },
} as const satisfies Readonly<Record<string, Mode>>;

/** Signal to noise ratio [dB] that the mode needs in its own noise bandwidth. */
export function requiredSnrInBandwidth(mode: Mode): number {
  return snrInBandwidth({
    snrDb: mode.requiredSnrDb,
    fromHz: mode.referenceBandwidthHz,
    toHz: mode.noiseBandwidthHz,
  });
}
