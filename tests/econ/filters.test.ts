import { describe, expect, test } from 'vitest';
import { benchmarks, SMOOTHING } from '../../src/lib/econ/benchmarks.ts';
import { hamilton } from '../../src/lib/econ/filters/hamilton.ts';
import { hodrickPrescott } from '../../src/lib/econ/filters/hodrickPrescott.ts';
import { lineResiduals } from '../../src/lib/econ/filters/logLinear.ts';
import { uniforms } from './economy.ts';
import { published } from './published.ts';

const uniform = uniforms(31);
let level = 450;
const x = Float64Array.from({ length: 200 }, () => (level += 0.2 + uniform()));

describe('the Hodrick-Prescott filter', () => {
  test('smooths as Ravn & Uhlig (2002) say', () => {
    expect(SMOOTHING).toEqual(published<{ values: object }>('ravn-uhlig-lambda').values);
  });

  test("satisfies its minimum's condition: the deviation is μ·D'D times the trend", () => {
    const { twoSided } = hodrickPrescott(x, 129_600);
    const trend = x.map((value, i) => value - twoSided[i]!);
    const bend = trend.map((_, i) => (i < 2 ? 0 : trend[i]! - 2 * trend[i - 1]! + trend[i - 2]!));
    const at = (i: number) => bend[i] ?? 0;
    twoSided.forEach((deviation, i) => {
      const rhs = 129_600 * (at(i) - 2 * at(i + 1) + at(i + 2));
      expect(Math.abs(deviation - rhs)).toBeLessThan(1e-6);
    });
  });

  test('has as one-sided value the two-sided one on the data so far', () => {
    const { oneSided } = hodrickPrescott(x, 1_600);
    for (const n of [3, 4, 5, 20, 111, 200]) {
      const { twoSided } = hodrickPrescott(x.slice(0, n), 1_600);
      expect(Math.abs(oneSided[n - 1]! - twoSided[n - 1]!)).toBeLessThan(1e-9);
    }
    expect(Array.from(oneSided.subarray(0, 3), Number.isNaN)).toEqual([true, true, false]);
  });

  test('leaves a straight line alone, and one or two values', () => {
    const line = Float64Array.from({ length: 90 }, (_, i) => 400 + 0.3 * i);
    for (const values of [line, line.slice(0, 2), line.slice(0, 1)]) {
      for (const deviation of hodrickPrescott(values, 129_600).twoSided)
        expect(Math.abs(deviation)).toBeLessThan(1e-10);
    }
  });
});

describe('filters have no value', () => {
  test("where Hamilton's regression has no more rows than coefficients, or collinear lags", () => {
    const values = (n: number) =>
      Array.from(hamilton(x.slice(0, n), 8, 4)).filter((value) => !Number.isNaN(value));
    expect(values(16)).toHaveLength(0);
    expect(values(17)).toHaveLength(6);
    expect(
      hamilton(
        x.map((_, i) => i),
        8,
        4,
      ).every(Number.isNaN),
    ).toBe(true);
  });

  test('where a single value leaves the line open', () => {
    expect(Array.from(lineResiduals(x.slice(0, 1)))).toEqual([NaN]);
    const { hp, log_linear } = benchmarks({ start: '2000', values: [5] }, 'annual');
    expect([hp, log_linear]).toEqual([[0], [null]]);
  });
});
