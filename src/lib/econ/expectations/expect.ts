import type { Data } from '../series.ts';
import type { Expectation } from '../types.ts';
import { adaptiveExpectation } from './adaptive.ts';
import type { ExpectationPath } from './expectation.ts';
import { regressionExpectation, type RegressionRule } from './regression.ts';
import { surveyExpectation } from './survey.ts';

/** Whether a rule learns by least squares, so that the slope's equations hold growth itself and no surprise. */
export function isRegression(rule: Expectation): rule is RegressionRule {
  return rule.rule === 'random_walk' || rule.rule === 'autoregression';
}

/**
 * Expected growth and surprises of any rule (method, section 2).
 * @param persistence ρ in use; it enters only the path variance of rules that learn by least squares.
 * @throws RefusedError where the data do not allow the rule.
 */
export function expect(data: Data, rule: Expectation, persistence: number): ExpectationPath {
  if (isRegression(rule)) return regressionExpectation(data, rule, persistence);
  return rule.rule === 'adaptive' ? adaptiveExpectation(data, rule) : surveyExpectation(data);
}
