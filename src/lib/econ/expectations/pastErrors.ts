/** Fewer earlier surprises than this say too little of their size. */
const FEWEST = 12;

/**
 * Root mean square of all earlier surprises, for rules without a regression; NaN where there are fewer than 12
 * (method, section 2). Log points a period, one value a target.
 * @param rounding Size of surprises that are rounding errors; an error of no more is 0.
 */
export function pastErrors(surprise: Float64Array, rounding: number): Float64Array {
  let sum = 0;
  return surprise.map((value, i) => {
    const error = i < FEWEST ? NaN : Math.sqrt(sum / i);
    sum += value * value;
    return error <= rounding ? 0 : error;
  });
}
