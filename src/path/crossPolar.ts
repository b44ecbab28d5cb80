import { requireFinite, requirePositive, type Validity } from "../numeric/check.ts";

export const crossPolarValidity = { frequencyGHz: [8, 35] } as const satisfies Validity;

/** Typical cross-polar constant of rain [dB]; 9 dB bounds all measurements from below. */
const TYPICAL_U0_DB = 15;

/** Cross-polar discrimination in rain is U - V log A. */
function coefficients(frequencyGHz: number, u0Db: number): { u: number; v: number } {
  requirePositive("frequencyGHz", frequencyGHz);
  requireFinite("u0Db", u0Db);
  return {
    u: u0Db + 30 * Math.log10(frequencyGHz),
    v: frequencyGHz <= 20 ? 12.8 * frequencyGHz ** 0.19 : 22.6,
  };
}

/**
 * Cross-polar discrimination left while rain attenuates a path.
 *
 * Source: ITU-R P.530-17, section 4.2.1 (the same in -18)
 * Valid:  8 to 35 GHz; the law of 8 to 20 GHz is extended below, that of 20 to 35 GHz above
 *
 * @param frequencyGHz   [GHz], above 0
 * @param coPolarLossDb  attenuation of the wanted polarization by rain [dB], above 0
 * @param u0Db           constant of rain [dB], by default 15
 * @returns discrimination [dB]
 * @throws RangeError on a non-finite argument or one out of range
 */
export function rainCrossPolar({
  frequencyGHz,
  coPolarLossDb,
  u0Db = TYPICAL_U0_DB,
}: {
  readonly frequencyGHz: number;
  readonly coPolarLossDb: number;
  readonly u0Db?: number;
}): { readonly discriminationDb: number } {
  requirePositive("coPolarLossDb", coPolarLossDb);
  const { u, v } = coefficients(frequencyGHz, u0Db);
  return { discriminationDb: u - v * Math.log10(coPolarLossDb) };
}

/**
 * Share of an average year in which rain leaves less cross-polar discrimination than a receiver needs.
 *
 * Source: ITU-R P.530-17, section 4.2.2 (the same in -18)
 * Valid:  as `rainCrossPolar`
 *
 * @param frequencyGHz           [GHz], above 0
 * @param carrierToInterferenceDb  ratio at which the receiver fails [dB]
 * @param improvementDb          what a cross-polar canceller adds [dB], by default 0
 * @param rainLoss001Db          rain attenuation exceeded for 0.01 % of the year [dB], above 0
 * @param u0Db                   constant of rain [dB], by default 15
 * @returns share of the year [%]
 * @throws RangeError on a non-finite argument or one out of range
 */
export function rainCrossPolarOutage({
  frequencyGHz,
  carrierToInterferenceDb,
  improvementDb = 0,
  rainLoss001Db,
  u0Db = TYPICAL_U0_DB,
}: {
  readonly frequencyGHz: number;
  readonly carrierToInterferenceDb: number;
  readonly improvementDb?: number;
  readonly rainLoss001Db: number;
  readonly u0Db?: number;
}): { readonly percent: number } {
  requireFinite("carrierToInterferenceDb", carrierToInterferenceDb);
  requireFinite("improvementDb", improvementDb);
  requirePositive("rainLoss001Db", rainLoss001Db);
  const { u, v } = coefficients(frequencyGHz, u0Db);
  const equivalentDb = 10 ** ((u - carrierToInterferenceDb + improvementDb) / v);
  const m = Math.min(40, 23.26 * Math.log10(equivalentDb / (0.12 * rainLoss001Db)));
  const n = (-12.7 + Math.sqrt(161.23 - 4 * m)) / 2;
  return { percent: Math.min(100, 10 ** (n - 2)) };
}
