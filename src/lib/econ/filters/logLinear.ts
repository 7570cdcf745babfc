import { constant } from '../linear/equation.ts';
import { leastSquares } from '../linear/leastSquares.ts';

/**
 * Deviations from the least-squares line through n values, in their unit.
 * @returns NaN where a single value leaves the line open.
 */
export function lineResiduals(x: Float64Array): Float64Array {
  const n = x.length;
  const trend = Float64Array.from({ length: n }, (_, i) => i - (n - 1) / 2);
  const fit = leastSquares([constant(n), trend], x);
  return fit?.residuals ?? x.map(() => NaN);
}
