/** dB of natural-log units: 10 / ln 10. */
const DB_PER_NEPER_POWER = 10 / Math.LN10;

/** The other way round, for products in a loop that drawn decibels go through. */
export const NEPERS_PER_DB = Math.LN10 / 10;

/** Power ratio to dB; 0 gives -Infinity. */
export function powerToDb(ratio: number): number {
  return 10 * Math.log10(ratio);
}

/** dB to power ratio. */
export function dbToPower(db: number): number {
  return Math.exp(db / DB_PER_NEPER_POWER);
}

/** Amplitude ratio to dB; 0 gives -Infinity. */
export function amplitudeToDb(ratio: number): number {
  return 20 * Math.log10(ratio);
}

/** dB to amplitude ratio. */
export function dbToAmplitude(db: number): number {
  return Math.exp(db / (2 * DB_PER_NEPER_POWER));
}

/** Watt to dBm. */
export function wattToDbm(powerW: number): number {
  return powerToDb(powerW) + 30;
}

/** dBm to watt. */
export function dbmToWatt(powerDbm: number): number {
  return dbToPower(powerDbm - 30);
}
