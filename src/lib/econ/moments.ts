/** Arithmetic mean of at least one number. */
export function mean(values: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i]!;
  return sum / values.length;
}

/** Variance with divisor n − 1; null for fewer than two numbers. */
export function sampleVariance(values: ArrayLike<number>): number | null {
  const n = values.length;
  return n < 2 ? null : centralMoment(values, 2) * (n / (n - 1));
}

/** Mean of the deviations from the mean to a whole power, divisor n. */
export function centralMoment(values: ArrayLike<number>, power: number): number {
  const centre = mean(values);
  let sum = 0;
  for (let i = 0; i < values.length; i++) {
    const deviation = values[i]! - centre;
    let term = deviation;
    for (let m = 1; m < power; m++) term *= deviation;
    sum += term;
  }
  return sum / values.length;
}
