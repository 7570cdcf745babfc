import ln from '@stdlib/math-base-special-ln';
import { normalQuantile } from './distributions/normal.ts';
import type { ExpectationPath } from './expectations/expectation.ts';
import type { Values } from './types.ts';

/** λ and ρ in use, with the variances of their errors (0 where they count as known). */
export interface GapParameters {
  lambda: number;
  rho: number;
  varianceLambda: number;
  varianceRho: number;
  covariance: number;
}

/** The implied gap and its band, log points, one value a target; null where it is not shown. */
export interface Gap {
  gap: Values;
  lower: Values;
  upper: Values;
}

/**
 * g_t = ρ·g_{t−1} + λ·u_t from g = 0, with the band of method section 4: the delta method for λ and ρ, and one and the
 * same error of the expectation's coefficients in every surprise. The first ⌈ln 0.1 / ln ρ⌉ values are withheld, by
 * when nine tenths of the start are forgotten.
 * @param confidence Strictly between 0 and 1.
 */
export function impliedGap(
  path: ExpectationPath,
  parameters: GapParameters,
  confidence: number,
): Gap {
  const { lambda, rho, varianceLambda, varianceRho, covariance } = parameters;
  const z = normalQuantile((1 + confidence) / 2);
  const result: Gap = { gap: [], lower: [], upper: [] };
  const withheld = withheldGaps(rho);
  let gap = 0;
  let byLambda = 0;
  let byRho = 0;
  path.surprise.forEach((surprise, i) => {
    byRho = gap + rho * byRho;
    byLambda = surprise + rho * byLambda;
    gap = rho * gap + lambda * surprise;
    const variance =
      byLambda * byLambda * varianceLambda +
      byRho * byRho * varianceRho +
      2 * byLambda * byRho * covariance +
      (lambda * lambda + varianceLambda) * path.pathVariance[i]!;
    const half = z * Math.sqrt(Math.max(variance, 0));
    const shown = i >= withheld;
    result.gap.push(shown ? gap : null);
    result.lower.push(shown ? gap - half : null);
    result.upper.push(shown ? gap + half : null);
  });
  return result;
}

/** ⌈ln 0.1 / ln ρ⌉: how many first gaps are withheld with persistence ρ in [0,1). */
export function withheldGaps(rho: number): number {
  return rho > 0 ? Math.ceil(ln(0.1) / ln(rho)) : 0;
}
