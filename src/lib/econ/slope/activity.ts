import { constant, type Equation } from '../linear/equation.ts';
import { influence, longRunCovariance } from '../linear/hac.ts';
import { mean } from '../moments.ts';
import { lagged } from '../series.ts';
import { fitSlopeEquation, type EstimationChoice } from './estimate.ts';
import type { LambdaEstimate } from './prices.ts';
import type { Terms } from './terms.ts';

/** λ̂ and ρ̂ of one equation, with standard errors and their covariance. */
export interface ActivityEstimate extends LambdaEstimate {
  rho: number;
  seRho: number;
  covariance: number;
}

const TREND = 1;
const PAST_ACTIVITY = 2;
const GROWTH = 3;

/**
 * λ and ρ from activity (Lucas 1973): least squares of x_t on 1, t, x_{t−1}, d_t … d_{t−P} and indicators; for rules
 * that do not learn by least squares u_t stands in place of the d's (method, section 3).
 * @throws RefusedError, see {@link fitSlopeEquation}.
 */
export function activityEquation(terms: Terms, choice: EstimationChoice): ActivityEstimate {
  const { data, surprise, order, seasons } = terms;
  const money = surprise
    ? [surprise]
    : Array.from({ length: order + 1 }, (_, j) => lagged(data.growth, j));
  const trend = Float64Array.from({ length: data.length }, (_, t) => t);
  const columns = [constant(data.length), trend, lagged(data.activity, 1), ...money, ...seasons];
  const { fit, lags } = fitSlopeEquation(data.activity, [columns], choice, 'activity', centred);
  const influences = [influence(fit, GROWTH), influence(fit, PAST_ACTIVITY)];
  const covariance = longRunCovariance(influences, lags, fit.coefficients.length);
  return {
    lambda: fit.coefficients[GROWTH]!,
    seLambda: Math.sqrt(covariance[0]![0]!),
    rho: fit.coefficients[PAST_ACTIVITY]!,
    seRho: Math.sqrt(covariance[1]![1]!),
    covariance: covariance[0]![1]!,
    observations: fit.observations,
    lags,
  };
}

/** Levels of 400 log points with changes of 0.1 lose digits beside a constant; the slopes do not depend on the origin. */
function centred(rows: Equation): void {
  const origin = mean(rows.y);
  const shift = (values: Float64Array, by: number) => values.map((value) => value - by);
  rows.y = shift(rows.y, origin);
  rows.columns[PAST_ACTIVITY] = shift(rows.columns[PAST_ACTIVITY]!, origin);
  rows.columns[TREND] = shift(rows.columns[TREND]!, mean(rows.columns[TREND]!));
}
