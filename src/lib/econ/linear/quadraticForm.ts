/**
 * v'A⁻¹v by Cholesky's factorisation of a symmetric positive definite A, scaled to a unit diagonal.
 * @returns null where A is not positive definite to rounding.
 */
export function quadraticForm(
  matrix: readonly number[][],
  vector: readonly number[],
): number | null {
  const size = vector.length;
  const scales = matrix.map((row, i) => Math.sqrt(row[i]!));
  if (!scales.every((scale) => scale > 0 && scale < Infinity)) return null;
  const factor: number[][] = [];
  const solved: number[] = [];
  let sum = 0;
  for (let i = 0; i < size; i++) {
    const row: number[] = [];
    for (let j = 0; j <= i; j++) {
      let entry = matrix[i]![j]! / scales[i]! / scales[j]!;
      for (let m = 0; m < j; m++) entry -= row[m]! * (j === i ? row[m]! : factor[j]![m]!);
      if (j < i) row.push(entry / factor[j]![j]!);
      else if (!(entry > size * Number.EPSILON)) return null;
      else row.push(Math.sqrt(entry));
    }
    factor.push(row);
    let value = vector[i]! / scales[i]!;
    for (let m = 0; m < i; m++) value -= row[m]! * solved[m]!;
    solved.push(value / row[i]!);
    sum += solved[i]! * solved[i]!;
  }
  return sum;
}
