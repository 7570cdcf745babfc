/**
 * Householder's QR factorisation of n×k columns scaled by powers of two, which loses nothing (Golub & Van Loan, Matrix
 * Computations, algorithms 5.2.1 and 5.1.2).
 */
export interface Factorisation {
  /** R, row-major k×k. */
  triangle: Float64Array;
  /** What column j was divided by before the factorisation. */
  scales: Float64Array;
  /** Replaces a vector of n numbers by Q' times it. */
  rotate(vector: Float64Array): void;
  /** Replaces a vector of n numbers by Q times it. */
  rotateBack(vector: Float64Array): void;
}

/** Factors k columns of n ≥ k numbers. A column of zeros gives a zero on R's diagonal. */
export function factorise(columns: readonly Float64Array[]): Factorisation {
  const k = columns.length;
  const scales = Float64Array.from(columns, (column) => powerOfTwo(length(column)));
  const vectors = columns.map((column, j) => column.map((value) => value / scales[j]!));
  const triangle = new Float64Array(k * k);
  for (let j = 0; j < k; j++) {
    const column = vectors[j]!;
    for (let i = 0; i < j; i++) reflect(vectors[i]!, i, column);
    for (let i = 0; i < j; i++) triangle[i * k + j] = column[i]!;
    triangle[j * k + j] = makeReflector(column, j);
  }
  return {
    triangle,
    scales,
    rotate(vector) {
      for (let j = 0; j < k; j++) reflect(vectors[j]!, j, vector);
    },
    rotateBack(vector) {
      for (let j = k - 1; j >= 0; j--) reflect(vectors[j]!, j, vector);
    },
  };
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
 * Turns a column, from row `from` on, into the vector v with v'v = 2 whose reflection I − vv' clears it below that row.
 * @returns R's entry on the diagonal.
 */
function makeReflector(column: Float64Array, from: number): number {
  const rest = column.subarray(from);
  const norm = length(rest);
  const diagonal = rest[0]! > 0 ? -norm : norm;
  rest[0]! -= diagonal;
  const size = length(rest);
  const factor = size > 0 ? Math.sqrt(2) / size : 0;
  for (let i = 0; i < rest.length; i++) rest[i]! *= factor;
  return diagonal;
}

/** target ← (I − vv')·target on rows from `from` on. */
function reflect(vector: Float64Array, from: number, target: Float64Array): void {
  let product = 0;
  for (let i = from; i < target.length; i++) product += vector[i]! * target[i]!;
  for (let i = from; i < target.length; i++) target[i]! -= product * vector[i]!;
}

/** The power of two at or just below a positive number; 1 for anything else. */
function powerOfTwo(value: number): number {
  if (!(value > 0) || value === Infinity) return 1;
  let power = 1;
  while (power > value) power /= 2;
  while (power * 2 <= value) power *= 2;
  return power;
}
