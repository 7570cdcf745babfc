import ln from '@stdlib/math-base-special-ln';
import { constant } from '../linear/equation.ts';
import { classicalErrors, leastSquares, type LeastSquares } from '../linear/leastSquares.ts';
import { mean } from '../moments.ts';
import { differences } from '../series.ts';
import type { DickeyFullerResult } from '../types.ts';
import { dickeyFullerCritical, dickeyFullerP, type Deterministic } from './mackinnon.ts';

/**
 * Augmented Dickey–Fuller test of a unit root (Said & Dickey 1984, Biometrika 71:599–607): Δy_t on the deterministic
 * terms, y_{t−1} and Δy_{t−1} … Δy_{t−L}. L is of least BIC, all coefficients counted, ties to fewer, up to
 * min(⌊12·(n/100)^¼⌋, ⌊n/2⌋ − D − 1) on a common sample; then the equation is fitted on the longest one.
 * @param y n consecutive values, in any unit.
 * @returns null where no number of lags is possible or the statistic would be 0/0.
 */
export function dickeyFuller(y: Float64Array, terms: Deterministic): DickeyFullerResult | null {
  const most = mostLags(y.length, terms === 'constant' ? 1 : 2);
  if (most < 0) return null;
  const lags = leastInformationLags(y, terms, most);
  return lags === null ? null : dickeyFullerAt(y, terms, lags);
}

/** The same test with a given number of lagged differences. */
export function dickeyFullerAt(
  y: Float64Array,
  terms: Deterministic,
  lags: number,
): DickeyFullerResult | null {
  const fit = regression(y, terms, lags, lags);
  if (fit === null || fit.ssr === 0 || fit.observations <= fit.coefficients.length) return null;
  const level = deterministicTerms(terms);
  const statistic = fit.coefficients[level]! / classicalErrors(fit)[level]!;
  return {
    statistic,
    lags,
    p: dickeyFullerP(statistic, terms),
    critical: dickeyFullerCritical(fit.observations, terms),
  };
}

/** ⌊12·(n/100)^¼⌋ in whole numbers, L⁴·100 ≤ 12⁴·n, so that no rounding decides; capped by the sample (Schwert 1989). */
function mostLags(n: number, deterministic: number): number {
  let lags = 0;
  while ((lags + 1) * (lags + 1) * (lags + 1) * (lags + 1) * 100 <= 20_736 * n) lags++;
  return Math.min(lags, Math.floor(n / 2) - deterministic - 1);
}

function leastInformationLags(y: Float64Array, terms: Deterministic, most: number): number | null {
  const fit = regression(y, terms, most, most);
  if (fit === null || fit.ssr === 0) return null;
  const n = fit.observations;
  const penalty = ln(n);
  const fixed = deterministicTerms(terms) + 1;
  let { ssr } = fit;
  let best = most;
  let least = Infinity;
  for (let lags = most; lags >= 0; lags--) {
    const criterion = n * ln(ssr / n) + (fixed + lags) * penalty;
    if (criterion <= least) {
      least = criterion;
      best = lags;
    }
    const component = fit.rotated[fixed + lags - 1]!;
    ssr += component * component;
  }
  return best;
}

/** The test's equation with `lags` lagged differences, on the periods for which `lost` of them exist. */
function regression(
  y: Float64Array,
  terms: Deterministic,
  lags: number,
  lost: number,
): LeastSquares | null {
  const change = differences(y);
  const first = lost + 1;
  const rows = y.length - first;
  const from = (values: Float64Array, lag: number) => values.slice(first - lag, first - lag + rows);
  const level = from(y, 1);
  const origin = mean(level);
  const columns = [
    constant(rows),
    ...(terms === 'constant'
      ? []
      : [Float64Array.from({ length: rows }, (_, i) => i - (rows - 1) / 2)]),
    level.map((value) => value - origin),
    ...Array.from({ length: lags }, (_, j) => from(change, j + 1)),
  ];
  return leastSquares(columns, from(change, 0));
}

function deterministicTerms(terms: Deterministic): number {
  return terms === 'constant' ? 1 : 2;
}
