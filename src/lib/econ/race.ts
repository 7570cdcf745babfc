import { studentTwoSided } from './distributions/studentT.ts';
import { coefficientsOf } from './expectations/coefficients.ts';
import { expect } from './expectations/expect.ts';
import type { ExpectationPath } from './expectations/expectation.ts';
import { mean, sampleVariance } from './moments.ts';
import { formatPeriod, PERIODS_A_YEAR } from './periods.ts';
import { RefusedError } from './refusal.ts';
import { prepare, type SeriesOfRequest } from './series.ts';
import type { ComputeRequest, Expectation, Window } from './types.ts';
import { parseRequest } from './validate/request.ts';

/** One rule's forecast errors over the periods that all rules share. */
export interface RaceEntry {
  /** Root mean square of the surprise, log points a period. */
  rmse: number;
  /** Diebold–Mariano statistic against the random walk: negative favours the rule. Null for the random walk and where 0/0. */
  diebold_mariano: number | null;
  /** Two-sided p-value, Student t with n − 1 degrees of freedom. */
  p: number | null;
}

/** The forecast race over `periods` shared periods from `first` to `last`. */
export interface RaceResult {
  first: string;
  last: string;
  periods: number;
  rules: Record<string, RaceEntry>;
}

/** The rule that every other is compared with. */
const YARDSTICK = 'random_walk';

/** The gain of the adaptive rule that races. */
const RACING_GAIN = 0.3;

/**
 * The forecast race of a release (contract, Result): the random walk, a first-order autoregression, adaptive
 * expectations with gain 0.3 and the rule in force (`in_force`), all with the window in force. Where that is the survey,
 * which has none, the others learn from an expanding window of five years, or ten of annual data. A rule with too many
 * coefficients for the window does not run.
 * @throws RefusedError as `compute` does.
 */
export function race(request: ComputeRequest): RaceResult {
  const parsed = parseRequest(request);
  const { expectation, frequency } = parsed;
  const window: Window =
    expectation.rule === 'survey'
      ? { kind: 'expanding', length: frequency === 'annual' ? 10 : 5 * PERIODS_A_YEAR[frequency] }
      : { kind: 'expanding', ...expectation.window };
  const seasonal = expectation.seasonal ?? 'none';
  const walk: Expectation = { rule: 'random_walk', seasonal, window };
  const others: Record<string, Expectation> = {
    ar1: { rule: 'autoregression', order: 1, seasonal, window },
    adaptive: { rule: 'adaptive', gain: RACING_GAIN, window },
    in_force: expectation,
  };
  const able = Object.entries(others).filter(
    ([, rule]) => rule.rule === 'survey' || coefficientsOf(rule, frequency) < rule.window.length,
  );
  return raceOf(parsed, { [YARDSTICK]: walk, ...Object.fromEntries(able) });
}

/**
 * Race of any rules over the periods in which all have a surprise (method, section 5). The Diebold–Mariano statistic of
 * u²_rule − u²_random walk, one step ahead, with the correction of Harvey, Leybourne & Newbold (1997, Int. J.
 * Forecasting 13:281–291), is the one-sample t statistic of these differences.
 * @param rules By name; `random_walk` is the yardstick.
 * @throws RefusedError where a rule cannot be computed, or no period has a surprise of every rule.
 */
export function raceOf(
  request: SeriesOfRequest,
  rules: Record<string, Expectation> & { [YARDSTICK]: Expectation },
): RaceResult {
  const data = prepare(request);
  const paths = Object.entries(rules).map(([name, rule]) => ({
    name,
    path: expect(data, rule, 0),
  }));
  const first = Math.max(...paths.map(({ path }) => path.first));
  const end = Math.min(...paths.map(({ path }) => path.first + path.surprise.length));
  if (end <= first) {
    throw new RefusedError([
      {
        pointer: '/money/values',
        message: 'There is no period in which every rule of the race has a surprise.',
      },
    ]);
  }
  const losses = (path: ExpectationPath) =>
    path.surprise.subarray(first - path.first, end - path.first).map((value) => value * value);
  const yardstick = losses(paths.find(({ name }) => name === YARDSTICK)!.path);
  const periodAt = (t: number) =>
    formatPeriod({ frequency: data.frequency, index: data.start + t });
  return {
    first: periodAt(first),
    last: periodAt(end - 1),
    periods: end - first,
    rules: Object.fromEntries(
      paths.map(({ name, path }) => [
        name,
        entry(losses(path), name === YARDSTICK ? null : yardstick),
      ]),
    ),
  };
}

function entry(losses: Float64Array, yardstick: Float64Array | null): RaceEntry {
  const rmse = Math.sqrt(mean(losses));
  const n = losses.length;
  const differences = losses.map((loss, i) => (yardstick === null ? 0 : loss - yardstick[i]!));
  const variance = sampleVariance(differences);
  if (yardstick === null || variance === null || !(variance > 0)) {
    return { rmse, diebold_mariano: null, p: null };
  }
  const statistic = mean(differences) / Math.sqrt(variance / n);
  return { rmse, diebold_mariano: statistic, p: studentTwoSided(statistic, n - 1) };
}
