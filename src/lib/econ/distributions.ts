import betainc from '@stdlib/math-base-special-betainc';
import erfc from '@stdlib/math-base-special-erfc';
import gammainc from '@stdlib/math-base-special-gammainc';
import quantile from '@stdlib/stats-base-dists-normal-quantile';

/**
 * P(χ²(df) > x), by the upper incomplete gamma function rather than 1 − cdf, so that small p-values keep their digits.
 * @param x Statistic ≥ 0. @param df Degrees of freedom ≥ 1.
 */
export function chiSquaredSurvival(x: number, df: number): number {
  return gammainc(Math.max(x, 0) / 2, df / 2, true, true);
}

/** Φ(x) of the standard normal distribution, exact in both tails. */
export function normalCdf(x: number): number {
  return erfc(-x / Math.sqrt(2)) / 2;
}

/** Φ⁻¹(p) of the standard normal distribution, 0 < p < 1. */
export function normalQuantile(p: number): number {
  return quantile(p, 0, 1);
}

/** P(|T| > |t|) of Student's t with `df` ≥ 1 degrees of freedom: I_{df/(df+t²)}(df/2, 1/2), so small values keep their digits. */
export function studentTwoSided(t: number, df: number): number {
  return betainc(df / (df + t * t), df / 2, 0.5, true, false);
}
