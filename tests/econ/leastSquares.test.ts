import { describe, expect, test } from 'vitest';
import { influence, longRunCovariance, ruleOfThumbLags } from '../../src/lib/econ/linear/hac.ts';
import { classicalErrors, leastSquares } from '../../src/lib/econ/linear/leastSquares.ts';
import { logPoints } from '../../src/lib/econ/series.ts';
import { dataset, digits, published } from './published.ts';

interface NistProblem {
  columns: string[];
  data: number[][];
  coefficients: number[];
  standard_errors: number[];
  residual_sd: number;
}

/** y and X of a NIST problem: the listed columns after a constant, or the powers of the one x. */
function problemOf({ columns, data, coefficients }: NistProblem) {
  const regressor = (row: number[], j: number) => {
    if (columns.length > 2) return j === 0 ? 1 : row[j]!;
    let power = 1;
    for (let m = 0; m < j; m++) power *= row[1]!;
    return power;
  };
  return {
    y: Float64Array.from(data, (row) => row[0]!),
    X: coefficients.map((_, j) => Float64Array.from(data, (row) => regressor(row, j))),
  };
}

describe("least squares reaches NIST's certified values", () => {
  // Powers of x to the tenth, rounded to doubles, keep about 7 digits of Filip (condition 1e10).
  test.each([
    ['nist-longley', 9, 9],
    ['nist-norris', 9, 9],
    ['nist-pontius', 9, 9],
    ['nist-wampler4', 9, 9],
    ['nist-filip', 7, 7],
  ])('%s: coefficients to %i digits, errors to %i', (id, inCoefficients, inErrors) => {
    const entry = published<NistProblem>(id);
    const { X, y } = problemOf(entry);
    const fit = leastSquares(X, y)!;
    expect(digits(fit.coefficients, entry.coefficients)).toBeGreaterThanOrEqual(inCoefficients);
    expect(digits(classicalErrors(fit), entry.standard_errors)).toBeGreaterThanOrEqual(inErrors);
    const sd = Math.sqrt(fit.ssr / (y.length - X.length));
    expect(digits([sd], [entry.residual_sd])).toBeGreaterThanOrEqual(inErrors);
  });

  test('and Greene (2003), Table 12.1', () => {
    const entry = published<{ full: { coefficients: number[]; standard_errors: number[] } }>(
      'greene-table-12-1',
    );
    const { money, prices, activity } = dataset('us-greene-quarterly');
    const logs = [activity!, prices!, money!].map((levels) =>
      logPoints(Array.from(levels)).map((value) => value / 100),
    );
    const fit = leastSquares([new Float64Array(204).fill(1), logs[0]!, logs[1]!], logs[2]!)!;
    expect(digits(fit.coefficients, entry.full.coefficients)).toBeGreaterThan(9);
    expect(digits(classicalErrors(fit), entry.full.standard_errors)).toBeGreaterThan(9);
  });

  test('and says nothing of collinear columns', () => {
    const ones = new Float64Array(5).fill(1);
    const line = Float64Array.of(1, 2, 3, 4, 5);
    const y = Float64Array.of(1, 4, 2, 5, 3);
    expect(leastSquares([ones, line, line.map((value) => 3 * value - 1)], y)).toBeNull();
    expect(leastSquares([ones, new Float64Array(5)], y)).toBeNull();
    const nearly = line.map((value, i) => value + (i === 2 ? 1e-12 : 0));
    expect(leastSquares([ones, line, nearly], y)).toBeNull();
    const justNot = line.map((value, i) => value + (i === 2 ? 1e-7 : 0));
    expect(leastSquares([ones, line, justNot], y)).not.toBeNull();
  });

  test('and calls residuals of rounding size zero', () => {
    const line = Float64Array.from({ length: 50 }, (_, i) => i);
    const fit = leastSquares(
      [new Float64Array(50).fill(1), line],
      line.map((x) => 0.1 + 0.3 * x),
    )!;
    expect(fit.ssr).toBe(0);
  });
});

describe('Newey-West errors', () => {
  test('agree with Zeileis (2004), section 4.2', () => {
    const entry = published<{
      data: number[][];
      full: {
        coefficients: number[];
        standard_errors: number[];
        standard_errors_times_factor: number[];
      };
    }>('newey-west-investment');
    const y = Float64Array.from(entry.data, (row) => row[0]!);
    const X = [0, 1, 2].map((j) => Float64Array.from(entry.data, (row) => (j === 0 ? 1 : row[j]!)));
    const fit = leastSquares(X, y)!;
    const covariance = longRunCovariance(
      [0, 1, 2].map((j) => influence(fit, j)),
      4,
      3,
    );
    const errors = covariance.map((row, i) => Math.sqrt(row[i]!));
    expect(digits(fit.coefficients, entry.full.coefficients)).toBeGreaterThan(9);
    expect(digits(errors, entry.full.standard_errors_times_factor)).toBeGreaterThan(9);
  });

  test('take the rule of thumb for their lags', () => {
    // 4·(n/100)^(2/9) is 4 at n = 100, 8 at 100·2^4.5 = 2262.7 and 16 at 51,200 exactly.
    expect([1, 99, 100, 101, 2262, 2263, 51_199, 51_200].map(ruleOfThumbLags)).toEqual([
      1, 3, 4, 4, 7, 8, 15, 16,
    ]);
  });
});
