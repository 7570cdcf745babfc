/** How many periods a year a series has: monthly 12, quarterly 4, annual 1. */
export type Frequency = 'monthly' | 'quarterly' | 'annual';

/** What a level stands for: the end of its period, or the average over it. */
export type Timing = 'end' | 'average';

/** Levels of consecutive periods; `start` is an ISO 8601 month `2031-04`, quarter `2031-Q2` or year `2031`. */
export interface LevelSeries {
  start: string;
  values: number[];
  timing?: Timing;
}

/** Rows a rule learns from: all earlier ones, or the last `length`; `length` is also the first surprise's minimum. */
export interface Window {
  kind: 'expanding' | 'rolling';
  length: number;
}

export type Seasonal = 'none' | 'dummies';

export type Expectation =
  | { rule: 'random_walk'; seasonal?: Seasonal; window: Window }
  | {
      rule: 'autoregression';
      order: number | { criterion: 'bic'; max: number };
      seasonal?: Seasonal;
      window: Window;
    }
  | {
      rule: 'adaptive';
      gain: number;
      seasonal?: 'none';
      window: { kind?: Window['kind']; length: number };
    }
  | { rule: 'survey'; seasonal?: 'none' };

export type Slope =
  | { method: 'fixed'; b: number; se_lambda?: number }
  | {
      method: 'structural';
      gamma: number;
      eta: number;
      relative_demand_variance: number;
      money_variance?: number | null;
    }
  | { method: 'prices' | 'activity'; window?: { length: number }; lags?: number };

export interface Gap {
  persistence?: 'none' | 'estimated' | number;
}

/** The assumptions of a computation, without its data: what a specification holds. */
export interface Assumptions {
  expectation: Expectation;
  slope: Slope;
  gap?: Gap;
  confidence?: number;
}

/** The contract's request. */
export interface ComputeRequest extends Assumptions {
  frequency: Frequency;
  money: LevelSeries;
  prices?: LevelSeries;
  activity?: LevelSeries;
  surveyed_growth?: { start: string; values: number[] };
}

/** A value for each period; null where it does not exist. */
export type Values = (number | null)[];

export interface SlopeResult {
  method: Slope['method'];
  b: number | null;
  lambda: number;
  se_lambda: number | null;
  se_b: number | null;
  rho: number | null;
  se_rho: number | null;
  roots: number[] | null;
  no_response: { lambda: 1; t: number } | null;
  drift: number | null;
  observations: number | null;
  lags: number | null;
  within_model: boolean;
}

export interface InflationResult {
  actual: Values;
  expected_money: Values;
  current_surprise: Values;
  carry_over: Values;
  unexplained: Values;
}

export interface NeutralityResult {
  statistic: number | null;
  p: number | null;
  coefficients: number[] | null;
  reason: string | null;
}

export interface TestResult {
  statistic: number | null;
  p: number | null;
}

export interface DickeyFullerResult {
  statistic: number;
  lags: number;
  p: number;
  critical: { '1%': number; '5%': number; '10%': number };
}

export interface DiagnosticsResult {
  surprise: {
    mean: number;
    mean_t: number | null;
    sd: number | null;
    rmse: number;
    mae: number;
  } | null;
  ljung_box: (TestResult & { lags: number }) | null;
  jarque_bera: TestResult | null;
  adf_money: DickeyFullerResult | null;
  adf_growth: DickeyFullerResult | null;
  neutrality: NeutralityResult | null;
}

export interface BenchmarksResult {
  periods: string[];
  hp: Values;
  hp_one_sided: Values;
  hamilton: Values;
  log_linear: Values;
}

/** The contract's result; arrays run over `periods`, in log points. */
export interface ComputeResult {
  periods: string[];
  expected_growth: number[];
  growth: number[];
  surprise: number[];
  forecast_se: Values;
  parameter_variance: Values;
  standardised_surprise: Values;
  cumulated_surprise: Values;
  order: number[] | null;
  slope: SlopeResult;
  gap: Values | null;
  gap_lower: Values | null;
  gap_upper: Values | null;
  inflation: InflationResult | null;
  diagnostics: DiagnosticsResult;
  benchmarks: BenchmarksResult | null;
  warnings: string[];
}

/** One fault of a request: RFC 6901 pointer, the period where there is one, and a sentence for a newcomer. */
export interface Fault {
  pointer: string;
  period?: string;
  message: string;
}
