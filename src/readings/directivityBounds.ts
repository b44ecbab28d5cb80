import { gammaOfReturnLoss, returnLossOfGamma } from "../cover/reflectionFigures.ts";

export interface DirectivityInput {
  readonly returnLossDb: number;
  readonly directivityDb: number;
  readonly sourceMatchDb?: number | undefined;
}

/**
 * What a coupler may read on a load of known return loss, or the load that may stand behind a reading.
 *
 * The leak d of the coupler and the reflection m of its test port add in unknown phase: the reading lies between
 * |G| - d - m|G|^2 and |G| + d + m|G|^2. To the first order this holds the other way round too: with a reading as
 * returnLossDb the limits are those of the true return loss.
 *
 * Source: standard directivity limits, as in Agilent AN 1287-3 and Rohde & Schwarz, Fundamentals of Vector Network
 *         Analysis
 * Valid:  first order in d and m; a leak as large as the reflection can cancel it: highDb is then Infinity
 *
 * @param returnLossDb   of the load [dB], at least 0
 * @param directivityDb  of the coupler [dB], at least 0
 * @param sourceMatchDb  return loss of the test port [dB], at least 0; absent: perfect
 * @returns lowDb and highDb, limits [dB]
 * @throws RangeError on a negative argument
 */
export function directivityBounds({
  returnLossDb,
  directivityDb,
  sourceMatchDb = Infinity,
}: DirectivityInput): {
  lowDb: number;
  highDb: number;
} {
  const gamma = gammaOfReturnLoss("returnLossDb", returnLossDb);
  const match = gammaOfReturnLoss("sourceMatchDb", sourceMatchDb);
  const error = gammaOfReturnLoss("directivityDb", directivityDb) + match * gamma * gamma;
  return { lowDb: returnLossOfGamma(gamma + error), highDb: returnLossOfGamma(Math.max(0, gamma - error)) };
}

/**
 * Most that the leak can falsify a change of return loss [dB]: 20 log10[(1 + d/g)/(1 - d/g1)] one way and
 * 20 log10[(1 + d/g1)/(1 - d/g)] the other, g bare and g1 covered; the larger is given.
 *
 * The leak keeps its phase while the load changes, so repeating the reading does not average it out. Infinity
 * where the leak can cancel the smaller reflection.
 *
 * Source: as `directivityBounds`
 *
 * @throws RangeError on a negative argument
 */
export function returnLossChangeLimitDb({
  bareReturnLossDb,
  coveredReturnLossDb,
  directivityDb,
}: {
  readonly bareReturnLossDb: number;
  readonly coveredReturnLossDb: number;
  readonly directivityDb: number;
}): number {
  const leak = gammaOfReturnLoss("directivityDb", directivityDb);
  const bare = leak / gammaOfReturnLoss("bareReturnLossDb", bareReturnLossDb);
  const covered = leak / gammaOfReturnLoss("coveredReturnLossDb", coveredReturnLossDb);
  const larger = Math.max(bare, covered);
  const smaller = Math.min(bare, covered);
  return larger >= 1 ? Infinity : 20 * Math.log10((1 + smaller) / (1 - larger));
}
