/** What one rule expects, for each target period; all arrays have one value a target. */
export interface ExpectationPath {
  /** First target, as an index of money's periods; targets are consecutive. */
  first: number;
  /** E_{t−1}[d_t], log points a period. */
  expected: Float64Array;
  /** u_t = d_t − E_{t−1}[d_t], log points a period. */
  surprise: Float64Array;
  /** Standard error of the forecast; NaN where there is none. */
  forecastError: Float64Array;
  /** s²_t·x_t'(X'X)⁻¹x_t, squared log points. */
  parameterVariance: Float64Array;
  /** s²_t·C_t'(X'X)⁻¹C_t with C_t = x_t + ρ·C_{t−1}: how the coefficients' error enters the gap (method, section 4). */
  pathVariance: Float64Array;
  /** Lag order at each target; null for rules without one. */
  order: number[] | null;
}

/** An empty path for `count` targets from period `first` on. */
export function emptyPath(first: number, count: number): ExpectationPath {
  const zeros = () => new Float64Array(count);
  return {
    first,
    expected: zeros(),
    surprise: zeros(),
    forecastError: zeros(),
    parameterVariance: zeros(),
    pathVariance: zeros(),
    order: null,
  };
}
