import ln from '@stdlib/math-base-special-ln';
import { UpdatedLeastSquares } from '../linear/updating.ts';
import { constant } from '../linear/equation.ts';
import { formatPeriod } from '../periods.ts';
import { RefusedError } from '../refusal.ts';
import { indicators, lagged, type Data } from '../series.ts';
import type { Expectation } from '../types.ts';
import { largestOrder } from './coefficients.ts';
import { emptyPath, type ExpectationPath } from './expectation.ts';

/** The rules that learn by least squares. */
export type RegressionRule = Extract<Expectation, { rule: 'random_walk' | 'autoregression' }>;

/**
 * One-step expectations by recursive least squares (method, section 2): at each target t, growth on a constant,
 * seasonal indicators and its own lags over the window that ends at t − 1.
 *
 * Columns are ordered constant, indicators, lag 1…P, so one triangular factor holds the fits of every order: order p
 * uses its leading columns, and what the others explain is added to its squared residuals.
 * @param persistence ρ, for the path of the coefficients' error.
 * @throws RefusedError where money is too short for the window, or a window is rank-deficient.
 */
export function regressionExpectation(
  data: Data,
  rule: RegressionRule,
  persistence: number,
): ExpectationPath {
  const largest = largestOrder(rule);
  const fixed = [constant(data.length), ...(rule.seasonal === 'dummies' ? indicators(data) : [])];
  const lags = Array.from({ length: largest }, (_, j) => lagged(data.growth, j + 1));
  const rows = transpose([...fixed, ...lags], data.length);
  const k = fixed.length + largest;
  const firstRow = largest + 1;
  const { kind, length } = rule.window;
  const first = firstRow + length;
  if (first >= data.length) throw tooShort(data.length, first + 1);

  const chooses = rule.rule === 'autoregression' && typeof rule.order !== 'number';
  const path = emptyPath(first, data.length - first);
  if (rule.rule === 'autoregression') path.order = [];
  const window = new UpdatedLeastSquares(k);
  const cumulated = new Float64Array(k);
  const standardised = new Float64Array(k);
  const spread = new Float64Array(k);
  for (let s = firstRow; s < first; s++) window.add(rows[s]!, data.growth[s]!);

  for (let t = first; t < data.length; t++) {
    if (t > first) advance(window, rows, data.growth, t, kind === 'rolling' ? length : null);
    if (window.rankDeficient) throw rankDeficient(data, t);
    const x = rows[t]!;
    const order = chooses ? leastInformation(window, fixed.length, largest) : largest;
    const used = fixed.length + order;
    window.standardise(x, standardised);
    let ssr = window.ssr;
    for (let i = used; i < k; i++) ssr += window.component(i) * window.component(i);
    let forecast = 0;
    let leverage = 0;
    for (let i = 0; i < used; i++) {
      forecast += standardised[i]! * window.component(i);
      leverage += standardised[i]! * standardised[i]!;
    }
    for (let j = 0; j < k; j++) cumulated[j] = x[j]! + persistence * cumulated[j]!;
    window.standardise(cumulated, spread);
    let pathLeverage = 0;
    for (let i = 0; i < used; i++) pathLeverage += spread[i]! * spread[i]!;

    const s = Math.sqrt(ssr / (window.observations - used));
    const variance = s > data.rounding ? s * s : 0;
    const i = t - first;
    path.expected[i] = forecast;
    path.surprise[i] = data.growth[t]! - forecast;
    path.forecastError[i] = Math.sqrt(variance) * Math.sqrt(1 + leverage);
    path.parameterVariance[i] = variance * leverage;
    path.pathVariance[i] = variance * pathLeverage;
    path.order?.push(order);
  }
  return path;
}

/** Order 0…P of least BIC = n·ln(SSR/n) + k·ln n on the window's rows; ties to the smaller. */
function leastInformation(window: UpdatedLeastSquares, fixed: number, largest: number): number {
  const n = window.observations;
  const penalty = ln(n);
  let ssr = window.ssr;
  let best = largest;
  let least = Infinity;
  for (let order = largest; order >= 0; order--) {
    const criterion = n * ln(ssr / n) + (fixed + order) * penalty;
    if (criterion <= least) {
      least = criterion;
      best = order;
    }
    if (order > 0) {
      const component = window.component(fixed + order - 1);
      ssr += component * component;
    }
  }
  return best;
}

/**
 * Moves a window on so that it ends at t − 1.
 * @param length How many rows it keeps; null where it keeps all.
 */
function advance(
  window: UpdatedLeastSquares,
  rows: Float64Array[],
  growth: Float64Array,
  t: number,
  length: number | null,
): void {
  window.add(rows[t - 1]!, growth[t - 1]!);
  if (length === null) return;
  const oldest = t - 1 - length;
  window.remove(rows[oldest]!, growth[oldest]!);
  if (window.accurate) return;
  window.clear();
  for (let s = oldest + 1; s < t; s++) window.add(rows[s]!, growth[s]!);
}

function transpose(columns: Float64Array[], length: number): Float64Array[] {
  const k = columns.length;
  const all = new Float64Array(length * k);
  columns.forEach((column, j) => {
    for (let t = 0; t < length; t++) all[t * k + j] = column[t]!;
  });
  return Array.from({ length }, (_, t) => all.subarray(t * k, (t + 1) * k));
}

/** The refusal where the series has fewer levels than the first surprise needs. */
export function tooShort(levels: number, needed: number): RefusedError {
  return new RefusedError([
    {
      pointer: '/money/values',
      message: `The money series has ${levels} ${levels === 1 ? 'level' : 'levels'}, but this rule and window need at least ${needed} before there is a first surprise. Load a longer series or shorten the window.`,
    },
  ]);
}

function rankDeficient(data: Data, t: number): RefusedError {
  const period = formatPeriod({ frequency: data.frequency, index: data.start + t });
  return new RefusedError([
    {
      pointer: '/money/values',
      period,
      message: `The expectation for ${period} cannot be computed: in the periods the rule learns from, money growth varies too little to tell its regressors apart. Use a longer window, a lower order or no seasonal indicators.`,
    },
  ]);
}
