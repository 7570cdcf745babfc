import { accurateDot } from './accurateDot.ts';
import { isRankDeficient } from './conditioning.ts';
import { factorise, length, type Factorisation } from './householder.ts';
import { solveTransposed, solveUpper } from './triangular.ts';

/** A least-squares fit of n observations on k regressors. */
export interface LeastSquares {
  observations: number;
  /** k estimates, in the order of the columns. */
  coefficients: Float64Array;
  /** n residuals y − Xb. */
  residuals: Float64Array;
  /** Sum of squared residuals; exactly 0 where they are rounding errors of the fit. */
  ssr: number;
  /** Q'y: the first k are y's parts along the columns in their order, so leading columns are nested fits. */
  rotated: Float64Array;
  /**
   * Row j of (X'X)⁻¹X': how much each of the n observations enters coefficient j, so that its error is this row
   * times the disturbances. Computed at each call, O(n·k).
   */
  weights(j: number): Float64Array;
}

/**
 * Ordinary least squares by Householder's QR, never by X'X, with one step of refinement.
 * @param columns k columns of X, each of n numbers. @param y n numbers.
 * @returns null where n < k or the columns are rank-deficient (see {@link isRankDeficient}).
 */
export function leastSquares(
  columns: readonly Float64Array[],
  y: Float64Array,
): LeastSquares | null {
  const n = y.length;
  const k = columns.length;
  if (n < k) return null;
  const factor = factorise(columns);
  if (isRankDeficient(factor.triangle, k, k)) return null;

  const { rotated, coefficients, residuals } = solve(factor, y);
  refine(factor, columns, y, coefficients, residuals);
  const size = length(residuals);
  const exact = size <= n * Number.EPSILON * length(y);
  return {
    observations: n,
    coefficients,
    residuals,
    ssr: exact ? 0 : size * size,
    rotated,
    weights: (j) => weightsOf(factor, n, j),
  };
}

/** The solution as the factorisation gives it, unrefined. */
export function solve(factor: Factorisation, y: Float64Array) {
  const k = factor.scales.length;
  const rotated = Float64Array.from(y);
  factor.rotate(rotated);
  const scaled = solveUpper(factor.triangle, k, k, rotated);
  const residuals = Float64Array.from(rotated).fill(0, 0, k);
  factor.rotateBack(residuals);
  const coefficients = scaled.map((value, j) => value / factor.scales[j]!);
  return { rotated, coefficients, residuals };
}

/** Classical standard errors √(s²·[(X'X)⁻¹]_jj), s² = SSR/(n − k); k numbers. */
export function classicalErrors(fit: LeastSquares): Float64Array {
  const k = fit.coefficients.length;
  const s = Math.sqrt(fit.ssr / (fit.observations - k));
  return fit.coefficients.map((_, j) => s * length(fit.weights(j)));
}

/**
 * One step of iterative refinement on r + Xb = y, X'r = 0, whose defects are summed in twice the working precision
 * (Björck 1967, BIT 7:257–278). It gives back the digits that a large condition takes from b.
 */
function refine(
  factor: Factorisation,
  columns: readonly Float64Array[],
  y: Float64Array,
  coefficients: Float64Array,
  residuals: Float64Array,
): void {
  const { triangle, scales } = factor;
  const k = columns.length;
  const row = new Float64Array(k + 1);
  const negated = Float64Array.of(...coefficients.map((value) => -value), -1);
  const defect = y.map((value, i) => {
    for (let j = 0; j < k; j++) row[j] = columns[j]![i]!;
    row[k] = residuals[i]!;
    return accurateDot(row, negated, value);
  });
  const along = columns.map((column, j) => -accurateDot(column, residuals, 0) / scales[j]!);
  const h = solveTransposed(triangle, k, k, along);
  factor.rotate(defect);
  const step = solveUpper(
    triangle,
    k,
    k,
    h.map((value, j) => defect[j]! - value),
  );
  defect.set(h);
  factor.rotateBack(defect);
  if (!step.every(Number.isFinite) || !defect.every(Number.isFinite)) return;
  step.forEach((value, j) => (coefficients[j]! += value / scales[j]!));
  defect.forEach((value, i) => (residuals[i]! += value));
}

/** Row j of (X'X)⁻¹X' = R⁻¹Q': Q times row j of R⁻¹. */
function weightsOf(factor: Factorisation, n: number, j: number): Float64Array {
  const k = factor.scales.length;
  const unit = new Float64Array(k);
  unit[j] = 1;
  const result = new Float64Array(n);
  result.set(solveTransposed(factor.triangle, k, k, unit));
  factor.rotateBack(result);
  return result.map((value) => value / factor.scales[j]!);
}
