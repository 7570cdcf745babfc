import { describe, expect, test } from 'vitest';
import { compute } from '../../src/lib/econ/compute.ts';
import { addPeriods } from '../../src/lib/econ/periods.ts';
import type {
  ComputeRequest,
  ComputeResult,
  Expectation,
  LevelSeries,
} from '../../src/lib/econ/types.ts';
import { compare } from './agreement.ts';
import { request as economy } from './economy.ts';

const rules: Record<string, Expectation> = {
  'random walk': { rule: 'random_walk', window: { kind: 'expanding', length: 60 } },
  'autoregression with indicators': {
    rule: 'autoregression',
    order: 2,
    seasonal: 'dummies',
    window: { kind: 'rolling', length: 60 },
  },
  'order by BIC': {
    rule: 'autoregression',
    order: { criterion: 'bic', max: 6 },
    window: { kind: 'expanding', length: 60 },
  },
  adaptive: { rule: 'adaptive', gain: 0.2, window: { length: 60 } },
};

const requests = Object.entries(rules).map(
  ([name, expectation]) => [name, economy({ expectation })] as const,
);

const disagreements = (got: unknown, expected: unknown) =>
  compare(got, expected).filter((one) => !one.agrees);

const scaled = (series: LevelSeries, factor: number): LevelSeries => ({
  ...series,
  values: series.values.map((value) => value * factor),
});

describe.each(requests)('with the rule %s', (_, request) => {
  const result = compute(request);

  test('the parts of the accounting sum to inflation', () => {
    const { actual, expected_money, current_surprise, carry_over, unexplained } = result.inflation!;
    let complete = 0;
    actual.forEach((inflation, i) => {
      if (carry_over[i] === null) return;
      complete++;
      const sum = expected_money[i]! + current_surprise[i]! + carry_over[i]! + unexplained[i]!;
      expect(Math.abs(sum - inflation!)).toBeLessThan(1e-12);
    });
    expect(complete).toBeGreaterThan(100);
  });

  test('rescaling levels changes nothing', () => {
    const other = compute({
      ...request,
      money: scaled(request.money, 1e6),
      prices: scaled(request.prices!, 0.013),
      activity: scaled(request.activity!, 77),
    });
    expect(disagreements(other, result)).toEqual([]);
  });

  test('shifting the calendar by whole years changes nothing', () => {
    const shift = (series: LevelSeries) => ({ ...series, start: addPeriods(series.start, -240) });
    const other = compute({
      ...request,
      money: shift(request.money),
      prices: shift(request.prices!),
      activity: shift(request.activity!),
    });
    const periods = (one: ComputeResult) => ({
      ...one,
      periods: [],
      benchmarks: { ...one.benchmarks, periods: [] },
    });
    expect(JSON.stringify(periods(other))).toBe(JSON.stringify(periods(result)));
  });

  test('later data never change an earlier expectation', () => {
    const cut = 250;
    const shorter = compute({
      ...request,
      money: { ...request.money, values: request.money.values.slice(0, cut) },
    });
    const n = shorter.periods.length;
    expect(n).toBeGreaterThan(100);
    for (const field of ['expected_growth', 'surprise', 'forecast_se', 'order'] as const) {
      expect(result[field]?.slice(0, n)).toEqual(shorter[field]?.slice(0, n));
    }
  });

  test('a survey that equals the expectations gives the same surprises', () => {
    const survey = compute({
      ...request,
      surveyed_growth: { start: result.periods[0]!, values: result.expected_growth },
      expectation: { rule: 'survey' },
    });
    expect(survey.periods).toEqual(result.periods);
    expect(survey.surprise).toEqual(result.surprise);
  });

  test('the result is finite JSON', () => {
    expect(JSON.parse(JSON.stringify(result))).toEqual(result);
  });
});

test('expanding and rolling agree while the window is not yet full', () => {
  const rule = (kind: 'expanding' | 'rolling', length: number): Expectation => ({
    rule: 'autoregression',
    order: 3,
    window: { kind, length },
  });
  const expanding = compute(economy({ expectation: rule('expanding', 80) }));
  const rolling = compute(economy({ expectation: rule('rolling', 80) }));
  expect(rolling.expected_growth[0]).toBe(expanding.expected_growth[0]);
  expect(rolling.expected_growth[1]).not.toBe(expanding.expected_growth[1]);
});

test('order 0 is the random walk, and BIC up to 0 too', () => {
  const window = { kind: 'expanding', length: 60 } as const;
  const walk = compute(economy({ expectation: { rule: 'random_walk', window } }));
  for (const order of [0, { criterion: 'bic', max: 0 }] as const) {
    const other = compute(economy({ expectation: { rule: 'autoregression', order, window } }));
    expect({ ...other, order: null }).toEqual(walk);
    expect(other.order!.every((one) => one === 0)).toBe(true);
  }
});

test('a given persistence of 0 equals none, and an absent gap too', () => {
  const given = compute(economy({ gap: { persistence: 0 } }));
  expect(given).toEqual(compute(economy({ gap: { persistence: 'none' } })));
  const request: ComputeRequest = economy({});
  delete request.gap;
  expect(compute(request)).toEqual(given);
});

test('the first gaps are withheld until nine tenths of the start are forgotten', () => {
  // ⌈ln 0.1 / ln ρ⌉: 5 at 0.6 (0.6⁵ = 0.078), 1 at 0.1, 32 at 0.93.
  for (const [persistence, withheld] of [
    [0.6, 5],
    [0.1, 1],
    [0.93, 32],
  ] as const) {
    const { gap, gap_lower, inflation } = compute(economy({ gap: { persistence } }));
    expect(gap!.findIndex((value) => value !== null)).toBe(withheld);
    expect(gap_lower!.findIndex((value) => value !== null)).toBe(withheld);
    expect(inflation!.carry_over.findIndex((value) => value !== null)).toBe(withheld + 1);
  }
});

test('prices that never change leave neutrality no error to test by', () => {
  const prices = { start: '1995-01', values: new Array<number>(300).fill(100) };
  const { diagnostics } = compute(economy({ prices }));
  expect(diagnostics.neutrality).toEqual({
    statistic: null,
    p: null,
    coefficients: null,
    reason: 'collinear',
  });
});

describe('money that grows the same in every period', () => {
  const steady = {
    start: '1995-01',
    values: Array.from({ length: 120 }, (_, t) => Math.exp(t / 200)),
  };
  const rules: [string, Expectation, number][] = [
    ['random walk', { rule: 'random_walk', window: { kind: 'rolling', length: 24 } }, 0],
    ['adaptive', { rule: 'adaptive', gain: 0.3, window: { length: 24 } }, 12],
  ];
  test.each(rules)('has no surprise to standardise or to test: %s', (_, expectation, first) => {
    const request = economy({ money: steady, expectation });
    const { forecast_se, standardised_surprise, diagnostics } = compute(request);
    expect(forecast_se.slice(first).every((error) => error === 0)).toBe(true);
    expect(standardised_surprise.every((value) => value === null)).toBe(true);
    expect(diagnostics).toMatchObject({
      surprise: { mean_t: null },
      ljung_box: { statistic: null, p: null },
      jarque_bera: { statistic: null, p: null },
      adf_money: null,
      adf_growth: null,
      neutrality: {
        statistic: null,
        reason: expectation.rule === 'adaptive' ? 'persistence' : 'collinear',
      },
    });
  });
});
