import { unsigned } from '../../lib/charts/figures.ts';
import type {
  Assumptions,
  ComputeResult,
  Expectation,
  Frequency,
  Slope,
} from '../../lib/econ/types.ts';
import { standardNormal80 } from './intervals.ts';

const nouns: Record<Frequency, string> = { monthly: 'month', quarterly: 'quarter', annual: 'year' };

/** The expectation rule of a specification in plain words. */
export function expectationWords(expectation: Expectation, frequency: Frequency): string {
  const noun = nouns[frequency];
  if (expectation.rule === 'survey') return `What a survey expected the ${noun} before`;
  const { window } = expectation;
  if (expectation.rule === 'adaptive') {
    return `Adaptive with a gain of ${expectation.gain}, started from the first ${window.length} ${noun}s`;
  }
  const rows =
    window.kind === 'rolling'
      ? `the last ${window.length} ${noun}s`
      : `all earlier ${noun}s, at least ${window.length}`;
  const seasonal = expectation.seasonal === 'dummies' ? ', with seasonal indicators' : '';
  if (expectation.rule === 'random_walk') return `Mean growth of ${rows}${seasonal}`;
  const order =
    typeof expectation.order === 'number'
      ? `Autoregression of order ${expectation.order}`
      : `Autoregression, order chosen by BIC up to ${expectation.order.max}`;
  return `${order} on ${rows}${seasonal}; re-estimated every ${noun}`;
}

/** Where the output share comes from, in plain words. */
export function slopeWords(slope: Slope, frequency: Frequency): string {
  const noun = nouns[frequency];
  switch (slope.method) {
    case 'fixed': {
      const share = slope.b / (1 + slope.b);
      const error =
        slope.se_lambda === undefined ? 'taken as known' : `with standard error ${slope.se_lambda}`;
      return `Fixed at ${unsigned(share, 2)}, ${error}`;
    }
    case 'structural':
      return `Solved from the model with labour-supply curvature ${slope.gamma} and demand elasticity ${slope.eta}`;
    case 'prices':
    case 'activity': {
      const rows = slope.window ? `the last ${slope.window.length} ${noun}s` : `all ${noun}s`;
      return `Estimated from ${slope.method} over ${rows}`;
    }
  }
}

/** How much of a gap remains after one period, in plain words. */
export function persistenceWords(
  assumptions: Pick<Assumptions, 'gap'>,
  rho: number | null,
): string {
  const given = assumptions.gap?.persistence ?? 'none';
  if (given === 'none' || given === 0) return 'None: the effect lasts one period';
  if (given !== 'estimated')
    return `Given: ${unsigned(given, 2)} of a gap remains after one period`;
  return rho === null
    ? 'Estimated from activity'
    : `Estimated from activity: ${unsigned(rho, 2)} of a gap remains after one period`;
}

/** The ends of the output share's 80% interval: "0.30 to 0.42"; null where it counts as known. */
export function shareInterval({ lambda, se_lambda }: ComputeResult['slope']): string | null {
  if (se_lambda === null) return null;
  const half = standardNormal80 * se_lambda;
  return `${unsigned(lambda - half, 2)} to ${unsigned(lambda + half, 2)}`;
}

/** The output share with its 80% interval: "0.36 (0.30 to 0.42)". */
export function shareWords(slope: ComputeResult['slope']): string {
  const interval = shareInterval(slope);
  const share = unsigned(slope.lambda, 2);
  return interval === null ? share : `${share} (${interval})`;
}

/** Where a release's output share comes from and what it is: "Estimated from prices over all months: 0.39, 80% interval 0.35 to 0.44". */
export function shareInUse(
  slope: Slope,
  result: ComputeResult['slope'],
  frequency: Frequency,
): string {
  const from = slopeWords(slope, frequency);
  const interval = shareInterval(result);
  const ends = interval === null ? '' : `, 80% interval ${interval}`;
  return slope.method === 'fixed' ? from + ends : `${from}: ${unsigned(result.lambda, 2)}${ends}`;
}

/** A series as a release used it: timing and adjustment in words. */
export function timingWords(
  timing: 'end' | 'average' | null | undefined,
  frequency: Frequency,
): string {
  if (timing === 'end') return `end of ${nouns[frequency]}`;
  if (timing === 'average') return `average over the ${nouns[frequency]}`;
  return 'timing not stated';
}

/** A p-value as pages print it: "p = 0.23", "p < 0.001", on one line. */
export function pValue(p: number): string {
  return p < 0.001 ? 'p\u00a0<\u00a00.001' : `p\u00a0=\u00a0${unsigned(p, p < 0.1 ? 3 : 2)}`;
}
