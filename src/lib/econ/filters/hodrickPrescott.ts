import { lineResiduals } from './logLinear.ts';

/** Deviations from the Hodrick–Prescott trend, in the unit of the series. */
export interface HodrickPrescott {
  /** With the whole sample; n numbers. */
  twoSided: Float64Array;
  /** At t with the sample up to t; NaN before the third observation. */
  oneSided: Float64Array;
}

/**
 * Hodrick–Prescott filter (Hodrick & Prescott 1997, J. Money, Credit and Banking 29:1–16). The trend τ minimises
 * Σ(x_t − τ_t)² + μ·Σ(Δ²τ_t)², so the deviation is c = D'z with (I/μ + DD')z = Dx and D the second difference. That
 * matrix has five bands, and the one of a shorter sample is its leading part: one factorisation serves every t, and the
 * one-sided value is the last component of the solution at t, known after the forward pass. O(n).
 *
 * The least-squares line, which the filter leaves alone, is taken out first, and the solution refined once.
 * @param x n values, log points. @param smoothing μ.
 */
export function hodrickPrescott(x: Float64Array, smoothing: number): HodrickPrescott {
  const n = x.length;
  const oneSided = new Float64Array(n).fill(NaN);
  if (n < 3) return { twoSided: new Float64Array(n), oneSided };
  const detrended = lineResiduals(x);
  const curvature = new Float64Array(n - 2);
  for (let i = 0; i < n - 2; i++)
    curvature[i] = detrended[i]! - 2 * detrended[i + 1]! + detrended[i + 2]!;

  const factor = factorise(n - 2, smoothing);
  const forward = forwardPass(factor, curvature);
  for (let i = 0; i < n - 2; i++) oneSided[i + 2] = forward[i]! / factor.pivots[i]!;

  const z = backwardPass(factor, forward);
  const correction = backwardPass(factor, forwardPass(factor, residual(z, curvature, smoothing)));
  const at = (i: number) => (i >= 0 && i < n - 2 ? z[i]! + correction[i]! : 0);
  const twoSided = x.map((_, i) => at(i) - 2 * at(i - 1) + at(i - 2));
  return { twoSided, oneSided };
}

/** L and the pivots of LDL' of a symmetric matrix with bands 6 + 1/μ, −4, 1; L has unit diagonal and two bands below. */
interface Factor {
  pivots: Float64Array;
  first: Float64Array;
  second: Float64Array;
}

function factorise(size: number, smoothing: number): Factor {
  const pivots = new Float64Array(size);
  const first = new Float64Array(size);
  const second = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    const above = i > 0 ? pivots[i - 1]! : 0;
    const twoAbove = i > 1 ? pivots[i - 2]! : 0;
    if (i > 1) second[i] = 1 / twoAbove;
    if (i > 0) first[i] = (-4 - (i > 1 ? second[i]! * twoAbove * first[i - 1]! : 0)) / above;
    pivots[i] =
      6 + 1 / smoothing - first[i]! * first[i]! * above - second[i]! * second[i]! * twoAbove;
  }
  return { pivots, first, second };
}

function forwardPass({ first, second }: Factor, right: Float64Array): Float64Array {
  const result = Float64Array.from(right);
  for (let i = 1; i < result.length; i++) {
    result[i]! -= first[i]! * result[i - 1]! + (i > 1 ? second[i]! * result[i - 2]! : 0);
  }
  return result;
}

function backwardPass({ pivots, first, second }: Factor, forward: Float64Array): Float64Array {
  const result = forward.map((value, i) => value / pivots[i]!);
  for (let i = result.length - 2; i >= 0; i--) {
    result[i]! -= first[i + 1]! * result[i + 1]!;
    if (i + 2 < result.length) result[i]! -= second[i + 2]! * result[i + 2]!;
  }
  return result;
}

function residual(z: Float64Array, right: Float64Array, smoothing: number): Float64Array {
  const at = (i: number) => (i >= 0 && i < z.length ? z[i]! : 0);
  return right.map((value, i) => {
    const fourth = at(i - 2) - 4 * at(i - 1) + 6 * at(i) - 4 * at(i + 1) + at(i + 2);
    return value - (fourth + at(i) / smoothing);
  });
}
