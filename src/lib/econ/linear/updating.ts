import { estimateCondition, isRankDeficient } from './conditioning.ts';
import { columnLengths, solveTransposed } from './triangular.ts';

/** Relative error that removals may have brought in before the window is factored afresh. */
const TOLERATED_LOSS = 1e-11;

/** A removal that leaves less than this share of a column, or of the squared residuals, cancels too many digits. */
const SMALLEST_REMAINDER = 0.01;

/**
 * A least-squares problem whose rows come and go: the triangle R of its QR factorisation, with z = Q'y beside it and
 * the squared residuals below. Adding a row costs one pass of Givens rotations, removing one a pass of the reverse
 * rotations, O(k²) each (Dongarra, Bunch, Moler & Stewart 1979, LINPACK Users' Guide, chapter 10). How many digits
 * removals may have cost is bounded as they happen; `accurate` says whether the result may still be used.
 */
export class UpdatedLeastSquares {
  readonly coefficients: number;
  observations = 0;
  /** Sum of squared residuals on all columns. */
  ssr = 0;
  private readonly stride: number;
  private readonly triangle: Float64Array;
  private readonly row: Float64Array;
  private readonly cosines: Float64Array;
  private readonly sines: Float64Array;
  private readonly workspace: Float64Array;
  private removals = 0;
  private spoilt = false;
  private largestSsr = 0;
  private readonly largestLengths: Float64Array;
  private knownCondition: number | null = null;

  constructor(coefficients: number) {
    this.coefficients = coefficients;
    this.stride = coefficients + 1;
    this.triangle = new Float64Array(coefficients * this.stride);
    this.row = new Float64Array(this.stride);
    this.cosines = new Float64Array(coefficients);
    this.sines = new Float64Array(coefficients);
    this.workspace = new Float64Array(3 * coefficients);
    this.largestLengths = new Float64Array(coefficients);
  }

  /** Adds an observation: k regressors and y. */
  add(regressors: ArrayLike<number>, y: number): void {
    const { triangle, row, stride, coefficients: k } = this;
    for (let j = 0; j < k; j++) row[j] = regressors[j]!;
    row[k] = y;
    for (let i = 0; i < k; i++) {
      const entry = row[i]!;
      if (entry === 0) continue;
      const start = i * stride;
      const diagonal = triangle[start + i]!;
      const norm = Math.sqrt(diagonal * diagonal + entry * entry);
      const cosine = diagonal / norm;
      const sine = entry / norm;
      triangle[start + i] = norm;
      for (let j = i + 1; j <= k; j++) {
        const above = triangle[start + j]!;
        triangle[start + j] = cosine * above + sine * row[j]!;
        row[j] = cosine * row[j]! - sine * above;
      }
    }
    this.ssr += row[k]! * row[k]!;
    this.observations++;
    this.knownCondition = null;
  }

  /** Removes an observation that was added before. Where too few digits survive, `accurate` turns false. */
  remove(regressors: ArrayLike<number>, y: number): void {
    const { triangle, row, cosines, stride, coefficients: k } = this;
    if (this.removals === 0) columnLengths(triangle, stride, k, this.largestLengths);
    this.largestSsr = Math.max(this.largestSsr, this.ssr);
    this.removals++;
    this.observations--;
    this.knownCondition = null;
    const sines = solveTransposed(triangle, stride, k, regressors, this.sines);
    let squared = 0;
    for (let i = 0; i < k; i++) squared += sines[i]! * sines[i]!;
    if (!(1 - squared > SMALLEST_REMAINDER)) {
      this.spoilt = true;
      return;
    }
    let alpha = Math.sqrt(1 - squared);
    for (let i = k - 1; i >= 0; i--) {
      const norm = Math.sqrt(alpha * alpha + sines[i]! * sines[i]!);
      cosines[i] = alpha / norm;
      sines[i]! /= norm;
      alpha = norm;
    }
    row.fill(0);
    for (let i = k - 1; i >= 0; i--) {
      const start = i * stride;
      for (let j = i; j < k; j++) {
        const above = triangle[start + j]!;
        triangle[start + j] = cosines[i]! * above - sines[i]! * row[j]!;
        row[j] = cosines[i]! * row[j]! + sines[i]! * above;
      }
    }
    let rest = y;
    for (let i = 0; i < k; i++) {
      const at = i * stride + k;
      triangle[at] = (triangle[at]! - sines[i]! * rest) / cosines[i]!;
      rest = cosines[i]! * rest - sines[i]! * triangle[at]!;
    }
    const remaining = this.ssr - rest * rest;
    if (!(remaining > SMALLEST_REMAINDER * this.ssr)) this.spoilt = true;
    this.ssr = remaining;
  }

  /** Forgets every observation. */
  clear(): void {
    this.triangle.fill(0);
    this.observations = 0;
    this.ssr = 0;
    this.removals = 0;
    this.spoilt = false;
    this.largestSsr = 0;
    this.knownCondition = null;
  }

  /**
   * Whether removals have kept the digits: a bound on their relative error, the rounding of each times the squared
   * condition and times how far columns and residuals have shrunk since the window was last factored afresh.
   */
  get accurate(): boolean {
    if (this.spoilt) return false;
    if (this.removals === 0) return true;
    const { triangle, stride, coefficients, workspace } = this;
    const lengths = columnLengths(triangle, stride, coefficients, workspace);
    let shrinkage = 1;
    for (let j = 0; j < coefficients; j++) {
      shrinkage = Math.max(shrinkage, this.largestLengths[j]! / lengths[j]!);
    }
    const { condition } = this;
    const rounding = this.removals * Number.EPSILON;
    const inCoefficients = rounding * condition * condition * shrinkage * shrinkage;
    const inResiduals = (rounding * this.largestSsr) / this.ssr;
    return inCoefficients <= TOLERATED_LOSS && inResiduals <= TOLERATED_LOSS;
  }

  /** Estimated condition of the regressors, columns scaled to unit length. */
  get condition(): number {
    const { triangle, stride, coefficients, workspace } = this;
    this.knownCondition ??= estimateCondition(triangle, stride, coefficients, workspace);
    return this.knownCondition;
  }

  get rankDeficient(): boolean {
    return isRankDeficient(this.triangle, this.stride, this.coefficients, this.condition);
  }

  /**
   * R⁻ᵀx for a regressor row x, written to `result`: its squared length is x'(X'X)⁻¹x, and likewise for leading
   * columns alone.
   */
  standardise(x: ArrayLike<number>, result: Float64Array): void {
    solveTransposed(this.triangle, this.stride, this.coefficients, x, result);
  }

  /** The part of y along column i, orthogonal to the columns before it. */
  component(i: number): number {
    return this.triangle[i * this.stride + this.coefficients]!;
  }
}
