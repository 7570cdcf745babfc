/** A regression equation on the periods for which all its terms exist. */
export interface Equation {
  /** Those periods, ascending. */
  rows: number[];
  y: Float64Array;
  columns: Float64Array[];
}

/**
 * Keeps the periods in which y and every column exist (are not NaN), or the last `last` of them.
 * @param y T numbers. @param columns k columns of T numbers.
 */
export function equation(y: Float64Array, columns: Float64Array[], last = Infinity): Equation {
  const complete: number[] = [];
  for (let t = 0; t < y.length; t++) {
    if (!Number.isNaN(y[t]!) && columns.every((column) => !Number.isNaN(column[t]!)))
      complete.push(t);
  }
  const rows = complete.slice(Math.max(0, complete.length - last));
  const pick = (values: Float64Array) => Float64Array.from(rows, (t) => values[t]!);
  return { rows, y: pick(y), columns: columns.map(pick) };
}

/** A column of ones. */
export function constant(length: number): Float64Array {
  return new Float64Array(length).fill(1);
}
