import { hamilton } from './filters/hamilton.ts';
import { hodrickPrescott } from './filters/hodrickPrescott.ts';
import { lineResiduals } from './filters/logLinear.ts';
import { periodsFrom } from './periods.ts';
import { logPoints } from './series.ts';
import type { BenchmarksResult, Frequency, LevelSeries, Values } from './types.ts';

/** Smoothing by Ravn & Uhlig (2002, REStat 84:371–375): 1,600 times the fourth power of the frequency relative to quarters. */
export const SMOOTHING: Record<Frequency, number> = {
  monthly: 129_600,
  quarterly: 1_600,
  annual: 6.25,
};

/** Hamilton's horizon of two years and its lags. */
const HAMILTON: Record<Frequency, { horizon: number; lags: number }> = {
  monthly: { horizon: 24, lags: 12 },
  quarterly: { horizon: 8, lags: 4 },
  annual: { horizon: 2, lags: 1 },
};

/**
 * Other measures of the gap (method, section 6), deviations of x = 100·ln X in log points over all periods of activity;
 * null where a filter has no value.
 */
export function benchmarks(activity: LevelSeries, frequency: Frequency): BenchmarksResult {
  const x = logPoints(activity.values);
  const { twoSided, oneSided } = hodrickPrescott(x, SMOOTHING[frequency]);
  const { horizon, lags } = HAMILTON[frequency];
  return {
    periods: periodsFrom(activity.start, x.length, frequency),
    hp: orNull(twoSided),
    hp_one_sided: orNull(oneSided),
    hamilton: orNull(hamilton(x, horizon, lags)),
    log_linear: orNull(lineResiduals(x)),
  };
}

function orNull(values: Float64Array): Values {
  return Array.from(values, (value) => (Number.isNaN(value) ? null : value));
}
