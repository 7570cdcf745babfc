import { describe, expect, test } from 'vitest';
import { structuralRoots } from '../../src/lib/econ/slope/structural.ts';
import { digits, published } from './published.ts';

interface Row {
  gamma: number;
  eta: number;
  relative_demand_variance: number;
  money_variance: number;
  b: number;
}

const roots = ({ gamma, eta, relative_demand_variance, money_variance }: Omit<Row, 'b'>) =>
  structuralRoots({
    gamma,
    eta,
    relativeDemandVariance: relative_demand_variance,
    moneyVariance: money_variance,
  });

describe('the structural slope', () => {
  test.each(published<{ rows: Row[] }>('structural-eta-1').rows)(
    'has its closed form at eta = 1: b = $b',
    (row) => {
      const found = roots(row);
      expect(found).toHaveLength(1);
      expect(digits(found, [row.b])).toBeGreaterThan(14);
    },
  );

  test('solves its own fixed point, with one root or three', () => {
    for (const gamma of [1.01, 1.04, 1.1, 1.5, 3]) {
      for (const eta of [0.5, 2, 10, 20, 60]) {
        for (const ratio of [0, 0.01, 0.22, 1, 10]) {
          const found = roots({
            gamma,
            eta,
            relative_demand_variance: 100,
            money_variance: 100 * ratio,
          });
          expect([1, 3]).toContain(found.length);
          if (found.length === 3) {
            // Three only if eta > 9 and gamma < 9/8 (method, section 3).
            expect(eta > 9 && gamma < 9 / 8).toBe(true);
          }
          for (const b of found) {
            const real = 100 / ((eta + b) * (eta + b));
            const nominal = (100 * ratio) / ((1 + b) * (1 + b));
            expect(digits([(1 / (gamma - 1)) * (real / (real + nominal))], [b])).toBeGreaterThan(
              10,
            );
          }
          expect([...found].sort((a, b) => a - b)).toEqual(found);
        }
      }
    }
  });
});
