/** Climate of anomalous propagation over a path. */
export interface DuctClimate {
  /** Time for which the refractivity gradient of the lowest 100 m falls below -100 N/km [%]. */
  readonly beta0Percent: number;
  /** Weight of a long inland section, 0 to 1. */
  readonly tau: number;
}

/**
 * Time percentage of ducting conditions at the middle of a path.
 *
 * Source: ITU-R P.452-18, section 3.2.1, equations 2 to 4
 *
 * @param latitudeDeg       of the middle of the path [deg], either sign
 * @param longestLandKm     longest run of coastal and inland ground [km], at least 0
 * @param longestInlandKm   longest run of inland ground [km], at least 0
 */
export function ductClimate({
  latitudeDeg,
  longestLandKm,
  longestInlandKm,
}: {
  readonly latitudeDeg: number;
  readonly longestLandKm: number;
  readonly longestInlandKm: number;
}): DuctClimate {
  const latitude = Math.abs(latitudeDeg);
  const tau = 1 - Math.exp(-4.12e-4 * longestInlandKm ** 2.41);
  const mu1 = Math.min(
    1,
    (10 ** (-longestLandKm / (16 - 6.6 * tau)) + 10 ** (-5 * (0.496 + 0.354 * tau))) ** 0.2,
  );
  const beta0Percent =
    latitude <= 70
      ? 10 ** (-0.015 * latitude + 1.67) * mu1 * mu1 ** (-0.935 + 0.0176 * latitude)
      : 4.17 * mu1 * mu1 ** 0.3;
  return { beta0Percent, tau };
}

export interface DuctingInput {
  readonly frequencyGHz: number;
  readonly distanceKm: number;
  readonly percent: number;
  readonly effectiveRadiusKm: number;
  readonly txHeightAmslM: number;
  readonly rxHeightAmslM: number;
  readonly txHorizonMrad: number;
  readonly rxHorizonMrad: number;
  readonly txHorizonKm: number;
  readonly rxHorizonKm: number;
  readonly txEffectiveHeightM: number;
  readonly rxEffectiveHeightM: number;
  readonly roughnessM: number;
  readonly txCoastKm: number;
  readonly rxCoastKm: number;
  readonly seaFraction: number;
  readonly climate: DuctClimate;
  readonly gasDb: number;
}

/**
 * Loss by ducting and reflection from elevated layers, not exceeded for a percentage of time.
 *
 * The sum of the loss of coupling into the duct at both ends, the loss along it by the angular distance, the
 * variation with time and the gas.
 *
 * Source: ITU-R P.452-18, section 4.4, equations 46 to 58
 * Valid:  0.1 to 50 GHz, 0.001 to 50 % of time
 *
 * @param input  geometry as `analysePath` gives it; `txCoastKm`, `rxCoastKm` distance over land to the coast
 *   along the path [km], 500 where there is none; `gasDb` over the whole path [dB]
 * @returns loss [dB]
 */
export function ductingLoss(input: DuctingInput): number {
  const { frequencyGHz: f, distanceKm: d, txHorizonKm, rxHorizonKm, seaFraction, climate, gasDb } = input;
  const { percent, effectiveRadiusKm, txHorizonMrad, rxHorizonMrad } = input;

  const lowBand = f < 0.5 ? 45.375 - 137 * f + 92.5 * f ** 2 : 0;
  const coupling =
    102.45 +
    20 * Math.log10(f * (txHorizonKm + rxHorizonKm)) +
    lowBand +
    siteShielding(txHorizonMrad, txHorizonKm, f) +
    siteShielding(rxHorizonMrad, rxHorizonKm, f) +
    seaDuctCoupling(seaFraction, input.txCoastKm, txHorizonKm, input.txHeightAmslM) +
    seaDuctCoupling(seaFraction, input.rxCoastKm, rxHorizonKm, input.rxHeightAmslM);

  const angleMrad =
    (1000 * d) / effectiveRadiusKm +
    Math.min(txHorizonMrad, 0.1 * txHorizonKm) +
    Math.min(rxHorizonMrad, 0.1 * rxHorizonKm);
  const alongDuct = 5e-5 * effectiveRadiusKm * Math.cbrt(f) * angleMrad;

  const beta = climate.beta0Percent * pathGeometryFactor(input) * roughnessFactor(input);
  const logBeta = Math.log10(beta);
  const exponent =
    1.076 *
    (2.0058 - logBeta) ** -1.012 *
    Math.exp(-(9.51 - 4.8 * logBeta + 0.198 * logBeta ** 2) * 1e-6 * d ** 1.13);
  const variation = -12 + (1.2 + 3.7e-3 * d) * Math.log10(percent / beta) + 12 * (percent / beta) ** exponent;

  return coupling + alongDuct + variation + gasDb;
}

/** Loss where the near horizon stands higher than a duct would leave it; equation 48. */
function siteShielding(horizonMrad: number, horizonKm: number, f: number): number {
  const excess = horizonMrad - 0.1 * horizonKm;
  if (excess <= 0) return 0;
  return 20 * Math.log10(1 + 0.361 * excess * Math.sqrt(f * horizonKm)) + 0.264 * excess * Math.cbrt(f);
}

/** Gain, as a negative loss, of an antenna near the shore into a duct over the sea; equation 49. */
function seaDuctCoupling(
  seaFraction: number,
  coastKm: number,
  horizonKm: number,
  heightAmslM: number,
): number {
  if (seaFraction < 0.75 || coastKm > horizonKm || coastKm > 5) return 0;
  return -3 * Math.exp(-0.25 * coastKm ** 2) * (1 + Math.tanh(0.07 * (50 - heightAmslM)));
}

/** Equation 55: high antennas see past the layer that a duct needs. */
function pathGeometryFactor(input: DuctingInput): number {
  const { distanceKm: d, effectiveRadiusKm, txEffectiveHeightM, rxEffectiveHeightM, climate } = input;
  const slope = Math.max(-3.4, -0.6 - 3.5e-9 * d ** 3.1 * climate.tau);
  const grazing =
    (500 * d ** 2) /
    (effectiveRadiusKm * (Math.sqrt(txEffectiveHeightM) + Math.sqrt(rxEffectiveHeightM)) ** 2);
  return Math.min(1, grazing ** slope);
}

/** Equation 56: rough ground breaks ducts up. */
function roughnessFactor({ distanceKm, txHorizonKm, rxHorizonKm, roughnessM }: DuctingInput): number {
  if (roughnessM <= 10) return 1;
  const betweenKm = Math.min(distanceKm - txHorizonKm - rxHorizonKm, 40);
  return Math.exp(-4.6e-5 * (roughnessM - 10) * (43 + 6 * betweenKm));
}
