import gammainc from '@stdlib/math-base-special-gammainc';

/**
 * P(χ²(df) > x), by the upper incomplete gamma function rather than 1 − cdf, so that small p-values keep their digits.
 * @param x Statistic ≥ 0. @param df Degrees of freedom ≥ 1.
 */
export function chiSquaredSurvival(x: number, df: number): number {
  return gammainc(Math.max(x, 0) / 2, df / 2, true, true);
}
