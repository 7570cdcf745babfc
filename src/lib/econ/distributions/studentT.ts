import betainc from '@stdlib/math-base-special-betainc';

/**
 * P(|T| > |t|) of Student's t with `df` ≥ 1 degrees of freedom: I_{df/(df+t²)}(df/2, 1/2), so that small values keep
 * their digits.
 */
export function studentTwoSided(t: number, df: number): number {
  return betainc(df / (df + t * t), df / 2, 0.5, true, false);
}
