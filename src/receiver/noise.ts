import { requireFinite, requireNotNegative, requirePositive } from "../numeric/check.ts";
import { BOLTZMANN_J_PER_K, REFERENCE_TEMPERATURE_K } from "../numeric/constants.ts";
import { dbToPower, powerToDb, wattToDbm } from "../numeric/decibels.ts";

/**
 * Thermal noise power available in a bandwidth, N = k T B.
 *
 * Source: definition; k is exact by the SI of 2019
 * Valid:  while h f is far below k T, so at every temperature and frequency met here
 *
 * @param temperatureK  noise temperature [K], above 0
 * @param bandwidthHz   noise bandwidth [Hz], above 0
 * @returns dBm
 */
export function thermalNoiseDbm({
  temperatureK,
  bandwidthHz,
}: {
  temperatureK: number;
  bandwidthHz: number;
}): number {
  requirePositive("temperatureK", temperatureK);
  requirePositive("bandwidthHz", bandwidthHz);
  return wattToDbm(BOLTZMANN_J_PER_K * temperatureK * bandwidthHz);
}

/**
 * Equivalent noise temperature [K] of a noise figure [dB]: T = 290 (10^(NF/10) - 1).
 *
 * Source: IEEE definition of the noise figure, reference temperature 290 K
 */
export function noiseTemperatureK(noiseFigureDb: number): number {
  requireNotNegative("noiseFigureDb", noiseFigureDb);
  return REFERENCE_TEMPERATURE_K * (dbToPower(noiseFigureDb) - 1);
}

/** Noise figure [dB] of an equivalent noise temperature [K]; inverse of `noiseTemperatureK`. */
export function noiseFigureDb(temperatureK: number): number {
  requireNotNegative("temperatureK", temperatureK);
  return powerToDb(1 + temperatureK / REFERENCE_TEMPERATURE_K);
}

export interface LossyLineInput {
  /** Dissipative loss ahead of the receiver [dB]; reflection emits nothing and does not belong here. */
  readonly lossDb: number;
  /** Physical temperature of the line [K]. */
  readonly lineK: number;
  /** Noise figure of the receiver behind the line [dB]. */
  readonly noiseFigureDb: number;
}

/**
 * Noise figure [dB] of a lossy line and the receiver behind it, seen from the line's input.
 *
 *     T = (l - 1) Tp + l Trx,   l = 10^(L/10)
 *
 * At 290 K the loss adds to the noise figure dB for dB.
 *
 * Source: noise of an attenuator, D. M. Pozar, Microwave Engineering, 4th ed. (from memory)
 */
export function noiseFigureBehindLine({ lossDb, lineK, noiseFigureDb: nf }: LossyLineInput): number {
  requireNotNegative("lossDb", lossDb);
  requireNotNegative("lineK", lineK);
  const loss = dbToPower(lossDb);
  return noiseFigureDb((loss - 1) * lineK + loss * noiseTemperatureK(nf));
}

export interface SystemInput extends LossyLineInput {
  /** Noise temperature of the antenna [K]. */
  readonly antennaK: number;
}

/**
 * System noise temperature [K] at the receiver's input, behind the line.
 *
 *     Tsys = Ta / l + Tp (1 - 1/l) + Trx,   l = 10^(L/10)
 *
 * Source: noise of an attenuator, D. M. Pozar, Microwave Engineering, 4th ed. (from memory)
 */
export function systemTemperatureK({ antennaK, lossDb, lineK, noiseFigureDb: nf }: SystemInput): number {
  requireNotNegative("antennaK", antennaK);
  requireNotNegative("lossDb", lossDb);
  requireNotNegative("lineK", lineK);
  const passed = 1 / dbToPower(lossDb);
  return antennaK * passed + lineK * (1 - passed) + noiseTemperatureK(nf);
}

/**
 * What a loss ahead of the receiver costs in carrier to noise [dB]: the signal lost plus the noise gained.
 *
 * Source: follows from `systemTemperatureK` with and without the line
 */
export function lineLossPenaltyDb(input: SystemInput): number {
  return input.lossDb + powerToDb(systemTemperatureK(input) / systemTemperatureK({ ...input, lossDb: 0 }));
}

/**
 * Noise figure [dB] of two stages in a row: F = F1 + (F2 - 1) / G1.
 *
 * Source: H. T. Friis, Noise figures of radio receivers, Proc. IRE 32, 419-422, 1944
 */
export function cascadeNoiseFigureDb({
  firstNoiseFigureDb,
  firstGainDb,
  secondNoiseFigureDb,
}: {
  firstNoiseFigureDb: number;
  firstGainDb: number;
  secondNoiseFigureDb: number;
}): number {
  requireFinite("firstGainDb", firstGainDb);
  return noiseFigureDb(
    noiseTemperatureK(firstNoiseFigureDb) + noiseTemperatureK(secondNoiseFigureDb) / dbToPower(firstGainDb),
  );
}

/**
 * Y factor [dB] between two known noise temperatures at the receiver's input: (Th + Trx) / (Tc + Trx).
 *
 * Source: definition of the Y factor
 */
export function yFactorDb({
  hotK,
  coldK,
  noiseFigureDb: nf,
}: {
  hotK: number;
  coldK: number;
  noiseFigureDb: number;
}): number {
  requireNotNegative("hotK", hotK);
  requirePositive("coldK", coldK);
  const receiverK = noiseTemperatureK(nf);
  return powerToDb((hotK + receiverK) / (coldK + receiverK));
}

/**
 * Signal to noise ratio [dB] restated in another noise bandwidth; white noise, all of the signal in both.
 *
 * Source: definition
 */
export function snrInBandwidth({
  snrDb,
  fromHz,
  toHz,
}: {
  snrDb: number;
  fromHz: number;
  toHz: number;
}): number {
  requireFinite("snrDb", snrDb);
  requirePositive("fromHz", fromHz);
  requirePositive("toHz", toHz);
  return snrDb + powerToDb(fromHz / toHz);
}

/**
 * Signal to noise ratio [dB] in a bandwidth from the energy a bit: Eb/N0 + 10 log(Rb / B).
 *
 * Source: definition
 */
export function snrFromEbN0({
  ebN0Db,
  bitsPerSecond,
  bandwidthHz,
}: {
  ebN0Db: number;
  bitsPerSecond: number;
  bandwidthHz: number;
}): number {
  return snrInBandwidth({ snrDb: ebN0Db, fromHz: bitsPerSecond, toHz: bandwidthHz });
}
