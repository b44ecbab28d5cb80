import { levenbergMarquardt } from "ml-levenberg-marquardt";

export interface LeastSquaresFit {
  readonly parameters: readonly number[];
  /** Covariance of the parameters for the uncertainties given; undefined where the data leave a parameter free. */
  readonly covariance: readonly (readonly number[])[] | undefined;
  /** Sum of squared residuals, each in units of its standard uncertainty. */
  readonly chiSquared: number;
  readonly degreesOfFreedom: number;
  /** Measured less fitted, in the data's own unit. */
  readonly residuals: readonly number[];
}

/**
 * Weighted least squares with the covariance of the parameters, by a Levenberg-Marquardt library.
 *
 * Data are divided by their uncertainty beforehand, and the library's tolerances are set to nothing: its
 * defaults stop at a sum of squares of 1e-7 and after forward differences of 0.1, both far too coarse here. The
 * covariance (J^T J)^-1 is taken at the solution by central differences.
 *
 * Source: Levenberg 1944, Marquardt 1963; covariance as in any text on regression (from memory)
 * Valid:  a start inside the valley of the solution; at least as many data as parameters
 *
 * @param measured   data
 * @param standard   standard uncertainty of each [same unit], above 0
 * @param predict    data that belong to given parameters
 * @param start      first guess
 * @param step       step of the differences, one a parameter: small against the scale on which `predict` bends
 * @param low, high  limits of the parameters, optional
 * @throws RangeError on fewer data than parameters
 */
export function leastSquares({
  measured,
  standard,
  predict,
  start,
  step,
  low,
  high,
}: {
  readonly measured: readonly number[];
  readonly standard: readonly number[];
  readonly predict: (parameters: readonly number[]) => readonly number[];
  readonly start: readonly number[];
  readonly step: readonly number[];
  readonly low?: readonly number[];
  readonly high?: readonly number[];
}): LeastSquaresFit {
  if (measured.length < start.length || measured.length < 2) {
    throw new RangeError(`${start.length} parameters need at least ${Math.max(2, start.length)} data`);
  }
  const whitened = (parameters: readonly number[]) =>
    predict(parameters).map((value, i) => value / standard[i]!);
  const { parameterValues } = levenbergMarquardt(
    { x: measured.map((_, i) => i), y: measured.map((value, i) => value / standard[i]!) },
    (parameters) => {
      const values = whitened(parameters);
      return (i) => values[i]!;
    },
    {
      initialValues: start,
      centralDifference: true,
      gradientDifference: step,
      errorTolerance: 0,
      maxIterations: 60,
      ...(low && { minValues: low }),
      ...(high && { maxValues: high }),
    },
  );
  const slopes = step.map((delta, k) => {
    const shifted = (sign: number) =>
      whitened(parameterValues.map((value, i) => (i === k ? value + sign * delta : value)));
    const up = shifted(1);
    const down = shifted(-1);
    return up.map((value, i) => (value - down[i]!) / (2 * delta));
  });
  const normal = slopes.map((a) => slopes.map((b) => a.reduce((sum, value, i) => sum + value * b[i]!, 0)));
  const residuals = predict(parameterValues).map((value, i) => measured[i]! - value);
  return {
    parameters: parameterValues,
    covariance: inverse(normal),
    chiSquared: residuals.reduce((sum, residual, i) => sum + (residual / standard[i]!) ** 2, 0),
    degreesOfFreedom: measured.length - start.length,
    residuals,
  };
}

/**
 * Inverse of a small symmetric matrix by Gauss-Jordan elimination, its diagonal scaled to 1; undefined where it is
 * not positive definite.
 */
function inverse(matrix: readonly (readonly number[])[]): number[][] | undefined {
  const size = matrix.map((row, i) => Math.sqrt(row[i]!));
  const rows = matrix.map((row, i) => [
    ...row.map((value, j) => value / (size[i]! * size[j]!)),
    ...row.map((_, j) => (i === j ? 1 : 0)),
  ]);
  for (const [i, pivotRow] of rows.entries()) {
    const pivot = pivotRow[i]!;
    if (!(pivot > 1e-12)) return undefined;
    for (let j = 0; j < pivotRow.length; j++) pivotRow[j] = pivotRow[j]! / pivot;
    for (const row of rows) {
      if (row === pivotRow) continue;
      const factor = row[i]!;
      for (let j = 0; j < row.length; j++) row[j] = row[j]! - factor * pivotRow[j]!;
    }
  }
  return rows.map((row, i) => row.slice(matrix.length).map((value, j) => value / (size[i]! * size[j]!)));
}
