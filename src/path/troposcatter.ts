import { requireFinite, requireNotNegative, requirePositive, type Validity } from "../numeric/check.ts";

export interface TroposcatterInput {
  readonly frequencyGHz: number;
  readonly distanceKm: number;
  readonly txHeightAmslM: number;
  readonly rxHeightAmslM: number;
  readonly effectiveRadiusKm: number;
  readonly txHorizonMrad: number;
  readonly rxHorizonMrad: number;
  readonly txGainDbi: number;
  readonly rxGainDbi: number;
  readonly N0: number;
  readonly dN: number;
  readonly groundHeightKm: number;
  readonly percent: number;
}

/** Where P.617-5 was fitted; limits from memory. */
export const troposcatterValidity = {
  frequencyGHz: [0.03, 50],
  distanceKm: [100, 1000],
  percent: [0.001, 99.999],
} as const satisfies Validity;

/** Height over which the refractivity falls by 1/e [km]. */
const REFRACTIVITY_SCALE_KM = 7.35;

/**
 * Troposcatter loss between two antennas beyond each other's horizon, for planning a wanted signal.
 *
 *     loss = F + 22 log f + 35 log theta + 17 log d + coupling - spread(percent)
 *
 * F falls with the refractivity at the common volume; the coupling is the gain that narrow beams lose on a
 * volume wider than they are. Gas and rain are not counted.
 *
 * Source: ITU-R P.617-5, step-by-step method (equation numbers not at hand)
 * Valid:  above 30 MHz, about 100 to 1000 km, trans-horizon paths (from memory)
 *
 * @param frequencyGHz       [GHz], above 0
 * @param distanceKm         [km], above 0
 * @param txHeightAmslM      transmitting antenna above mean sea level [m]
 * @param rxHeightAmslM      receiving antenna above mean sea level [m]
 * @param effectiveRadiusKm  radius of the Earth that makes median rays straight [km], above 0
 * @param txHorizonMrad      elevation of the transmitter's radio horizon [mrad]
 * @param rxHorizonMrad      elevation of the receiver's radio horizon [mrad]
 * @param txGainDbi          gain towards that horizon [dBi]
 * @param rxGainDbi          gain towards that horizon [dBi]
 * @param N0                 median sea-level refractivity at mid-path [N-units]
 * @param dN                 median fall of refractivity over the lowest kilometre [N-units/km], positive
 * @param groundHeightKm     ground below the common volume above mean sea level [km]
 * @param percent            time of an average year for which the loss is not exceeded [%], within 0 and 100
 * @returns loss [dB] between isotropic antennas plus the coupling, and the scatter angle [mrad]
 * @throws RangeError on a non-finite argument, one out of range, or a scatter angle that is not positive
 */
export function troposcatterLoss(input: TroposcatterInput): {
  readonly lossDb: number;
  readonly scatterAngleMrad: number;
} {
  const { frequencyGHz, distanceKm, txHeightAmslM, rxHeightAmslM, effectiveRadiusKm } = input;
  const { txHorizonMrad, rxHorizonMrad, txGainDbi, rxGainDbi, N0, dN, groundHeightKm, percent } = input;
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("distanceKm", distanceKm);
  requirePositive("effectiveRadiusKm", effectiveRadiusKm);
  requirePositive("N0", N0);
  const finite = { txHeightAmslM, rxHeightAmslM, txHorizonMrad, rxHorizonMrad };
  for (const [name, value] of Object.entries({ ...finite, txGainDbi, rxGainDbi, dN, groundHeightKm })) {
    requireFinite(name, value);
  }
  if (!(percent > 0 && percent < 100)) {
    throw new RangeError(`percent must lie between 0 and 100, got ${percent}`);
  }
  const scatterAngleMrad = (1000 * distanceKm) / effectiveRadiusKm + txHorizonMrad + rxHorizonMrad;
  requirePositive("scatterAngleMrad", scatterAngleMrad);

  const refractivity = 0.18 * N0 * Math.exp(-groundHeightKm / REFRACTIVITY_SCALE_KM) - 0.23 * dN;
  const coupling = 0.07 * Math.exp(0.055 * (txGainDbi + rxGainDbi));

  // Height of the crossing of the two horizon rays, above mean sea level.
  const rxAngle =
    distanceKm / (2 * effectiveRadiusKm) +
    rxHorizonMrad / 1000 +
    (rxHeightAmslM - txHeightAmslM) / (1000 * distanceKm);
  const crossingKm = (distanceKm * Math.sin(rxAngle)) / Math.sin(scatterAngleMrad / 1000);
  const crossingHeightKm =
    txHeightAmslM / 1000 +
    crossingKm * ((0.5 * crossingKm) / effectiveRadiusKm + Math.sin(txHorizonMrad / 1000));

  const tail = -Math.log10((percent < 50 ? percent : 100 - percent) / 50);
  const spread = 0.035 * N0 * Math.exp(-crossingHeightKm / REFRACTIVITY_SCALE_KM) * tail ** 0.67;

  const lossDb =
    refractivity +
    22 * Math.log10(1000 * frequencyGHz) +
    35 * Math.log10(scatterAngleMrad) +
    17 * Math.log10(distanceKm) +
    coupling -
    (percent < 50 ? spread : -spread);
  return { lossDb, scatterAngleMrad };
}

/**
 * Troposcatter loss not exceeded for small percentages of time: the term that P.452 combines with ducting.
 *
 * Source: ITU-R P.452-18, section 4.3, equation 45
 * Valid:  0.1 to 50 GHz, 0.001 to 50 % of time
 *
 * @param frequencyGHz          [GHz], above 0
 * @param distanceKm            [km], above 0
 * @param angularDistanceMrad   angle between the two horizon rays [mrad]
 * @param N0                    median sea-level refractivity at mid-path [N-units]
 * @param txGainDbi             gain towards the horizon [dBi]
 * @param rxGainDbi             gain towards the horizon [dBi]
 * @param gasDb                 gas over the whole path, at 3 g/m3 of vapour [dB], at least 0
 * @param percent               time for which the loss is not exceeded [%], above 0, at most 50
 * @returns loss [dB]
 * @throws RangeError on a non-finite argument or one out of range
 */
export function interferenceTroposcatterLoss({
  frequencyGHz,
  distanceKm,
  angularDistanceMrad,
  N0,
  txGainDbi,
  rxGainDbi,
  gasDb,
  percent,
}: {
  readonly frequencyGHz: number;
  readonly distanceKm: number;
  readonly angularDistanceMrad: number;
  readonly N0: number;
  readonly txGainDbi: number;
  readonly rxGainDbi: number;
  readonly gasDb: number;
  readonly percent: number;
}): number {
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("distanceKm", distanceKm);
  for (const [name, value] of Object.entries({ angularDistanceMrad, N0, txGainDbi, rxGainDbi })) {
    requireFinite(name, value);
  }
  requireNotNegative("gasDb", gasDb);
  if (!(percent > 0 && percent <= 50)) {
    throw new RangeError(`percent must lie above 0 and at most at 50, got ${percent}`);
  }
  const frequencyTerm = 25 * Math.log10(frequencyGHz) - 2.5 * Math.log10(frequencyGHz / 2) ** 2;
  const coupling = 0.051 * Math.exp(0.055 * (txGainDbi + rxGainDbi));
  return (
    190 +
    frequencyTerm +
    20 * Math.log10(distanceKm) +
    0.573 * angularDistanceMrad -
    0.15 * N0 +
    coupling +
    gasDb -
    10.1 * (-Math.log10(percent / 50)) ** 0.7
  );
}
