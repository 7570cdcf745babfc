import { mean } from '../moments.ts';
import type { Data } from '../series.ts';
import type { Expectation } from '../types.ts';
import { emptyPath, type ExpectationPath } from './expectation.ts';
import { pastErrors } from './pastErrors.ts';
import { tooShort } from './regression.ts';

/**
 * Adaptive expectations (Cagan 1956, in Friedman, Studies in the Quantity Theory of Money): a_{N+1} is the mean of the
 * first N growth rates, a_{t+1} = a_t + κ(d_t − a_t), and E_{t−1}[d_t] = a_t from t = N + 1 on.
 * @throws RefusedError where money has fewer than N + 2 levels.
 */
export function adaptiveExpectation(
  data: Data,
  rule: Extract<Expectation, { rule: 'adaptive' }>,
): ExpectationPath {
  const { length } = rule.window;
  const first = length + 1;
  if (first >= data.length) throw tooShort(data.length, first + 1);
  const path = emptyPath(first, data.length - first);
  let expected = mean(data.growth.subarray(1, first));
  for (let t = first; t < data.length; t++) {
    const surprise = data.growth[t]! - expected;
    path.expected[t - first] = expected;
    path.surprise[t - first] = surprise;
    expected += rule.gain * surprise;
  }
  path.forecastError = pastErrors(path.surprise, data.rounding);
  return path;
}
