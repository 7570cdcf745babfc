import erfc from '@stdlib/math-base-special-erfc';
import quantile from '@stdlib/stats-base-dists-normal-quantile';

/** Φ(x) of the standard normal distribution, with all its digits in both tails. */
export function normalCdf(x: number): number {
  return erfc(-x / Math.sqrt(2)) / 2;
}

/** Φ⁻¹(p) of the standard normal distribution, ½ ≤ p < 1; far below ½ the package loses digits. */
export function normalQuantile(p: number): number {
  return quantile(p, 0, 1);
}
