import { equation, type Equation } from '../linear/equation.ts';
import { ruleOfThumbLags } from '../linear/hac.ts';
import { leastSquares, type LeastSquares } from '../linear/leastSquares.ts';
import { RefusedError } from '../refusal.ts';
import type { Fault } from '../types.ts';

/** Which rows a slope equation uses and how its errors are computed. */
export interface EstimationChoice {
  /** The last so many periods; all where absent. */
  window?: { length: number };
  /** Newey–West lags; the rule of thumb where absent. */
  lags?: number;
}

export interface FittedEquation {
  fit: LeastSquares;
  lags: number;
}

/** Regressors of an equation that may drop some: the first set of full rank is used. */
type ColumnSets = Float64Array[][];

/**
 * Fits a slope equation (method, section 3).
 * @param series Which series of the request it explains, for the pointer of a refusal.
 * @param centre Changes the selected rows before the fit, for accuracy.
 * @throws RefusedError where there are too few rows, the rank is deficient, the fit is exact or the lags are too many.
 */
export function fitSlopeEquation(
  y: Float64Array,
  sets: ColumnSets,
  choice: EstimationChoice,
  series: 'prices' | 'activity',
  centre: (rows: Equation) => void = () => {},
): FittedEquation {
  let rows = equation(y, sets[0]!, choice.window?.length);
  let fit: LeastSquares | null = null;
  for (const columns of sets) {
    rows = equation(y, columns, choice.window?.length);
    centre(rows);
    fit = leastSquares(rows.columns, rows.y);
    if (fit !== null) break;
  }
  const n = rows.rows.length;
  const lags = choice.lags ?? ruleOfThumbLags(n);
  const faults = [unfit(fit, n, rows.columns.length, choice, series), excessive(choice, n)];
  const found = faults.filter((fault) => fault !== null);
  if (found.length > 0 || fit === null) throw new RefusedError(found);
  return { fit, lags };
}

/** Why an equation of k coefficients on n periods gives no estimate; null where it gives one. */
function unfit(
  fit: LeastSquares | null,
  n: number,
  k: number,
  { window }: EstimationChoice,
  series: 'prices' | 'activity',
): Fault | null {
  const what = `The equation that estimates the response of ${series} to money`;
  if (window !== undefined && window.length <= k) {
    return {
      pointer: '/slope/window/length',
      message: `${what} has ${k} coefficients, so its window must hold at least ${k + 1} periods, not ${window.length}.`,
    };
  }
  const pointer = `/${series}/values`;
  if (n <= k) {
    return {
      pointer,
      message: `${what} has ${k} coefficients and needs more periods than that, but only ${n} have all its terms. Load a longer series.`,
    };
  }
  if (fit === null) {
    return {
      pointer,
      message: `${what} cannot be solved: over these periods its terms move together, so that their effects cannot be told apart.`,
    };
  }
  if (fit.ssr > 0) return null;
  return {
    pointer,
    message: `${what} fits every period exactly, so the error of its estimate cannot be measured. Check whether the series is a computed one.`,
  };
}

/** The fault of more lags than the equation's n periods can bear. */
function excessive({ lags }: EstimationChoice, n: number): Fault | null {
  if (lags === undefined || lags < n) return null;
  return {
    pointer: '/slope/lags',
    message: `The number of lags must be below the ${n} periods of the slope's equation, not ${lags}.`,
  };
}
