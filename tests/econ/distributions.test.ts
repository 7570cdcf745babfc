import { describe, expect, test } from 'vitest';
import { chiSquaredSurvival } from '../../src/lib/econ/distributions/chiSquared.ts';
import { normalCdf, normalQuantile } from '../../src/lib/econ/distributions/normal.ts';
import { studentTwoSided } from '../../src/lib/econ/distributions/studentT.ts';
import { digits } from './published.ts';

describe('χ² survival', () => {
  test('has its closed form at even degrees of freedom, far into the tail', () => {
    // e^(−x/2)·Σ_{j<df/2} (x/2)^j/j! (Abramowitz & Stegun 1964, 26.4.5).
    for (const df of [2, 4, 6, 24]) {
      for (const x of [0.01, 0.5, 2, 10, 40, 150, 700]) {
        let term = Math.exp(-x / 2);
        let sum = 0;
        for (let j = 0; j < df / 2; j++) {
          sum += term;
          term *= x / 2 / (j + 1);
        }
        expect(digits([chiSquaredSurvival(x, df)], [sum])).toBeGreaterThan(12);
      }
    }
  });

  test('has the values of the tables', () => {
    // NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7.4: upper critical values, three decimals.
    for (const [x, df, p] of [
      [3.841, 1, 0.05],
      [6.635, 1, 0.01],
      [18.307, 10, 0.05],
      [36.415, 24, 0.05],
    ] as const) {
      expect(chiSquaredSurvival(x, df)).toBeCloseTo(p, 4);
    }
    expect(chiSquaredSurvival(0, 3)).toBe(1);
  });
});

describe('the normal distribution', () => {
  test('has the values of the tables, in the tails too', () => {
    // Abramowitz & Stegun 1964, tables 26.1 and 26.2: Q(2), Q(3), Q(5), Q(10).
    expect(
      digits([normalCdf(-2), normalCdf(-3)], [0.02275013194817921, 0.0013498980316300933]),
    ).toBeGreaterThan(13);
    expect(digits([normalCdf(-5), normalCdf(-10)], [2.866515719e-7, 7.61985e-24])).toBeGreaterThan(
      5,
    );
    expect(normalCdf(0)).toBe(0.5);
  });

  test('has its quantiles', () => {
    // Wichura 1988, Applied Statistics 37:477–484, and tables of percentage points.
    expect(
      digits(
        [normalQuantile(0.9), normalQuantile(0.95), normalQuantile(0.975)],
        [1.2815515655446004, 1.6448536269514722, 1.959963984540054],
      ),
    ).toBeGreaterThan(14);
    for (const p of [0.5, 0.6, 0.8, 0.999, 1 - 1e-9])
      expect(digits([normalCdf(normalQuantile(p))], [p])).toBeGreaterThan(12);
  });
});

describe("Student's t, two-sided", () => {
  test('has its closed forms', () => {
    // One degree of freedom (Cauchy): (2/π)·atan(1/t); two: 1 − t/√(2 + t²) = 2/(s(s + t)) with s = √(2 + t²).
    for (const t of [0.1, 1, 3, 40, 1e4]) {
      expect(digits([studentTwoSided(t, 1)], [(2 / Math.PI) * Math.atan(1 / t)])).toBeGreaterThan(
        12,
      );
      const s = Math.sqrt(2 + t * t);
      expect(digits([studentTwoSided(-t, 2)], [2 / (s * (s + t))])).toBeGreaterThan(12);
    }
  });

  test('has the values of the tables', () => {
    // NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7.2: upper critical values, three decimals.
    for (const [t, df, p] of [
      [2.228, 10, 0.05],
      [2.042, 30, 0.05],
      [2.626, 100, 0.01],
    ] as const) {
      expect(studentTwoSided(t, df)).toBeCloseTo(p, 4);
    }
    expect(studentTwoSided(0, 5)).toBe(1);
  });
});
