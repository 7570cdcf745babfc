import ln from '@stdlib/math-base-special-ln';
import { parsePeriod, PERIODS_A_YEAR, seasonOf } from './periods.ts';
import type { ComputeRequest, Frequency } from './types.ts';

/**
 * A request's data in log points, each array over money's periods 0…T−1. NaN marks a value that does not exist: growth
 * in the first period, prices or activity outside their span. NaN never leaves the computation.
 */
export interface Data {
  frequency: Frequency;
  /** Periods a year, f. */
  perYear: number;
  /** Index of money's first period, see {@link parsePeriod}. */
  start: number;
  /** Number of money's periods, T. */
  length: number;
  /** m_t = 100·ln M_t. */
  money: Float64Array;
  /** d_t = m_t − m_{t−1}, log points a period. */
  growth: Float64Array;
  /** π_t = p_t − p_{t−1}, log points a period. */
  inflation: Float64Array;
  /** w_t = d_t − π_t, growth of real balances. */
  realBalances: Float64Array;
  /** x_t = 100·ln X_t. */
  activity: Float64Array;
  /** E_{t−1}[d_t] as supplied, log points a period. */
  surveyed: Float64Array;
  /** What rounding alone may make of growth, log points: below it, money grows the same in every period. */
  rounding: number;
  hasPrices: boolean;
  hasActivity: boolean;
}

/** 100·ln of each level. */
export function logPoints(levels: readonly number[]): Float64Array {
  return Float64Array.from(levels, (level) => 100 * ln(level));
}

/** x_t − x_{t−1}; NaN in the first period. */
export function differences(values: Float64Array): Float64Array {
  return values.map((value, t) => (t === 0 ? NaN : value - values[t - 1]!));
}

/** x_{t−lag}; NaN where it does not exist. */
export function lagged(values: Float64Array, lag: number): Float64Array {
  const result = new Float64Array(values.length).fill(NaN);
  if (lag < values.length) result.set(values.subarray(0, values.length - lag), lag);
  return result;
}

/** a_t − b_t. */
export function minus(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((value, t) => value - b[t]!);
}

/** The part of a request that holds its series. */
export type SeriesOfRequest = Pick<
  ComputeRequest,
  'frequency' | 'money' | 'prices' | 'activity' | 'surveyed_growth'
>;

/** Brings a valid request's series into log points on money's periods. */
export function prepare(request: SeriesOfRequest): Data {
  const { frequency } = request;
  const start = parsePeriod(request.money.start, frequency).index;
  const money = logPoints(request.money.values);
  const align = (series: { start: string } | undefined, values: Float64Array) => {
    const result = new Float64Array(money.length).fill(NaN);
    if (series === undefined) return result;
    const offset = parsePeriod(series.start, frequency).index - start;
    for (let i = Math.max(0, -offset); i < values.length && i + offset < money.length; i++) {
      result[i + offset] = values[i]!;
    }
    return result;
  };
  const growth = differences(money);
  const inflation = differences(align(request.prices, logPoints(request.prices?.values ?? [])));
  return {
    frequency,
    perYear: PERIODS_A_YEAR[frequency],
    start,
    length: money.length,
    money,
    growth,
    inflation,
    realBalances: minus(growth, inflation),
    activity: align(request.activity, logPoints(request.activity?.values ?? [])),
    surveyed: align(
      request.surveyed_growth,
      Float64Array.from(request.surveyed_growth?.values ?? []),
    ),
    rounding: 8 * Number.EPSILON * largest(money),
    hasPrices: request.prices !== undefined,
    hasActivity: request.activity !== undefined,
  };
}

/** Largest size among some numbers; 0 for none. */
function largest(values: Float64Array): number {
  return values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
}

/** f − 1 indicators over money's periods, of every season but the first month or quarter of the year. */
export function indicators(data: Data): Float64Array[] {
  return Array.from({ length: data.perYear - 1 }, (_, i) =>
    Float64Array.from({ length: data.length }, (_, t) =>
      seasonOf(data.start + t, data.frequency) === i + 1 ? 1 : 0,
    ),
  );
}
