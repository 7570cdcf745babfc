import { largestOrder } from '../expectations/coefficients.ts';
import { isRegression } from '../expectations/expect.ts';
import type { ExpectationPath } from '../expectations/expectation.ts';
import { indicators, type Data } from '../series.ts';
import type { Expectation } from '../types.ts';

/** What the slope's and the neutrality equations are built from (method, section 3); arrays over money's periods. */
export interface Terms {
  data: Data;
  /** u_t for rules that do not learn by least squares, NaN where there is none; null for those that do. */
  surprise: Float64Array | null;
  /** P: the largest lag order of the rule. */
  order: number;
  /** f − 1 seasonal indicators where the rule has them. */
  seasons: Float64Array[];
}

/**
 * Terms of a rule. `path` is needed only for rules that do not learn by least squares: the other rules' equations hold
 * growth itself, so that no estimated regressor enters them.
 */
export function termsOf(data: Data, rule: Expectation, path: ExpectationPath | null): Terms {
  return {
    data,
    surprise: isRegression(rule) || path === null ? null : spread(data, path),
    order: largestOrder(rule),
    seasons: rule.seasonal === 'dummies' ? indicators(data) : [],
  };
}

function spread(data: Data, path: ExpectationPath): Float64Array {
  const result = new Float64Array(data.length).fill(NaN);
  result.set(path.surprise, path.first);
  return result;
}
