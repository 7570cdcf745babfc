import { chiSquaredSurvival } from '../distributions/chiSquared.ts';
import { constant, equation } from '../linear/equation.ts';
import { influence, longRunCovariance, ruleOfThumbLags } from '../linear/hac.ts';
import { leastSquares } from '../linear/leastSquares.ts';
import { quadraticForm } from '../linear/quadraticForm.ts';
import { differences, lagged, minus } from '../series.ts';
import type { EstimationChoice } from '../slope/estimate.ts';
import type { Terms } from '../slope/terms.ts';
import type { NeutralityResult } from '../types.ts';

/**
 * The test that fits the rule; null without prices. An exact fit, which leaves no error to test by, counts as collinear.
 * @param order p: 0 for the random walk, the order, or under BIC the latest order used.
 * @param choice The slope's window, used by rules that do not learn by least squares, and its lags.
 */
export function neutrality(
  terms: Terms,
  order: number,
  rho: number,
  choice: EstimationChoice,
): NeutralityResult | null {
  if (!terms.data.hasPrices) return null;
  if (terms.surprise === null) return neutralityOfGrowth(terms, order, rho, choice.lags);
  return neutralityOfSurprises(terms, terms.surprise, rho, choice);
}

type Reason = 'persistence' | 'too few' | 'collinear';

/**
 * The model's own test of neutrality for rules that learn by least squares (method, section 3). With the ρ in use,
 * w_t − ρ·w_{t−1} on 1, d_{t−1}, Δd_t … Δd_{t−p} and indicators gives a, λ, γ_1…γ_p; d_t on 1, d_{t−1} … d_{t−p} and
 * indicators on the same rows gives φ. H0: a = 0 and γ_j + λφ_j = 0. Wald statistic by the delta method on the joint
 * Newey–West covariance of both equations, χ²(1 + p).
 */
function neutralityOfGrowth(
  terms: Terms,
  order: number,
  rho: number,
  lags?: number,
): NeutralityResult {
  if (!(rho >= 0 && rho < 1)) return without('persistence');
  const { data, seasons } = terms;
  const ones = constant(data.length);
  const balances =
    rho === 0
      ? data.realBalances
      : data.realBalances.map((w, t) => w - rho * (t === 0 ? NaN : data.realBalances[t - 1]!));
  const change = differences(data.growth);
  const changes = Array.from({ length: order + 1 }, (_, j) => lagged(change, j));
  const past = Array.from({ length: order }, (_, j) => lagged(data.growth, j + 1));
  const main = [ones, lagged(data.growth, 1), ...changes, ...seasons];
  const rows = equation(balances, [...main, data.growth, ...past]);
  const n = rows.rows.length;
  const k = main.length;
  if (n <= k) return without('too few');
  const response = leastSquares(rows.columns.slice(0, k), rows.y);
  const pick = (values: Float64Array) => Float64Array.from(rows.rows, (t) => values[t]!);
  const growth = leastSquares([ones, ...past, ...seasons].map(pick), pick(data.growth));
  if (response === null || response.ssr === 0 || growth === null) return without('collinear');

  const coefficients = Array.from(response.coefficients.subarray(1, 3 + order));
  const lambda = coefficients[1]!;
  const byLambda = influence(response, 2);
  const restrictions = [coefficients[0]!];
  const influences = [influence(response, 1)];
  for (let j = 1; j <= order; j++) {
    const phi = growth.coefficients[j]!;
    restrictions.push(coefficients[1 + j]! + lambda * phi);
    const byGamma = influence(response, 2 + j);
    const byPhi = influence(growth, j);
    influences.push(byGamma.map((value, i) => value + phi * byLambda[i]! + lambda * byPhi[i]!));
  }
  return waldTest(restrictions, influences, coefficients, lags ?? ruleOfThumbLags(n), k);
}

/**
 * The test for rules that do not learn by least squares: π_t on 1, d_t − u_t, u_t, u_{t−1}; H0: β₁ = 1 and
 * β₂ + β₃ = 1, χ²(2). Without persistence only.
 * @param choice The slope's window, where its method is prices, and its lags.
 */
function neutralityOfSurprises(
  terms: Terms,
  surprise: Float64Array,
  rho: number,
  choice: EstimationChoice,
): NeutralityResult {
  if (rho !== 0) return without('persistence');
  const { data } = terms;
  const columns = [
    constant(data.length),
    minus(data.growth, surprise),
    surprise,
    lagged(surprise, 1),
  ];
  const rows = equation(data.inflation, columns, choice.window?.length);
  const n = rows.rows.length;
  if (n <= columns.length) return without('too few');
  const fit = leastSquares(rows.columns, rows.y);
  if (fit === null || fit.ssr === 0) return without('collinear');
  const byCarried = influence(fit, 3);
  const coefficients = Array.from(fit.coefficients);
  return waldTest(
    [coefficients[1]! - 1, coefficients[2]! + coefficients[3]! - 1],
    [influence(fit, 1), influence(fit, 2).map((value, i) => value + byCarried[i]!)],
    coefficients,
    choice.lags ?? ruleOfThumbLags(n),
    columns.length,
  );
}

function waldTest(
  restrictions: number[],
  influences: Float64Array[],
  coefficients: number[],
  lags: number,
  k: number,
): NeutralityResult {
  const statistic = quadraticForm(longRunCovariance(influences, lags, k), restrictions);
  if (statistic === null) return without('collinear');
  const p = chiSquaredSurvival(statistic, restrictions.length);
  return { statistic, p, coefficients, reason: null };
}

function without(reason: Reason): NeutralityResult {
  return { statistic: null, p: null, coefficients: null, reason };
}
