import { PERIODS_A_YEAR } from '../periods.ts';
import type { Expectation, Frequency } from '../types.ts';

/** Largest lag order of a rule: P of the method's section 3; 0 for rules without one. */
export function largestOrder(rule: Expectation): number {
  if (rule.rule !== 'autoregression') return 0;
  return typeof rule.order === 'number' ? rule.order : rule.order.max;
}

/** Coefficients a rule learns from its window, k of the method's section 2; the window must be longer. */
export function coefficientsOf(rule: Expectation, frequency: Frequency): number {
  const indicators = rule.seasonal === 'dummies' ? PERIODS_A_YEAR[frequency] - 1 : 0;
  return 1 + largestOrder(rule) + indicators;
}
