import { isRankDeficient } from './conditioning.ts';
import { solveUpper } from './triangular.ts';

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
 * Ordinary least squares by Householder's QR on columns scaled to unit length (Golub & Van Loan, Matrix
 * Computations, algorithm 5.3.2); X'X is never formed.
 * @param columns k columns of X, each of n numbers; n ≥ k.
 * @param y n numbers.
 * @returns null where the columns are rank-deficient (see {@link isRankDeficient}).
 */
export function leastSquares(
  columns: readonly Float64Array[],
  y: Float64Array,
): LeastSquares | null {
  const n = y.length;
  const k = columns.length;
  if (n < k) return null;
  const scales = columns.map(length);
  if (!scales.every((scale) => scale > 0 && scale < Infinity)) return null;
  const work = columns.map((column, j) => column.map((value) => value / scales[j]!));
  const triangle = reduce(work, n);
  if (isRankDeficient(triangle, k, k)) return null;

  const rotated = Float64Array.from(y);
  for (let j = 0; j < k; j++) reflect(work[j]!, j, rotated);
  const scaled = solveUpper(triangle, k, k, rotated);
  const residuals = Float64Array.from(rotated).fill(0, 0, k);
  let ssr = 0;
  for (let i = k; i < n; i++) ssr += rotated[i]! * rotated[i]!;
  for (let j = k - 1; j >= 0; j--) reflect(work[j]!, j, residuals);
  const rounding = n * Number.EPSILON * length(y);

  return {
    observations: n,
    coefficients: scaled.map((value, j) => value / scales[j]!),
    residuals,
    ssr: ssr <= rounding * rounding ? 0 : ssr,
    rotated,
    weights(j) {
      // Row j of R⁻¹Q' is Q times the solution of R'z = e_j read from R⁻¹'s row, that is Q·(R⁻¹)'e_j.
      const row = inverseRow(triangle, k, j);
      const result = new Float64Array(n);
      result.set(row);
      for (let i = k - 1; i >= 0; i--) reflect(work[i]!, i, result);
      return result.map((value) => value / scales[j]!);
    },
  };
}

/** Classical standard errors √(s²·[(X'X)⁻¹]_jj), s² = SSR/(n − k); k numbers. */
export function classicalErrors(fit: LeastSquares): Float64Array {
  const k = fit.coefficients.length;
  const s = Math.sqrt(fit.ssr / (fit.observations - k));
  return fit.coefficients.map((_, j) => s * length(fit.weights(j)));
}

/** Euclidean length, scaled against overflow. */
export function length(values: Float64Array): number {
  let largest = 0;
  for (const value of values) largest = Math.max(largest, Math.abs(value));
  if (!(largest > 0) || largest === Infinity) return largest;
  let sum = 0;
  for (const value of values) sum += (value / largest) * (value / largest);
  return largest * Math.sqrt(sum);
}

/**
 * Overwrites the columns with Householder vectors (column j from row j on, v'v = 2) and returns R, row-major k×k.
 */
function reduce(work: Float64Array[], n: number): Float64Array {
  const k = work.length;
  const triangle = new Float64Array(k * k);
  for (let j = 0; j < k; j++) {
    const column = work[j]!;
    for (let i = 0; i < j; i++) reflect(work[i]!, i, column);
    for (let i = 0; i < j; i++) triangle[i * k + j] = column[i]!;
    const norm = length(column.subarray(j));
    const diagonal = column[j]! > 0 ? -norm : norm;
    triangle[j * k + j] = diagonal;
    column[j]! -= diagonal;
    const size = length(column.subarray(j));
    const factor = size > 0 ? Math.sqrt(2) / size : 0;
    for (let i = j; i < n; i++) column[i]! *= factor;
  }
  return triangle;
}

/** target ← (I − v v')·target on rows from `from` on. */
function reflect(vector: Float64Array, from: number, target: Float64Array): void {
  let product = 0;
  for (let i = from; i < target.length; i++) product += vector[i]! * target[i]!;
  for (let i = from; i < target.length; i++) target[i]! -= product * vector[i]!;
}

function inverseRow(triangle: Float64Array, k: number, j: number): Float64Array {
  const row = new Float64Array(k);
  row[j] = 1 / triangle[j * k + j]!;
  for (let m = j + 1; m < k; m++) {
    let sum = 0;
    for (let i = j; i < m; i++) sum += row[i]! * triangle[i * k + m]!;
    row[m] = -sum / triangle[m * k + m]!;
  }
  return row;
}
