import { columnLengths, solveUpper } from './triangular.ts';

/** Below this ratio of smallest to largest singular value a matrix counts as rank-deficient (method, section 2). */
export const RANK_TOLERANCE = 1e-10;

/** The estimate may fall short of the truth by a few powers of ten; beyond this the singular values are computed. */
const SUSPICIOUS_CONDITION = 1e6;

const JACOBI_SWEEPS = 60;

/**
 * Condition of a matrix whose columns were scaled to unit length, from its triangle R: about the largest over
 * the smallest singular value. One solve with R' whose right side is chosen to grow, one with R, O(k²)
 * (Cline, Moler, Stewart & Wilkinson 1979, SIAM J. Numer. Anal. 16:368–375).
 * @param workspace 3k numbers that may be overwritten; callers in a loop keep them.
 * @returns Infinity for an exactly singular matrix.
 */
export function estimateCondition(
  triangle: Float64Array,
  stride: number,
  order: number,
  workspace: Float64Array = new Float64Array(3 * order),
): number {
  const lengths = columnLengths(triangle, stride, order, workspace.subarray(0, order));
  const grown = workspace.subarray(order, 2 * order).fill(0);
  const solution = workspace.subarray(2 * order, 3 * order);
  // With D the lengths, (R·D⁻¹)'w = e is R'w = De: the columns are scaled without a division in the loops.
  let before = 0;
  for (let i = 0; i < order; i++) {
    const row = i * stride;
    const diagonal = triangle[row + i]!;
    if (!(Math.abs(diagonal) > 0)) return Infinity;
    const sum = grown[i]!;
    const value = (sum + (sum < 0 ? -lengths[i]! : lengths[i]!)) / diagonal;
    grown[i] = value;
    before += value * value;
    for (let j = i + 1; j < order; j++) grown[j]! -= triangle[row + j]! * value;
  }
  solveUpper(triangle, stride, order, grown, solution);
  let after = 0;
  for (let i = 0; i < order; i++) {
    const value = lengths[i]! * solution[i]!;
    after += value * value;
  }
  const condition = Math.sqrt(order) * Math.sqrt(after / before);
  return condition >= 1 ? condition : after > 0 ? 1 : Infinity;
}

/**
 * Whether a matrix, given by its triangle R, is rank-deficient: smallest over largest singular value below 1e-10
 * after scaling columns to unit length. Cheap where the condition is plainly good; else by the singular values.
 * @param condition Its estimated condition, where already known.
 */
export function isRankDeficient(
  triangle: Float64Array,
  stride: number,
  order: number,
  condition = estimateCondition(triangle, stride, order),
): boolean {
  if (condition <= SUSPICIOUS_CONDITION) return false;
  const lengths = columnLengths(triangle, stride, order);
  const columns: Float64Array[] = [];
  for (let j = 0; j < order; j++) {
    const length = lengths[j]!;
    if (!(length > 0) || length === Infinity) return true;
    const column = new Float64Array(order);
    for (let i = 0; i <= j; i++) column[i] = triangle[i * stride + j]! / length;
    columns.push(column);
  }
  const values = singularValues(columns);
  return !(values[values.length - 1]! >= RANK_TOLERANCE * values[0]!);
}

/**
 * Singular values, largest first, by one-sided Jacobi rotations, which keep the small ones' relative accuracy
 * (Demmel & Veselić 1992, SIAM J. Matrix Anal. Appl. 13:1204–1245). The columns are overwritten.
 */
export function singularValues(columns: Float64Array[]): number[] {
  for (let sweep = 0; sweep < JACOBI_SWEEPS; sweep++) {
    let rotated = false;
    for (let p = 0; p < columns.length; p++) {
      for (let q = p + 1; q < columns.length; q++) {
        if (orthogonalise(columns[p]!, columns[q]!)) rotated = true;
      }
    }
    if (!rotated) break;
  }
  return columns.map((column) => Math.sqrt(dot(column, column))).sort((a, b) => b - a);
}

function orthogonalise(a: Float64Array, b: Float64Array): boolean {
  const aa = dot(a, a);
  const bb = dot(b, b);
  const ab = dot(a, b);
  if (Math.abs(ab) <= Number.EPSILON * Math.sqrt(aa) * Math.sqrt(bb)) return false;
  const zeta = (bb - aa) / (2 * ab);
  const tangent = (zeta < 0 ? -1 : 1) / (Math.abs(zeta) + Math.sqrt(1 + zeta * zeta));
  const cosine = 1 / Math.sqrt(1 + tangent * tangent);
  const sine = cosine * tangent;
  for (let i = 0; i < a.length; i++) {
    const first = a[i]!;
    a[i] = cosine * first - sine * b[i]!;
    b[i] = sine * first + cosine * b[i]!;
  }
  return true;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
