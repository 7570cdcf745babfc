/** Fewer earlier surprises than this say too little of their size. */
const FEWEST = 12;

/**
 * Root mean square of all earlier surprises, for rules without a regression; NaN where there are fewer than 12
 * (method, section 2). Log points a period, one value a target.
 */
export function pastErrors(surprise: Float64Array): Float64Array {
  let sum = 0;
  return surprise.map((value, i) => {
    const error = i < FEWEST ? NaN : Math.sqrt(sum / i);
    sum += value * value;
    return error;
  });
}
