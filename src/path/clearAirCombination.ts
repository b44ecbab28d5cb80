/** Losses [dB] and geometry of one path that the combination weighs. */
export interface Mechanisms {
  readonly percent: number;
  readonly beta0Percent: number;
  readonly distanceKm: number;
  readonly seaFraction: number;
  /** Slope of the steepest ray from transmitter to terrain over that to the receiver [m/km]. */
  readonly terrainExcessMPerKm: number;
  /** Free space and gas. */
  readonly freeSpaceDb: number;
  /** Free space, gas and focusing at the percentage of time, and at beta0. */
  readonly lineOfSightDb: number;
  readonly lineOfSightBeta0Db: number;
  /** Diffraction against free space: median, and at the percentage of time. */
  readonly diffractionMedianDb: number;
  readonly diffractionDb: number;
  /** Share of the way from median to beta0 at the percentage of time, 0 to 1. */
  readonly timeWeight: number;
  readonly troposcatterDb: number;
  readonly ductingDb: number;
}

/**
 * Basic transmission loss of all clear-air mechanisms together.
 *
 * Line of sight and diffraction merge with ducting by a rounded choice and by distance, the result slides
 * towards a notional least loss where the path is clear, and troposcatter closes from above.
 *
 * Source: ITU-R P.452-18, sections 4.2.4 and 4.6, equations 43, 44 and 59 to 64
 *
 * @returns loss [dB] not exceeded for the percentage of time
 */
export function combineMechanisms(m: Mechanisms): number {
  const diffractedMedianDb = m.freeSpaceDb + m.diffractionMedianDb;
  const diffractedDb = m.lineOfSightDb + m.diffractionDb;
  const overLandDb = (1 - m.seaFraction) * m.diffractionDb;
  const leastDb =
    m.percent < m.beta0Percent
      ? m.lineOfSightDb + overLandDb
      : diffractedMedianDb + (m.lineOfSightBeta0Db + overLandDb - diffractedMedianDb) * m.timeWeight;

  const ductedDb = softMaximum(m.ductingDb, m.lineOfSightDb, 2.5);
  const distanceWeight = 1 - 0.5 * (1 + Math.tanh((1.5 * (m.distanceKm - 20)) / 20));
  const enhancedDb =
    ductedDb > diffractedDb ? diffractedDb : ductedDb + (diffractedDb - ductedDb) * distanceWeight;

  const slopeWeight = 1 - 0.5 * (1 + Math.tanh((2.4 * m.terrainExcessMPerKm) / 0.3));
  const belowScatterDb = enhancedDb + (leastDb - enhancedDb) * slopeWeight;
  return -softMaximum(-m.troposcatterDb, -belowScatterDb, 5 / Math.LN10);
}

/** The larger of two losses with a rounded corner: scale ln(exp(a / scale) + exp(b / scale)). */
function softMaximum(a: number, b: number, scale: number): number {
  return Math.max(a, b) + scale * Math.log1p(Math.exp(-Math.abs(a - b) / scale));
}
