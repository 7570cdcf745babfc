/**
 * Solves R'a = b for the leading `order` rows of an upper triangle.
 * @param triangle Row-major square array with rows of `stride` numbers; below the diagonal it is not read.
 * @param a Where the result goes; it may be b.
 * @returns a, of `order` numbers.
 */
export function solveTransposed(
  triangle: Float64Array,
  stride: number,
  order: number,
  b: ArrayLike<number>,
  a: Float64Array = new Float64Array(order),
): Float64Array {
  for (let i = 0; i < order; i++) a[i] = b[i]!;
  for (let i = 0; i < order; i++) {
    const row = i * stride;
    const value = a[i]! / triangle[row + i]!;
    a[i] = value;
    for (let j = i + 1; j < order; j++) a[j]! -= triangle[row + j]! * value;
  }
  return a;
}

/** Solves R x = b for the leading `order` rows of an upper triangle stored as in {@link solveTransposed}; x may be b. */
export function solveUpper(
  triangle: Float64Array,
  stride: number,
  order: number,
  b: ArrayLike<number>,
  x: Float64Array = new Float64Array(order),
): Float64Array {
  for (let i = order - 1; i >= 0; i--) {
    const row = i * stride;
    let sum = b[i]!;
    for (let j = i + 1; j < order; j++) sum -= triangle[row + j]! * x[j]!;
    x[i] = sum / triangle[row + i]!;
  }
  return x;
}

/** Lengths of the columns of an upper triangle, which are those of the matrix it was factored from. */
export function columnLengths(
  triangle: Float64Array,
  stride: number,
  order: number,
  lengths: Float64Array = new Float64Array(order),
): Float64Array {
  lengths.fill(0, 0, order);
  for (let i = 0; i < order; i++) {
    const row = i * stride;
    for (let j = i; j < order; j++) lengths[j]! += triangle[row + j]! * triangle[row + j]!;
  }
  for (let j = 0; j < order; j++) lengths[j] = Math.sqrt(lengths[j]!);
  return lengths;
}
