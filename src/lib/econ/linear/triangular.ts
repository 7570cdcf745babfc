/**
 * Solves R'a = b for the leading `order` rows of an upper triangle.
 * @param triangle Row-major square array with rows of `stride` numbers; below the diagonal it is not read.
 * @returns a, of `order` numbers.
 */
export function solveTransposed(
  triangle: Float64Array,
  stride: number,
  order: number,
  b: ArrayLike<number>,
): Float64Array {
  const a = new Float64Array(order);
  for (let i = 0; i < order; i++) a[i] = b[i]!;
  for (let i = 0; i < order; i++) {
    const row = i * stride;
    const value = a[i]! / triangle[row + i]!;
    a[i] = value;
    for (let j = i + 1; j < order; j++) a[j]! -= triangle[row + j]! * value;
  }
  return a;
}

/** Solves R x = b for the leading `order` rows of an upper triangle stored as in {@link solveTransposed}. */
export function solveUpper(
  triangle: Float64Array,
  stride: number,
  order: number,
  b: ArrayLike<number>,
): Float64Array {
  const x = new Float64Array(order);
  for (let i = order - 1; i >= 0; i--) {
    const row = i * stride;
    let sum = b[i]!;
    for (let j = i + 1; j < order; j++) sum -= triangle[row + j]! * x[j]!;
    x[i] = sum / triangle[row + i]!;
  }
  return x;
}

/** Lengths of the columns of an upper triangle, which are those of the matrix it was factored from. */
export function columnLengths(triangle: Float64Array, stride: number, order: number): Float64Array {
  const squares = new Float64Array(order);
  for (let i = 0; i < order; i++) {
    for (let j = i; j < order; j++)
      squares[j]! += triangle[i * stride + j]! * triangle[i * stride + j]!;
  }
  return squares.map((square) => Math.sqrt(square));
}
