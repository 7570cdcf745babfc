/** Coefficients and classical standard errors by the normal equations; plain on purpose, apart from src/lib/econ. */
export function leastSquares(
  rows: number[][],
  y: number[],
): { coefficients: number[]; errors: number[]; sd: number } {
  const width = rows[0]!.length;
  const sums = Array.from({ length: width }, (_, i) => [
    ...Array.from({ length: width }, (_, j) =>
      rows.reduce((sum, row) => sum + row[i]! * row[j]!, 0),
    ),
    ...Array.from({ length: width }, (_, j) => (i === j ? 1 : 0)),
    rows.reduce((sum, row, n) => sum + row[i]! * y[n]!, 0),
  ]);
  for (let pivot = 0; pivot < width; pivot++) {
    const scale = sums[pivot]![pivot]!;
    sums[pivot] = sums[pivot]!.map((value) => value / scale);
    for (let i = 0; i < width; i++) {
      const factor = sums[i]![pivot]!;
      if (i !== pivot) sums[i] = sums[i]!.map((value, j) => value - factor * sums[pivot]![j]!);
    }
  }
  const coefficients = sums.map((row) => row[2 * width]!);
  const residuals = rows.map((row, n) =>
    row.reduce((left, value, i) => left - value * coefficients[i]!, y[n]!),
  );
  const squares = residuals.reduce((sum, residual) => sum + residual ** 2, 0);
  const sd = Math.sqrt(squares / (rows.length - width));
  return { coefficients, errors: sums.map((row, i) => sd * Math.sqrt(row[width + i]!)), sd };
}
