import { describe, expect, test } from 'vitest';
import { compute } from '../../src/lib/econ/compute.ts';
import { problem, RefusedError } from '../../src/lib/econ/refusal.ts';
import type { ComputeRequest, Fault } from '../../src/lib/econ/types.ts';
import { request, uniforms } from './economy.ts';

function faultsOf(input: unknown): Fault[] {
  try {
    compute(input as ComputeRequest);
  } catch (error) {
    if (error instanceof RefusedError) return error.faults;
    throw error;
  }
  return [];
}

const pointersOf = (input: unknown) => faultsOf(input).map((fault) => fault.pointer);

/** A request with some fields replaced, whatever their types. */
const changed = (changes: Record<string, unknown>) => ({ ...request({}), ...changes });

const window = { kind: 'expanding', length: 60 };
const ar = (changes: Record<string, unknown>) =>
  changed({ expectation: { rule: 'autoregression', order: 1, window, ...changes } });
const slope = (changes: Record<string, unknown>) => changed({ slope: changes });

describe('a request is refused at', () => {
  const constantPrices = { start: '1995-01', values: new Array(300).fill(100) };
  const cases: [string, unknown, string[]][] = [
    ['nothing at all', undefined, ['']],
    ['a list', [], ['']],
    ['an empty request', {}, ['/frequency', '/expectation', '/slope', '/money']],
    ['an unknown field with a slash and a tilde', changed({ 'a/b~c': 1 }), ['/a~1b~0c']],
    [
      'the name of a built-in',
      JSON.parse(JSON.stringify(request({})).replace('{', '{"__proto__":1,')),
      ['/__proto__'],
    ],
    ['another frequency', changed({ frequency: 'weekly' }), ['/frequency']],
    [
      'a start of another frequency',
      changed({ money: { start: '1995-Q1', values: request({}).money.values } }),
      ['/money/start'],
    ],
    [
      'an unknown field of a series',
      changed({ prices: { ...request({}).prices, unit: 'index' } }),
      ['/prices/unit'],
    ],
    [
      'timing of a survey',
      changed({ surveyed_growth: { start: '1995-01', values: [1], timing: 'end' } }),
      ['/surveyed_growth/timing'],
    ],
    [
      'values that are no list',
      changed({ money: { start: '1995-01', values: 'many' } }),
      ['/money/values'],
    ],
    ['no values', changed({ money: { start: '1995-01', values: [] } }), ['/money/values']],
    ['a null series', changed({ prices: null }), ['/prices']],
    [
      'a series past the last year',
      changed({ money: { start: '9999-12', values: [1, 2] } }),
      ['/money/values'],
    ],
    ['an unknown rule', ar({ rule: 'guess' }), ['/expectation/rule']],
    ['an order that is no whole number', ar({ order: 1.5 }), ['/expectation/order']],
    ['an order above 24', ar({ order: 25 }), ['/expectation/order']],
    ['a missing order', ar({ order: undefined }), ['/expectation/order']],
    [
      'another criterion',
      ar({ order: { criterion: 'aic', max: 3 } }),
      ['/expectation/order/criterion'],
    ],
    [
      'an unknown field of the order',
      ar({ order: { criterion: 'bic', max: 3, min: 1 } }),
      ['/expectation/order/min'],
    ],
    ['a missing window', ar({ window: undefined }), ['/expectation/window']],
    [
      'an unknown window',
      ar({ window: { kind: 'fixed', length: 60 } }),
      ['/expectation/window/kind'],
    ],
    [
      'an unknown field of the window',
      ar({ window: { ...window, from: 1 } }),
      ['/expectation/window/from'],
    ],
    [
      'a window too short for the order',
      ar({ order: 3, window: { kind: 'rolling', length: 4 } }),
      ['/expectation/window/length'],
    ],
    [
      'a window too short for the largest order',
      ar({ order: { criterion: 'bic', max: 6 }, window: { ...window, length: 7 } }),
      ['/expectation/window/length'],
    ],
    [
      'a window too short for the indicators',
      ar({ order: 0, seasonal: 'dummies', window: { ...window, length: 12 } }),
      ['/expectation/window/length'],
    ],
    [
      'a window of one for adaptive',
      changed({ expectation: { rule: 'adaptive', gain: 0.2, window: { length: 1 } } }),
      ['/expectation/window/length'],
    ],
    [
      'a gain of zero',
      changed({ expectation: { rule: 'adaptive', gain: 0, window: { length: 9 } } }),
      ['/expectation/gain'],
    ],
    [
      'indicators with adaptive',
      changed({
        expectation: { rule: 'adaptive', gain: 0.5, seasonal: 'dummies', window: { length: 9 } },
      }),
      ['/expectation/seasonal'],
    ],
    ['a gain of an autoregression', ar({ gain: 0.3 }), ['/expectation/gain']],
    [
      'a window of a survey',
      changed({
        expectation: { rule: 'survey', window },
        surveyed_growth: { start: '1996-01', values: [1, 2] },
      }),
      ['/expectation/window'],
    ],
    [
      'a survey outside money',
      changed({
        expectation: { rule: 'survey' },
        surveyed_growth: { start: '1990-01', values: [1, 2] },
      }),
      ['/surveyed_growth'],
    ],
    [
      'a survey of the first level alone',
      changed({
        expectation: { rule: 'survey' },
        surveyed_growth: { start: '1995-01', values: [1] },
      }),
      ['/surveyed_growth'],
    ],
    ['a slope of zero', slope({ method: 'fixed', b: 0 }), ['/slope/b']],
    ['a negative error', slope({ method: 'fixed', b: 1, se_lambda: -1 }), ['/slope/se_lambda']],
    ['lags of a fixed slope', slope({ method: 'fixed', b: 1, lags: 3 }), ['/slope/lags']],
    [
      'structural parameters out of bounds',
      slope({
        method: 'structural',
        gamma: 1,
        eta: 0,
        relative_demand_variance: 0,
        money_variance: -1,
      }),
      ['/slope/gamma', '/slope/eta', '/slope/relative_demand_variance', '/slope/money_variance'],
    ],
    ['negative lags', slope({ method: 'prices', lags: -1 }), ['/slope/lags']],
    [
      'as many lags as periods',
      slope({ method: 'prices', window: { length: 50 }, lags: 50 }),
      ['/slope/lags'],
    ],
    [
      'a slope window too short',
      slope({ method: 'prices', window: { length: 4 } }),
      ['/slope/window/length'],
    ],
    [
      'no prices where the slope needs them',
      changed({ prices: undefined, slope: { method: 'prices' } }),
      ['/prices'],
    ],
    [
      'no activity where the slope needs it',
      changed({ activity: undefined, slope: { method: 'activity' } }),
      ['/activity'],
    ],
    [
      'no activity for estimated persistence',
      changed({ activity: undefined, gap: { persistence: 'estimated' } }),
      ['/activity'],
    ],
    [
      'prices that never overlap with money',
      changed({ prices: { start: '1950-01', values: [1, 2, 3] }, slope: { method: 'prices' } }),
      ['/prices/values'],
    ],
    [
      'activity too short for estimated persistence',
      changed({
        activity: { start: '2000-01', values: [1, 2, 3] },
        gap: { persistence: 'estimated' },
      }),
      ['/activity/values'],
    ],
    [
      'constant activity',
      changed({ activity: constantPrices, gap: { persistence: 'estimated' } }),
      ['/activity/values'],
    ],
    [
      'constant prices, whose response has no error',
      changed({ prices: constantPrices, slope: { method: 'prices' } }),
      ['/prices/values'],
    ],
    ['a persistence of one', changed({ gap: { persistence: 1 } }), ['/gap/persistence']],
    ['a negative persistence', changed({ gap: { persistence: -0.1 } }), ['/gap/persistence']],
    ['an unknown field of the gap', changed({ gap: { rho: 0.5 } }), ['/gap/rho']],
    ['a confidence of one', changed({ confidence: 1 }), ['/confidence']],
    ['a null confidence', changed({ confidence: null }), ['/confidence']],
    [
      'several faults of the computation at once',
      changed({
        expectation: { rule: 'random_walk', window: { ...window, length: 400 } },
        activity: { start: '2000-01', values: [1, 2, 3] },
        gap: { persistence: 'estimated' },
      }),
      ['/activity/values', '/money/values'],
    ],
    [
      'faults of money and of the slope at once',
      changed({
        expectation: { rule: 'random_walk', window: { ...window, length: 400 } },
        slope: { method: 'prices', lags: 999 },
      }),
      ['/money/values', '/slope/lags'],
    ],
    [
      'a slope window too short and too many lags at once',
      slope({ method: 'prices', window: { length: 3 }, lags: 3 }),
      ['/slope/window/length', '/slope/lags'],
    ],
  ];
  test.each(cases)('%s', (_, input, pointers) => {
    const faults = faultsOf(input);
    expect(faults.map((fault) => fault.pointer)).toEqual(pointers);
    for (const { message } of faults) expect(message).toMatch(/^[A-Z].*\.$/s);
  });
});

test('every faulty value is named with its period', () => {
  const values: unknown[] = [...request({}).money.values];
  values[0] = -1;
  values[13] = null;
  values[20] = 'x';
  values[21] = Infinity;
  expect(faultsOf(changed({ money: { start: '1995-01', values } }))).toEqual(
    [
      ['/money/values/0', '1995-01'],
      ['/money/values/13', '1996-02'],
      ['/money/values/20', '1996-09'],
      ['/money/values/21', '1996-10'],
    ].map(([pointer, period]) => expect.objectContaining({ pointer, period })),
  );
});

test('the problem document follows RFC 9457', () => {
  const error = new RefusedError([{ pointer: '/confidence', message: 'It must be so.' }]);
  expect(problem(error)).toEqual({
    type: expect.stringMatching(/^urn:/),
    title: 'The request is refused',
    status: 422,
    detail: 'It must be so.',
    errors: error.faults,
  });
});

test('what is allowed is not refused', () => {
  expect(pointersOf(changed({ gap: {}, confidence: undefined }))).toEqual([]);
  expect(
    pointersOf(
      changed({
        expectation: {
          rule: 'adaptive',
          gain: 1,
          seasonal: 'none',
          window: { kind: 'rolling', length: 12 },
        },
      }),
    ),
  ).toEqual([]);
  expect(pointersOf(changed({ prices: undefined, activity: undefined }))).toEqual([]);
  expect(
    pointersOf(slope({ method: 'structural', gamma: 1.5, eta: 5, relative_demand_variance: 0.45 })),
  ).toEqual([]);
});

test('numbers of an absurd size are refused or finite, never infinite', { timeout: 60_000 }, () => {
  const uniform = uniforms(99);
  const sizes = [1e-320, 1e-300, 1e-9, 1, 1e9, 1e300];
  const pick = <T>(list: readonly T[]): T => list[Math.floor((uniform() + 0.5) * list.length)]!;
  const series = () => ({
    start: '1995-01',
    values: Array.from({ length: 90 }, () => pick(sizes)),
  });
  const slopes = () =>
    pick([
      { method: 'fixed', b: pick(sizes), se_lambda: pick(sizes) },
      {
        method: 'structural',
        gamma: 1 + pick(sizes),
        eta: pick(sizes),
        relative_demand_variance: pick(sizes),
        money_variance: pick(sizes),
      },
      { method: 'prices' },
      { method: 'activity' },
    ]);
  let computed = 0;
  for (let i = 0; i < 80; i++) {
    const input = changed({
      money: series(),
      prices: series(),
      activity: series(),
      expectation: pick([
        { rule: 'random_walk', window: { kind: 'rolling', length: 24 } },
        {
          rule: 'autoregression',
          order: { criterion: 'bic', max: 3 },
          window: { kind: 'rolling', length: 24 },
        },
        { rule: 'adaptive', gain: 0.3, window: { length: 24 } },
      ]),
      slope: slopes(),
      gap: { persistence: pick(['none', 'estimated', 0.9999999, 1e-300]) },
      confidence: pick([1e-300, 0.5, 0.9999999999999999]),
    });
    try {
      const result = compute(input as unknown as ComputeRequest);
      expect(
        JSON.stringify(result, (_, value) =>
          typeof value === 'number' && !Number.isFinite(value) ? 'NOT FINITE' : value,
        ),
      ).not.toContain('NOT FINITE');
      computed++;
    } catch (error) {
      if (!(error instanceof RefusedError)) throw error;
      expect(error.faults.length).toBeGreaterThan(0);
    }
  }
  expect(computed).toBeGreaterThan(10);
});
