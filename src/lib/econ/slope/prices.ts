import { constant } from '../linear/equation.ts';
import { influence, longRunVariance } from '../linear/hac.ts';
import { lagged, minus } from '../series.ts';
import { fitSlopeEquation, type EstimationChoice } from './estimate.ts';
import type { Terms } from './terms.ts';

/** λ̂ with its Newey–West standard error; `observations` rows, `lags` of the covariance. */
export interface LambdaEstimate {
  lambda: number;
  seLambda: number;
  observations: number;
  lags: number;
}

/**
 * λ from prices: the response of real balances w_t = d_t − π_t to money growth within the period, by least squares
 * of w_t on 1, d_t … d_{t−P−1} and indicators; for rules that do not learn by least squares on 1, u_t, u_{t−1} and
 * d_t − u_t, the last left out where it is collinear (method, section 3).
 * @throws RefusedError, see {@link fitSlopeEquation}.
 */
export function lambdaFromPrices(terms: Terms, choice: EstimationChoice): LambdaEstimate {
  const { data, surprise, order, seasons } = terms;
  const ones = constant(data.length);
  let sets: Float64Array[][];
  if (surprise === null) {
    const growth = Array.from({ length: order + 2 }, (_, j) => lagged(data.growth, j));
    sets = [[ones, ...growth, ...seasons]];
  } else {
    const surprises = [ones, surprise, lagged(surprise, 1)];
    sets = [[...surprises, minus(data.growth, surprise)], surprises];
  }
  const { fit, lags } = fitSlopeEquation(data.realBalances, sets, choice, 'prices');
  const variance = longRunVariance(influence(fit, 1), lags, fit.coefficients.length);
  return {
    lambda: fit.coefficients[1]!,
    seLambda: Math.sqrt(variance),
    observations: fit.observations,
    lags,
  };
}
