import { requireFinite, requirePositive, requireWithin, type Validity } from "../numeric/check.ts";

/** Where the polynomial was fitted; it was tried from 0 to 20 degC. */
export const rainCrossSectionValidity = {
  frequencyGHz: [3, 100],
  temperatureC: [0, 20],
} as const satisfies Validity;

/** Powers of the frequency in each coefficient, and of the temperature in each of those. */
const FREQUENCY_TERMS = 8;
const TEMPERATURE_TERMS = 3;

/** Powers of ln R in the coefficient of each power of sin^2(angle / 2). */
const rainRateTerms = [3, 3, 4, 4] as const;

/**
 * Rows of c0, c1, c2 for rising powers m of the frequency, within n of ln R, within i of sin^2(angle / 2).
 *
 * Source: ITU-R P.452-18, hydrometeor scatter, as in its reference implementation
 */
// biome-ignore format: three coefficients a row, as published
const coefficients = [
  // i = 1, n = 1
  -23.033, -0.019039, -1.3511e-7,
  1.0988, 0.0057909, -1.8732e-5,
  -0.053826, -0.00051258, 2.8893e-6,
  0.0017167, 2.0326e-5, -1.5242e-7,
  -3.3231e-5, -4.2625e-7, 3.8089e-9,
  3.7396e-7, 4.9297e-9, -4.969e-11,
  -2.2438e-9, -2.9763e-11, 3.2787e-13,
  5.5409e-12, 7.3317e-14, -8.6497e-16,
  // i = 1, n = 2
  1.758, 0.0078061, -0.00019642,
  -0.034774, -0.0010409, 4.8582e-5,
  0.0031934, 1.2441e-5, -3.9051e-6,
  -0.00014758, 1.6661e-6, 1.5195e-7,
  3.3014e-6, -7.0142e-8, -3.2085e-9,
  -3.8772e-8, 1.1439e-9, 3.7652e-11,
  2.3188e-10, -8.5799e-12, -2.3101e-13,
  -5.5887e-13, 2.4612e-14, 5.779e-16,
  // i = 1, n = 3
  -0.051224, 0.00081531, 1.1534e-5,
  0.0011587, -0.00031961, -2.3173e-6,
  -8.8754e-5, 3.5484e-5, 1.4933e-7,
  9.6328e-7, -1.6609e-6, -4.7112e-9,
  5.927e-8, 3.9523e-8, 8.0972e-11,
  -1.6618e-9, -5.0408e-10, -7.7464e-13,
  1.5626e-11, 3.2862e-12, 3.8749e-15,
  -5.0972e-14, -8.6057e-15, -7.8859e-18,
  // i = 2, n = 1
  0.28927, 0.037271, -0.00010078,
  -0.11742, -0.011059, 6.6665e-5,
  0.010231, 0.00093297, -8.6068e-6,
  -0.00041831, -3.5477e-5, 4.2065e-7,
  8.8529e-6, 7.2358e-7, -1.0192e-8,
  -1.0313e-7, -8.2014e-9, 1.3111e-10,
  6.2591e-10, 4.8736e-11, -8.5865e-13,
  -1.5469e-12, -1.1849e-13, 2.2546e-15,
  // i = 2, n = 2
  -0.2317, -0.005093, 0.00045796,
  0.020016, -0.00076558, -0.00011298,
  0.00060157, 0.00020785, 9.1237e-6,
  -9.7303e-5, -1.2384e-5, -3.5392e-7,
  3.2711e-6, 3.3064e-7, 7.4324e-9,
  -5.0187e-8, -4.5084e-9, -8.6694e-11,
  3.6714e-10, 3.0694e-11, 5.2868e-13,
  -1.0386e-12, -8.2853e-14, -1.3148e-15,
  // i = 2, n = 3
  -0.036841, -0.0025519, -2.6162e-5,
  0.012953, 0.00084793, 5.2688e-6,
  -0.001305, -8.5265e-5, -3.3134e-7,
  5.9518e-5, 3.7912e-6, 9.6604e-9,
  -1.454e-6, -8.7204e-8, -1.4711e-10,
  1.91e-8, 1.085e-9, 1.1752e-12,
  -1.2719e-10, -6.9419e-12, -4.3973e-15,
  3.3748e-13, 1.7914e-14, 5.0804e-18,
  // i = 3, n = 1
  -0.0022144, -0.0014792, 0.00030493,
  -0.008123, -0.00055742, -8.8598e-5,
  0.0018507, 0.00015755, 8.3245e-6,
  -8.484e-5, -8.944e-6, -3.572e-7,
  1.9127e-6, 2.323e-7, 7.9876e-9,
  -2.2827e-8, -3.1221e-9, -9.6893e-11,
  1.4148e-10, 2.1074e-11, 6.0585e-13,
  -3.5797e-13, -5.6545e-14, -1.5317e-15,
  // i = 3, n = 2
  -0.048207, -0.019603, 3.8001e-6,
  -0.00041118, 0.0045669, -1.0444e-5,
  0.0016887, -0.00031651, 1.7242e-6,
  -0.00011195, 1.0267e-5, -1.0534e-7,
  3.0478e-6, -1.776e-7, 2.9975e-9,
  -4.1397e-8, 1.6755e-9, -4.3294e-11,
  2.8014e-10, -8.0718e-12, 3.0902e-13,
  -7.5246e-13, 1.5353e-14, -8.6683e-16,
  // i = 3, n = 3
  -0.1208, -0.0018073, -7.7431e-5,
  0.039712, 0.00099445, 2.2037e-5,
  -0.0039312, -0.00012817, -2.1388e-6,
  0.00017579, 6.5734e-6, 9.7426e-8,
  -4.0495e-6, -1.669e-7, -2.3253e-9,
  5.0716e-8, 2.2341e-9, 3.0006e-11,
  -3.2704e-10, -1.512e-11, -1.9832e-13,
  8.496e-13, 4.0796e-14, 5.2636e-16,
  // i = 3, n = 4
  0.02176, 0.0005804, 9.4104e-6,
  -0.0067089, -0.00020457, -2.5829e-6,
  0.0006556, 2.156e-5, 2.4395e-7,
  -2.966e-5, -9.9711e-7, -1.0876e-8,
  6.9633e-7, 2.3723e-8, 2.5604e-10,
  -8.7919e-9, -3.0371e-10, -3.2742e-12,
  5.6633e-11, 1.9905e-12, 2.15e-14,
  -1.462e-13, -5.2428e-15, -5.6776e-17,
  // i = 4, n = 1
  -0.046298, -0.0057663, -0.00018642,
  0.01272, 0.0017156, 4.8813e-5,
  -0.0010278, -0.0001572, -4.0434e-6,
  3.4667e-5, 6.2343e-6, 1.5655e-7,
  -6.1228e-7, -1.3209e-7, -3.2237e-9,
  5.8573e-9, 1.5529e-9, 3.65e-11,
  -2.9595e-11, -9.5349e-12, -2.1505e-13,
  6.2019e-14, 2.3843e-14, 5.1597e-16,
  // i = 4, n = 2
  -0.15558, -0.0042536, -9.7633e-5,
  0.047606, 0.0017754, 3.2832e-5,
  -0.0046542, -0.00020881, -3.4242e-6,
  0.00020312, 1.0088e-5, 1.6314e-7,
  -4.6089e-6, -2.4592e-7, -4.0092e-9,
  5.6717e-8, 3.2014e-9, 5.2747e-11,
  -3.5983e-10, -2.1241e-11, -3.5329e-13,
  9.2209e-13, 5.6467e-14, 9.4664e-16,
  // i = 4, n = 3
  0.11087, 0.0061252, 5.7319e-5,
  -0.029622, -0.0017355, -1.5993e-5,
  0.0025942, 0.00016036, 1.5228e-6,
  -0.00010795, -6.8539e-6, -6.7714e-8,
  2.3816e-6, 1.5498e-7, 1.5828e-9,
  -2.8856e-8, -1.9149e-9, -2.0088e-11,
  1.8081e-10, 1.2223e-11, 1.3102e-13,
  -4.5761e-13, -3.1539e-14, -3.4402e-16,
  // i = 4, n = 4
  -0.015838, -0.00071563, -6.1847e-6,
  0.0042926, 0.00019142, 1.6456e-6,
  -0.00039171, -1.6809e-5, -1.5321e-7,
  1.6946e-5, 6.9046e-7, 6.7237e-9,
  -3.8371e-7, -1.5112e-8, -1.5611e-10,
  4.6824e-9, 1.8183e-10, 1.9738e-12,
  -2.9185e-11, -1.1361e-12, -1.2841e-14,
  7.3004e-14, 2.8813e-15, 3.3644e-17,
] as const;

/**
 * Bistatic cross-section of rain per volume.
 *
 * ln eta is a polynomial in sin^2(angle / 2), ln R, frequency and temperature.
 *
 * Source: ITU-R P.452-18, hydrometeor scatter
 * Valid:  3 to 100 GHz, 0 to 20 degC
 *
 * @param frequencyGHz     [GHz], above 0
 * @param rainRateMmPerH   [mm/h], above 0
 * @param temperatureC     of the rain [degC]
 * @param scatterDeg       0 straight on, 180 back [deg]
 * @returns cross-section per volume [1/m], without the factor of polarization
 * @throws RangeError on a non-finite argument or one out of range
 */
export function rainCrossSection({
  frequencyGHz,
  rainRateMmPerH,
  temperatureC,
  scatterDeg,
}: {
  readonly frequencyGHz: number;
  readonly rainRateMmPerH: number;
  readonly temperatureC: number;
  readonly scatterDeg: number;
}): { readonly perM: number } {
  requirePositive("frequencyGHz", frequencyGHz);
  requirePositive("rainRateMmPerH", rainRateMmPerH);
  requireFinite("temperatureC", temperatureC);
  requireWithin("scatterDeg", scatterDeg, 0, 180);
  const s = (1 - Math.cos((scatterDeg * Math.PI) / 180)) / 2;
  const logRate = Math.log(rainRateMmPerH);
  let row = 0;
  let exponent = 0;
  rainRateTerms.forEach((terms, i) => {
    for (let n = 0; n < terms; n++) {
      for (let m = 0; m < FREQUENCY_TERMS; m++) {
        const c0 = coefficients[row]!;
        const c1 = coefficients[row + 1]!;
        const c2 = coefficients[row + 2]!;
        const b = c0 + temperatureC * (c1 + temperatureC * c2);
        exponent += b * frequencyGHz ** m * logRate ** n * s ** i;
        row += TEMPERATURE_TERMS;
      }
    }
  });
  return { perM: Math.exp(exponent) };
}
