import { chiSquaredSurvival } from '../distributions/chiSquared.ts';
import { longRunVariance, ruleOfThumbLags } from '../linear/hac.ts';
import { centralMoment, mean, sampleVariance } from '../moments.ts';
import type { DiagnosticsResult, TestResult } from '../types.ts';

/**
 * Size and bias of the surprise as a forecast error (method, section 5), log points a period. `mean_t` uses Newey–West
 * errors with the rule of thumb's lags; it and `sd` are null for a single surprise, `mean_t` also where all are alike.
 */
export function sizeOfSurprise(
  surprise: Float64Array,
  rounding: number,
): NonNullable<DiagnosticsResult['surprise']> {
  const n = surprise.length;
  const centre = mean(surprise);
  const variance = sampleVariance(surprise);
  let meanT: number | null = null;
  if (variance !== null && !allAlike(surprise, rounding)) {
    const weighted = surprise.map((value) => (value - centre) / n);
    const longRun = longRunVariance(weighted, ruleOfThumbLags(n), 1);
    meanT = longRun > 0 ? centre / Math.sqrt(longRun) : null;
  }
  return {
    mean: centre,
    mean_t: meanT,
    sd: variance === null ? null : Math.sqrt(variance),
    rmse: Math.sqrt(mean(surprise.map((value) => value * value))),
    mae: mean(surprise.map((value) => Math.abs(value))),
  };
}

/**
 * Ljung–Box test of no autocorrelation (Ljung & Box 1978, Biometrika 65:297–303) up to lag h = min(2f, ⌊n/5⌋), at least
 * 1; χ²(h). Null statistic where there is one surprise, or all are alike.
 * @param perYear Periods a year, f.
 */
export function ljungBox(
  surprise: Float64Array,
  perYear: number,
  rounding: number,
): TestResult & { lags: number } {
  const n = surprise.length;
  const lags = Math.max(1, Math.min(2 * perYear, Math.floor(n / 5)));
  if (n < 2 || allAlike(surprise, rounding)) return { statistic: null, lags, p: null };
  const centre = mean(surprise);
  const deviations = surprise.map((value) => value - centre);
  const variance = sumOfProducts(deviations, 0);
  let sum = 0;
  for (let lag = 1; lag <= lags && lag < n; lag++) {
    const correlation = sumOfProducts(deviations, lag) / variance;
    sum += (correlation * correlation) / (n - lag);
  }
  const statistic = n * (n + 2) * sum;
  return { statistic, lags, p: chiSquaredSurvival(statistic, lags) };
}

/**
 * Jarque–Bera test of normality (Jarque & Bera 1980, Economics Letters 6:255–259), moments with divisor n; χ²(2). Null
 * where there is one surprise, or all are alike.
 */
export function jarqueBera(surprise: Float64Array, rounding: number): TestResult {
  if (surprise.length < 2 || allAlike(surprise, rounding)) return { statistic: null, p: null };
  const variance = centralMoment(surprise, 2);
  const skewness = centralMoment(surprise, 3) / (variance * Math.sqrt(variance));
  const kurtosis = centralMoment(surprise, 4) / (variance * variance);
  const excess = kurtosis - 3;
  const statistic = (surprise.length / 6) * (skewness * skewness + (excess * excess) / 4);
  return { statistic, p: chiSquaredSurvival(statistic, 2) };
}

/**
 * Whether all numbers are alike but for rounding, so that a statistic of their deviations would be 0/0. There is at
 * least one.
 * @param rounding Size of deviations that are rounding errors.
 */
export function allAlike(values: Float64Array, rounding: number): boolean {
  return Math.sqrt(centralMoment(values, 2)) <= rounding;
}

function sumOfProducts(values: Float64Array, lag: number): number {
  let sum = 0;
  for (let i = lag; i < values.length; i++) sum += values[i]! * values[i - lag]!;
  return sum;
}
