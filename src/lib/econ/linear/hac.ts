import type { LeastSquares } from './leastSquares.ts';

/**
 * Lags of the Newey–West covariance where none are given: ⌊4·(n/100)^(2/9)⌋ (Newey & West 1994). In whole
 * numbers, L⁹·100² ≤ n²·4⁹, so that no rounding decides.
 */
export function ruleOfThumbLags(n: number): number {
  let lags = 0;
  while (power(lags + 1, 9) * 10_000 <= n * n * power(4, 9)) lags++;
  return lags;
}

/**
 * Long-run covariance of estimates by Newey & West (1987, Econometrica 55:703–708): Bartlett weights
 * 1 − l/(L+1), no prewhitening, times n/(n − k).
 * @param influences m series of n numbers in time order: what each observation's disturbance adds to each estimate.
 * @param lags L ≥ 0.
 * @param coefficients k of the equation, for the factor.
 * @returns m×m symmetric matrix, in the squared units of the estimates.
 */
export function longRunCovariance(
  influences: readonly Float64Array[],
  lags: number,
  coefficients: number,
): number[][] {
  const n = influences[0]!.length;
  const factor = n / (n - coefficients);
  const covariance = influences.map(() => new Array<number>(influences.length).fill(0));
  for (let a = 0; a < influences.length; a++) {
    for (let b = 0; b <= a; b++) {
      let sum = crossProduct(influences[a]!, influences[b]!, 0);
      for (let lag = 1; lag <= lags && lag < n; lag++) {
        const both =
          crossProduct(influences[a]!, influences[b]!, lag) +
          crossProduct(influences[b]!, influences[a]!, lag);
        sum += (1 - lag / (lags + 1)) * both;
      }
      covariance[a]![b] = covariance[b]![a] = factor * sum;
    }
  }
  return covariance;
}

/** Long-run variance of one estimate, as {@link longRunCovariance} gives it. */
export function longRunVariance(
  influences: Float64Array,
  lags: number,
  coefficients: number,
): number {
  return longRunCovariance([influences], lags, coefficients)[0]![0]!;
}

/** Influence of each observation on coefficient j: its weight in the estimate times its residual; n numbers. */
export function influence(fit: LeastSquares, j: number): Float64Array {
  return fit.weights(j).map((weight, i) => weight * fit.residuals[i]!);
}

function crossProduct(a: Float64Array, b: Float64Array, lag: number): number {
  let sum = 0;
  for (let i = lag; i < a.length; i++) sum += a[i]! * b[i - lag]!;
  return sum;
}

function power(base: number, exponent: number): number {
  let result = 1;
  for (let i = 0; i < exponent; i++) result *= base;
  return result;
}
