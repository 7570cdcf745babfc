import { describe, expect, test } from 'vitest';
import { dickeyFullerAt, dickeyFuller } from '../../src/lib/econ/diagnostics/dickeyFuller.ts';
import { dickeyFullerCritical, dickeyFullerP } from '../../src/lib/econ/diagnostics/mackinnon.ts';
import { logPoints } from '../../src/lib/econ/series.ts';
import { dataset, digits, published } from './published.ts';

type Evaluated = Record<string, { constant: number; constant_and_trend: number }>;

describe('the augmented Dickey-Fuller test', () => {
  const { rows } = published<{
    rows: {
      series: string;
      column: string;
      lagged_differences: number;
      tau_printed: number;
      digits: number;
      tau_full: number;
    }[];
  }>('nelson-plosser-table-5');
  const all = dataset('us-nelson-plosser-all-series');
  const annual = dataset('us-nelson-plosser-annual');

  test.each(rows)('reproduces Nelson & Plosser (1982), Table 5: $series', (row) => {
    const levels = { ...all, M: annual.money!, 'gnp.p': annual.prices! }[row.column]!;
    const values = row.column === 'bnd' ? levels : logPoints(Array.from(levels));
    const { statistic } = dickeyFullerAt(values, 'constant_and_trend', row.lagged_differences)!;
    expect(statistic.toFixed(row.digits)).toBe(row.tau_printed.toFixed(row.digits));
    expect(digits([statistic], [row.tau_full])).toBeGreaterThan(8);
  });

  test('reproduces Stock & Watson (2007), equation 14.34', () => {
    const entry = published<{ data: number[]; tau_full: number; tau_printed: number }>(
      'stock-watson-adf-inflation',
    );
    const { statistic } = dickeyFullerAt(Float64Array.from(entry.data), 'constant', 4)!;
    expect(statistic.toFixed(2)).toBe(entry.tau_printed.toFixed(2));
    expect(digits([statistic], [entry.tau_full])).toBeGreaterThan(9);
  });

  test('has no value for constant, exact or very short series', () => {
    expect(dickeyFuller(new Float64Array(60).fill(3), 'constant')).toBeNull();
    expect(
      dickeyFuller(
        Float64Array.from({ length: 60 }, (_, i) => i),
        'constant',
      ),
    ).toBeNull();
    expect(dickeyFuller(Float64Array.of(1, 2, 4), 'constant')).toBeNull();
  });
});

describe("MacKinnon's tables", () => {
  test('give his p-values', () => {
    const { evaluated } = published<{ evaluated: Evaluated }>('mackinnon-1994-p');
    for (const [tau, p] of Object.entries(evaluated)) {
      expect(digits([dickeyFullerP(Number(tau), 'constant')], [p.constant])).toBeGreaterThan(12);
      expect(
        digits([dickeyFullerP(Number(tau), 'constant_and_trend')], [p.constant_and_trend]),
      ).toBeGreaterThan(12);
    }
    expect(dickeyFullerP(3, 'constant')).toBe(1);
    expect(dickeyFullerP(-20, 'constant')).toBe(0);
  });

  test('give his critical values', () => {
    const { evaluated } = published<{
      evaluated: Record<string, Record<'constant' | 'constant_and_trend', number[]>>;
    }>('mackinnon-2010-critical');
    for (const [n, values] of Object.entries(evaluated)) {
      for (const terms of ['constant', 'constant_and_trend'] as const) {
        expect(
          digits(Object.values(dickeyFullerCritical(Number(n), terms)), values[terms]),
        ).toBeGreaterThan(14);
      }
    }
  });
});
