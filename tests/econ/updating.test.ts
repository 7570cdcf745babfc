import { describe, expect, test } from 'vitest';
import {
  regressionExpectation,
  type RegressionRule,
} from '../../src/lib/econ/expectations/regression.ts';
import { singularValues } from '../../src/lib/econ/linear/conditioning.ts';
import { leastSquares } from '../../src/lib/econ/linear/leastSquares.ts';
import { UpdatedLeastSquares } from '../../src/lib/econ/linear/updating.ts';
import { prepare, type Data } from '../../src/lib/econ/series.ts';
import { RefusedError } from '../../src/lib/econ/refusal.ts';
import { request, uniforms } from './economy.ts';

/** Data whose growth is as given, in log points, from the second month on. */
function dataOf(growth: number[]): Data {
  let log = 460;
  const values = [0, ...growth].map((d) => Math.exp((log += d) / 100));
  return prepare({ ...request({}), money: { start: '1990-01', values } });
}

/** One-step forecasts of AR(p) with their variances, by a fresh factorisation of each window. */
function refitted(
  { growth, length }: Data,
  order: number,
  { kind, length: N }: RegressionRule['window'],
) {
  const forecasts: number[] = [];
  const errors: number[] = [];
  for (let t = order + 1 + N; t < length; t++) {
    const from = kind === 'rolling' ? t - N : order + 1;
    const row = (s: number) => [1, ...Array.from({ length: order }, (_, j) => growth[s - 1 - j]!)];
    const rows = Array.from({ length: t - from }, (_, i) => row(from + i));
    const columns = row(t).map((_, j) => Float64Array.from(rows, (one) => one[j]!));
    const fit = leastSquares(columns, growth.slice(from, t))!;
    const x = row(t);
    forecasts.push(x.reduce((sum, value, j) => sum + value * fit.coefficients[j]!, 0));
    const weights = x.map((_, j) => fit.weights(j));
    let leverage = 0;
    for (let i = 0; i < t - from; i++) {
      const weight = x.reduce((sum, value, j) => sum + value * weights[j]![i]!, 0);
      leverage += weight * weight;
    }
    errors.push(Math.sqrt((fit.ssr / (t - from - x.length)) * (1 + leverage)));
  }
  return { forecasts, errors };
}

const noise = (seed: number, size: number, spread: number) => {
  const uniform = uniforms(seed);
  return Array.from({ length: size }, () => spread * uniform());
};

const outlier = noise(1, 200, 1).map((d, t) => (t === 90 ? 1e4 : 0.4 + d));
const smooth = noise(2, 200, 1e-4).map((d, t) => 0.5 + Math.sin(t / 9) + d);
const quiet = noise(3, 200, 1).map((d, t) => 0.4 + d * (t < 100 ? 100 : 1e-3));

describe('updated windows equal refitted ones', () => {
  test.each([
    ['ordinary growth', noise(4, 200, 2), 3],
    ['an outlier that enters and leaves', outlier, 2],
    ['growth so smooth that its lags nearly coincide', smooth, 6],
    ['growth that becomes a hundred thousand times quieter', quiet, 2],
  ])('%s', (_, growth, order) => {
    const data = dataOf(growth);
    for (const kind of ['expanding', 'rolling'] as const) {
      const window = { kind, length: 40 };
      const path = regressionExpectation(data, { rule: 'autoregression', order, window }, 0);
      const { forecasts, errors } = refitted(data, order, window);
      const size = Math.max(...data.growth.subarray(1).map(Math.abs));
      expect(path.expected.length).toBe(forecasts.length);
      forecasts.forEach((forecast, i) => {
        const scale = Math.max(Math.abs(forecast), 1e-3 * Math.min(size, 10));
        expect(Math.abs(path.expected[i]! - forecast) / scale).toBeLessThan(1e-8);
        expect(Math.abs(path.forecastError[i]! / errors[i]! - 1)).toBeLessThan(1e-8);
      });
    }
  });
});

describe('a loss of accuracy is noticed', () => {
  test('when a row that carries nearly all of a column is removed', () => {
    const window = new UpdatedLeastSquares(2);
    window.add([1, 1e9], 1);
    for (let i = 0; i < 20; i++) window.add([1, i], i % 3);
    window.remove([1, 1e9], 1);
    expect(window.accurate).toBe(false);
  });

  test('when many removals meet an ill-conditioned window', () => {
    const uniform = uniforms(5);
    const rows = Array.from({ length: 60 }, () => {
      const x = uniform();
      return { x: [1, x, x + 1e-6 * uniform()], y: uniform() };
    });
    const window = new UpdatedLeastSquares(3);
    rows.forEach(({ x, y }) => window.add(x, y));
    expect(window.accurate).toBe(true);
    window.remove(rows[0]!.x, rows[0]!.y);
    expect(window.accurate).toBe(false);
  });

  test('and not in an ordinary window', () => {
    const uniform = uniforms(6);
    const rows = Array.from({ length: 60 }, () => ({ x: [1, uniform(), uniform()], y: uniform() }));
    const window = new UpdatedLeastSquares(3);
    rows.forEach(({ x, y }) => window.add(x, y));
    for (const { x, y } of rows.slice(0, 30)) {
      window.remove(x, y);
      expect(window.accurate).toBe(true);
    }
  });
});

test('a window that is rank-deficient refuses the request at its target', () => {
  // Growth is constant in the first forty months, so its lag cannot be told from the constant.
  const data = dataOf(noise(7, 80, 1).map((d, t) => (t < 45 ? 0.5 : d)));
  const rule: RegressionRule = {
    rule: 'autoregression',
    order: 1,
    window: { kind: 'expanding', length: 24 },
  };
  try {
    regressionExpectation(data, rule, 0);
    expect.unreachable();
  } catch (error) {
    expect((error as RefusedError).faults).toEqual([
      expect.objectContaining({ pointer: '/money/values', period: '1992-03' }),
    ]);
  }
});

test('singular values are those of a matrix with known ones', () => {
  // The Hilbert matrix of order 3: eigenvalues 1.408318927, 0.122327066, 0.002687340 (Todd 1954).
  const hilbert = [0, 1, 2].map((j) => Float64Array.from([0, 1, 2], (i) => 1 / (i + j + 1)));
  const values = singularValues(hilbert);
  [1.4083189271236539, 0.12232706585390584, 0.002687340355773529].forEach((value, i) =>
    expect(values[i]! / value).toBeCloseTo(1, 12),
  );
});
