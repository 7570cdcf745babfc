import { constant, equation } from '../linear/equation.ts';
import { leastSquares } from '../linear/leastSquares.ts';
import { mean } from '../moments.ts';
import { lagged } from '../series.ts';

/**
 * Hamilton's filter (2018, REStat 100:831–843): residual of x_t on 1, x_{t−h} … x_{t−h−p+1}, log points.
 * @param x n values. @param horizon h. @param lags p.
 * @returns n values; NaN where the lags do not exist, and everywhere where there are at most p + 1 rows or the lags are
 * collinear.
 */
export function hamilton(x: Float64Array, horizon: number, lags: number): Float64Array {
  const result = new Float64Array(x.length).fill(NaN);
  const centre = mean(x);
  const centred = x.map((value) => value - centre);
  const columns = Array.from({ length: lags }, (_, j) => lagged(centred, horizon + j));
  const rows = equation(centred, [constant(x.length), ...columns]);
  if (rows.rows.length <= lags + 1) return result;
  const fit = leastSquares(rows.columns, rows.y);
  if (fit !== null) rows.rows.forEach((t, i) => (result[t] = fit.residuals[i]!));
  return result;
}
